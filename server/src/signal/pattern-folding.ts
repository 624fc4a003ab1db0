import { type FoldedPiece, foldHz, MOST_PIECES } from './folding.ts';
import { type FrequencyRange, merged, within } from './frequency-range.ts';
import type { PatternGains } from './pattern.ts';
import { coincidenceOf, cutTo, foldShifted, partnerOf, shiftHzOf } from './shifted-folding.ts';

/** Where a pattern of samples brings tones and ranges. Gains are amplitude ratios to the level of what is sampled. */

/** A line that a tone leaves in the record. */
export interface ToneImage {
  /** 0 .. rate / 2. */
  readonly recordedHz: number;
  /** At 0 Hz and rate / 2, and where two images coincide, the most that any phase makes of it. */
  readonly gain: number;
  /** The k whose images these are, ascending: one, or two that coincide. The tone itself is k = 0. */
  readonly shifts: readonly number[];
}

/** The lines of a tone, ascending, and what was left out where there are too many. */
export interface ToneImages {
  readonly images: readonly ToneImage[];
  /** How many k are told by no image. */
  readonly omitted: number;
  /** No line that is left out is higher. */
  readonly omittedGain: number;
}

/**
 * Every line that a tone leaves, the tone itself among them.
 *
 * @param limit lines at most; the strongest are kept
 */
export function imagesOf(
  frequencyHz: number,
  rateHz: number,
  pattern: PatternGains,
  limit: number = MOST_PIECES,
): ToneImages {
  const { slots, gains, strongest } = pattern;
  const coincidence = coincidenceOf(frequencyHz, rateHz, slots);
  const rest = Math.abs(frequencyHz) % rateHz;
  const images: ToneImage[] = [];
  const told = new Set<number>();
  for (const shift of strongest) {
    if (told.has(shift)) continue;
    if (images.length >= limit) {
      const omittedGain = gains[shift]! * (coincidence === undefined ? 1 : 2);
      return { images: ascending(images), omitted: strongest.length - told.size, omittedGain };
    }
    const partner = coincidence === undefined ? shift : partnerOf(shift, coincidence, slots);
    const shifts = partner === shift || gains[partner] === 0 ? [shift] : [shift, partner].sort((a, b) => a - b);
    for (const one of shifts) told.add(one);
    images.push({
      recordedHz: foldHz(rest + shiftHzOf(shifts[0]!, rateHz, slots), rateHz),
      gain: shifts.reduce((sum, one) => sum + gains[one]!, 0),
      shifts,
    });
  }
  return { images: ascending(images), omitted: 0, omittedGain: 0 };
}

function ascending(images: readonly ToneImage[]): readonly ToneImage[] {
  return [...images].sort((first, second) => first.recordedHz - second.recordedHz);
}

/** Part of a range as one image of the pattern records it. */
export interface PatternPiece extends FoldedPiece {
  /** The k of the image; the range itself is 0. Of a collapsed piece, the strongest that it stands for. */
  readonly shift: number;
  readonly gain: number;
  /**
   * The most that a single tone within the piece makes of a line, when it is where this image coincides with another
   * of its own; `gain` where it can't be. Never too low; may be too high for a piece hundreds of spacings wide.
   */
  readonly coincidentGain: number;
}

/** Frequencies of coincidence that are looked at one by one in a piece. */
const MOST_COINCIDENCES = 256;

/**
 * How a range is recorded: every image of it, the range itself among them, split where it folds. The strongest image
 * comes first, each in ascending true frequency; images are as long as the range, so they overlap where it is long.
 *
 * @param ratesHz the slot rate, then that of each step that follows, all above 0
 * @param limit pieces at most; past it one collapsed piece stands for all weaker images
 */
export function imagesOfRange(
  lowHz: number,
  highHz: number,
  ratesHz: readonly [number, ...number[]],
  pattern: PatternGains,
  limit: number = MOST_PIECES,
): readonly PatternPiece[] {
  const { slots, gains, strongest } = pattern;
  const [rateHz] = ratesHz;
  const pieces: PatternPiece[] = [];
  for (const [rank, shift] of strongest.entries()) {
    const gain = gains[shift]!;
    const room = limit - pieces.length - (rank + 1 < strongest.length ? 1 : 0);
    if (room < 1) {
      // Where one of these coincides with one that is told, that one's piece says so.
      const rest = foldShifted(lowHz, highHz, shiftHzOf(shift, rateHz, slots), ratesHz, 0);
      return [...pieces, ...rest.map((piece) => ({ ...piece, shift, gain, coincidentGain: 2 * gain }))];
    }
    for (const piece of foldShifted(lowHz, highHz, shiftHzOf(shift, rateHz, slots), ratesHz, room)) {
      pieces.push({ ...piece, shift, gain, coincidentGain: gain + greatestPartner(piece, shift, rateHz, pattern) });
    }
  }
  return pieces;
}

/** The greatest gain of another image that coincides with this one somewhere in the piece. */
function greatestPartner(
  { trueLowHz, trueHighHz }: FoldedPiece,
  shift: number,
  rateHz: number,
  { slots, gains, strongest }: PatternGains,
): number {
  const first = multipleOf(trueLowHz, rateHz, slots, Math.ceil);
  const last = multipleOf(trueHighHz, rateHz, slots, Math.floor);
  const greatestOther = gains[(shift === strongest[0] ? strongest[1] : strongest[0]) ?? slots] ?? 0;
  // Past the safe integers the multiples are no longer told apart either.
  if (!(last - first < MOST_COINCIDENCES && last < Number.MAX_SAFE_INTEGER)) return greatestOther;
  let greatest = 0;
  for (let coincidence = first; coincidence <= last; coincidence++) {
    const partner = partnerOf(shift, coincidence, slots);
    if (partner !== shift) greatest = Math.max(greatest, gains[partner]!);
  }
  return greatest;
}

/** The multiple of rate / (2 slots) that an end of a range is at; the next one inwards where it is at none. */
function multipleOf(frequencyHz: number, rateHz: number, slots: number, inwards: (value: number) => number): number {
  const multiple = frequencyHz / (rateHz / (2 * slots));
  return coincidenceOf(frequencyHz, rateHz, slots) === undefined ? inwards(multiple) : Math.round(multiple);
}

/**
 * The images of a band that fall back into it, cut to where they do; its own place in the record is not among them.
 * A collapsed piece is left whole.
 *
 * @param limit see `imagesOfRange`, at least 2; the result may have one piece for each of these and each piece of the band itself
 */
export function imagesInBand(
  lowHz: number,
  highHz: number,
  ratesHz: readonly [number, ...number[]],
  pattern: PatternGains,
  limit: number = MOST_PIECES,
): readonly PatternPiece[] {
  const pieces = imagesOfRange(lowHz, highHz, ratesHz, pattern, Math.max(limit, 2));
  const landing = merged(pieces.filter(({ shift }) => shift === 0).map(recordedRange));
  return pieces
    .filter(({ shift }) => shift !== 0)
    .flatMap((piece) =>
      piece.collapsed ? [piece] : within(landing, recordedRange(piece)).map((part) => cutTo(piece, part)),
    );
}

function recordedRange({ recordedLowHz, recordedHighHz }: FoldedPiece): FrequencyRange {
  return { lowHz: recordedLowHz, highHz: recordedHighHz };
}
