import type { FoldedPiece } from '../signal/folding.ts';
import { cutTo } from '../signal/shifted-folding.ts';

/** A piece in up to three parts: below a band of true frequencies, inside it, and above. */
export interface CutPiece {
  readonly inside: FoldedPiece | undefined;
  readonly outside: readonly FoldedPiece[];
}

/** Cuts a piece at the ends of a band of true frequencies. What only touches the band is outside. */
export function cutAtBand(piece: FoldedPiece, lowHz: number, highHz: number): CutPiece {
  const { trueLowHz, trueHighHz } = piece;
  if (trueLowHz === trueHighHz) {
    return trueLowHz >= lowHz && trueLowHz <= highHz
      ? { inside: piece, outside: [] }
      : { inside: undefined, outside: [piece] };
  }
  const start = Math.max(trueLowHz, lowHz);
  const end = Math.min(trueHighHz, highHz);
  if (start >= end) return { inside: undefined, outside: [piece] };
  if (start <= trueLowHz && end >= trueHighHz) return { inside: piece, outside: [] };
  const outside: FoldedPiece[] = [];
  if (trueLowHz < start) outside.push(within(piece, trueLowHz, start));
  if (end < trueHighHz) outside.push(within(piece, end, trueHighHz));
  return { inside: within(piece, start, end), outside };
}

/** The part of a piece between two of its true frequencies. */
function within(piece: FoldedPiece, lowHz: number, highHz: number): FoldedPiece {
  const { trueLowHz, trueHighHz, recordedLowHz, recordedHighHz, mirrored } = piece;
  const recorded = mirrored
    ? { lowHz: recordedLowHz + (trueHighHz - highHz), highHz: recordedHighHz - (lowHz - trueLowHz) }
    : { lowHz: recordedLowHz + (lowHz - trueLowHz), highHz: recordedHighHz - (trueHighHz - highHz) };
  return { ...cutTo(piece, recorded), trueLowHz: lowHz, trueHighHz: highHz };
}
