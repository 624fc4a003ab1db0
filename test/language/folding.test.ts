import { describe, expect, it } from 'vitest';
import { foldingOf } from '../../server/src/editor/folding.ts';
import { readSnapshot } from '../../server/src/rig/snapshot.ts';
import { SAMPLES } from '../tools/samples.ts';

/** What can be folded in a text, as its first and last line each: `channels: .. rate: 1 kHz`. */
function folds(text: string): readonly string[] {
  const lines = text.split(/\r?\n/);
  return foldingOf(readSnapshot(text))
    .sort((a, b) => a.startLine - b.startLine || b.endLine - a.endLine)
    .map(({ startLine, endLine, kind }) => {
      const ends = `${lines[startLine]!.trim()} .. ${lines[endLine]!.trim()}`;
      return kind === undefined ? ends : `${kind} ${ends}`;
    });
}

const TEXT = `# A rig with everything
# that can be folded
rig: Folded

# one line alone
mains:
  frequency: 50 Hz
channels:
  a:
    rate: 10 kHz
    then:
      - decimate: 5
        filter:
          response: rc
          order: 1
      - decimate: 2
    band: 1 Hz .. 100 Hz

  b: { rate: 1 kHz, band: 1 Hz .. 100 Hz }
  c: {
    rate: 1 kHz,
    hears: [
      mains
    ] }
checks: { band-droop: off }
`;

const EXPECTED = [
  'comment # A rig with everything .. # that can be folded',
  'mains: .. frequency: 50 Hz',
  'channels: .. ] }',
  'a: .. band: 1 Hz .. 100 Hz',
  'then: .. - decimate: 2',
  '- decimate: 5 .. order: 1',
  'filter: .. order: 1',
  'c: { .. ] }',
  'hears: [ .. ] }',
];

describe('what can be folded', () => {
  it('is every section, entry, map and list of more than a line, and every run of comments', () => {
    expect(folds(TEXT)).toEqual(EXPECTED);
  });

  it('is the same in lines that end with two signs', () => {
    expect(folds(TEXT.replaceAll('\n', '\r\n'))).toEqual(EXPECTED);
  });

  it('is found in JSON and in a section in braces', () => {
    const json = '{\n  "rig": "x",\n  "channels": {\n    "a": {\n      "rate": "1 kHz"\n    }\n  }\n}\n';
    expect(folds(json)).toEqual(['"channels": { .. }', '"a": { .. }']);
    expect(folds('rig: x\nchannels: {\n  a: { rate: 1 kHz },\n  b: {} }\n')).toEqual(['channels: { .. b: {} }']);
  });

  it('is nothing in a text without anything to fold', () => {
    for (const text of ['', 'rig: x', '# a\n', 'clocks: { c: { frequency: 1 MHz } }\n', 'clocks:\n']) {
      expect(folds(text)).toEqual([]);
    }
  });

  it('is nested or apart, never across, in every sample', () => {
    for (const { text } of SAMPLES) {
      const ranges = foldingOf(readSnapshot(text));
      expect(ranges.length).toBeGreaterThan(5);
      for (const a of ranges) {
        expect(a.endLine).toBeGreaterThan(a.startLine);
        for (const b of ranges) {
          const across = a.startLine < b.startLine && b.startLine <= a.endLine && a.endLine < b.endLine;
          expect(across, `${JSON.stringify(a)} ${JSON.stringify(b)}`).toBe(false);
        }
      }
    }
  });
});
