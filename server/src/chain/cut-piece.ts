import type { FoldedPiece, StageInput } from '../signal/folding.ts';
import { partOf } from './strongest.ts';

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
  const width = piece.trueHighHz - piece.trueLowHz;
  const from = (lowHz - piece.trueLowHz) / width;
  const to = (highHz - piece.trueLowHz) / width;
  const recorded: StageInput = {
    lowHz: piece.recordedLowHz,
    highHz: piece.recordedHighHz,
    reversed: piece.mirrored,
  };
  const landed = partOf(recorded, from, to);
  return {
    ...piece,
    trueLowHz: lowHz,
    trueHighHz: highHz,
    recordedLowHz: landed.lowHz,
    recordedHighHz: landed.highHz,
    inputs: piece.inputs.map((input) => partOf(input, from, to)),
  };
}
