import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { CompletionItem, TextEdit } from 'vscode-languageserver-types';
import { CompletionItemKind } from 'vscode-languageserver-types';
import { CHECK_NAMES } from '../../server/src/checks/list.ts';
import { completionsAt } from '../../server/src/editor/completion.ts';
import { PRACTICE_NAMES } from '../../server/src/practices/practices.ts';
import { generatedRig } from '../bench/rigs.ts';
import { TextDocument } from '../tools/applied-edits.ts';
import { runs } from '../tools/runs.ts';
import { EXTRACT_FAN, SAMPLES } from '../tools/samples.ts';
import { evaluated } from '../workbench/describe-findings.ts';
import { marked, markedAt } from './marked.ts';

interface Offers {
  readonly labels: readonly string[];
  readonly isIncomplete: boolean;
  item(label: string): CompletionItem;
  /** The text once an offer has been accepted. */
  accepted(label: string): string;
}

/** What is offered at the mark, in order; `null` where nothing may be. */
function offers(fixture: string): Offers | null {
  const { text, position } = marked(fixture);
  const list = completionsAt(evaluated(text), position);
  if (!list) return null;
  const sorted = [...list.items].sort((a, b) => (a.sortText! < b.sortText! ? -1 : 1));
  const item = (label: string): CompletionItem => {
    const found = sorted.find((one) => one.label === label);
    if (!found) throw new Error(`"${label}" is not among ${sorted.map((one) => one.label).join(', ')}`);
    // An editor drops what the typed text does not lead to.
    const { range } = found.textEdit as TextEdit;
    const typed = text.slice(TextDocument.offset(text, range.start), TextDocument.offset(text, position));
    expect(leadsTo(typed, found.filterText!)).toBe(true);
    return found;
  };
  return {
    labels: sorted.map(({ label }) => label),
    isIncomplete: list.isIncomplete,
    item,
    accepted: (label) => TextDocument.applied(text, [item(label).textEdit as TextEdit]),
  };
}

/** Whether an editor would show an entry for what was typed: its letters stand in it in order, case aside. */
function leadsTo(typed: string, filter: string): boolean {
  let at = 0;
  for (const letter of typed.toLowerCase()) {
    at = filter.toLowerCase().indexOf(letter, at) + 1;
    if (at === 0) return false;
  }
  return true;
}

const labels = (fixture: string): readonly string[] => offers(fixture)!.labels;
const fan = (piece: string): Offers => offers(markedAt(EXTRACT_FAN, piece))!;

/** A channel between the things it may name, with a place left for the rest. */
const rig = (channel: string): string => `rig: Rig
clocks:
  chassis: { frequency: 13.1072 MHz, divide: 1..128 }
digitizers:
  front-end: { clock: chassis, prescale: 256, bits: 24, full-scale: ±10 V }
sensors:
  stud: { measures: acceleration, sensitivity: 100 mV/g }
  lux: { measures: other, sensitivity: 20 mV/klx }
filters:
  card: { response: butterworth, order: 6, cutoff: 4 kHz }
  plain: { response: rc }
sources:
  inverter: { carrier: 16 kHz, modulation: 50 Hz, level: 4 mV }
channels:
${channel}`;

