import fc from 'fast-check';
import { afterEach, describe, expect, it } from 'vitest';
import type {
  CodeAction,
  CompletionList,
  Diagnostic,
  DocumentSymbol,
  FoldingRange,
  Hover,
} from 'vscode-languageserver-types';
import { generatedRig } from '../bench/rigs.ts';
import { TextDocument } from '../tools/applied-edits.ts';
import { editsOf, step } from '../tools/random-edits.ts';
import { runs } from '../tools/runs.ts';
import { EXTRACT_FAN, SAMPLES } from '../tools/samples.ts';
import type { ClientOptions, TestClient } from './client.ts';
import { startClient } from './client.ts';

const URI = 'file:///cell2.rig.yaml';
const clients: TestClient[] = [];

async function client(options: Partial<ClientOptions> = {}): Promise<TestClient> {
  const started = await startClient({ pull: true, ...options });
  clients.push(started);
  return started;
}

afterEach(async () => {
  for (const one of clients.splice(0)) one.connection.dispose();
});

const codes = (diagnostics: readonly Diagnostic[]): readonly unknown[] => diagnostics.map(({ code }) => code).sort();
const EXPECTED = ['band-droop', 'fold-in-band', 'resonance-in-band', 'unused-name'];

describe('findings', () => {
  it('are pulled by a client that announces it, and not pushed as well', async () => {
    const one = await client();
    let pushes = 0;
    one.connection.onNotification('textDocument/publishDiagnostics', () => {
      pushes++;
    });
    one.open(URI, EXTRACT_FAN);
    expect(codes(await one.pull(URI))).toEqual(EXPECTED);
    expect(one.capabilities.diagnosticProvider).toBeDefined();
    expect(pushes).toBe(0);
  });

  it('are pushed to any other, with the version they are of', async () => {
    const one = await client({ pull: false });
    expect(one.capabilities.diagnosticProvider).toBeUndefined();
    one.open(URI, EXTRACT_FAN);
    expect(codes(await one.pushed(URI, 1))).toEqual(EXPECTED);
    const version = one.change(URI, EXTRACT_FAN.replace('rate: 25.6 kHz', 'rate: 51.2 kHz'));
    expect(codes(await one.pushed(URI, version))).not.toContain('fold-in-band');
  });

  it('link to their pages in the reference and tell the places that matter', async () => {
    const one = await client({ initializationOptions: { referenceFolder: 'file:///reference/' } });
    one.open(URI, EXTRACT_FAN);
    const fold = (await one.pull(URI)).find(({ code }) => code === 'fold-in-band')!;
    expect(fold.codeDescription?.href).toBe('file:///reference/checks/fold-in-band.md');
    expect(fold.relatedInformation?.length).toBeGreaterThan(0);
    expect(fold.range.start).toEqual({ line: 24, character: 10 });
  });

  it('of a hint are shown as information, and of a name nobody uses as unnecessary', async () => {
    const one = await client();
    one.open(URI, EXTRACT_FAN);
    const unused = (await one.pull(URI)).find(({ code }) => code === 'unused-name')!;
    expect(unused.severity).toBe(4);
    expect(unused.tags).toEqual([1]);
  });

  it('are at most 1,000 a file, and the last says how many are left out', async () => {
    const one = await client();
    one.open(URI, generatedRig(1_500, 'block').replaceAll('kHz\n    filter', 'kHz\n    fliter'));
    const items = await one.pull(URI);
    expect(items).toHaveLength(1_000);
    expect(items.at(-1)!.message).toMatch(/^\d+ more findings are not shown here/);
  });

  it('go when the file is closed', async () => {
    const one = await client({ pull: false });
    one.open(URI, EXTRACT_FAN);
    await one.pushed(URI, 1);
    one.close(URI);
    const closed = new Promise<readonly Diagnostic[]>((resolve) => {
      one.connection.onNotification('textDocument/publishDiagnostics', ({ diagnostics }) => resolve(diagnostics));
    });
    expect(await closed).toEqual([]);
  });
});

