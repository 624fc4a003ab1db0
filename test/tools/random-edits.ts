import fc from 'fast-check';
import type { TextEdit } from '../../server/src/rig/snapshot.ts';
import { BLOCK_RIG, FLOW_RIG } from '../rig/snapshot-rigs.ts';

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
  '{1..3}',
  '  s-{2..5}: { rate: 1 kHz, band: 1 Hz .. 450 Hz }\n',
  'accept: [{ finding: fold-in-band, reason: known }]\n',
  '  - { finding: band-droop, on: "s-*", reason: known, until: 2026-11-30 }\n',
  'until: 2026-12-01',
];

/** One random edit, free of the text that it will be made on. */
export type Step = readonly [kind: number, a: number, b: number, piece: number];

export const step: fc.Arbitrary<Step> = fc.tuple(
  fc.nat({ max: 11 }),
  fc.nat({ max: 1_000_000 }),
  fc.nat({ max: 1_000_000 }),
  fc.nat({ max: PIECES.length - 1 }),
);

/** The edits that a step makes on a text: of characters, lines, blocks, indentation, or several at once. */
export function editsOf(text: string, [kind, a, b, piece]: Step): readonly TextEdit[] {
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