describe('keys', () => {
  it('that fit are offered, those that stand there already are not', () => {
    const found = labels(rig('  a:\n    sensor: stud\n    ▮\n    band: 1 Hz .. 2 kHz\n'));
    expect(found).toEqual(expect.arrayContaining(['rate', 'digitizer', 'filter', 'then', 'hears', 'sensitivity']));
    for (const taken of ['sensor', 'band', 'clocks', 'order']) expect(found).not.toContain(taken);
  });

  it('tell what they are for and what holds without them', () => {
    const found = offers(rig('  a:\n    ▮'))!;
    expect(found.item('rate').detail).toBe('required');
    expect(found.item('filter').detail).toBe("left out: none besides the digitizer's");
    expect(found.item('note').detail).toBeUndefined();
    expect(found.item('rate').documentation).toEqual({
      kind: 'markdown',
      value: 'The sample rate of the converter, for this channel.\n\n`rate: 25.6 kHz`',
    });
    expect(found.item('rate').command?.command).toBe('editor.action.triggerSuggest');
  });

  it('at the first character of a line are those of the top of the file', () => {
    for (const fixture of ['▮', 'rig: x\n▮', '▮\nrig: x\n', rig('  a:\n    rate: 1 kHz\n▮'), `▮${rig('')}`]) {
      const found = labels(fixture);
      expect(found).toEqual(expect.arrayContaining(['checks', 'accept', 'run']));
      expect(found).not.toContain('rate');
      expect(found.includes('rig')).toBe(fixture === '▮');
    }
    expect(labels(rig('  a: { rate: 1 kHz }\n').replace('  a:', '▮  a:'))).not.toContain('clocks');
  });

  it('are written with their colon, and a section without a space behind it', () => {
    expect(offers('rig: x\nch▮')!.accepted('channels')).toBe('rig: x\nchannels:');
    expect(offers('rig: x\nma▮')!.accepted('mains')).toBe('rig: x\nmains: ');
    expect(offers('rig: x\n▮')!.item('channels').command).toBeUndefined();
  });

  it('take the place of the word under the cursor and keep the colon behind it', () => {
    expect(offers(rig('  a:\n    ra▮te: 1 kHz\n'))!.accepted('rate')).toBe(rig('  a:\n    rate: 1 kHz\n'));
    expect(offers(rig('  a:\n    sens▮r : stud\n'))!.accepted('sensor')).toBe(rig('  a:\n    sensor : stud\n'));
    // Another key begun ahead of one leaves it as it is.
    expect(offers('▮rig: x\n')!.accepted('mains')).toBe('mains: rig: x\n');
  });

  it('are offered in flow style, finished or not', () => {
    expect(labels('filters:\n  card: { re▮')).toContain('response');
    expect(labels('filters:\n  card: { response: rc, ▮ }')).toContain('corner');
    expect(labels('filters:\n  card: { response: rc, ▮ }')).not.toContain('response');
    expect(labels(rig('  a: { rate: 1 kHz,\n    band: 1 Hz .. 400 Hz, # to be settled\n    fil▮'))).toContain('filter');
    expect(labels(rig("  a: { note: it's new, ra▮ }"))).toContain('rate');
    expect(labels(rig('  a: {\n    then: [{ decimate: 5,\n      ▮'))).toEqual(expect.arrayContaining(['filter']));
  });

  it('are offered below text that is not YAML yet', () => {
    expect(labels(rig('  b: { rate: [\n  a:\n    rate: 1 kHz\n    fil▮\n  c: "\n'))).toContain('filter');
    expect(labels(`clocks:\n  c: { frequency: 1 MHz,\nchannels:\n  a:\n    note: one of [2 or 3\n    ra▮`)).toContain(
      'rate',
    );
  });

  it('in a list are those of its items', () => {
    expect(labels(rig('  a:\n    then:\n      - ▮'))).toEqual(['decimate', 'filter', 'per-turn', 'speed']);
    expect(labels(rig('  a:\n    then:\n      - ▮\n        filter: tidy\n'))).toEqual([
      'decimate',
      'per-turn',
      'speed',
    ]);
    expect(labels('accept:\n- ▮')).toEqual(expect.arrayContaining(['finding', 'on', 'reason', 'until']));
    // An item may be a name or a thing written in its place.
    expect(labels(rig('  a:\n    filter:\n      - ▮'))).toEqual(expect.arrayContaining(['response', 'card', 'plain']));
  });

  it('may be names: of sources, or of checks', () => {
    const heard = offers(rig('  a:\n    hears:\n      ▮'))!;
    expect(heard.labels).toEqual(['inverter']);
    expect(heard.accepted('inverter')).toMatch(/ {6}inverter: $/);
    const checks = offers('checks:\n  fold-in-band: off\n  ▮')!;
    expect(checks.labels).toEqual(CHECK_NAMES.filter((name) => name !== 'fold-in-band'));
    expect(labels('checks:\n  band-droop: ▮')).toEqual(['off', 'hint', 'warning', 'error']);
    expect(labels('accept:\n  - finding: ▮')).toEqual(CHECK_NAMES);
  });

  it('are those of a map in braces over a whole section', () => {
    expect(labels('channels: {\n  a: { rate: 1 kHz, ▮ },\n  b: { rate: 2 kHz } }\n')).toContain('band');
    expect(labels('  rig: x\n  channels:\n    a:\n      ▮')).toContain('band');
  });

  it('are not offered in a comment', () => {
    expect(offers('rig: x # ▮')).toBeNull();
    expect(offers('clocks:\n  c: { frequency: 1 MHz, # ▮')).toBeNull();
  });

  it('are offered in the seven-hundredth channel as in the first', () => {
    const text = generatedRig(700, 'block');
    const at = text.indexOf('position 699') + 'position 699'.length;
    expect(labels(`${text.slice(0, at)}\n    ▮${text.slice(at)}`)).toEqual(expect.arrayContaining(['gain', 'hears']));
  });
});

