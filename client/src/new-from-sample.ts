import { type ExtensionContext, Uri, window, workspace } from 'vscode';
import { describeSample } from './samples.ts';

const UTF8 = new TextDecoder('utf-8');

async function readSamples(folder: Uri) {
  const names = (await workspace.fs.readDirectory(folder)).map(([name]) => name).filter((name) => /\.rig\./.test(name));
  return Promise.all(
    names.sort().map(async (name) => {
      const text = UTF8.decode(await workspace.fs.readFile(Uri.joinPath(folder, name)));
      const sample = describeSample(name, text);
      return { label: sample.title, detail: sample.summary, text };
    }),
  );
}

/** Lets a person choose one of the rigs that come with the extension and opens a copy of it, not saved yet. */
export async function newFromSample(context: ExtensionContext): Promise<void> {
  const items = await readSamples(Uri.joinPath(context.extensionUri, 'client', 'samples'));
  const chosen = await window.showQuickPick(items, {
    title: 'New rig file from sample',
    placeHolder: 'The copy is yours to change; save it where you like',
    matchOnDetail: true,
  });
  if (chosen === undefined) return;
  await window.showTextDocument(await workspace.openTextDocument({ language: 'rig', content: chosen.text }));
}
