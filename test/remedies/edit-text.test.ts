import { describe, expect, it } from 'vitest';
import { replaceScalar, setEntryKey } from '../../server/src/remedies/edit-text.ts';
import { addThing, freeName } from '../../server/src/remedies/new-thing.ts';
import type { NewValue } from '../../server/src/remedies/written-value.ts';
import { scalarText, valueText } from '../../server/src/remedies/written-value.ts';
import type { NamedSection } from '../../server/src/rig/entry.ts';
import type { Snapshot } from '../../server/src/rig/snapshot.ts';
import { readSnapshot } from '../../server/src/rig/snapshot.ts';
import { applyTextEdits } from '../../server/src/rig/text-edit.ts';

/** The text after a key was written into the channel `a`. */
function withKey(text: string, key: string, value: NewValue): string | undefined {
  const snapshot = readSnapshot(text);
  const edits = setEntryKey(snapshot, entryNamed(snapshot, 'channels', 'a'), key, value);
  return edits && applyTextEdits(text, edits);
}

function withThing(text: string, section: NamedSection, name: string, value: NewValue): string | undefined {
  const edits = addThing(readSnapshot(text), section, name, value);
  return edits && applyTextEdits(text, edits);
}

function entryNamed(snapshot: Snapshot, section: NamedSection, name: string) {
  const found = snapshot.entries.find((entry) => entry.section === section && entry.name === name);
  if (!found) throw new Error(`the text has no ${section}/${name}`);
  return found;
}

describe('a key written into a channel', () => {
  it('goes below the last key of a block, with its indentation, ahead of what follows', () => {
    const text = 'channels:\n    a:\n        rate: 1 kHz # first\n\n    # next\n    b:\n        rate: 2 kHz\n';
    expect(withKey(text, 'gain', '10')).toBe(
      'channels:\n    a:\n        rate: 1 kHz # first\n        gain: 10\n\n    # next\n    b:\n        rate: 2 kHz\n',
    );
  });

  it('goes behind a block of steps and behind a folded text', () => {
    expect(withKey('channels:\n  a:\n    then:\n      - decimate: 5\n  b: {}\n', 'gain', '2')).toBe(
      'channels:\n  a:\n    then:\n      - decimate: 5\n    gain: 2\n  b: {}\n',
    );
    expect(withKey('channels:\n  a:\n    note: |\n      one\n      two\n  b: {}\n', 'gain', '2')).toBe(
      'channels:\n  a:\n    note: |\n      one\n      two\n    gain: 2\n  b: {}\n',
    );
  });

  it('goes where a key without a value stands last', () => {
    expect(withKey('channels:\n  a:\n    rate: 1 kHz\n    note:\n  b: {}\n', 'gain', '2')).toBe(
      'channels:\n  a:\n    rate: 1 kHz\n    note:\n    gain: 2\n  b: {}\n',
    );
  });

  it('keeps a file without a last line end without one', () => {
    expect(withKey('channels:\n  a:\n    rate: 1 kHz', 'gain', '2')).toBe(
      'channels:\n  a:\n    rate: 1 kHz\n    gain: 2',
    );
  });

  it('keeps the line ends of the file', () => {
    expect(withKey('channels:\r\n  a:\r\n    rate: 1 kHz\r\n', 'gain', '2')).toBe(
      'channels:\r\n  a:\r\n    rate: 1 kHz\r\n    gain: 2\r\n',
    );
  });

  it('goes into braces: filled, empty, with a comma at the end', () => {
    expect(withKey('channels:\n  a: { rate: 1 kHz }\n', 'gain', '2')).toBe(
      'channels:\n  a: { rate: 1 kHz, gain: 2 }\n',
    );
    expect(withKey('channels:\n  a: {}\n', 'gain', '2')).toBe('channels:\n  a: { gain: 2 }\n');
    expect(withKey('channels:\n  a: { rate: 1 kHz, } # c\n', 'gain', '2')).toBe(
      'channels:\n  a: { rate: 1 kHz, gain: 2, } # c\n',
    );
  });

  it('has a line of its own in braces whose keys have', () => {
    const text = 'channels:\n  a: {\n    rate: 1 kHz,\n    gain: 1 # one\n  }\n';
    expect(withKey(text, 'flatness', '2 dB')).toBe(
      'channels:\n  a: {\n    rate: 1 kHz,\n    gain: 1, # one\n    flatness: 2 dB\n  }\n',
    );
    expect(withKey('channels:\n  a: {\n    rate: 1 kHz,\n  }\n', 'gain', '2')).toBe(
      'channels:\n  a: {\n    rate: 1 kHz,\n    gain: 2,\n  }\n',
    );
  });

  it('takes the place of a value that is there, in its quotes', () => {
    expect(withKey("channels:\n  a:\n    rate: '1 kHz' # c\n", 'rate', '2 kHz')).toBe(
      "channels:\n  a:\n    rate: '2 kHz' # c\n",
    );
    expect(withKey('channels:\n  a: { filter: [x, y] }\n', 'filter', 'z')).toBe('channels:\n  a: { filter: z }\n');
    expect(withKey('channels:\n  a:\n    filter:\n      - x\n      - y\n    gain: 1\n', 'filter', ['x', 'z'])).toBe(
      'channels:\n  a:\n    filter: [x, z]\n    gain: 1\n',
    );
  });

  it('takes the place of nothing, and of an alias', () => {
    expect(withKey('channels:\n  a:\n    rate:\n    gain: 1\n', 'rate', '2 kHz')).toBe(
      'channels:\n  a:\n    rate: 2 kHz\n    gain: 1\n',
    );
    expect(withKey('defaults: { rate: &r 1 kHz }\nchannels:\n  a:\n    rate: *r\n', 'rate', '2 kHz')).toBe(
      'defaults: { rate: &r 1 kHz }\nchannels:\n  a:\n    rate: 2 kHz\n',
    );
  });

  it('makes a map that merges of a channel that is an alias', () => {
    expect(withKey('channels:\n  b: &b { rate: 1 kHz }\n  a: *b\n  c: *b\n', 'rate', '2 kHz')).toBe(
      'channels:\n  b: &b { rate: 1 kHz }\n  a: { <<: *b, rate: 2 kHz }\n  c: *b\n',
    );
  });

  it('begins the map of a channel that has nothing', () => {
    expect(withKey('channels:\n  a: # mine\n  b: {}\n', 'rate', '2 kHz')).toBe(
      'channels:\n  a: # mine\n    rate: 2 kHz\n  b: {}\n',
    );
    expect(withKey('channels: { a: , b: {} }\n', 'rate', '2 kHz')).toBe('channels: { a: { rate: 2 kHz }, b: {} }\n');
  });

  it('is written in quotes in JSON', () => {
    expect(withKey('{ "channels": { "a": { "rate": "1 kHz" } } }\n', 'gain', '2')).toBe(
      '{ "channels": { "a": { "rate": "1 kHz", "gain": 2 } } }\n',
    );
    expect(withKey('{\n  "channels": {\n    "a": {\n      "rate": 1000\n    }\n  }\n}\n', 'rate', '2 kHz')).toBe(
      '{\n  "channels": {\n    "a": {\n      "rate": "2 kHz"\n    }\n  }\n}\n',
    );
  });

  it('leaves a channel alone that is no map', () => {
    expect(withKey('channels:\n  a: 12\n', 'rate', '2 kHz')).toBeUndefined();
  });
});

