import { type Along, leastPointAlong } from '../signal/cascade.ts';
import { type FoldedPiece, foldsInto } from '../signal/folding.ts';
import type { Response } from '../signal/response.ts';
import type { Chain, SignalPath } from './model.ts';
import { partOf } from './strongest.ts';

/** The least that is taken off anything that folds into a band, and where that is. */
export interface Least {
  /** As much as is sure: the least itself to within 0.01 dB, or less where the search was given up. */
  readonly attenuationDb: number;
  readonly atHz: number;
}

/** What folds into a band: every range below the first Nyquist frequency that ends there. */
export interface BandImages {
  readonly path: SignalPath;
  /** The band itself where it is folded on purpose: of what lands in the record's band, the one thing that is wanted. */
  readonly spared: TrueRange | undefined;
  /** The least attenuated behind the first stage come first. */
  readonly images: readonly Image[];
}

interface Image {
  readonly piece: FoldedPiece;
  /** What is sure to be taken off behind the first stage. */
  readonly laterDb: number;
}

/** Images that are told apart. */
const MOST_IMAGES = 8192;

/** Zones of the first stage that are looked at one by one before what is beyond them is taken at its bound. */
const MOST_ZONES = 64;

/** Pieces that are searched for their least before the rest are taken at their bounds. */
const MOST_SEARCHED = 1024;

/** Where no more than this can be gained by looking on, the bound is taken: an equal ripple would never end. */
const CLOSE_DB = 0.01;

/** What has to be known of a chain to say what folds into its band. */
type ImagedBand = Pick<Chain, 'path' | 'recordedBand' | 'isBandpass' | 'bandLowHz' | 'bandHighHz'>;

/** Everything below the first Nyquist frequency of a path that ends in a band. */
export function bandImages({ path, recordedBand, isBandpass, bandLowHz, bandHighHz }: ImagedBand): BandImages {
  const firstNyquistHz = path.ratesHz[0]! / 2;
  const topHz = Math.min(recordedBand.highHz, path.ratesHz[path.ratesHz.length - 1]! / 2);
  const pieces = foldsInto(recordedBand.lowHz, topHz, path.ratesHz.slice(1), firstNyquistHz, MOST_IMAGES);
  const images = pieces.map((piece): Image => {
    let laterDb = 0;
    for (const { response, lowHz, highHz } of laterMembers(piece, path)) laterDb += response.leastDb(lowHz, highHz);
    return { piece, laterDb };
  });
  const spared = isBandpass ? { lowHz: bandLowHz, highHz: bandHighHz } : undefined;
  return { path, spared, images: images.sort((first, second) => first.laterDb - second.laterDb) };
}

/**
 * Of the true frequencies `lowHz .. highHz`, which may reach to infinity, the least attenuated that first fold at each
 * stage in turn and end in the band; `undefined` for a stage at which none do.
 *
 * @param ahead the responses that see the true frequency, the filters ahead of the first stage among them
 */
export function worstFolds(
  { path, spared, images }: BandImages,
  ahead: readonly Response[],
  lowHz = 0,
  highHz = Infinity,
): readonly (Least | undefined)[] {
  const found: (Least | undefined)[] = path.ratesHz.map(() => undefined);
  // Of a band that is folded on purpose, what is native below half the rate is a stranger too.
  const firstZone = Math.max(spared ? 0 : 1, Math.floor((2 * lowHz) / path.ratesHz[0]!));
  let searches = 0;
  const consider = (stage: number, image: Image, zone: number): void => {
    const range = trueRange(image, zone, path);
    if (spared && isWithin(range, spared)) return;
    const low = Math.max(range.lowHz, lowHz);
    const high = Math.min(range.highHz, highHz);
    if (low > high) return;
    const before = found[stage];
    const boundDb = image.laterDb + sumOfLeast(ahead, low, high);
    if (before && boundDb >= before.attenuationDb) return;
    if (before && boundDb >= before.attenuationDb - CLOSE_DB) {
      found[stage] = { attenuationDb: boundDb, atHz: before.atHz };
      return;
    }
    const isSearched = !image.piece.collapsed && searches++ < MOST_SEARCHED;
    const least = isSearched ? leastOf(image, zone, ahead, path, low, high) : { attenuationDb: boundDb, atHz: low };
    if (!before || least.attenuationDb < before.attenuationDb) found[stage] = least;
  };
  for (const image of images) {
    // Stages count from 0 here, and the pieces' own from the second one.
    if (image.piece.foldsAtStage !== null) consider(image.piece.foldsAtStage, image, 0);
    const skipped = image.piece.foldsAtStage !== null && firstZone === 0 ? 1 : 0;
    for (let count = skipped; count <= MOST_ZONES; count++) {
      const zone = firstZone + count;
      const beyondHz = Math.max(trueRange(image, zone, path).lowHz, lowHz);
      if (beyondHz > highHz) break;
      const boundDb = image.laterDb + sumOfLeast(ahead, beyondHz, highHz);
      const before = found[0];
      if (before && boundDb >= before.attenuationDb - CLOSE_DB) {
        if (boundDb < before.attenuationDb) found[0] = { attenuationDb: boundDb, atHz: before.atHz };
        break;
      }
      if (count < MOST_ZONES) consider(0, image, zone);
      else found[0] = { attenuationDb: boundDb, atHz: beyondHz };
    }
  }
  return found;
}

