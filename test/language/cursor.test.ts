import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cursorAt, cursorIn } from '../../server/src/editor/cursor.ts';
import type { Cursor } from '../../server/src/editor/cursor-model.ts';
import { readSnapshot } from '../../server/src/rig/snapshot.ts';
import { runs } from '../tools/runs.ts';
import { EXTRACT_FAN } from '../tools/samples.ts';
import { marked } from './marked.ts';

/** Where a cursor stands, in short: the path with `/`, `-` for an item, then what is written there. */
function check(fixture: string, expected: string, siblings?: readonly string[]): void {
  const { text, offset } = marked(fixture);
  const cursor = cursorIn(text, offset);
  const path = cursor.path.map((step) => (step.kind === 'key' ? step.key : '-')).join('/');
  expect(`${path} ${cursor.writes} ${JSON.stringify(cursor.prefix)}`).toBe(expected);
  if (siblings) expect([...cursor.siblings].sort()).toEqual([...siblings].sort());
}

describe('a cursor in block style', () => {
  it('at the top writes a key of the rig', () => {
    check('▮', ' key ""');
    check('rig: x\nma▮', ' key "ma"', ['rig']);
    check('channels:\n  a:\n    rate: 1 kHz\n▮', ' key ""');
  });

  it('in a section writes a name, in an entry a key', () => {
    check('channels:\n  be▮', 'channels key "be"');
    check('channels:\n  a:\n    ra▮\n    band: 1 Hz .. 2 Hz\n', 'channels/a key "ra"', ['band']);
    check('channels:\n  a:\n    rate: 1 kHz\n    ▮', 'channels/a key ""', ['rate']);
  });

  it('behind a colon writes a value', () => {
    check('channels:\n  a:\n    rate: ▮', 'channels/a/rate value ""');
    check('channels:\n  a:\n    rate: 25.6 k▮', 'channels/a/rate value "25.6 k"');
    check("channels:\n  a:\n    rate: '25.6▮", 'channels/a/rate value "25.6"');
    check('mains: ▮', 'mains value ""');
  });

  it('in a list writes an item', () => {
    check('channels:\n  a:\n    then:\n      - ▮', 'channels/a/then/- key ""');
    check('channels:\n  a:\n    then:\n      - decimate: ▮', 'channels/a/then/-/decimate value ""');
    check('channels:\n  a:\n    then:\n      - decimate: 5\n        fi▮', 'channels/a/then/- key "fi"', ['decimate']);
    check('channels:\n  a:\n    then:\n    - decimate: 5\n      fi▮', 'channels/a/then/- key "fi"');
    check('accept:\n- find▮', 'accept/- key "find"');
  });

  it('knows names in quotes, anchors and comments above it', () => {
    check('channels:\n  "a b": &x\n    # a comment\n\n    ra▮', 'channels/a b key "ra"');
    check('channels: # all of them\n  a:\n    ra▮', 'channels/a key "ra"');
  });

  it('in a comment is in a comment', () => {
    const { text, offset } = marked('channels:\n  a: # ra▮');
    expect(cursorIn(text, offset).inComment).toBe(true);
  });
});

describe('a cursor in flow style', () => {
  it('inside an open map writes keys and values', () => {
    check('clocks:\n  c: { fre▮', 'clocks/c key "fre"');
    check('clocks:\n  c: { frequency: ▮ }', 'clocks/c/frequency value ""');
    check('clocks:\n  c: { frequency: 1 MHz, ▮ }', 'clocks/c key ""', ['frequency']);
    check('channels:\n  a:\n    then:\n      - { decimate: 5, filter: ▮ }', 'channels/a/then/-/filter value ""');
    check('channels:\n  a:\n    then: [{ decimate: ▮', 'channels/a/then/-/decimate value ""');
    check('channels:\n  a: { hears: [mains, ▮', 'channels/a/hears/- value ""');
  });

  it('that runs over lines stands under the line it began on', () => {
    check('clocks:\n  c: {\n    frequency: 1 MHz,\n    di▮', 'clocks/c key "di"', ['frequency']);
  });

  it('within others that run over lines stands in all of them', () => {
    check('digitizers:\n  d: {\n    filter: { response: ▮', 'digitizers/d/filter/response value ""');
    check('channels:\n  a:\n    then: [\n      { decimate: 5 },\n      { fi▮', 'channels/a/then/- key "fi"');
  });

  it('is not misled by brackets, apostrophes and comments in what is written', () => {
    check('channels:\n  a:\n    note: 2 of [0, 5)\n    ra▮', 'channels/a key "ra"', ['note']);
    check("channels:\n  a: { note: it's new, ra▮", 'channels/a key "ra"', ['note']);
    check('clocks:\n  c: { frequency: 1 MHz, # a comma, a {\n    di▮', 'clocks/c key "di"', ['frequency']);
    check('clocks:\n  c: { frequency: 1 # so far\n    M▮', 'clocks/c/frequency value "M"');
    check('clocks:\n  c: { note:, a#b: "x # y", di▮', 'clocks/c key "di"', ['note', 'a#b']);
    const { text, offset } = marked('clocks:\n  c: { frequency: 1 MHz, # ra▮');
    expect(cursorIn(text, offset).inComment).toBe(true);
  });

  it('in JSON writes quoted keys and values', () => {
    check('{ "channels": { "a": { "ra▮', 'channels/a key "ra"');
    check('{ "channels": { "a": { "rate": "25▮', 'channels/a/rate value "25"');
    check('{ "channels": { "a": { "rate": "25 kHz", "▮" } } }', 'channels/a key ""', ['rate']);
    check('{"channels":{"a":{"gain":1,"rate":▮', 'channels/a/rate value ""');
    check('# JSON with a comment\n{ "note": "a \\" {", "ch▮', ' key "ch"', ['note']);
  });
});