describe('a scalar replaced', () => {
  it('is left alone where it is written as a block, or is not of this text', () => {
    const text = 'channels:\n  a:\n    rate: |\n      1 kHz\n';
    const snapshot = readSnapshot(text);
    const entry = entryNamed(snapshot, 'channels', 'a');
    const start = entry.text.indexOf('|');
    expect(replaceScalar(snapshot, { entry, start, end: entry.text.length }, '2 kHz')).toBeUndefined();
    expect(replaceScalar(readSnapshot(text), { entry, start, end: start + 1 }, '2 kHz')).toBeUndefined();
  });
});

describe('a new thing', () => {
  const filter = new Map([['response', 'butterworth']]);

  it('goes behind the last of its section', () => {
    expect(withThing('filters:\n  a: {}\n\n# channels\nchannels:\n', 'filters', 'b', filter)).toBe(
      'filters:\n  a: {}\n  b: { response: butterworth }\n\n# channels\nchannels:\n',
    );
    expect(withThing('filters: { a: {} }\n', 'filters', 'b', filter)).toBe(
      'filters: { a: {}, b: { response: butterworth } }\n',
    );
    expect(withThing('filters:\n  a:\n    order: 2', 'filters', 'b', filter)).toBe(
      'filters:\n  a:\n    order: 2\n  b: { response: butterworth }',
    );
  });

  it('goes into an empty section, or brings its own', () => {
    expect(withThing('filters:\nchannels:\n  a: {}\n', 'filters', 'b', filter)).toBe(
      'filters:\n  b: { response: butterworth }\nchannels:\n  a: {}\n',
    );
    expect(withThing('filters: {}\n', 'filters', 'b', filter)).toBe('filters: { b: { response: butterworth } }\n');
    expect(withThing('rig: x\n', 'filters', 'b', filter)).toBe('rig: x\n\nfilters:\n  b: { response: butterworth }\n');
    expect(withThing('rig: x', 'filters', 'b', filter)).toBe('rig: x\n\nfilters:\n  b: { response: butterworth }');
  });

  it('is written as JSON in JSON', () => {
    expect(withThing('{ "rig": "x" }\n', 'filters', 'b', filter)).toBe(
      '{ "filters": { "b": { "response": "butterworth" } }, "rig": "x" }\n',
    );
    expect(withThing('{\n  "filters": {\n    "a": {}\n  }\n}\n', 'filters', 'b', filter)).toBe(
      '{\n  "filters": {\n    "a": {},\n    "b": { "response": "butterworth" }\n  }\n}\n',
    );
  });

  it('has a name that is free', () => {
    const snapshot = readSnapshot('filters:\n  card: {}\n  card-2: {}\n');
    expect(freeName(snapshot, 'filters', 'card')).toBe('card-3');
    expect(freeName(snapshot, 'sources', 'card')).toBe('card');
  });
});

describe('a scalar written anew', () => {
  const block = { json: false, flow: false, lineEnd: '\n' } as const;

  it('has quotes only where it needs them', () => {
    expect(scalarText('-80 dBFS', block)).toBe('-80 dBFS');
    expect(scalarText('10 Hz .. 2 kHz', block)).toBe('10 Hz .. 2 kHz');
    expect(scalarText('a, b', block)).toBe('a, b');
    expect(scalarText('a, b', { ...block, flow: true })).toBe('"a, b"');
    expect(scalarText('a: b', block)).toBe('"a: b"');
    expect(scalarText('a #b', block)).toBe('"a #b"');
    expect(scalarText('- a', block)).toBe('"- a"');
    expect(scalarText('', block)).toBe('""');
    expect(scalarText("it's", block, "'")).toBe("'it''s'");
  });

  it('nests in braces and brackets', () => {
    expect(
      valueText(
        new Map<string, NewValue>([
          ['pass', '0.2 fs'],
          ['list', ['a', '[b']],
        ]),
        block,
      ),
    ).toBe('{ pass: 0.2 fs, list: [a, "[b"] }');
  });
});
