import { createRequire } from 'node:module';
import { describe, expect, it } from 'vitest';
import { activateIn, FakeEditor } from './fake-editor.ts';

const { contributes } = createRequire(import.meta.url)('../../package.json');

/** A text editor on a rig file with its cursor on a line. */
function rigEditor(line: number) {
  return {
    document: { languageId: 'rig', fileName: '/w/fan.rig.yaml', uri: 'file:///w/fan.rig.yaml' },
    selection: { active: { line, character: 4 } },
  };
}

const map = (title: string) => ({ title, svg: `<svg>${title}</svg>`, text: title });

describe('activation', () => {
  it('registers every command that is contributed, and no other', async () => {
    const editor = new FakeEditor();
    await activateIn(editor);
    const contributed = contributes.commands.map(({ command }: { command: string }) => command);
    expect([...editor.commands.keys()].sort()).toEqual(contributed.sort());
  });

  it('starts the server over IPC and tells it the theme, pictures and where the reference lies', async () => {
    const editor = new FakeEditor();
    editor.themeKind = 3;
    const { client } = await activateIn(editor);
    expect(client.log).toEqual(['start']);
    expect(client.server).toEqual({ module: '/extensions/ratewright/dist/server.cjs', transport: 'ipc' });
    expect(client.options.initializationOptions()).toEqual({
      theme: 'high-contrast',
      pictures: true,
      referenceFolder: 'file:///extensions/ratewright/dist/reference',
    });
    expect(client.options.diagnosticPullOptions).toMatchObject({ onChange: true, onTabs: true });
  });

  it('stops the server when it is switched off', async () => {
    const { extension, client } = await activateIn(new FakeEditor());
    await extension.deactivate();
    expect(client.log).toEqual(['start', 'stop']);
  });
});

describe('changes that the server is told of', () => {
  it('the theme, by its kind', async () => {
    const editor = new FakeEditor();
    const { client } = await activateIn(editor);
    for (const kind of [1, 2, 3, 4]) await editor.themeChanged.fire({ kind });
    expect(client.notifications).toEqual(
      ['light', 'dark', 'high-contrast', 'high-contrast-light'].map((theme) => ['ratewright/theme', { theme }]),
    );
  });

  it('settings that it depends on, by starting anew; not others', async () => {
    const editor = new FakeEditor();
    const { client } = await activateIn(editor);
    await editor.settingsChanged.fire({ affectsConfiguration: (name: string) => name === 'ratewright.trace' });
    expect(client.log).toEqual(['start']);
    editor.settings['ratewright.hover.picture'] = false;
    await editor.settingsChanged.fire({ affectsConfiguration: (name: string) => name === 'ratewright.hover' });
    expect(client.log).toEqual(['start', 'stop', 'start']);
    expect(client.options.initializationOptions()).toMatchObject({ pictures: false });
  });
});

describe('findings', () => {
  it('that the settings ask not to see are left out', async () => {
    const editor = new FakeEditor();
    const { client } = await activateIn(editor);
    const report = { kind: 'full', items: [{ severity: 0 }, { severity: 1 }, { severity: 3 }] };
    const pull = (answer: unknown) =>
      client.options.middleware.provideDiagnostics(undefined, undefined, undefined, async () => answer);
    expect(await pull(report)).toEqual(report);
    editor.settings['ratewright.findings.show'] = 'warnings';
    expect(await pull(report)).toEqual({ kind: 'full', items: [{ severity: 0 }, { severity: 1 }] });
    expect(await pull({ kind: 'unChanged', resultId: '1' })).toEqual({ kind: 'unChanged', resultId: '1' });
    expect(await pull(null)).toBeNull();
  });
});

describe('a server that dies', () => {
  it('is started anew four times without a word; at the fifth it is said, and Restart starts it', async () => {
    const editor = new FakeEditor();
    const { client } = await activateIn(editor);
    const die = () => client.options.errorHandler.closed();
    for (let death = 1; death <= 4; death++) expect(die()).toEqual({ action: 'restart' });
    expect(editor.messages).toEqual([]);
    client.running = false;
    editor.answer = 'Restart';
    expect(die()).toEqual({ action: 'leave', handled: true });
    await new Promise(setImmediate);
    expect(editor.messages).toHaveLength(1);
    expect(editor.messages[0]).toContain('stopped five times');
    expect(client.log).toEqual(['start', 'start']);
  });

  it('can be started by the command after that', async () => {
    const editor = new FakeEditor();
    const { client } = await activateIn(editor);
    client.running = false;
    await editor.commands.get('ratewright.restart')?.();
    expect(client.log).toEqual(['start', 'start']);
    await editor.commands.get('ratewright.restart')?.();
    expect(client.log).toEqual(['start', 'start', 'stop', 'start']);
  });
});

