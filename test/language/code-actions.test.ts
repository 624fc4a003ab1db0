import { describe, expect, it } from 'vitest';
import type { CodeAction, Diagnostic, TextDocumentEdit, TextEdit } from 'vscode-languageserver-types';
import type { EditAbilities } from '../../server/src/editor/client-abilities.ts';
import type { ActionRequest } from '../../server/src/editor/code-actions.ts';
import { fixAllActions, remedyActions } from '../../server/src/editor/code-actions.ts';
import { diagnosticsOf } from '../../server/src/editor/diagnostics.ts';
import { NO_LINKS } from '../../server/src/editor/reference-links.ts';
import type { Workbench } from '../../server/src/workbench/workbench.ts';
import { TextDocument } from '../tools/applied-edits.ts';
import { EXTRACT_FAN } from '../tools/samples.ts';
import { findingLines, strictWorkbench } from '../workbench/describe-findings.ts';
import { client } from './clients.ts';
import { marked, markedAt } from './marked.ts';

const URI = 'file:///marked.rig.yaml';
const EVERYTHING: EditAbilities = { versions: true, annotations: true };

interface Setting {
  readonly edits?: EditAbilities;
  readonly end?: { readonly line: number; readonly character: number };
  readonly isCancelled?: () => boolean;
}

interface Offered {
  readonly text: string;
  readonly actions: readonly CodeAction[];
  action(title: RegExp): CodeAction;
  /** The text once the action has been applied. */
  after(title: RegExp): string;
}

function ask(
  fixture: string,
  { edits = EVERYTHING, end, isCancelled = () => false }: Setting,
  from: (workbench: Workbench, request: ActionRequest) => readonly CodeAction[],
): Offered {
  const { text, position } = marked(fixture);
  const workbench = strictWorkbench();
  workbench.setFile(URI, { text });
  const diagnostics = diagnosticsOf(URI, workbench.evaluation(URI)!, NO_LINKS);
  const range = { start: position, end: end ?? position };
  const actions = from(workbench, { uri: URI, version: 7, range, diagnostics, edits, isCancelled });
  const action = (title: RegExp): CodeAction => {
    const found = actions.find((one) => title.test(one.title));
    if (!found) throw new Error(`No ${title} among ${actions.map((one) => one.title).join(' | ')}`);
    return found;
  };
  return { text, actions, action, after: (title) => applied(text, action(title)) };
}

/** What is offered at the mark, or from there to `end`. */
const offered = (fixture: string, setting: Setting = {}): Offered => ask(fixture, setting, remedyActions);
const fixAll = (fixture: string, setting: Setting = {}): Offered => ask(fixture, setting, fixAllActions);

function applied(text: string, { edit }: CodeAction): string {
  const [change] = (edit!.documentChanges ?? []) as readonly TextDocumentEdit[];
  return TextDocument.applied(text, (change?.edits ?? edit!.changes![URI]!) as readonly TextEdit[]);
}

const codes = ({ diagnostics }: CodeAction): readonly unknown[] => (diagnostics ?? []).map(({ code }) => code);

const SMALL = `rig: Small
filters:
  card: { response: butterworth, order: 8, cutoff: 4 kHz }
channels:
  a:
    rate: 25.6 kHz
    filter: card
    band: 10 Hz .. 2 kHz
`;