describe('names and values', () => {
  it.each([
    ['digitizer: ▮', 'front-end', '24 bit'],
    ['sensor: ▮', 'stud', 'acceleration'],
    ['filter: ▮', 'card', 'butterworth, order 6'],
    ['filter: ▮', 'plain', 'filter'],
    ['filter: [card, ▮', 'card', 'butterworth, order 6'],
    ['hears: [▮]', 'inverter', 'carrier at 16 kHz'],
  ])('behind `%s` are those that exist', (value, name, detail) => {
    expect(offers(rig(`  a:\n    ${value}`))!.item(name).detail).toBe(detail);
  });

  it('of practices are offered with what they ask for, in a channel, in its list and for the whole file', () => {
    const fixtures = ['    follows: ▮', '    follows: [shock-peaks, ▮]', '    follows:\n      - ▮'].map((line) =>
      rig(`  a:\n${line}`),
    );
    for (const fixture of [...fixtures, 'rig: x\nfollows: ▮', 'defaults: { follows: ▮ }']) {
      const item = offers(fixture)!.item('machine-vibration');
      expect(item.detail).toBe('a band from 10 Hz to 1 kHz');
      expect(JSON.stringify(item.documentation)).toMatch(/ISO 20816-1.*from memory.*Left out/);
    }
    expect(labels(rig('  a:\n    follows: ▮'))).toEqual(['none', ...PRACTICE_NAMES]);
  });

  it('of clocks and of channels are found where they are meant', () => {
    expect(fan('clock: ▮chassis').item('chassis').detail).toBe('13.1072 MHz');
    const on = 'channels:\n  tower: { rate: 1 kHz }\naccept:\n  - on: ▮';
    expect(offers(on)!.item('tower').detail).toBe('channel');
    expect(labels('clocks:\n  bare: {}\n  other: { locked-to: ▮ }')).toContain('bare');
    expect(labels('digitizers:\n  bare: {}\nchannels:\n  a: { digitizer: ▮')).toContain('bare');
    expect(labels('sensors:\n  bare: {}\nchannels:\n  a: { sensor: ▮')).toContain('bare');
    expect(labels('groups:\n  bare: {}\nchannels:\n  a: { group: ▮')).toContain('bare');
    const grouped = 'groups:\n  tower: { within: 2 deg, up-to: 1 kHz }\nchannels:\n  a: { group: ▮';
    expect(offers(grouped)!.item('tower').detail).toBe('within 2 deg up to 1 kHz');
  });

  it('are the words of a choice, with what each means', () => {
    const found = fan('response: ▮butterworth');
    expect(found.labels).toEqual(expect.arrayContaining(['butterworth', 'bessel', 'mask', 'cic']));
    expect(found.item('bessel').kind).toBe(CompletionItemKind.EnumMember);
    expect(found.item('bessel').documentation).toBeDefined();
    expect(labels('sources:\n  a: { wanted: ▮')).toEqual(['true', 'false']);
  });

  it('take the place of the whole value, and of nothing behind it', () => {
    expect(fan('filter: c▮ard').accepted('card')).toBe(EXTRACT_FAN);
    expect(fan('filter: ▮card').accepted('tidy')).toBe(EXTRACT_FAN.replace('filter: card', 'filter: tidy'));
    expect(offers(rig('  a:\n    filter: ▮plain # for now\n'))!.accepted('card')).toBe(
      rig('  a:\n    filter: card # for now\n'),
    );
    expect(offers(rig('  a: { filter: pl▮ain, rate: 1 kHz }'))!.accepted('plain')).toBe(
      rig('  a: { filter: plain, rate: 1 kHz }'),
    );
    // A thing written in place is no word that another could take the place of.
    expect(offers(rig('  a:\n    filter: ▮{ response: rc }'))).toBeNull();
  });

  it('are written in the quotes that the file has, or needs', () => {
    expect(offers(rig("  a:\n    filter: 'pl▮'"))!.accepted('plain')).toBe(rig("  a:\n    filter: 'plain'"));
    expect(offers(rig('  a:\n    filter: "▮'))!.accepted('plain')).toBe(rig('  a:\n    filter: "plain"'));
    const odd = 'filters:\n  "a, b": { response: rc }\nchannels:\n  a: { filter: ▮ }';
    expect(offers(odd)!.accepted('a, b')).toBe(
      'filters:\n  "a, b": { response: rc }\nchannels:\n  a: { filter: "a, b" }',
    );
  });

  it('and keys in JSON are in quotes, whatever has been typed of them', () => {
    const json = (channel: string): string => `{ "sources": {}, "channels": { "a": { ${channel} } } }`;
    expect(offers(json('▮'))!.accepted('rate')).toBe(json('"rate": '));
    expect(offers(json('"ra▮"'))!.accepted('rate')).toBe(json('"rate": '));
    expect(offers(json('"ra▮te": "1 kHz"'))!.accepted('rate')).toBe(json('"rate": "1 kHz"'));
    expect(offers(json('"filter":▮'))!.accepted('none')).toBe(json('"filter":"none"'));
    expect(offers(json('"rate":"1 kHz","filter": "n▮"'))!.accepted('none')).toBe(
      json('"rate":"1 kHz","filter": "none"'),
    );
    expect(offers('{ "sources": { "a": { "wanted": ▮ } } }')!.accepted('true')).toBe(
      '{ "sources": { "a": { "wanted": true } } }',
    );
    expect(offers('{ "sources": { "a": { "wanted": "▮" } } }')!.accepted('true')).toBe(
      '{ "sources": { "a": { "wanted": "true" } } }',
    );
  });
});

