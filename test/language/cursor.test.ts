import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cursorIn } from '../../server/src/editor/cursor.ts';
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

  it('in JSON writes quoted keys and values', () => {
    check('{ "channels": { "a": { "ra▮', 'channels/a key "ra"');
    check('{ "channels": { "a": { "rate": "25▮', 'channels/a/rate value "25"');
    check('{ "channels": { "a": { "rate": "25 kHz", "▮" } } }', 'channels/a key ""', ['rate']);
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
        const cursor = cursorIn(text, offset);
        expect(cursor.start).toBeGreaterThanOrEqual(0);
        expect(cursor.start).toBeLessThanOrEqual(offset);
      }),
      { numRuns: runs(2_000), seed: 3 },
    );
  });
});