describe('the alias map', () => {
  it('is that of the channel under the cursor, and follows the cursor and the text until it is closed', async () => {
    const editor = new FakeEditor();
    const { client } = await activateIn(editor);
    editor.activeTextEditor = rigEditor(7);
    client.answers.push(...['a', 'b', 'c'].map((title) => Promise.resolve(map(title))));
    await editor.commands.get('ratewright.showMap')?.();
    const [panel] = editor.panels;
    expect(panel?.title).toBe('a');
    expect(client.requests).toEqual([
      ['ratewright/map', { textDocument: { uri: 'file:///w/fan.rig.yaml' }, position: { line: 7, character: 4 } }],
    ]);
    await editor.selectionChanged.fire({ textEditor: rigEditor(9) });
    await new Promise(setImmediate);
    expect(panel?.title).toBe('b');
    await editor.documentChanged.fire({ document: (editor.activeTextEditor as ReturnType<typeof rigEditor>).document });
    await new Promise(setImmediate);
    expect(panel?.title).toBe('c');
    panel?.close();
    await editor.selectionChanged.fire({ textEditor: rigEditor(9) });
    expect(client.requests).toHaveLength(3);
  });

  it('of an answer that a later one has overtaken is dropped', async () => {
    const editor = new FakeEditor();
    const { client } = await activateIn(editor);
    editor.activeTextEditor = rigEditor(7);
    client.answers.push(Promise.resolve(map('first')));
    await editor.commands.get('ratewright.showMap')?.();
    let answerLate: (value: unknown) => void = () => undefined;
    client.answers.push(new Promise((resolve) => (answerLate = resolve)), Promise.resolve(map('new')));
    await editor.selectionChanged.fire({ textEditor: rigEditor(8) });
    await editor.selectionChanged.fire({ textEditor: rigEditor(9) });
    await new Promise(setImmediate);
    answerLate(map('old'));
    await new Promise(setImmediate);
    expect(editor.panels[0]?.title).toBe('new');
  });

  it('says what to do where the cursor is on no channel, or the text is no rig file', async () => {
    const editor = new FakeEditor();
    const { client } = await activateIn(editor);
    await editor.commands.get('ratewright.showMap')?.();
    expect(editor.panels[0]?.webview.html).toContain('Put the cursor on a channel');
    editor.activeTextEditor = rigEditor(0);
    client.answers.push(Promise.resolve(null));
    await editor.commands.get('ratewright.showMap')?.();
    expect(editor.panels).toHaveLength(1);
    expect(editor.panels[0]?.webview.html).toContain('Put the cursor on a channel');
  });

  it('keeps what it shows where an answer fails because the text has moved on', async () => {
    const editor = new FakeEditor();
    const { client } = await activateIn(editor);
    editor.activeTextEditor = rigEditor(7);
    client.answers.push(Promise.resolve(map('kept')), Promise.reject(new Error('The document has changed.')));
    await editor.commands.get('ratewright.showMap')?.();
    await editor.selectionChanged.fire({ textEditor: rigEditor(8) });
    await new Promise(setImmediate);
    expect(editor.panels[0]?.title).toBe('kept');
  });
});

describe('other commands', () => {
  it('a sample is offered by name and opened as a new rig file', async () => {
    const editor = new FakeEditor();
    await activateIn(editor);
    editor.files['b.rig.yaml'] = '# Second.\nrig: B\n';
    editor.files['a.rig.yaml'] = 'rig: A\n';
    editor.files['notes.md'] = '# no rig';
    await editor.commands.get('ratewright.newFromSample')?.();
    expect(editor.offered.map(({ label, detail }) => [label, detail])).toEqual([
      ['A', ''],
      ['B', 'Second.'],
    ]);
    expect(editor.opened).toEqual([]);
    editor.choice = 1;
    await editor.commands.get('ratewright.newFromSample')?.();
    expect(editor.opened).toEqual([{ language: 'rig', content: '# Second.\nrig: B\n' }]);
  });

  it('fixing every channel asks for the fix-all of this extension alone', async () => {
    const editor = new FakeEditor();
    await activateIn(editor);
    await editor.commands.get('ratewright.fixEveryChannel')?.();
    expect(editor.executed).toEqual([
      ['editor.action.codeAction', { kind: 'source.fixAll.ratewright', apply: 'first' }],
    ]);
  });
});