describe('a client that opens, edits, hovers, acts and closes', () => {
  it('has its findings go when it applies what it is offered', async () => {
    const one = await client();
    one.open(URI, EXTRACT_FAN);
    const [fold] = (await one.pull(URI)).filter(({ code }) => code === 'fold-in-band');
    const actions = (await one.connection.sendRequest('textDocument/codeAction', {
      textDocument: { uri: URI },
      range: fold!.range,
      context: { diagnostics: [fold!] },
    })) as readonly CodeAction[];
    expect(actions.length).toBeGreaterThan(0);
    const preferred = actions.find(({ isPreferred }) => isPreferred)!;
    expect(preferred.title).toMatch(/^Sample at /);
    const [change] = preferred.edit!.documentChanges as readonly {
      edits: { range: Diagnostic['range']; newText: string }[];
    }[];
    const after = TextDocument.applied(EXTRACT_FAN, change!.edits);
    one.change(URI, after);
    expect(codes(await one.pull(URI))).not.toContain('fold-in-band');
  });

  it('is asked before an edit that changes the rig, the test or what is claimed', async () => {
    const one = await client();
    one.open(URI, EXTRACT_FAN);
    const actions = (await one.connection.sendRequest('textDocument/codeAction', {
      textDocument: { uri: URI },
      range: { start: { line: 24, character: 10 }, end: { line: 24, character: 18 } },
      context: { diagnostics: [] },
    })) as readonly CodeAction[];
    for (const { title, edit } of actions) {
      const conditional = /^(?:If the rig is changed|If the test allows|If it is known|Accept):/.test(title);
      expect(Object.values(edit!.changeAnnotations ?? {}).map(({ needsConfirmation }) => needsConfirmation)).toEqual([
        conditional,
      ]);
    }
  });

  it('fixes every channel with one action of kind source.fixAll.ratewright', async () => {
    const one = await client();
    one.open(URI, EXTRACT_FAN);
    const actions = (await one.connection.sendRequest('textDocument/codeAction', {
      textDocument: { uri: URI },
      range: { start: { line: 0, character: 0 }, end: { line: 0, character: 0 } },
      context: { diagnostics: [], only: ['source.fixAll'] },
    })) as readonly CodeAction[];
    expect(actions.map(({ kind }) => kind)).toEqual(['source.fixAll.ratewright']);
    expect(actions[0]!.title).toMatch(/^Fix every channel/);
  });

  it('sees the map as a picture where it shows pictures, drawn in characters elsewhere', async () => {
    const hover = async (initializationOptions: object): Promise<string> => {
      const one = await client({ initializationOptions });
      one.open(URI, EXTRACT_FAN);
      const answer = (await one.connection.sendRequest('textDocument/hover', {
        textDocument: { uri: URI },
        position: { line: 24, character: 12 },
      })) as Hover;
      return (answer.contents as { readonly value: string }).value;
    };
    const pictured = await hover({ pictures: true, theme: 'dark' });
    expect(pictured).toMatch(/!\[[^\]]+\]\(data:image\/svg\+xml;base64,[A-Za-z0-9+/=]+\)/);
    expect(pictured).toContain('| 9.6 kHz |');
    expect(pictured.length).toBeLessThan(48_000);
    const drawn = await hover({});
    expect(drawn).toContain('```text');
    expect(drawn).toContain('| 9.6 kHz |');
  });

  it('is offered the rates that the clock can make, with their verdicts', async () => {
    const one = await client();
    one.open(URI, EXTRACT_FAN);
    const list = (await one.connection.sendRequest('textDocument/completion', {
      textDocument: { uri: URI },
      position: { line: 24, character: 10 },
    })) as CompletionList;
    const fifty = list.items.find(({ label }) => label === '51.2 kHz')!;
    expect(fifty.detail).toMatch(/^margin 2\.56 · /);
  });

  it('has an outline with every channel, and folding ranges', async () => {
    const one = await client();
    one.open(URI, EXTRACT_FAN);
    const textDocument = { uri: URI };
    const outline = (await one.connection.sendRequest('textDocument/documentSymbol', {
      textDocument,
    })) as readonly DocumentSymbol[];
    const channels = outline.find(({ name }) => name === 'channels')!;
    expect(channels.children!.map(({ name, detail }) => `${name} ${detail}`)).toEqual(['bearing-drive-end 25.6 kHz']);
    const folding = (await one.connection.sendRequest('textDocument/foldingRange', {
      textDocument,
    })) as readonly FoldingRange[];
    expect(folding).toContainEqual({ startLine: 21, endLine: 28 });
  });

  it('may ask for the map of the channel under the cursor', async () => {
    const one = await client({ initializationOptions: { theme: 'light' } });
    one.open(URI, EXTRACT_FAN);
    await one.connection.sendNotification('ratewright/theme', { theme: 'dark' });
    const view = (await one.connection.sendRequest('ratewright/map', {
      textDocument: { uri: URI },
      position: { line: 24, character: 0 },
    })) as { readonly title: string; readonly svg: string; readonly text: string };
    expect(view.title).toBe('bearing-drive-end');
    expect(view.svg).toMatch(/^<svg/);
    expect(view.text.length).toBeGreaterThan(100);
  });
});

