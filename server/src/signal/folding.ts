/**
 * Fold-back of frequencies and ranges through one sampling after another.
 *
 * recorded(f) = |f - rate round(f / rate)|; zone = floor(2 f / rate) + 1, mirrored in even zones. Keeping every M-th
 * sample of a stored sequence is sampling again, at rate / M, so a chain is a list of rates.
 * Source: Oppenheim and Schafer, Discrete-Time Signal Processing, the chapter on sampling.
 */

/** The frequencies at which one stage sees a piece. */
export interface StageInput {
  readonly lowHz: number;
  readonly highHz: number;
  /** Whether it rises here while the true frequency falls. */
  readonly reversed: boolean;
}

/** Part of a true range that folds as one: frequency maps to frequency with slope 1 or -1 at every stage. */
export interface FoldedPiece {
  readonly trueLowHz: number;
  readonly trueHighHz: number;
  readonly recordedLowHz: number;
  readonly recordedHighHz: number;
  /** Whether the record holds it upside down. */
  readonly mirrored: boolean;
  /** The first stage, from 1, whose sampling moves it; `null` where it is recorded at its true frequency. */
  readonly foldsAtStage: number | null;
  /** Per stage, the range that the stage's own filter sees: `inputs[0]` is the true range. */
  readonly inputs: readonly StageInput[];
  /**
   * Set on a piece that stands for all that was left when the pieces ran out. It is recorded as the whole of
   * 0 .. Nyquist and no frequency in it corresponds to any one of another stage: each range bounds what is there.
   */
  readonly collapsed: boolean;
}

/** How many pieces a range is split into unless the caller says otherwise. */
export const MOST_PIECES = 4096;

/** Zones from here on are no longer told apart by a double. */
const MOST_ZONES = 2 ** 50;

/** Where a frequency (its magnitude) is recorded at `rateHz`: 0 .. rate / 2. What has no value is recorded at 0. */
export function foldHz(frequencyHz: number, rateHz: number): number {
  // The remainder is exact, where a product with a rounded quotient would not be.
  const rest = Math.abs(frequencyHz) % rateHz;
  if (Number.isNaN(rest)) return 0;
  return rest > rateHz / 2 ? rateHz - rest : rest;
}

/** Which zone of half a rate a frequency is in, from 1. */
export function zoneOf(frequencyHz: number, rateHz: number): number {
  return Math.floor((2 * frequencyHz) / rateHz) + 1;
}

/**
 * Where a range of true frequencies ends up: split at every multiple of half the rate of each stage in turn.
 *
 * Ends that touch a multiple do not cross it. A point (`lowHz === highHz`) is one piece, at 0 or Nyquist on a
 * multiple. Pieces come in ascending true frequency and cover the range without gap. Past `limit` pieces (or where
 * zones are narrower than a double can tell) all that is left is one collapsed piece, which claims more than is so.
 *
 * @param ratesHz the rate of each stage, all above 0, the converter's first
 */
export function foldThrough(
  lowHz: number,
  highHz: number,
  ratesHz: readonly number[],
  limit: number = MOST_PIECES,
): readonly FoldedPiece[] {
  const pieces: FoldedPiece[] = [];
  const whole: Track = {
    ranges: [{ lowHz, highHz, reversed: false }],
    foldsAtStage: null,
  };
  if (splitOnward(whole, ratesHz, limit, pieces)) return pieces;
  const last = pieces.pop();
  return [...pieces, collapsedPiece(last?.trueLowHz ?? lowHz, highHz, ratesHz)];
}

/** A range on its way: where it is at every stage so far, the true one first. */
interface Track {
  readonly ranges: readonly StageInput[];
  readonly foldsAtStage: number | null;
}

/** Splits a track at its next stage and follows each part to the end; false where it had to stop on the way. */
function splitOnward(track: Track, ratesHz: readonly number[], limit: number, pieces: FoldedPiece[]): boolean {
  const stage = track.ranges.length - 1;
  const rateHz = ratesHz[stage];
  if (rateHz === undefined) {
    if (pieces.length >= limit) return false;
    pieces.push(pieceOf(track));
    return true;
  }
  const { lowHz, highHz, reversed } = track.ranges[stage]!;
  const nyquistHz = rateHz / 2;
  if (lowHz === highHz) return splitOnward(sampled(track, rateHz, pointZone(lowHz, nyquistHz)), ratesHz, limit, pieces);
  const { first, last } = rangeZones(lowHz, highHz, nyquistHz);
  if (!(last < MOST_ZONES)) return false;
  for (let count = 0; count <= last - first; count++) {
    const zone = reversed ? last - count : first + count;
    const startHz = zone === first ? lowHz : zone * nyquistHz;
    const endHz = zone === last ? highHz : (zone + 1) * nyquistHz;
    if (!splitOnward(sampled(cut(track, startHz, endHz), rateHz, zone), ratesHz, limit, pieces)) return false;
  }
  return true;
}

