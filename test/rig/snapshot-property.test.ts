import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { editSnapshot, readSnapshot, type Snapshot, type TextEdit } from '../../server/src/rig/snapshot.ts';
import { applyTextEdits } from '../../server/src/rig/text-edit.ts';
import { runs } from '../tools/runs.ts';
import { BLOCK_RIG, FLOW_RIG, RIGS } from './snapshot-rigs.ts';

/** What a snapshot says, free of object identity. */
function described(snapshot: Snapshot): unknown {
  return {
    style: snapshot.style,
    length: snapshot.length,
    lineCount: snapshot.lineCount,
    text: snapshot.text(),
    entries: snapshot.entries.map((entry) => ({ ...entry, at: snapshot.startOf(entry) })),
    problems: snapshot.problems.map(({ problem, place }) => ({
      problem,
      range: snapshot.rangeOf(place),
      text: place.entry.text,
    })),
  };
}

/** Pieces that change how the text around them is read. */
const PIECES = [
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
  ' # ',
  '\n',
  '\r\n',
  '\r',
  ' ',
  '  ',
  '\t',
  '- ',
  '&a ',
  '*far',
  '<<: *stud',
  '| ',
  '>-\n',
  '---\n',
  '...\n',
  '\n---\n',
  '%',
  '? ',
  '!!str ',
  'x',
  'channels:\n',
  'channels: ',
  'filters:',
  '\nsources:\n  new: { frequency: 1 kHz }\n',
  '  extra:\n    rate: 1 kHz\n',
  '__proto__: 1\n',
  '\uFFFD',
  '\uFEFF',
  '\u0000',
  '{ a: 1 }\n',
  '\\',
];

type Step = readonly [kind: number, a: number, b: number, piece: number];

const step: fc.Arbitrary<Step> = fc.tuple(
  fc.nat({ max: 11 }),
  fc.nat({ max: 1_000_000 }),
  fc.nat({ max: 1_000_000 }),
  fc.nat({ max: PIECES.length - 1 }),
);

/** The edits that a step makes on a text: of characters, lines, blocks, indentation, or several at once. */
function editsOf(text: string, [kind, a, b, piece]: Step): readonly TextEdit[] {
  const at = a % (text.length + 1);
  const lines = text.split('\n');
  const starts = [0];
  for (const line of lines) starts.push(starts.at(-1)! + line.length + 1);
  const lineIndex = a % lines.length;
  const lineStart = Math.min(starts[lineIndex]!, text.length);
  const count = 1 + (b % 6);
  const linesEnd = Math.min(starts[Math.min(lineIndex + count, lines.length)]!, text.length);
  const other = Math.min(starts[b % lines.length]!, text.length);
  const taken = text.slice(lineStart, linesEnd);
  switch (kind) {
    case 0:
    case 1:
      return [{ start: at, end: at, text: PIECES[piece]! }];
    case 2:
      return [{ start: at, end: Math.min(at + 1 + (b % 3), text.length), text: '' }];
    case 3:
      return [{ start: lineStart, end: linesEnd, text: '' }];
    case 4:
      return [{ start: lineStart, end: lineStart, text: PIECES[piece]! }];
    case 5: {
      const move = other < lineStart || other >= linesEnd;
      return move
        ? [
            { start: lineStart, end: linesEnd, text: '' },
            { start: other, end: other, text: taken },
          ]
        : [];
    }
    case 6:
      return [{ start: other, end: other, text: taken }];
    case 7:
      return [{ start: lineStart, end: linesEnd, text: taken.replace(/^/gm, '  ') }];
    case 8:
      return [{ start: lineStart, end: linesEnd, text: taken.replace(/^ {1,2}/gm, '') }];
    case 9:
      return [{ start: lineStart, end: linesEnd, text: taken.replace(/\r?\n/g, b % 2 ? '\r\n' : '\n') }];
    case 10: {
      const far = b % (text.length + 1);
      return [
        { start: Math.max(at, far), end: Math.max(at, far), text: PIECES[piece]! },
        { start: Math.min(at, far), end: Math.min(at, far), text: PIECES[(piece * 7) % PIECES.length]! },
      ];
    }
    default:
      return b % 8 === 0
        ? [{ start: 0, end: text.length, text: b % 16 === 0 ? FLOW_RIG : BLOCK_RIG }]
        : [{ start: 0, end: Math.min(text.length, b % 3), text: PIECES[piece]! }];
  }
}

describe('editing a snapshot', () => {
  it.each(RIGS)('equals a read from nothing after every edit (%s)', (_, rig) => {
    fc.assert(
      fc.property(fc.array(step, { minLength: 1, maxLength: 12 }), (steps) => {
        let text = rig;
        let snapshot = readSnapshot(text);
        for (const one of steps) {
          const edits = editsOf(text, one);
          text = applyTextEdits(text, edits);
          snapshot = editSnapshot(snapshot, edits);
          expect(described(snapshot)).toEqual(described(readSnapshot(text)));
        }
      }),
      { seed: 20, numRuns: runs(60) },
    );
  });
});
