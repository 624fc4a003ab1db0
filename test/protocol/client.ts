import { type ChildProcess, spawn } from 'node:child_process';
import { PassThrough } from 'node:stream';
import { createConnection, ProposedFeatures } from 'vscode-languageserver/node';
import type {
  Diagnostic,
  Position,
  PublishDiagnosticsParams,
  RegistrationParams,
  ServerCapabilities,
} from 'vscode-languageserver-protocol';
import type { ProtocolConnection } from 'vscode-languageserver-protocol/node';
import {
  createProtocolConnection,
  StreamMessageReader,
  StreamMessageWriter,
} from 'vscode-languageserver-protocol/node';
import { serve } from '../../server/src/server.ts';

/** A real client of the protocol, for tests and benchmarks: what it sends and receives goes through streams. */
export interface TestClient {
  readonly connection: ProtocolConnection;
  readonly capabilities: ServerCapabilities;
  readonly child: ChildProcess | undefined;
  /** The methods that the server has registered for since. */
  readonly registered: readonly string[];
  open(uri: string, text: string): void;
  /** Sends one change; without positions it replaces the whole text. */
  change(uri: string, text: string, start?: Position, end?: Position): number;
  close(uri: string): void;
  /** Asks for the findings (pull). */
  pull(uri: string): Promise<readonly Diagnostic[]>;
  /** The next findings that the server pushes for a version of a file, or later. */
  pushed(uri: string, version: number): Promise<readonly Diagnostic[]>;
  stop(): Promise<void>;
}

export interface ClientOptions {
  readonly pull: boolean;
  readonly initializationOptions?: object;
  /** URIs of the folders that are open; none where left out. */
  readonly folders?: readonly string[];
  /** The client watches files, and pulls again when it is asked to. */
  readonly watchesAndRefreshes?: boolean;
  /** Spawns this server program over standard input and output; otherwise the server runs in this process. */
  readonly spawn?: readonly string[];
}

/** Connects, initializes, and returns the client. */
export async function startClient(options: ClientOptions): Promise<TestClient> {
  const { connection, child } = options.spawn ? overProcess(options.spawn) : inProcess();
  const versions = new Map<string, number>();
  const latest = new Map<string, PublishDiagnosticsParams>();
  const waiting = new Set<() => void>();
  connection.onNotification('textDocument/publishDiagnostics', (params: PublishDiagnosticsParams) => {
    latest.set(params.uri, params);
    for (const check of [...waiting]) check();
  });
  const registered: string[] = [];
  connection.onRequest('client/registerCapability', ({ registrations }: RegistrationParams) => {
    registered.push(...registrations.map(({ method }) => method));
    return null;
  });
  const watches = options.watchesAndRefreshes === true;
  connection.listen();
  const { capabilities } = (await connection.sendRequest('initialize', {
    processId: process.pid,
    rootUri: null,
    initializationOptions: options.initializationOptions,
    workspaceFolders: options.folders?.map((uri) => ({ uri, name: uri })) ?? null,
    capabilities: {
      workspace: {
        workspaceEdit: { documentChanges: true, changeAnnotationSupport: {} },
        workspaceFolders: options.folders !== undefined,
        ...(watches
          ? { diagnostics: { refreshSupport: true }, didChangeWatchedFiles: { dynamicRegistration: true } }
          : {}),
      },
      textDocument: {
        hover: { contentFormat: ['markdown', 'plaintext'] },
        ...(options.pull ? { diagnostic: { dynamicRegistration: false } } : {}),
      },
    },
  })) as { capabilities: ServerCapabilities };
  await connection.sendNotification('initialized', {});

  return {
    connection,
    capabilities,
    child,
    registered,
    open(uri, text) {
      versions.set(uri, 1);
      void connection.sendNotification('textDocument/didOpen', {
        textDocument: { uri, languageId: 'rig', version: 1, text },
      });
    },
    change(uri, text, start, end) {
      const version = (versions.get(uri) ?? 0) + 1;
      versions.set(uri, version);
      const change = start && end ? { range: { start, end }, text } : { text };
      void connection.sendNotification('textDocument/didChange', {
        textDocument: { uri, version },
        contentChanges: [change],
      });
      return version;
    },
    close(uri) {
      void connection.sendNotification('textDocument/didClose', { textDocument: { uri } });
    },
    async pull(uri) {
      const report = (await connection.sendRequest('textDocument/diagnostic', { textDocument: { uri } })) as {
        items: readonly Diagnostic[];
      };
      return report.items;
    },
    pushed(uri, version) {
      return new Promise((resolve) => {
        const check = (): void => {
          const params = latest.get(uri);
          if (!params || (params.version ?? 0) < version) return;
          waiting.delete(check);
          resolve(params.diagnostics);
        };
        waiting.add(check);
        check();
      });
    },
    async stop() {
      await connection.sendRequest('shutdown');
      await connection.sendNotification('exit');
      connection.dispose();
      child?.kill();
    },
  };
}

function overProcess(command: readonly string[]): { connection: ProtocolConnection; child: ChildProcess } {
  const child = spawn(command[0]!, command.slice(1), { stdio: ['pipe', 'pipe', 'inherit'] });
  const connection = createProtocolConnection(
    new StreamMessageReader(child.stdout!),
    new StreamMessageWriter(child.stdin!),
  );
  return { connection, child };
}

function inProcess(): { connection: ProtocolConnection; child: undefined } {
  const toServer = new PassThrough();
  const toClient = new PassThrough();
  serve(createConnection(ProposedFeatures.all, toServer, toClient));
  const connection = createProtocolConnection(new StreamMessageReader(toClient), new StreamMessageWriter(toServer));
  return { connection, child: undefined };
}
