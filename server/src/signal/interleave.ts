import { decibels } from './decibel.ts';
import { type FoldedPiece, MOST_PIECES } from './folding.ts';
import { coincidenceOf, foldShifted, partnerOf, shiftHzOf } from './shifted-folding.ts';

/**
 * Interleaved converters: M of them take turns, each at rate / M, and are never quite alike.
 *
 * Unlike gains and instants multiply a tone by a sequence of period M, unlike offsets add one: lines at f + k rate / M
 * and at k rate / M, k = 1 .. M - 1, folded. Summed over k, the image lines have the power of the mismatch itself.
 * Sources: W. C. Black and D. A. Hodges, Time interleaved converter arrays, IEEE JSSC 1980; C. Vogel, The impact of
 * combined channel mismatch effects in time-interleaved ADCs, IEEE Trans. Instrumentation and Measurement 2005.
 */
export interface Interleave {
  /** How many, M. */
  readonly converters: number;
  /** Rms about the mean, as a part of the mean gain. */
  readonly gainMismatch: number;
  /** Rms about evenly spaced instants, in s. */
  readonly timingMismatchS: number;
  /** Rms about the mean, as a part of full scale. */
  readonly offsetMismatch: number;
}

/** Part of a range as one image of the interleaving records it. */
export interface InterleavePiece extends FoldedPiece {
  /** The k of the image; of a collapsed piece, the first that it stands for. */
  readonly shift: number;
  /** Of the whole mismatch at the piece's highest true frequency, in dB relative to what is sampled. */
  readonly imageDb: number;
}

/** The lines of the offsets. */
export interface OffsetLines {
  /** Ascending, 0 .. rate / 2; that of the mean offset, 0, is not among them. */
  readonly recordedHz: readonly number[];
  /** How many more there are, above these. */
  readonly omitted: number;
  /** Of all together, against which each is judged. */
  readonly togetherDbfs: number;
}

/**
 * All images of a tone at `frequencyHz` together, as an amplitude ratio: sqrt(g^2 + (2 pi f s)^2).
 *
 * A formula of small angles: where 2 pi f s nears 1 it says more than is so.
 */
export function mismatchRatio(frequencyHz: number, { gainMismatch, timingMismatchS }: Interleave): number {
  const timing = timingMismatchS === 0 ? 0 : 2 * Math.PI * frequencyHz * timingMismatchS;
  return Math.hypot(gainMismatch, timing);
}

/**
 * The images of a range, k ascending, each split where it folds and judged at the whole of the mismatch; which of
 * them are the strong ones no figure of the whole tells. None where fewer than two converters take turns, or all are
 * alike.
 *
 * A tone (`lowHz === highHz`) has one piece for lines that coincide, none for one that falls on the tone itself:
 * there it is an error of the tone's own level.
 *
 * @param ratesHz the rate of all converters together, then that of each step that follows, all above 0
 * @param limit pieces at most; past it one collapsed piece stands for all that is left
 */
export function interleaveImages(
  lowHz: number,
  highHz: number,
  ratesHz: readonly [number, ...number[]],
  interleave: Interleave,
  limit: number = MOST_PIECES,
): readonly InterleavePiece[] {
  const { converters } = interleave;
  if (!takesTurns(converters) || !(mismatchRatio(highHz, interleave) > 0)) return [];
  const [rateHz] = ratesHz;
  const coincidence = lowHz === highHz ? coincidenceOf(lowHz, rateHz, converters) : undefined;
  const judged = (piece: FoldedPiece, shift: number): InterleavePiece => ({
    ...piece,
    shift,
    imageDb: decibels(mismatchRatio(piece.trueHighHz, interleave)),
  });
  const pieces: InterleavePiece[] = [];
  for (let shift = 1; shift < converters; shift++) {
    // The partner of the tone's own line, 0, is less than any shift too.
    if (coincidence !== undefined && partnerOf(shift, coincidence, converters) < shift) continue;
    const room = limit - pieces.length - (shift + 1 < converters ? 1 : 0);
    const shiftHz = shiftHzOf(shift, rateHz, converters);
    for (const piece of foldShifted(lowHz, highHz, shiftHz, ratesHz, Math.max(room, 0)))
      pieces.push(judged(piece, shift));
    if (room < 1) break;
  }
  return pieces;
}

/**
 * The lines that unlike offsets leave whether or not there is a signal; `undefined` where fewer than two converters
 * take turns, or all are alike. An offset of rms o of full scale has the power of a sinusoid of sqrt 2 o.
 *
 * @param rateHz of all converters together
 * @param limit lines at most
 */
export function offsetLines(
  rateHz: number,
  { converters, offsetMismatch }: Interleave,
  limit: number = MOST_PIECES,
): OffsetLines | undefined {
  if (!takesTurns(converters) || !(offsetMismatch > 0)) return undefined;
  // k and M - k are one line.
  const lines = Math.floor(converters / 2);
  const recordedHz = Array.from({ length: Math.min(lines, limit) }, (_, i) => shiftHzOf(i + 1, rateHz, converters));
  return {
    recordedHz,
    omitted: lines - recordedHz.length,
    togetherDbfs: decibels(Math.SQRT2 * offsetMismatch),
  };
}

function takesTurns(converters: number): boolean {
  return Number.isInteger(converters) && converters >= 2;
}
