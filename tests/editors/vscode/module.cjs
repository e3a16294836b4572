'use strict';
// As much of the editor's own module as the extension and its client touch. What they hand to the
// editor is kept in `seen`; what is missing here is a class with no members, and named in
// `seen.stood_in`, so that the test can say what was not real.

class Disposable {
  constructor(undo) { this.undo = undo; }
  dispose() { this.undo?.(); this.undo = undefined; }
  static from(...all) { return new Disposable(() => { for (const it of all) { it.dispose(); } }); }
}

class EventEmitter {
  constructor() {
    this.heard = new Set();
    this.event = (listener, self) => {
      const one = self ? listener.bind(self) : listener;
      this.heard.add(one);
      return new Disposable(() => this.heard.delete(one));
    };
  }
  fire(what) { for (const one of [...this.heard]) { one(what); } }
  dispose() { this.heard.clear(); }
}

class CancellationTokenSource {
  constructor() { this.token = { isCancellationRequested: false, onCancellationRequested: never }; }
  cancel() { this.token.isCancellationRequested = true; }
  dispose() {}
}

class Position { constructor(line, character) { Object.assign(this, { line, character }); } }
class Range { constructor(start, end, line, character) {
  if (start instanceof Position) { Object.assign(this, { start, end }); }
  else { Object.assign(this, { start: new Position(start, end), end: new Position(line, character) }); }
} }
class Location { constructor(uri, range) { Object.assign(this, { uri, range }); } }
class Diagnostic { constructor(range, message, severity) { Object.assign(this, { range, message, severity }); } }
class DiagnosticRelatedInformation { constructor(location, message) { Object.assign(this, { location, message }); } }
class TextEdit { constructor(range, newText) { Object.assign(this, { range, newText }); } }
class WorkspaceEdit {
  constructor() { this.edits = []; }
  set(uri, edits) { this.edits.push(...edits.flat().filter((it) => it instanceof TextEdit)); }
}
class TabInputText { constructor(uri) { this.uri = uri; } }
class CodeAction { constructor(title) { this.title = title; } }
class CodeActionKind {
  constructor(value) { this.value = value; }
  append(word) { return new CodeActionKind(this.value ? `${this.value}.${word}` : word); }
}
CodeActionKind.Empty = new CodeActionKind('');
CodeActionKind.QuickFix = new CodeActionKind('quickfix');

class Uri {
  constructor(scheme, path) { Object.assign(this, { scheme, path, fsPath: path, authority: '', query: '', fragment: '' }); }
  static file(path) { return new Uri('file', path); }
  static parse(text) { const url = new URL(text); return new Uri(url.protocol.slice(0, -1), decodeURIComponent(url.pathname)); }
  toString() { return `${this.scheme}://${encodeURI(this.path)}`; }
}

const seen = {
  commands: new Map(), providers: {}, diagnostics: new Map(), errors: [], log: [],
  settings: {}, stood_in: new Set(),
};
const never = () => new Disposable();
const opened = new EventEmitter(), changed = new EventEmitter(), closed = new EventEmitter();
const settings = new EventEmitter();

/** A log, as a channel of output is one. */
function channel() {
  const line = (text) => seen.log.push(String(text));
  return {
    name: 'log', logLevel: 3, onDidChangeLogLevel: never, append: line, appendLine: line,
    trace: line, debug: line, info: line, warn: line, error: line,
    replace() {}, clear() {}, show() {}, hide() {}, dispose() {},
  };
}

/** Matches a document against the selector the client gives. */
function match(selector, document) {
  const one = (it) => it.language === document.languageId && (!it.scheme || it.scheme === document.uri.scheme);
  return [selector].flat().some(one) ? 10 : 0;
}

/** A setting, or all those under a name, as the editor gives them: an object in objects. */
function setting(name) {
  if (name in seen.settings) { return seen.settings[name]; }
  const under = Object.keys(seen.settings).filter((it) => it.startsWith(`${name}.`)).map((it) => it.slice(name.length + 1).split('.')[0]);
  return under.length ? Object.fromEntries(under.map((it) => [it, setting(`${name}.${it}`)])) : undefined;
}

const languages = {
  match,
  createDiagnosticCollection: (name) => {
    const all = new Map();
    const put = (uri, list) => {
      all.set(uri.toString(), list ?? []);
      seen.diagnostics.set(name, all);
    };
    const clear = () => { for (const key of all.keys()) { all.set(key, []); } };
    return {
      name, set: put, delete: (uri) => put(uri, []), clear, dispose: clear,
      has: (uri) => all.has(uri.toString()), get: (uri) => all.get(uri.toString()),
    };
  },
  onDidChangeDiagnostics: never,
};

