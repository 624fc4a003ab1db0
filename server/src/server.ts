import { performance } from 'node:perf_hooks';
import type { CancellationToken, Connection, InitializeParams, InitializeResult } from 'vscode-languageserver';
import {
  CodeActionKind,
  DidChangeConfigurationNotification,
  DidChangeWatchedFilesNotification,
  LSPErrorCodes,
  ResponseError,
  TextDocumentSyncKind,
} from 'vscode-languageserver';
import type { ClientAbilities } from './editor/client-abilities.ts';
import { abilitiesOf, withTheme } from './editor/client-abilities.ts';
import { FIX_ALL_KIND, fixAllActions, remedyActions } from './editor/code-actions.ts';
import { completionsAt } from './editor/completion.ts';
import { diagnosticsOf } from './editor/diagnostics.ts';
import { foldingOf } from './editor/folding.ts';
import { hoverAt } from './editor/hover.ts';
import { mapAt } from './editor/map-view.ts';
import { outlineOf } from './editor/outline.ts';
import { foldersOf, readableFrom } from './server-folders.ts';
import { today } from './server-today.ts';
import { readUsedFile, readWantedFiles } from './server-used-files.ts';
import type { Evaluation } from './workbench/evaluation.ts';
import { canonicalUri } from './workbench/uris.ts';
import { Workbench } from './workbench/workbench.ts';

/**
 * After so many ms of work the server looks for a message. The longest steps, the folds over all of 10,000 channels, take
 * twice as long again, so that no slice lasts more than 20 ms.
 */
export const SLICE_MS = 6;

/** The files that clients are asked to watch: rig files by name, wherever they lie. */
const WATCHED = [{ globPattern: '**/*.rig.{yaml,yml,json}' }];

interface OpenDocument {
  readonly version: number;
  /** Where the latest change was: what stands near it is checked first. */
  readonly nearOffset: number | undefined;
  /** The evaluation of this version, once somebody has asked for it. */
  evaluated: Promise<Evaluation | undefined> | undefined;
}

/**
 * Serves the language-server protocol on a connection until it closes.
 *
 * Every answer is of the text as it stands when the answer is given: one whose text has changed meanwhile is dropped
 * with `ContentModified` (or `ServerCancelled`, for findings, which the client then asks for again).
 */
