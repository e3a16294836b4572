'use strict';
// Unpacks a packaged extension, loads it as the editor does, with a stand-in for the editor's own
// module, and writes what it does to standard output, a line a fact. `tests/editors/vscode.rs`
// starts this and judges the lines.
//
//   node composer.cjs PACKAGE EMPTY_FOLDER SHEET PATH_TO_PROGRAM NODE_MODULES_OF_THE_EXTENSION

const fs = require('node:fs');
const path = require('node:path');
const childProcess = require('node:child_process');

const [packed, folder, sheet, program, modules] = process.argv.slice(2);
const LIMIT = 20000;
let mock;

const tell = (text) => process.stdout.write(`${text}\n`);

async function until(what, ready) {
  for (const last = Date.now() + LIMIT; !(await ready());) {
    if (Date.now() > last) { throw new Error(`waited in vain for ${what}`); }
    await new Promise((go) => setTimeout(go, 10));
  }
}

/** Unpacks; the names in the package, in order. */
async function unpack() {
  const yauzl = require(path.join(modules, 'yauzl'));
  const zip = await yauzl.openPromise(packed);
  const names = [];
  for await (const entry of zip.eachEntry()) {
    names.push(entry.fileName);
    const to = path.join(folder, entry.fileName);
    fs.mkdirSync(path.dirname(to), { recursive: true });
    const from = await zip.openReadStreamPromise(entry);
    await require('node:stream/promises').pipeline(from, fs.createWriteStream(to));
  }
  return names.sort();
}

/** The packages that go into a bundle of the source, and which of them the notices leave out. */
function tellNotices(root) {
  const source = path.join(modules, '..');
  // At once: what bundles in the background would be one more program that runs.
  const { metafile } = require(path.join(modules, 'esbuild')).buildSync({
    absWorkingDir: source, entryPoints: ['src/extension.ts'], outfile: 'none.js', write: false,
    bundle: true, platform: 'node', external: ['vscode'], metafile: true,
  });
  const inside = Object.keys(metafile.inputs).filter((file) => file.includes('node_modules/'));
  const parents = inside.map((file) => {
    const words = file.split('/');
    const at = words.lastIndexOf('node_modules') + 1;
    return words.slice(0, at + (words[at].startsWith('@') ? 2 : 1)).join('/');
  });
  const notices = fs.readFileSync(path.join(root, 'dist/notices.txt'), 'utf8');
  const flat = (text) => text.replace(/\s+/g, ' ').trim();
  const bundled = [], missing = [];
  for (const parent of [...new Set(parents)].sort()) {
    const folder = path.join(source, parent);
    const { name, version, license } = JSON.parse(fs.readFileSync(path.join(folder, 'package.json'), 'utf8'));
    bundled.push(name);
    const terms = fs.readdirSync(folder).filter((file) => file.toLowerCase().startsWith('licen'));
    const texts = terms.map((file) => flat(fs.readFileSync(path.join(folder, file), 'utf8')));
    const named = notices.split('\n').includes(`${name} ${version} (${license})`);
    const whole = texts.length > 0 && texts.every((text) => flat(notices).includes(text));
    if (!named || !whole) { missing.push(name); }
  }
  tell(`bundled ${bundled.join(' ')}`);
  tell(`without a notice: ${missing.join(' ') || 'none'}`);
}

/** The programs that were started and still run: how they were called. */
const children = new Set();
const spawn = childProcess.spawn;
childProcess.spawn = (...words) => {
  const child = spawn(...words);
  const one = { pid: child.pid, call: [path.basename(child.spawnfile), ...child.spawnargs.slice(1)].join(' ') };
  children.add(one);
  for (const end of ['exit', 'error']) { child.once(end, () => children.delete(one)); }
  return child;
};
const tellChildren = () => tell(`started ${[...children].map((child) => child.call).join(', ')}`);

function tellFindings(seen) {
  const lists = [...seen.diagnostics.values()].flatMap((all) => [...all.values()]).flat();
  tell(`findings ${lists.length}`);
  for (const it of lists) {
    const code = it.code?.value ?? it.code;
    tell(`finding ${it.range.start.line + 1}:${it.range.start.character + 1} severity ${it.severity} ${it.source} ${code}`);
    tell(`message ${it.message}`);
  }
}