const workspace = {
  textDocuments: [], notebookDocuments: [], workspaceFolders: undefined, isTrusted: true,
  getConfiguration: (section) => ({
    get: (key, otherwise) => setting(section ? `${section}.${key}` : key) ?? otherwise,
    has: () => false, inspect: () => undefined,
  }),
  onDidOpenTextDocument: opened.event,
  onDidChangeTextDocument: changed.event,
  onDidCloseTextDocument: closed.event,
  onDidChangeConfiguration: settings.event,
  getWorkspaceFolder: () => undefined,
  createFileSystemWatcher: () => ({ onDidCreate: never, onDidChange: never, onDidDelete: never, dispose() {} }),
};

const window = {
  activeTextEditor: undefined, visibleTextEditors: [],
  tabGroups: { all: [], onDidChangeTabs: never, onDidChangeTabGroups: never },
  createOutputChannel: channel,
  showErrorMessage: (text) => { seen.errors.push(text); return Promise.resolve(undefined); },
};

const commands = {
  registerCommand: (name, run) => {
    if (seen.commands.has(name)) { throw new Error(`command ${name} is there already`); }
    seen.commands.set(name, run);
    return new Disposable(() => seen.commands.delete(name));
  },
  executeCommand: (name, ...rest) => Promise.resolve(seen.commands.get(name)?.(...rest)),
};

/** `workspace.onDid…` and the like are events that never come; `languages.register…` is kept. */
function kept(space, name) {
  return new Proxy(space, {
    get(known, key) {
      if (key in known || typeof key === 'symbol') { return known[key]; }
      seen.stood_in.add(`${name}.${key}`);
      if (/^register/.test(key)) {
        return (selector, provider) => {
          (seen.providers[key] ??= []).push(provider);
          return new Disposable(() => { seen.providers[key] = seen.providers[key].filter((it) => it !== provider); });
        };
      }
      return /^on(Did|Will)/.test(key) ? never : undefined;
    },
  });
}

/** What the editor does when a sheet is opened, typed in, closed, or a setting is changed. */
const composer = {
  open(path, text) {
    const document = {
      uri: Uri.file(path), fileName: path, languageId: 'voicesheet', version: 1, isClosed: false,
      text, getText: () => document.text,
    };
    workspace.textDocuments.push(document);
    window.tabGroups.all = [{ tabs: [{ input: new TabInputText(document.uri) }] }];
    window.activeTextEditor = { document };
    opened.fire(document);
    return document;
  },
  /** Makes edits whose places are all those before any of them, as one change. */
  edit(document, edits) {
    const lines = document.text.split('\n');
    const offset = (at) => lines.slice(0, at.line).reduce((sum, line) => sum + line.length + 1, 0) + at.character;
    const contentChanges = edits
      .map(({ range, newText }) => {
        const rangeOffset = offset(range.start);
        return { range, rangeOffset, rangeLength: offset(range.end) - rangeOffset, text: newText };
      })
      .sort((a, b) => b.rangeOffset - a.rangeOffset);
    for (const { rangeOffset, rangeLength, text } of contentChanges) {
      document.text = document.text.slice(0, rangeOffset) + text + document.text.slice(rangeOffset + rangeLength);
    }
    document.version += 1;
    changed.fire({ document, contentChanges, reason: undefined });
  },
  set(name, value) {
    seen.settings[name] = value;
    settings.fire({ affectsConfiguration: (section) => name === section || name.startsWith(`${section}.`) });
  },
};

const known = {
  Disposable, EventEmitter, Position, Range, Location, Diagnostic, DiagnosticRelatedInformation,
  CancellationTokenSource, CodeAction, CodeActionKind, TabInputText, TextEdit, Uri, WorkspaceEdit,
  languages: kept(languages, 'languages'), workspace: kept(workspace, 'workspace'),
  window: kept(window, 'window'), commands: kept(commands, 'commands'),
  env: { language: 'en', appName: 'a stand-in', clipboard: {} }, version: '1.91.0',
  extensions: { getExtension: () => undefined, all: [] },
  l10n: { t: (text) => text },
  DiagnosticSeverity: { Error: 0, Warning: 1, Information: 2, Hint: 3 },
  DiagnosticTag: { Unnecessary: 1, Deprecated: 2 },
  LogLevel: { Off: 0, Trace: 1, Debug: 2, Info: 3, Warning: 4, Error: 5 },
  __esModule: true, seen, composer,
};

module.exports = new Proxy(known, {
  get(all, key) {
    if (key in all || typeof key === 'symbol') { return all[key]; }
    seen.stood_in.add(key);
    all[key] = class {};
    return all[key];
  },
});
