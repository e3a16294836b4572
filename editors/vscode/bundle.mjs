// Bundles the extension, and beside it the licences of the packages that went in, by what esbuild
// says it read. esbuild's own `legalComments` keeps the comments in the code alone, and those point
// to files that no bundle holds.

import { readFile, readdir, writeFile } from 'node:fs/promises';

import { build } from 'esbuild';

const { metafile } = await build({
  entryPoints: ['src/extension.ts'],
  outfile: 'dist/extension.js',
  bundle: true,
  platform: 'node',
  format: 'cjs',
  target: 'node20',
  external: ['vscode'],
  minify: true,
  metafile: true,
  logLevel: 'info',
});

const folders = new Set(
  Object.keys(metafile.inputs).flatMap((file) => file.match(/^.*\bnode_modules\/(@[^/]+\/)?[^/]+/)?.[0] ?? []),
);
const notices = await Promise.all([...folders].sort().map(notice));
const head = 'The extension contains these packages, each under its own licence.\n';
await writeFile('dist/notices.txt', [head, ...notices].join(`\n${'-'.repeat(80)}\n\n`));

/** A package by name, and every text on its terms that it comes with. */
async function notice(folder) {
  const { name, version, license } = JSON.parse(await readFile(`${folder}/package.json`, 'utf8'));
  const files = (await readdir(folder)).filter((file) => /^(licen[cs]e|copying|notice|third-?party)/i.test(file));
  if (files.length === 0) {
    throw new Error(`${name} comes without the text of its licence: see ${folder}`);
  }
  const texts = await Promise.all(files.sort().map((file) => readFile(`${folder}/${file}`, 'utf8')));
  const plain = texts.map((text) => `${text.replaceAll('\r\n', '\n').trim()}\n`);
  return [`${name} ${version} (${license})\n`, ...plain].join('\n');
}