export function serve(connection: Connection): void {
  const workbench = new Workbench((message) => connection.console.error(message), today);
  const documents = new Map<string, OpenDocument>();
  let abilities: ClientAbilities = abilitiesOf(undefined);
  /** URIs of the folders that the client has open. */
  let folders: readonly string[] = [];
  const readable = () => readableFrom(folders, documents.keys());

  connection.onInitialize((params: InitializeParams): InitializeResult => {
    abilities = abilitiesOf(params);
    folders = foldersOf(params);
    return {
      serverInfo: { name: 'ratewright' },
      capabilities: {
        textDocumentSync: { openClose: true, change: TextDocumentSyncKind.Incremental },
        ...(abilities.pullsFindings
          ? { diagnosticProvider: { interFileDependencies: true, workspaceDiagnostics: false } }
          : {}),
        ...(abilities.announcesFolders
          ? { workspace: { workspaceFolders: { supported: true, changeNotifications: true } } }
          : {}),
        hoverProvider: true,
        completionProvider: { triggerCharacters: [' ', ':', ',', '{', '['] },
        codeActionProvider: { codeActionKinds: [CodeActionKind.QuickFix, FIX_ALL_KIND] },
        documentSymbolProvider: true,
        foldingRangeProvider: true,
      },
    };
  });
  connection.onInitialized(() => {
    if (abilities.announcesSettings) void connection.client.register(DidChangeConfigurationNotification.type);
    if (abilities.watchesFiles)
      void connection.client.register(DidChangeWatchedFilesNotification.type, { watchers: WATCHED });
    if (abilities.announcesFolders) {
      connection.workspace.onDidChangeWorkspaceFolders(({ added, removed }) => {
        const gone = new Set(removed.map(({ uri }) => uri));
        folders = [...folders.filter((uri) => !gone.has(uri)), ...added.map(({ uri }) => uri)];
        readAgain(workbench.filesUsed());
      });
    }
  });

  connection.onDidOpenTextDocument(({ textDocument }) => {
    const before = readable().paths.length;
    workbench.openFile(textDocument.uri, textDocument.text);
    documents.set(textDocument.uri, { version: textDocument.version, nearOffset: undefined, evaluated: undefined });
    push(textDocument.uri);
    changedBelow([textDocument.uri]);
    // A file outside all open folders opens up its own: what was not read before may be now.
    if (readable().paths.length > before) readAgain(workbench.filesUsed());
  });
  connection.onDidChangeTextDocument(({ textDocument, contentChanges }) => {
    workbench.editFile(textDocument.uri, contentChanges);
    documents.set(textDocument.uri, {
      version: textDocument.version,
      nearOffset: offsetOfLast(textDocument.uri, contentChanges),
      evaluated: undefined,
    });
    push(textDocument.uri);
    changedBelow([textDocument.uri]);
  });
  connection.onDidCloseTextDocument(({ textDocument }) => {
    // Forgotten rather than closed: if others use it, it is read again, as it has become on the disk.
    workbench.forgetFile(textDocument.uri);
    documents.delete(textDocument.uri);
    changedBelow([textDocument.uri]);
    if (!abilities.pullsFindings) void connection.sendDiagnostics({ uri: textDocument.uri, diagnostics: [] });
  });

  connection.onDidChangeWatchedFiles(({ changes }) => {
    const used = new Set(workbench.filesUsed().map(canonicalUri));
    readAgain(changes.map(({ uri }) => uri).filter((uri) => used.has(canonicalUri(uri))));
  });

  /** Reads used files again, and has those who use them checked again. */
  function readAgain(uris: readonly string[]): void {
    for (const uri of uris) workbench.setFile(uri, readUsedFile(uri, readable()));
    changedBelow(uris);
  }

  /** After files have changed: the findings of open documents that use them may be others now. */
  function changedBelow(uris: readonly string[]): void {
    workbench.forgetUnused();
    const users = new Set(uris.flatMap((uri) => workbench.usersOf(uri)));
    for (const uri of users) {
      const document = documents.get(uri);
      if (!document) continue;
      documents.set(uri, { ...document, evaluated: undefined });
      push(uri);
    }
    if (users.size > 0) askToRefresh();
  }

  let refreshing: 'no' | 'yes' | 'once more' = 'no';

  /** Asks a client that pulls to pull again; never a second time before it has answered the first. */
  function askToRefresh(): void {
    if (!abilities.pullsFindings || !abilities.refreshesFindings) return;
    if (refreshing !== 'no') {
      refreshing = 'once more';
      return;
    }
    refreshing = 'yes';
    const after = (): void => {
      const again = refreshing === 'once more';
      refreshing = 'no';
      if (again) askToRefresh();
    };
    connection.languages.diagnostics.refresh().then(after, after);
  }

  function offsetOfLast(uri: string, changes: readonly object[]): number | undefined {
    const last = changes.at(-1);
    if (!last || !('range' in last)) return undefined;
    const { start } = last.range as { readonly start: { readonly line: number; readonly character: number } };
    return workbench.snapshot(uri)?.offsetAt(start);
  }

  /** The evaluation of the document as it stands; rejects when the document changes before it is done. */
  function evaluated(uri: string): Promise<Evaluation | undefined> {
    const document = documents.get(uri);
    if (!document) return Promise.resolve(undefined);
    document.evaluated ??= evaluateInSlices(uri, document);
    return document.evaluated;
  }

  async function evaluateInSlices(uri: string, document: OpenDocument): Promise<Evaluation | undefined> {
    readWantedFiles(workbench, readable);
    const steps = workbench.evaluating(uri, document.nearOffset);
    for (;;) {
      const sliceEnd = performance.now() + SLICE_MS;
      do {
        const step = steps.next();
        if (step.done) return step.value;
      } while (performance.now() < sliceEnd);
      await new Promise(setImmediate);
      if (documents.get(uri) !== document) throw new Outdated();
    }
  }

  function push(uri: string): void {
    if (abilities.pullsFindings) return;
    const document = documents.get(uri);
    // One turn later, so that changes that arrived together are checked once.
    setImmediate(() => {
      if (!document || documents.get(uri) !== document) return;
      void evaluated(uri).then(
        (evaluation) => {
          if (!evaluation || documents.get(uri) !== document) return;
          const diagnostics = diagnosticsOf(uri, evaluation, abilities.links);
          void connection.sendDiagnostics({ uri, version: document.version, diagnostics });
        },
        (fault: unknown) => {
          if (!(fault instanceof Outdated)) connection.console.error(String(fault));
        },
      );
    });
  }

  /**
   * Answers a request from the evaluation of the document as it stands. The answer is made in one go after the
   * evaluation, so that nothing can change between the two.
   */
  async function answer<T>(
    uri: string,
    token: CancellationToken,
    none: T,
    make: (evaluation: Evaluation) => T,
    outdated: number = LSPErrorCodes.ContentModified,
  ): Promise<T> {
    const document = documents.get(uri);
    if (!document) return none;
    const evaluation = await evaluated(uri).catch((fault: unknown) => {
      if (fault instanceof Outdated) throw outdatedError(outdated);
      throw fault;
    });
    if (token.isCancellationRequested) throw new ResponseError(LSPErrorCodes.RequestCancelled, 'Cancelled.');
    if (documents.get(uri) !== document) throw outdatedError(outdated);
    return evaluation ? make(evaluation) : none;
  }

  connection.languages.diagnostics.on(({ textDocument: { uri } }, token) =>
    answer(
      uri,
      token,
      { kind: 'full', items: [] },
      (evaluation) => ({ kind: 'full', items: diagnosticsOf(uri, evaluation, abilities.links) }),
      LSPErrorCodes.ServerCancelled,
    ),
  );
  connection.onHover(({ textDocument: { uri }, position }, token) =>
    answer(uri, token, null, (evaluation) => hoverAt(evaluation, position, abilities)),
  );
  connection.onCompletion(({ textDocument: { uri }, position }, token) =>
    answer(uri, token, null, (evaluation) => completionsAt(evaluation, position)),
  );
  connection.onDocumentSymbol(({ textDocument: { uri } }, token) => answer(uri, token, [], outlineOf));
  connection.onFoldingRanges(({ textDocument: { uri } }, token) =>
    answer(uri, token, [], (evaluation) => foldingOf(evaluation.snapshot)),
  );
  connection.onCodeAction(({ textDocument: { uri }, range, context }, token) =>
    answer(uri, token, [], () => {
      const request = {
        uri,
        version: documents.get(uri)?.version ?? null,
        range,
        diagnostics: context.diagnostics,
        edits: abilities.edits,
        isCancelled: () => token.isCancellationRequested,
      };
      const wants = (kind: string): boolean =>
        context.only === undefined || context.only.some((only) => kind === only || kind.startsWith(`${only}.`));
      return [
        ...(wants(CodeActionKind.QuickFix) ? remedyActions(workbench, request) : []),
        ...(context.only !== undefined && wants(FIX_ALL_KIND) ? fixAllActions(workbench, request) : []),
      ];
    }),
  );
  connection.onRequest(
    'ratewright/map',
    (
      { textDocument, position }: { textDocument: { uri: string }; position: { line: number; character: number } },
      token,
    ) => answer(textDocument.uri, token, null, (evaluation) => mapAt(evaluation, position, abilities)),
  );
  connection.onNotification('ratewright/theme', ({ theme }: { theme: unknown }) => {
    abilities = withTheme(abilities, theme);
  });

  connection.listen();
}

/** The document changed before its evaluation was done. */
class Outdated extends Error {}

function outdatedError(code: number): ResponseError<unknown> {
  return code === LSPErrorCodes.ServerCancelled
    ? new ResponseError(code, 'The document has changed.', { retriggerRequest: true })
    : new ResponseError(code, 'The document has changed.');
}