describe('remedies at the cursor', () => {
  it('are quick fixes that answer what the editor shows there', () => {
    const found = offered(markedAt(SMALL.replace('filter: card', 'filter: crad'), 'filter: ▮crad'));
    const action = found.action(/card/);
    expect(action.kind).toBe('quickfix');
    expect(action.isPreferred).toBe(true);
    expect(codes(action)).toEqual(['unknown-name']);
    expect(found.after(/card/)).toBe(SMALL);
  });

  it.each(['▮filter: crad', 'filter: crad▮', 'filter: cr▮ad'])('are found from both ends of a finding: %s', (piece) => {
    const found = offered(markedAt(SMALL.replace('filter: card', 'filter: crad'), piece));
    expect(found.actions.length > 0).toBe(!piece.startsWith('▮'));
  });

  it('take their finding away, the best one first and preferred', () => {
    const found = offered(markedAt(EXTRACT_FAN, 'rate: ▮25.6 kHz'));
    expect(found.actions.filter(({ isPreferred }) => isPreferred)).toHaveLength(1);
    expect(found.actions[0]!.isPreferred).toBe(true);
    // 13.1072 MHz / 256 is 51.2 kHz: the next rate that the clock can make, and one at which 16 kHz does not fold.
    expect(found.after(/^Sample at 51\.2 kHz/)).toBe(EXTRACT_FAN.replace('rate: 25.6 kHz', 'rate: 51.2 kHz'));
    expect(findingLines(found.after(/^Sample at 51\.2 kHz/)).join('\n')).not.toContain('fold-in-band');
  });

  it('of two findings at one place are offered once, for both', () => {
    const twice = EXTRACT_FAN.replace('\nchannels:', '  drive: { frequency: 16.2 kHz, level: 400 mV }\n\nchannels:');
    const found = offered(markedAt(twice, 'rate: ▮25.6 kHz'));
    const faster = found.actions.filter(({ title }) => title.startsWith('Sample at 51.2 kHz'));
    expect(faster).toHaveLength(1);
    expect(codes(faster[0]!)).toEqual(['fold-in-band', 'fold-in-band']);
    expect(new Set((faster[0]!.diagnostics as Diagnostic[]).map(({ message }) => message)).size).toBe(2);
  });

  it('of many findings are those of the gravest', () => {
    const channels = Array.from(
      { length: 40 },
      (_, index) => `  c-${index}: { rate: 25.6 kHz, filter: card, band: 10 Hz .. 2 kHz, flatnes: 1 dB }\n`,
    );
    const text = `▮${SMALL.replace('channels:\n', `channels:\n${channels.join('')}`).replace('filter: card\n', 'filter: crad\n')}`;
    const { actions } = offered(text, { end: { line: 999, character: 0 } });
    expect(actions.filter((action) => codes(action).includes('unknown-name')).length).toBeGreaterThan(0);
    expect(new Set(actions.flatMap(({ diagnostics }) => diagnostics)).size).toBeLessThanOrEqual(24);
  });

  it('are none where nothing is found, where nobody waits, and for a file that is not known', () => {
    expect(offered(`▮${EXTRACT_FAN}`).actions).toEqual([]);
    const cancelled = (): boolean => true;
    expect(offered(markedAt(EXTRACT_FAN, 'rate: ▮25.6 kHz'), { isCancelled: cancelled }).actions).toEqual([]);
    let asked = 0;
    const meanwhile = (): boolean => asked++ > 0;
    expect(offered(markedAt(EXTRACT_FAN, 'rate: ▮25.6 kHz'), { isCancelled: meanwhile }).actions).toEqual([]);
    const request = {
      uri: 'file:///unknown',
      version: null,
      range: { start: { line: 0, character: 0 }, end: { line: 0, character: 0 } },
      diagnostics: [],
      edits: EVERYTHING,
      isCancelled: () => false,
    };
    expect(remedyActions(strictWorkbench(), request)).toEqual([]);
    expect(fixAllActions(strictWorkbench(), request)).toEqual([]);
  });
});

