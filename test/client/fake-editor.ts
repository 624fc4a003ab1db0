import { build } from 'esbuild';

/** A language client that only remembers what was done with it. */
export class FakeClient {
  running = false;
  readonly log: string[] = [];
  readonly notifications: [string, unknown][] = [];
  /** Answers to requests, one for each, in order; a request without one never returns. */
  readonly answers: Promise<unknown>[] = [];
  readonly requests: [string, unknown][] = [];
  readonly outputChannel = { show: () => this.log.push('show output') };
  readonly code2ProtocolConverter = { asUri: String, asPosition: (position: unknown) => position };

  constructor(
    readonly id: string,
    readonly name: string,
    readonly server: { readonly module: string; readonly transport: string },
    readonly options: ClientOptions,
  ) {}

  isRunning = () => this.running;
  needsStop = () => this.running;
  async start() {
    this.running = true;
    this.log.push('start');
  }
  async stop() {
    this.running = false;
    this.log.push('stop');
  }
  async sendNotification(method: string, parameters: unknown) {
    this.notifications.push([method, parameters]);
  }
  sendRequest(method: string, parameters: unknown) {
    this.requests.push([method, parameters]);
    return this.answers.shift() ?? new Promise(() => undefined);
  }
}

interface ClientOptions {
  readonly documentSelector: readonly unknown[];
  readonly initializationOptions: () => unknown;
  readonly diagnosticPullOptions: { readonly onChange: boolean; readonly onTabs: boolean };
  readonly errorHandler: { readonly closed: () => { readonly action: string; readonly handled?: boolean } };
  readonly middleware: {
    readonly provideDiagnostics: (
      document: unknown,
      previous: unknown,
      token: unknown,
      next: () => Promise<unknown>,
    ) => Promise<unknown>;
  };
}

type Listener = (event: unknown) => unknown;

class Signal {
  readonly listeners = new Set<Listener>();
  readonly on = (listener: Listener) => {
    this.listeners.add(listener);
    return { dispose: () => this.listeners.delete(listener) };
  };
  fire(event: unknown) {
    return Promise.all([...this.listeners].map((listener) => listener(event)));
  }
}

export interface FakePanel {
  title: string;
  readonly webview: { html: string };
  readonly close: () => void;
}

/** As much of the editor as the extension touches; tests set what a person would do or see. */
export class FakeEditor {
  readonly commands = new Map<string, (...parameters: unknown[]) => unknown>();
  readonly executed: [string, unknown][] = [];
  readonly settings: Record<string, unknown> = {};
  readonly files: Record<string, string> = {};
  readonly themeChanged = new Signal();
  readonly settingsChanged = new Signal();
  readonly selectionChanged = new Signal();
  readonly documentChanged = new Signal();
  readonly panels: FakePanel[] = [];
  readonly messages: string[] = [];
  readonly opened: unknown[] = [];
  /** What a person answers to the next message. */
  answer: string | undefined;
  /** The index of the entry a person chooses of a list; none when undefined. */
  choice: number | undefined;
  offered: readonly { readonly label: string; readonly detail: string }[] = [];
  themeKind = 2;
  activeTextEditor: unknown;
  client: FakeClient | undefined;

  /** The module `vscode` as the extension sees it. */
  readonly vscode = {
    ColorThemeKind: { Light: 1, Dark: 2, HighContrast: 3, HighContrastLight: 4 },
    ViewColumn: { Beside: -2 },
    Uri: { joinPath: (base: string, ...parts: readonly string[]) => [base, ...parts].join('/') },
    commands: {
      registerCommand: (name: string, run: (...parameters: unknown[]) => unknown) => {
        this.commands.set(name, run);
        return { dispose: () => this.commands.delete(name) };
      },
      executeCommand: async (name: string, parameters: unknown) => void this.executed.push([name, parameters]),
    },
    window: Object.defineProperties(
      {
        onDidChangeActiveColorTheme: this.themeChanged.on,
        onDidChangeTextEditorSelection: this.selectionChanged.on,
        createWebviewPanel: (_type: string, title: string) => this.createPanel(title),
        showErrorMessage: async (message: string) => {
          this.messages.push(message);
          return this.answer;
        },
        showQuickPick: async (items: FakeEditor['offered']) => {
          this.offered = items;
          return this.choice === undefined ? undefined : items[this.choice];
        },
        showTextDocument: async (document: unknown) => void this.opened.push(document),
      },
      {
        activeColorTheme: { get: () => ({ kind: this.themeKind }) },
        activeTextEditor: { get: () => this.activeTextEditor },
      },
    ),
    workspace: {
      onDidChangeConfiguration: this.settingsChanged.on,
      onDidChangeTextDocument: this.documentChanged.on,
      getConfiguration: () => ({
        get: (name: string, fallback: unknown) => this.settings[`ratewright.${name}`] ?? fallback,
      }),
      openTextDocument: async (options: unknown) => options,
      fs: {
        readDirectory: async () => Object.keys(this.files).map((name) => [name, 1]),
        readFile: async (path: string) => new TextEncoder().encode(this.files[path.split('/').at(-1) ?? '']),
      },
    },
  };

  private createPanel(title: string) {
    const disposed = new Signal();
    const panel = {
      title,
      webview: { html: '' },
      reveal: () => undefined,
      onDidDispose: disposed.on,
      dispose: () => disposed.fire(undefined),
    };
    this.panels.push({
      get title() {
        return panel.title;
      },
      webview: panel.webview,
      close: panel.dispose,
    });
    return panel;
  }
}

interface Extension {
  activate(context: unknown): Promise<void>;
  deactivate(): Promise<void>;
}

let bundle: Promise<string> | undefined;

/** Bundles the extension as it is packed, but for the editor and the client library, which are fakes. */
async function bundled(): Promise<string> {
  const { outputFiles } = await build({
    entryPoints: [new URL('../../client/src/extension.ts', import.meta.url).pathname],
    bundle: true,
    write: false,
    platform: 'node',
    format: 'cjs',
    external: ['vscode', 'vscode-languageclient/node'],
  });
  return outputFiles[0]?.text ?? '';
}

/** Activates the extension in a fake editor. */
export async function activateIn(editor: FakeEditor): Promise<{ extension: Extension; client: FakeClient }> {
  bundle ??= bundled();
  const modules: Record<string, unknown> = {
    vscode: editor.vscode,
    'vscode-languageclient/node': {
      CloseAction: { Restart: 'restart', DoNotRestart: 'leave' },
      ErrorAction: { Continue: 'continue' },
      TransportKind: { ipc: 'ipc' },
      LanguageClient: class extends FakeClient {
        constructor(...parameters: ConstructorParameters<typeof FakeClient>) {
          super(...parameters);
          editor.client = this;
        }
      },
    },
  };
  const module = { exports: {} as Extension };
  const run = new Function('require', 'module', 'exports', await bundle);
  run((name: string) => modules[name], module, module.exports);
  await module.exports.activate({
    subscriptions: [],
    extensionUri: 'file:///extensions/ratewright',
    asAbsolutePath: (path: string) => `/extensions/ratewright/${path}`,
  });
  if (editor.client === undefined) throw new Error('no language client was made');
  return { extension: module.exports, client: editor.client };
}
