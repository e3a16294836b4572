import { execFile } from 'node:child_process';

import * as vscode from 'vscode';
import { LanguageClient } from 'vscode-languageclient/node';

let client: LanguageClient | undefined;
/** Starting and stopping, one after the other. */
let queue: Promise<void> = Promise.resolve();

export function activate(context: vscode.ExtensionContext): Promise<void> {
  context.subscriptions.push(
    vscode.commands.registerCommand('partwright.restart', restart),
    vscode.workspace.onDidChangeConfiguration((change) => {
      if (change.affectsConfiguration('partwright.path')) {
        void restart();
      }
    }),
  );
  return restart();
}

export function deactivate(): Promise<void> {
  return next(stop);
}

function restart(): Promise<void> {
  return next(async () => {
    await stop();
    await start();
  });
}

function next(step: () => Promise<void>): Promise<void> {
  queue = queue.then(step);
  return queue;
}

async function start(): Promise<void> {
  const command = vscode.workspace.getConfiguration('partwright').get('path', 'partwright');
  const why = await whyNot(command);
  if (why !== undefined) {
    tellMissing(command, why);
    return;
  }
  const started: LanguageClient = new LanguageClient(
    'partwright',
    'partwright',
    { command, args: ['serve'] },
    {
      documentSelector: [
        { scheme: 'file', language: 'voicesheet' },
        { scheme: 'untitled', language: 'voicesheet' },
      ],
      // The server lets itself be asked; the client by itself would ask when a sheet is opened only.
      diagnosticPullOptions: { onChange: true, onFocus: true },
      middleware: {
        workspace: {
          // Not to a server that is just being stopped, because the setting is the path to it.
          didChangeConfiguration: async (sections, send) => {
            await queue;
            if (client === started) {
              await send(sections);
            }
          },
        },
      },
    },
  );
  client = started;
  // What goes wrong in here the client itself tells.
  await started.start().catch(() => undefined);
}

async function stop(): Promise<void> {
  const running = client;
  client = undefined;
  // A server that has died by itself cannot be asked to stop, and need not be.
  await running?.dispose().catch(() => undefined);
}

/** Why the program cannot be run; nothing if it can. */
function whyNot(command: string): Promise<string | undefined> {
  return new Promise((answer) => {
    execFile(command, ['--version'], { timeout: 10_000 }, (error) => answer(error?.message));
  });
}

/** The one thing that goes wrong at first: the program is not where it is looked for. */
function tellMissing(command: string, why: string): void {
  const open = 'Open the Setting';
  void vscode.window
    .showErrorMessage(`No sheet is checked: "${command}" does not run. (${why})`, open)
    .then((chosen) => {
      if (chosen === open) {
        void vscode.commands.executeCommand('workbench.action.openSettings', 'partwright.path');
      }
    });
}