describe('a cursor in an entry that is read alone', () => {
  /** The cursor as the whole text shows it, and as the entry under it does. */
  function both(fixture: string): readonly Cursor[] {
    const { text, offset } = marked(fixture);
    return [cursorIn(text, offset), cursorAt(readSnapshot(text), offset)];
  }

  it.each([
    'rig: x\nchannels:\n  a:\n    rate: 1 kHz\n  b:\n    ra▮\n  c: { rate: 2 kHz }\n',
    'channels:\n  a:\n    rate: 1 kHz\n  b▮',
    'channels:\n  a: { rate: ▮ }\n  b: { rate: 2 kHz }\n',
    'channels:\n  a: { then: [{ decimate: 5,\n    fi▮\n',
    'channels:\n  a:\n    then:\n    - decimate: ▮\n',
    'accept:\n- finding: ▮\nchecks:\n  band-droop: off\n',
    'channels: { a: { rate: ▮ } }\n',
    '  rig: x\n  channels:\n    a:\n      ra▮\n',
    '# first\n▮\nrig: x\n',
    'rig: x\nclocks:\n▮\nchannels:\n  a: { rate: 1 kHz }\n',
    '{ "channels": { "a": { "ra▮": 1 } } }',
  ])('stands where it does in the whole: %j', (fixture) => {
    const [whole, alone] = both(fixture);
    const { siblings: _, ...rest } = alone!;
    expect(whole).toMatchObject(rest);
  });

  it('knows the other keys of its map, at the top those of the whole file', () => {
    const [, alone] = both('rig: x\nclocks:\n  c: { frequency: 1 MHz }\nchannels:\n  a: { rate: 1 kHz }\n▮');
    expect([...alone!.siblings]).toEqual(['rig', 'clocks', 'channels']);
    const [, inside] = both('channels:\n  a:\n    ▮\n    rate: 1 kHz\n  b:\n    band: 1 Hz .. 2 Hz\n');
    expect([...inside!.siblings]).toEqual(['rate']);
  });

  it('is not drawn into a map that is left open in another', () => {
    const [, alone] = both('clocks:\n  c: { frequency: 1 MHz,\nchannels:\n  a:\n    rate: ▮');
    expect(alone).toMatchObject({
      path: ['channels', 'a', 'rate'].map((key) => ({ kind: 'key', key })),
      inFlow: false,
    });
  });
});

describe('a cursor anywhere', () => {
  it('is somewhere, whatever the text', () => {
    const pieces = [
      '"',
      "'",
      '{',
      '}',
      '[',
      ']',
      ':',
      ': ',
      ',',
      '#',
      '\n',
      '  ',
      '- ',
      'a',
      '&x ',
      '\t',
      '\r\n',
      EXTRACT_FAN.slice(0, 80),
    ];
    fc.assert(
      fc.property(fc.array(fc.constantFrom(...pieces), { maxLength: 30 }), fc.nat(), (parts, at) => {
        const text = parts.join('');
        const offset = at % (text.length + 1);
        for (const cursor of [cursorIn(text, offset), cursorAt(readSnapshot(text), offset)]) {
          expect(cursor.start).toBeGreaterThanOrEqual(text.lastIndexOf('\n', offset - 1) + 1 - Number(offset === 0));
          expect(cursor.start).toBeLessThanOrEqual(offset);
        }
      }),
      { numRuns: runs(2_000), seed: 3 },
    );
  });
});
