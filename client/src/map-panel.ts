import {
  type Disposable,
  type Position,
  type TextEditor,
  type Uri,
  ViewColumn,
  type WebviewPanel,
  window,
  workspace,
} from 'vscode';
import type { LanguageClient } from 'vscode-languageclient/node';
import { type AliasMap, emptyMapPage, mapPage } from './map-page.ts';
import { isRigFile } from './rig-files.ts';

const NO_CHANNEL = 'Put the cursor on a channel of a rig file to see its alias map here.';

/** The one read-only view beside the text; it shows the map of the channel under the cursor, and follows edits. */
export class MapPanel implements Disposable {
  private panel: WebviewPanel | undefined;
  private following: Disposable[] = [];
  /** Counts requests, so that an answer overtaken by a later request is dropped. */
  private latest = 0;

  constructor(private readonly client: LanguageClient) {}

  async open(): Promise<void> {
    const editor = window.activeTextEditor;
    if (this.panel === undefined) this.create();
    else this.panel.reveal(undefined, true);
    await this.show(editor);
  }

  dispose(): void {
    this.panel?.dispose();
  }

  private create(): void {
    const column = { viewColumn: ViewColumn.Beside, preserveFocus: true };
    const panel = window.createWebviewPanel('ratewright.map', 'Alias map', column, { enableScripts: false });
    panel.webview.html = emptyMapPage(NO_CHANNEL);
    this.panel = panel;
    this.following = [
      window.onDidChangeTextEditorSelection((change) => void this.show(change.textEditor)),
      window.onDidChangeActiveColorTheme(() => void this.show(window.activeTextEditor)),
      workspace.onDidChangeTextDocument((change) => {
        const editor = window.activeTextEditor;
        if (editor?.document === change.document) void this.show(editor);
      }),
    ];
    panel.onDidDispose(() => {
      for (const listener of this.following) listener.dispose();
      this.following = [];
      this.panel = undefined;
    });
  }

  private async show(editor: TextEditor | undefined): Promise<void> {
    if (editor === undefined || !isRigFile(editor.document)) return;
    const mine = ++this.latest;
    const map = await this.ask(editor.document.uri, editor.selection.active);
    if (map === 'outdated' || this.panel === undefined || mine !== this.latest) return;
    this.panel.title = map?.title ?? 'Alias map';
    this.panel.webview.html = map === null ? emptyMapPage(NO_CHANNEL) : mapPage(map);
  }

  private async ask(uri: Uri, position: Position): Promise<AliasMap | null | 'outdated'> {
    const { client } = this;
    if (!client.isRunning()) return 'outdated';
    const parameters = {
      textDocument: { uri: client.code2ProtocolConverter.asUri(uri) },
      position: client.code2ProtocolConverter.asPosition(position),
    };
    try {
      return await client.sendRequest<AliasMap | null>('ratewright/map', parameters);
    } catch {
      // The text changed before the answer was ready; the change has asked again.
      return 'outdated';
    }
  }
}