/** Zones from 0. A point on the Nyquist frequency stays where it is. */
function pointZone(hz: number, nyquistHz: number): number {
  return hz <= nyquistHz ? 0 : Math.floor(hz / nyquistHz);
}

/** Zones from 0 that a range of some width has a part in; the quotients' rounding is put right. */
function rangeZones(
  lowHz: number,
  highHz: number,
  nyquistHz: number,
): { readonly first: number; readonly last: number } {
  const quotient = Math.floor(lowHz / nyquistHz);
  const first = (quotient + 1) * nyquistHz <= lowHz ? quotient + 1 : quotient;
  const upper = Math.ceil(highHz / nyquistHz) - 1;
  const last = upper * nyquistHz >= highHz ? upper - 1 : upper;
  return { first, last: Math.max(first, last) };
}

/** The part of a track that is within `startHz .. endHz` at the stage reached. */
function cut(track: Track, startHz: number, endHz: number): Track {
  const here = track.ranges[track.ranges.length - 1]!;
  return {
    ...track,
    ranges: track.ranges.map((range) => partOf(range, here, startHz, endHz)),
  };
}

/** What of `range` corresponds to `startHz .. endHz` of `here`; parts that share an end there share it here. */
function partOf(range: StageInput, here: StageInput, startHz: number, endHz: number): StageInput {
  const isOpposed = range.reversed !== here.reversed;
  const imageOf = (hz: number): number => {
    if (hz === here.lowHz) return isOpposed ? range.highHz : range.lowHz;
    if (hz === here.highHz) return isOpposed ? range.lowHz : range.highHz;
    const moved = isOpposed ? range.highHz - (hz - here.lowHz) : range.lowHz + (hz - here.lowHz);
    return Math.min(Math.max(moved, range.lowHz), range.highHz);
  };
  const start = imageOf(startHz);
  const end = imageOf(endHz);
  return {
    lowHz: Math.min(start, end),
    highHz: Math.max(start, end),
    reversed: range.reversed,
  };
}

/** A track after the sampling at `rateHz`, all of it in one zone (from 0). */
function sampled(track: Track, rateHz: number, zone: number): Track {
  const stage = track.ranges.length;
  const { lowHz, highHz, reversed } = track.ranges[stage - 1]!;
  const first = foldedInZone(lowHz, rateHz, zone);
  const second = foldedInZone(highHz, rateHz, zone);
  const range: StageInput = {
    lowHz: Math.min(first, second),
    highHz: Math.max(first, second),
    reversed: reversed !== (zone % 2 === 1),
  };
  return {
    ranges: [...track.ranges, range],
    foldsAtStage: track.foldsAtStage ?? (zone > 0 ? stage : null),
  };
}

/** The ends of a zone are exactly 0 and Nyquist, whatever the multiplication made of them. */
function foldedInZone(hz: number, rateHz: number, zone: number): number {
  const nyquistHz = rateHz / 2;
  if (hz === zone * nyquistHz) return zone % 2 === 0 ? 0 : nyquistHz;
  if (hz === (zone + 1) * nyquistHz) return zone % 2 === 0 ? nyquistHz : 0;
  return foldHz(hz, rateHz);
}

function pieceOf(track: Track): FoldedPiece {
  const { ranges, foldsAtStage } = track;
  const whole = ranges[0]!;
  const recorded = ranges[ranges.length - 1]!;
  return {
    trueLowHz: whole.lowHz,
    trueHighHz: whole.highHz,
    recordedLowHz: recorded.lowHz,
    recordedHighHz: recorded.highHz,
    mirrored: recorded.reversed,
    foldsAtStage,
    inputs: ranges.length > 1 ? ranges.slice(0, -1) : ranges,
    collapsed: false,
  };
}

/** All of a range in one piece that claims the whole record, and to fold at the first stage. */
function collapsedPiece(lowHz: number, highHz: number, ratesHz: readonly number[]): FoldedPiece {
  const ranges = [
    { lowHz, highHz, reversed: false },
    ...ratesHz.map((rateHz) => ({
      lowHz: 0,
      highHz: rateHz / 2,
      reversed: false,
    })),
  ];
  return { ...pieceOf({ ranges, foldsAtStage: 1 }), collapsed: true };
}

