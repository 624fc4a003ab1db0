import { type Disposable, type ExtensionContext, Uri, window } from 'vscode';
import {
  CloseAction,
  type CloseHandlerResult,
  ErrorAction,
  LanguageClient,
  type LanguageClientOptions,
  type ServerOptions,
  TransportKind,
} from 'vscode-languageclient/node';
import { decideOnDeath } from './restart-policy.ts';
import { isRigFile, rigFiles } from './rig-files.ts';
import { themeName } from './theme.ts';

/** What the server is told at its start; it works without any of it, as it does for other editors. */
interface InitializationOptions {
  readonly theme: ReturnType<typeof themeName>;
  /** Folder of the reference pages, one `NAME.md` a check or key. */
  readonly referenceFolder: string;
}

function initializationOptions(context: ExtensionContext): InitializationOptions {
  return {
    theme: themeName(window.activeColorTheme.kind),
    referenceFolder: Uri.joinPath(context.extensionUri, 'dist', 'reference').fsPath,
  };
}

/** Says once that the server keeps dying, and offers the two things a person can do about it. */
async function sayServerGivenUp(client: LanguageClient): Promise<void> {
  const restart = 'Restart';
  const showOutput = 'Show output';
  const answer = await window.showErrorMessage(
    'Ratewright stopped five times within three minutes and was left stopped: findings are no longer updated.',
    restart,
    showOutput,
  );
  if (answer === restart) await client.start();
  if (answer === showOutput) client.outputChannel.show(true);
}

/** Makes the client of the language server in `dist/server.cjs`, which runs in a process of its own; does not start it. */
export function createServerProcess(context: ExtensionContext): LanguageClient {
  const module = context.asAbsolutePath('dist/server.cjs');
  const server: ServerOptions = { module, transport: TransportKind.ipc };

  let deathsMs: readonly number[] = [];
  const closed = (): CloseHandlerResult => {
    const decision = decideOnDeath(deathsMs, Date.now());
    deathsMs = decision.restart ? decision.deathsMs : [];
    if (decision.restart) return { action: CloseAction.Restart };
    void sayServerGivenUp(client);
    return { action: CloseAction.DoNotRestart, handled: true };
  };

  const options: LanguageClientOptions = {
    documentSelector: [...rigFiles],
    initializationOptions: () => initializationOptions(context),
    synchronize: { configurationSection: 'ratewright' },
    diagnosticPullOptions: {
      onChange: true,
      onTabs: true,
      match: (_selector, resource) => isRigFile({ languageId: 'yaml', fileName: resource.path }),
    },
    errorHandler: { error: () => ({ action: ErrorAction.Continue }), closed },
  };
  const client = new LanguageClient('ratewright', 'Ratewright', server, options);
  return client;
}

/** Keeps the server told of the theme's kind, so that the pictures it draws fit. */
export function followTheme(client: LanguageClient): Disposable {
  return window.onDidChangeActiveColorTheme(async (theme) => {
    if (client.isRunning()) await client.sendNotification('ratewright/theme', { theme: themeName(theme.kind) });
  });
}