async function main() {
  for (const name of await unpack()) { tell(`packed ${name}`); }
  const root = path.join(folder, 'extension');
  tellNotices(root);
  const manifest = JSON.parse(fs.readFileSync(path.join(root, 'package.json'), 'utf8'));
  tell(`manifest ${manifest.publisher}.${manifest.name}, depends on ${Object.keys(manifest.dependencies ?? {}).length}`);
  for (const language of manifest.contributes.languages) {
    const rules = JSON.parse(fs.readFileSync(path.join(root, language.configuration), 'utf8'));
    tell(`language ${language.id}, ${language.extensions.join(' ')}, comment ${rules.comments.lineComment}`);
    // The editor adds `g` by itself.
    const words = 'S | F♯4 - Bb2.C | 𝄪'.match(new RegExp(rules.wordPattern, 'gu'));
    tell(`words ${words.join(' ')}`);
  }
  tell(`activation ${manifest.activationEvents.join(' ')}`);

  // Found by Node as the editor's module is: by its name.
  fs.mkdirSync(path.join(folder, 'node_modules'));
  fs.copyFileSync(path.join(__dirname, 'module.cjs'), path.join(folder, 'node_modules/vscode.js'));
  mock = require(path.join(folder, 'node_modules/vscode.js'));
  const { seen, composer } = mock;
  const extension = require(path.join(root, manifest.main));

  for (const [name, it] of Object.entries(manifest.contributes.configuration.properties)) {
    seen.settings[name] = it.default;
  }
  const text = fs.readFileSync(sheet, 'utf8');
  const document = composer.open(sheet, text);
  const context = { subscriptions: [] };
  await extension.activate(context);
  tellChildren();
  const declared = manifest.contributes.commands.map((it) => it.command);
  tell(`commands without a declaration ${declared.filter((name) => !seen.commands.has(name)).length}`);
  const list = () => [...seen.diagnostics.values()].flatMap((all) => all.get(document.uri.toString()) ?? []);
  const found = (count) => until(`${count} findings`, () => list().length === count);
  await found(1);
  tellFindings(seen);
  const [first] = children;

  // A mend, and then a licence, as the menu at the finding offers them.
  const [actions] = seen.providers.registerCodeActionsProvider;
  const never = { isCancellationRequested: false, onCancellationRequested: () => ({ dispose() {} }) };
  for (const [nth, pick] of [(title) => title.startsWith('Move'), (title) => title.startsWith('Grant')].entries()) {
    const [at] = list();
    const context = { diagnostics: [at], only: undefined, triggerKind: 1 };
    const offered = await actions.provideCodeActions(document, at.range, context, never);
    if (nth === 0) { for (const it of offered) { tell(`offered ${it.isPreferred ? 'first ' : ''}${it.title}`); } }
    const chosen = offered.find((it) => pick(it.title));
    const whole = chosen.edit ? chosen : await actions.resolveCodeAction(chosen, never);
    const before = document.text;
    composer.edit(document, whole.edit.edits);
    await found(0);
    tell(`chose ${chosen.title}`);
    const old = before.split('\n');
    for (const line of document.text.split('\n')) { if (!old.includes(line)) { tell(`changed ${line}`); } }
    const end = document.text.split('\n').length;
    composer.edit(document, [{ range: new mock.Range(0, 0, end, 0), newText: before }]);
    await found(1);
  }

  composer.set('partwright.style', 'motet');
  await found(3);
  tell(`as a motet ${list().map((it) => it.code?.value ?? it.code).sort().join(', ')}`);
  composer.set('partwright.style', '');
  await found(1);

  composer.set('partwright.path', 'no-such-program');
  await until('the word that it is missing', () => seen.errors.length > 0);
  for (const error of seen.errors) { tell(`error ${error}`); }
  await until('the first to be gone', () => children.size === 0);
  tellFindings(seen);

  seen.errors.length = 0;
  composer.set('partwright.path', program);
  await found(1);
  tellChildren();
  tell(`another ${![...children].includes(first)}`);
  await seen.commands.get('partwright.restart')();
  tellChildren();

  await extension.deactivate();
  for (const it of context.subscriptions) { it.dispose(); }
  await until('the server to be gone', () => children.size === 0);
  tell(`errors ${seen.errors.length}`);
  tell(`commands left ${seen.commands.size}`);
  // Anything that still holds the process up is a leak: no call of exit here.
  setTimeout(() => { tell('FAILED: something holds the process up'); process.exit(1); }, LIMIT).unref();
}

main().catch((reason) => {
  tell(`FAILED: ${reason?.stack ?? reason}`);
  for (const line of mock?.seen.log ?? []) { tell(`log ${line}`); }
  process.exit(1);
});
