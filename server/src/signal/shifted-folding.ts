import { type FoldedPiece, foldThrough } from './folding.ts';
import type { FrequencyRange } from './frequency-range.ts';

/**
 * Fold-back where the sampling also shifts: whatever repeats with a period of `slots` samples (a pattern of gaps,
 * converters that take turns) makes of a tone at f one line at each f + k rate / slots, k = 0 .. slots - 1, folded.
 * Those at -f + k rate / slots are the same lines.
 */

/** Lines closer than this part of the rate are one: it takes a record of a billion samples to part them. */
const SAME_LINE = 1e-9;

/**
 * How a range folds once it is shifted up by `shiftHz`, as `foldThrough` has it; the true frequencies of the pieces are
 * those before the shift, and so is what the first stage's filter sees.
 *
 * @param ratesHz the rate of each stage, all above 0, the one that shifts first
 * @param limit pieces at most; with 0 one collapsed piece stands for the range
 */
export function foldShifted(
  lowHz: number,
  highHz: number,
  shiftHz: number,
  ratesHz: readonly number[],
  limit: number,
): readonly FoldedPiece[] {
  const shiftedLowHz = lowHz + shiftHz;
  const shiftedHighHz = highHz + shiftHz;
  const pieces = foldThrough(shiftedLowHz, shiftedHighHz, ratesHz, limit);
  if (shiftHz === 0) return pieces;
  const before = (hz: number): number => {
    if (hz === shiftedLowHz) return lowHz;
    return hz === shiftedHighHz ? highHz : Math.min(Math.max(hz - shiftHz, lowHz), highHz);
  };
  return pieces.map((piece) => {
    const trueLowHz = before(piece.trueLowHz);
    // A shift may be so large that a double no longer tells the ends of the range apart.
    const trueHighHz = shiftedLowHz === shiftedHighHz ? highHz : before(piece.trueHighHz);
    return {
      ...piece,
      trueLowHz,
      trueHighHz,
      inputs: [{ lowHz: trueLowHz, highHz: trueHighHz, reversed: false }, ...piece.inputs.slice(1)],
      foldsAtStage: 1,
    };
  });
}

/** How far the line of shift k = `shift` is moved, in Hz. */
export function shiftHzOf(shift: number, rateHz: number, slots: number): number {
  return (shift * rateHz) / slots;
}

/**
 * The whole number q for which a tone is at q rate / (2 slots), where its lines coincide two by two: those of shifts k
 * and -q - k. `undefined` elsewhere, where each line stands alone.
 */
export function coincidenceOf(frequencyHz: number, rateHz: number, slots: number): number | undefined {
  const halfSpacingHz = rateHz / (2 * slots);
  // The remainder is exact; a whole rate is 2 slots half spacings, which changes no partner.
  const rest = Math.abs(frequencyHz) % rateHz;
  const nearest = Math.round(rest / halfSpacingHz);
  return Math.abs(rest - nearest * halfSpacingHz) <= (SAME_LINE / 2) * rateHz ? nearest : undefined;
}

/** The shift whose line coincides with that of `shift`; `shift` itself where the line is at 0 or rate / 2. */
export function partnerOf(shift: number, coincidence: number, slots: number): number {
  const partner = (-coincidence - shift) % slots;
  return partner < 0 ? partner + slots : Math.abs(partner);
}

/** The part of a piece, not a collapsed one, that is recorded within `recorded`, which is within what it records. */
export function cutTo<Piece extends FoldedPiece>(piece: Piece, recorded: FrequencyRange): Piece {
  const belowHz = recorded.lowHz - piece.recordedLowHz;
  const aboveHz = piece.recordedHighHz - recorded.highHz;
  const trimmed = <Range extends FrequencyRange>(range: Range, reversed: boolean): Range => {
    const lowHz = range.lowHz + (reversed === piece.mirrored ? belowHz : aboveHz);
    const highHz = range.highHz - (reversed === piece.mirrored ? aboveHz : belowHz);
    return { ...range, lowHz, highHz: Math.max(lowHz, highHz) };
  };
  const whole = trimmed({ lowHz: piece.trueLowHz, highHz: piece.trueHighHz }, false);
  return {
    ...piece,
    trueLowHz: whole.lowHz,
    trueHighHz: whole.highHz,
    recordedLowHz: recorded.lowHz,
    recordedHighHz: recorded.highHz,
    inputs: piece.inputs.map((input) => trimmed(input, input.reversed)),
  };
}