describe('rates', () => {
  // 13.1072 MHz / (256 x n): 51.2 kHz, 25.6 kHz, 12.8 kHz, ... A band to 2 kHz needs more than 4 kHz.
  const channel = '  a:\n    digitizer: front-end\n    filter: card\n    band: 10 Hz .. 2 kHz\n    rate: ▮';

  it('are those that the clock can make, the slowest first, with margin and verdict', () => {
    const found = offers(rig(channel))!;
    const rates = found.labels.map((label) => Number.parseFloat(label));
    expect(found.labels).toEqual(expect.arrayContaining(['5.12 kHz', '12.8 kHz', '25.6 kHz', '51.2 kHz']));
    expect(rates).toEqual([...rates].sort((a, b) => a - b));
    for (const rate of rates) expect(Math.abs(51.2 / rate - Math.round(51.2 / rate))).toBeLessThan(1e-3);
    expect(found.item('25.6 kHz').detail).toMatch(/^margin 6\.40 · /);
    // What folds onto 2 kHz comes from 3.12 kHz, which a cutoff of 4 kHz lets through.
    expect(found.item('5.12 kHz').detail).toBe('margin 1.28 · filter-short');
  });

  it('have the slowest clean one chosen beforehand', () => {
    const found = offers(
      rig(
        '  a:\n    digitizer: front-end\n    hears: none\n    band: 10 Hz .. 2 kHz\n    undeclared: -120 dBFS\n    rate: ▮',
      ),
    )!;
    const chosen = found.labels.filter((label) => found.item(label).preselect);
    const clean = found.labels.filter((label) => found.item(label).detail?.endsWith('· clean'));
    expect(clean.length).toBeGreaterThan(1);
    expect(chosen).toEqual([clean[0]]);
  });

  it('are told apart by the findings that each would have', () => {
    // The worked rig folds at 25.6 kHz and does not at 51.2 kHz.
    const found = fan('rate: ▮25.6 kHz');
    expect(found.labels.slice(0, 2)).toEqual(['25.6 kHz', '51.2 kHz']);
    expect(found.item('25.6 kHz').detail).toBe('margin 1.28 · fold-in-band, band-droop, resonance-in-band');
    expect(found.item('51.2 kHz').detail).toBe('margin 2.56 · band-droop, resonance-in-band');
    expect(found.accepted('51.2 kHz')).toBe(EXTRACT_FAN.replace('rate: 25.6 kHz', 'rate: 51.2 kHz'));
  });

  it('are offered in flow style, in JSON and in unfinished text', () => {
    expect(labels(rig('  a: { digitizer: front-end, band: 10 Hz .. 2 kHz, rate: ▮ }'))).toContain('25.6 kHz');
    expect(labels(rig('  a: { digitizer: front-end, band: 10 Hz .. 2 kHz, rate: ▮'))).toContain('25.6 kHz');
    expect(labels(rig(`${channel}\n  b: { rate: [`))).toContain('25.6 kHz');
    const json = '{ "channels": { "a": { "band": "10 Hz .. 2 kHz", "rate": "▮" } } }';
    expect(labels(json).length).toBeGreaterThan(0);
  });

  it('are not offered for a key of that name elsewhere, nor without a band', () => {
    expect(labels('defaults:\n  rate: ▮')).toEqual([]);
    expect(labels(rig('  a:\n    digitizer: front-end\n    rate: ▮'))).toEqual([]);
  });
});

