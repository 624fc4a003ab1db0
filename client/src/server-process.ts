import { type Disposable, type ExtensionContext, Uri, window, workspace } from 'vscode';
import {
  CloseAction,
  type CloseHandlerResult,
  ErrorAction,
  LanguageClient,
  type LanguageClientOptions,
  type Middleware,
  type ServerOptions,
  TransportKind,
} from 'vscode-languageclient/node';
import { decideOnDeath } from './restart-policy.ts';
import { isRigFile, rigFiles } from './rig-files.ts';
import { changesSettings, readSettings } from './settings.ts';
import { shownFindings } from './shown-findings.ts';
import { type ThemeName, themeName } from './theme.ts';

/** What the server is told at its start; it works without any of it, as it does for other editors. */
interface InitializationOptions {
  readonly theme: ThemeName;
  /** Whether a hover may hold a picture. */
  readonly pictures: boolean;
  /** URI of the folder of the reference pages. */
  readonly referenceFolder: string;
}

function initializationOptions(context: ExtensionContext): InitializationOptions {
  return {
    theme: themeName(window.activeColorTheme.kind),
    pictures: readSettings().hoverPicture,
    referenceFolder: Uri.joinPath(context.extensionUri, 'dist', 'reference').toString(),
  };
}

/** Leaves out of the server's answer what the settings ask not to see. */
const onlyShown: NonNullable<Middleware['provideDiagnostics']> = async (document, previous, token, next) => {
  const report = await next(document, previous, token);
  if (!report || !('items' in report)) return report;
  return { ...report, items: [...shownFindings(report.items, readSettings().findingsShown)] };
};

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
    diagnosticPullOptions: {
      onChange: true,
      onTabs: true,
      match: (_selector, resource) => isRigFile({ languageId: 'yaml', fileName: resource.path }),
    },
    middleware: { provideDiagnostics: onlyShown },
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

/** Starts the server anew, also where it was left stopped. */
export async function restartServer(client: LanguageClient): Promise<void> {
  if (client.needsStop()) await client.stop();
  await client.start();
}

/** Starts the server anew when a setting changes that it, or what is shown of its answers, depends on. */
export function followSettings(client: LanguageClient): Disposable {
  return workspace.onDidChangeConfiguration(async (change) => {
    if (client.isRunning() && changesSettings(change)) await restartServer(client);
  });
}
