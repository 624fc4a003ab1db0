import { commands, type ExtensionContext } from 'vscode';
import type { LanguageClient } from 'vscode-languageclient/node';
import { MapPanel } from './map-panel.ts';
import { newFromSample } from './new-from-sample.ts';
import { createServerProcess, followSettings, followTheme, restartServer } from './server-process.ts';

let running: LanguageClient | undefined;

/** Called by the editor when a rig file is opened or one of the commands is chosen. */
export async function activate(context: ExtensionContext): Promise<void> {
  const client = createServerProcess(context);
  const panel = new MapPanel(client);
  running = client;
  context.subscriptions.push(
    panel,
    followTheme(client),
    followSettings(client),
    commands.registerCommand('ratewright.newFromSample', () => newFromSample(context)),
    commands.registerCommand('ratewright.showMap', () => panel.open()),
    commands.registerCommand('ratewright.restart', () => restartServer(client)),
    commands.registerCommand('ratewright.fixEveryChannel', () =>
      commands.executeCommand('editor.action.codeAction', { kind: 'source.fixAll.ratewright', apply: 'first' }),
    ),
  );
  await client.start();
}

/** Called by the editor when it closes or the extension is switched off. */
export async function deactivate(): Promise<void> {
  await running?.stop();
}