describe('answers', () => {
  it('to a version that has been typed over are dropped, never given for another', async () => {
    const one = await client();
    const text = generatedRig(2_000, 'block');
    one.open(URI, text);
    const pulled = one.connection.sendRequest('textDocument/diagnostic', { textDocument: { uri: URI } }).then(
      () => 'answered',
      (fault: { readonly code: number; readonly data?: unknown }) => `${fault.code} ${JSON.stringify(fault.data)}`,
    );
    one.change(URI, EXTRACT_FAN);
    expect(['answered', '-32802 {"retriggerRequest":true}']).toContain(await pulled);
    expect(codes(await one.pull(URI))).toEqual(EXPECTED);
  });

  it('about files that are not open are empty', async () => {
    const one = await client();
    expect(await one.pull('file:///other.rig.yaml')).toEqual([]);
    const hover = await one.connection.sendRequest('textDocument/hover', {
      textDocument: { uri: 'file:///other.rig.yaml' },
      position: { line: 0, character: 0 },
    });
    expect(hover).toBeNull();
  });

  it('are those of the text as it stands, through a thousand random edits', async () => {
    const one = await client();
    const fresh = await client();
    let count = 0;
    await fc.assert(
      fc.asyncProperty(
        fc.constantFrom(...SAMPLES),
        fc.array(step, { minLength: 20, maxLength: 20 }),
        async ({ text }, steps) => {
          const uri = `file:///random-${count++}.rig.yaml`;
          one.open(uri, text);
          let current = text;
          for (const each of steps) {
            // No client can point between the two signs of one line end.
            const whole = (offset: number): number =>
              current[offset - 1] === '\r' && current[offset] === '\n' ? offset + 1 : offset;
            const edits = editsOf(current, each)
              .map(({ start, end, text: by }) => ({ start: whole(start), end: whole(end), text: by }))
              .sort((a, b) => b.start - a.start);
            for (const edit of edits) {
              one.change(
                uri,
                edit.text,
                TextDocument.position(current, edit.start),
                TextDocument.position(current, edit.end),
              );
              current = current.slice(0, edit.start) + edit.text + current.slice(edit.end);
            }
          }
          const found = await one.pull(uri);
          fresh.open(uri, current);
          expect(found).toEqual(await fresh.pull(uri));
          one.close(uri);
          fresh.close(uri);
        },
      ),
      { numRuns: runs(50), seed: 7 },
    );
  }, 300_000);
});