/** The filters behind the first stage, as they see an image. */
function laterMembers(piece: FoldedPiece, { known, ratesHz }: SignalPath): readonly Along[] {
  const recorded = { lowHz: piece.recordedLowHz, highHz: piece.recordedHighHz, reversed: piece.mirrored };
  return known.slice(1).flatMap((responses, index) => {
    const { lowHz, highHz, reversed } = index + 1 < ratesHz.length ? piece.inputs[index]! : recorded;
    return responses.map((response) => ({ response, lowHz, highHz, reversed }));
  });
}

/** Whether a range is no more than the band, the clock's tolerance apart. */
function isWithin({ lowHz, highHz }: TrueRange, band: TrueRange): boolean {
  const middle = (lowHz + highHz) / 2;
  return middle > band.lowHz && middle < band.highHz;
}

interface TrueRange {
  readonly lowHz: number;
  readonly highHz: number;
}

/** The true frequencies in a zone of the first stage (from 0) that fold onto an image, with the clock's tolerance. */
function trueRange({ piece }: Image, zone: number, path: SignalPath): TrueRange {
  const nyquistHz = path.ratesHz[0]! / 2;
  const isMirrored = zone % 2 === 1;
  const lowHz = isMirrored ? (zone + 1) * nyquistHz - piece.trueHighHz : zone * nyquistHz + piece.trueLowHz;
  const highHz = isMirrored ? (zone + 1) * nyquistHz - piece.trueLowHz : zone * nyquistHz + piece.trueHighHz;
  const slackHz = 2 * Math.ceil(zone / 2) * nyquistHz * path.clockTolerance;
  return { lowHz: Math.max(lowHz - slackHz, 0), highHz: highHz + slackHz };
}

/** The least over the part `lowHz .. highHz` of what folds onto an image in a zone. */
function leastOf(
  image: Image,
  zone: number,
  ahead: readonly Response[],
  path: SignalPath,
  lowHz: number,
  highHz: number,
): Least {
  const whole = trueRange(image, zone, path);
  const width = whole.highHz - whole.lowHz;
  const from = width > 0 ? (lowHz - whole.lowHz) / width : 0;
  const to = width > 0 ? (highHz - whole.lowHz) / width : 1;
  const isMirrored = zone % 2 === 1;
  const members: Along[] = ahead.map((response) => ({ response, lowHz, highHz, reversed: false }));
  for (const { response, lowHz: low, highHz: high, reversed } of laterMembers(image.piece, path)) {
    const seen = { lowHz: low, highHz: high, reversed: reversed !== isMirrored };
    members.push({ response, ...partOf(seen, from, to) });
  }
  if (members.length === 0) return { attenuationDb: 0, atHz: lowHz };
  const { attenuationDb, t } = leastPointAlong(members);
  return { attenuationDb, atHz: Math.min(lowHz + t * (highHz - lowHz), highHz) };
}

function sumOfLeast(responses: readonly Response[], lowHz: number, highHz: number): number {
  let sum = 0;
  for (const response of responses) sum += response.leastDb(lowHz, highHz);
  return sum;
}