describe('the edit of a remedy', () => {
  it('is shown before it is applied where it changes more than a setting', () => {
    const conditional = offered(markedAt(EXTRACT_FAN, 'filter: c▮ard')).action(/^If the rig is changed: /);
    expect(Object.values(conditional.edit!.changeAnnotations!)).toEqual([
      { label: conditional.title, needsConfirmation: true },
    ]);
    const setting = offered(markedAt(EXTRACT_FAN, 'rate: ▮25.6 kHz')).action(/^Sample at/);
    expect(Object.values(setting.edit!.changeAnnotations!)).toEqual([
      { label: setting.title, needsConfirmation: false },
    ]);
    const [change] = setting.edit!.documentChanges as readonly TextDocumentEdit[];
    expect(change!.textDocument).toEqual({ uri: URI, version: 7 });
    for (const edit of change!.edits) {
      expect(Object.keys(setting.edit!.changeAnnotations!)).toContain((edit as { annotationId?: string }).annotationId);
    }
  });

  it('holds no more than the client understands', () => {
    const fixture = markedAt(EXTRACT_FAN, 'rate: ▮25.6 kHz');
    const versions = offered(fixture, { edits: { versions: true, annotations: false } });
    const plain = offered(fixture, { edits: { versions: false, annotations: false } });
    const [whole, part, least] = [offered(fixture), versions, plain].map((found) => found.action(/^Sample at/).edit!);
    expect(Object.keys(part!)).toEqual(['documentChanges']);
    expect(JSON.stringify(part)).not.toContain('annotationId');
    expect(Object.keys(least!)).toEqual(['changes']);
    expect(Object.keys(least!.changes!)).toEqual([URI]);
    expect(Object.keys(whole!)).toEqual(['documentChanges', 'changeAnnotations']);
    expect(plain.actions.map(({ title }) => title)).toEqual(versions.actions.map(({ title }) => title));
    expect(plain.after(/^Sample at/)).toBe(versions.after(/^Sample at/));
  });

  it('is in the places that the protocol counts, behind signs of two units and in lines that end with two signs', () => {
    const emoji = 'rig: 🛠\nchannels:\n  "🛠🛠": { note: "🛠", rate: 25.6 kHz, band: 10 Hz .. 2 kHz, flatnes: 1 dB }\n';
    const found = offered(markedAt(emoji, 'fla▮tnes'));
    expect(found.after(/flatness/)).toBe(emoji.replace('flatnes', 'flatness'));
    const windows = SMALL.replace('filter: card', 'filter: crad').replaceAll('\n', '\r\n');
    expect(offered(markedAt(windows, 'cr▮ad')).after(/card/)).toBe(SMALL.replaceAll('\n', '\r\n'));
  });
});

describe('what a client understands of edits', () => {
  it('is what it announces, annotations only with versions', () => {
    const edits = (workspaceEdit: object) => client({ workspace: { workspaceEdit } }).edits;
    expect(client({}).edits).toEqual({ versions: false, annotations: false });
    expect(edits({ documentChanges: true })).toEqual({ versions: true, annotations: false });
    expect(edits({ documentChanges: true, changeAnnotationSupport: {} })).toEqual({
      versions: true,
      annotations: true,
    });
    expect(edits({ changeAnnotationSupport: {} })).toEqual({ versions: false, annotations: false });
  });
});

describe('the action that fixes everything', () => {
  const slips = SMALL.replace('filter: card', 'filter: crad').replace(
    'channels:\n',
    'channels:\n  b: { rate: 25.6 kHz, filter: card, band: 10 Hz .. 2 kHz, flatnes: 1 dB }\n',
  );

  it('says how many remedies it applies, and applies them at once', () => {
    const found = fixAll(`▮${slips}`);
    expect(found.actions.map(({ title, kind }) => [title, kind])).toEqual([
      ['Fix every channel (2 remedies)', 'source.fixAll.ratewright'],
    ]);
    expect(found.after(/^Fix/)).toBe(slips.replace('crad', 'card').replace('flatnes:', 'flatness:'));
    expect(found.actions[0]!.edit!.changeAnnotations).toBeUndefined();
  });

  it('counts one as one, and edits as the client understands it', () => {
    const plain = fixAll(`▮${slips.replace('crad', 'card')}`, { edits: { versions: false, annotations: false } });
    expect(plain.actions[0]!.title).toBe('Fix every channel (1 remedy)');
    expect(Object.keys(plain.actions[0]!.edit!)).toEqual(['changes']);
    expect(plain.after(/^Fix/)).toContain('flatness: 1 dB');
  });

  it('is not offered where there is nothing that it may apply', () => {
    expect(fixAll(`▮${SMALL}`).actions).toEqual([]);
  });
});