/** A range that ends up in the record's, where it is from some stage on; `reversed` as seen from there. */
interface Image extends Track {
  readonly collapsed: boolean;
}

/**
 * Every range of true frequencies up to `upToHz` that is recorded within `recordedLowHz .. recordedHighHz` (cut to
 * 0 .. Nyquist of the last stage), ascending, the one that is recorded where it is among them.
 *
 * Past `limit` ranges one collapsed piece stands for all above.
 *
 * @param ratesHz the rate of each stage, all above 0, the converter's first
 */
export function foldsInto(
  recordedLowHz: number,
  recordedHighHz: number,
  ratesHz: readonly number[],
  upToHz: number,
  limit: number = MOST_PIECES,
): readonly FoldedPiece[] {
  const nyquistHz = (ratesHz[ratesHz.length - 1] ?? Infinity) / 2;
  const recorded: StageInput = {
    lowHz: Math.max(recordedLowHz, 0),
    highHz: Math.min(recordedHighHz, nyquistHz),
    reversed: false,
  };
  if (!(recorded.lowHz <= recorded.highHz)) return [];
  let images: readonly Image[] = [{ ranges: [recorded], foldsAtStage: null, collapsed: false }];
  for (let stage = ratesHz.length; stage >= 1; stage--) {
    const boundHz = stage === 1 ? upToHz : ratesHz[stage - 2]! / 2;
    images = imagesBefore(images, stage, ratesHz[stage - 1]!, boundHz, Math.max(limit, 1));
  }
  return images.map((image) => {
    const { lowHz, highHz } = image.ranges[0]!;
    return image.collapsed ? collapsedPiece(lowHz, highHz, ratesHz) : pieceOf(image);
  });
}

/** What the sampling at `rateHz` brings into the images, up to `boundHz`, ascending. */
function imagesBefore(
  images: readonly Image[],
  stage: number,
  rateHz: number,
  boundHz: number,
  limit: number,
): readonly Image[] {
  const nyquistHz = rateHz / 2;
  const descending = [...images].reverse();
  const found: Image[] = [];
  if (!(nyquistHz > 0)) return found;
  for (let zone = 0; zone * nyquistHz <= boundHz; zone++) {
    for (const image of zone % 2 === 0 ? images : descending) {
      const before = imageInZone(image, stage, nyquistHz, zone, boundHz);
      if (before === undefined || isSamePoint(before, found[found.length - 1])) continue;
      if (found.length < limit) {
        found.push(before);
        continue;
      }
      const lowHz = found.pop()!.ranges[0]!.lowHz;
      return [
        ...found,
        {
          ranges: [{ lowHz, highHz: boundHz, reversed: false }],
          foldsAtStage: stage,
          collapsed: true,
        },
      ];
    }
  }
  return found;
}

/** The range of zone `zone` (from 0) that lands on an image; `undefined` where it is all above the bound. */
function imageInZone(image: Image, stage: number, nyquistHz: number, zone: number, boundHz: number): Image | undefined {
  const landing = image.ranges[0]!;
  const isMirrored = zone % 2 === 1;
  const lowHz = isMirrored ? (zone + 1) * nyquistHz - landing.highHz : zone * nyquistHz + landing.lowHz;
  const highHz = isMirrored ? (zone + 1) * nyquistHz - landing.lowHz : zone * nyquistHz + landing.highHz;
  if (lowHz > boundHz || (lowHz === boundHz && lowHz < highHz)) return undefined;
  const overHz = Math.max(highHz - boundHz, 0);
  const later = image.ranges.map((range) => withoutTop({ ...range, reversed: range.reversed !== isMirrored }, overHz));
  return {
    ranges: [{ lowHz, highHz: Math.min(highHz, boundHz), reversed: false }, ...later],
    foldsAtStage: zone > 0 ? stage : image.foldsAtStage,
    collapsed: image.collapsed,
  };
}

/** A range without the part that corresponds to the top `overHz` of the first one. */
function withoutTop(range: StageInput, overHz: number): StageInput {
  if (overHz === 0) return range;
  return range.reversed
    ? { ...range, lowHz: Math.min(range.lowHz + overHz, range.highHz) }
    : { ...range, highHz: Math.max(range.highHz - overHz, range.lowHz) };
}

/** 0 Hz and the Nyquist frequency are in two zones at once. */
function isSamePoint(image: Image, previous: Image | undefined): boolean {
  const { lowHz, highHz } = image.ranges[0]!;
  return lowHz === highHz && previous?.ranges[0]?.lowHz === lowHz && previous.ranges[0].highHz === highHz;
}