describe('units', () => {
  it('follow a number, spaced as the vocabulary spaces them', () => {
    const found = offers('clocks:\n  c: { frequency: 13▮ }')!;
    expect(found.labels).toEqual(['13 Hz', '13 kHz', '13 MHz', '13 GHz']);
    expect(found.accepted('13 MHz')).toBe('clocks:\n  c: { frequency: 13 MHz }');
    expect(found.isIncomplete).toBe(true);
    expect(offers('clocks:\n  c: { frequency: 13 M▮ }')!.accepted('13 MHz')).toBe(
      'clocks:\n  c: { frequency: 13 MHz }',
    );
    expect(offers('clocks:\n  c: { frequency: 13▮ kHz }')!.accepted('13 MHz')).toBe(
      'clocks:\n  c: { frequency: 13 MHz }',
    );
  });

  it('follow the second number of a range, and a sign', () => {
    expect(offers(rig('  a:\n    band: 5 Hz .. 10▮'))!.accepted('5 Hz .. 10 kHz')).toMatch(/band: 5 Hz \.\. 10 kHz$/);
    expect(labels('digitizers:\n  d:\n    full-scale: ±10 ▮')).toEqual(['±10 V', '±10 mV', '±10 uV']);
    expect(labels('sources:\n  s: { order: 1, speed: 600..3000▮')).toContain('600..3000 rpm');
  });

  it('are those of what the channel measures where that is due', () => {
    expect(labels(rig('  a:\n    sensor: stud\n    peak: 40 ▮')).slice(0, 2)).toEqual(['40 g', '40 m/s2']);
    expect(labels(rig('  a:\n    sensor: lux\n    peak: 40 ▮'))[0]).toBe('40 klx');
    expect(labels(rig('  a:\n    peak: 40 ▮'))).toEqual(['40 V', '40 mV', '40 uV', '40 dBFS']);
    // A source belongs to no one channel.
    expect(labels(rig('').replace('level: 4 mV', 'level: 2▮'))).toEqual(
      expect.arrayContaining(['2 g', '2 klx', '2 dBFS', '2 V']),
    );
  });

  it('are not offered without a number, nor behind a word that has one', () => {
    expect(labels('clocks:\n  c: { frequency: ▮ }')).toEqual([]);
    expect(labels('clocks:\n  c: { frequency: 5..▮ }')).toEqual([]);
    expect(labels(rig('  a:\n    sensor: stud\n    peak: 2 g rms▮'))).toEqual([]);
    expect(offers('clocks:\n  c: { frequency: ▮ }')!.isIncomplete).toBe(false);
  });
});

describe('places of completions', () => {
  it('count as the protocol does behind signs of two units, and in lines that end with two signs', () => {
    const text = rig('  a: { note: "🛠🛠", filter: ▮plain }');
    expect(offers(text)!.accepted('card')).toBe(rig('  a: { note: "🛠🛠", filter: card }'));
    const windows = rig('  a:\n    filter: ▮plain\n    rate: 1 kHz\n').replaceAll('\n', '\r\n');
    expect(offers(windows)!.accepted('card')).toBe(
      rig('  a:\n    filter: card\n    rate: 1 kHz\n').replaceAll('\n', '\r\n'),
    );
    expect(labels(rig('  a:\n    rate: 1 kHz\n    ▮\n').replaceAll('\n', '\r\n'))).not.toContain('rate');
  });

  it('hold the cursor and stand on its line, wherever it is', () => {
    const texts = [EXTRACT_FAN, ...SAMPLES.map(({ text }) => text), generatedRig(2, 'json'), generatedRig(2, 'flow')];
    fc.assert(
      fc.property(fc.constantFrom(...texts), fc.nat(), fc.nat(300), (whole, at, cut) => {
        const offset = at % (whole.length + 1);
        const text = whole.slice(0, offset) + whole.slice(Math.min(whole.length, offset + cut));
        const position = TextDocument.position(text, offset);
        const list = completionsAt(evaluated(text), position);
        for (const { textEdit } of list?.items ?? []) {
          const { start, end } = (textEdit as TextEdit).range;
          expect([start.line, end.line]).toEqual([position.line, position.line]);
          expect(start.character).toBeLessThanOrEqual(position.character);
          expect(end.character).toBeGreaterThanOrEqual(position.character);
        }
      }),
      { numRuns: runs(500), seed: 11 },
    );
  });
});
