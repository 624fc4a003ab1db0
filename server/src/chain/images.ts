import type { Channel, Source } from '../rig/model.ts';
import { decibels } from '../signal/decibel.ts';
import type { FoldedPiece } from '../signal/folding.ts';
import { interleaveImages, mismatchRatio } from '../signal/interleave.ts';
import { type PatternGains, patternImages, type SlotPattern } from '../signal/pattern.ts';
import { imagesInBand, imagesOfRange } from '../signal/pattern-folding.ts';
import { shiftHzOf } from '../signal/shifted-folding.ts';
import { LEVEL_ROUNDING_DB } from './arrivals.ts';
import { componentsOf } from './components.ts';
import { landingIn } from './landing.ts';
import type { Chain } from './model.ts';
import { componentLevel, sourceLevelsOf } from './source-level.ts';
import { strongestOf } from './strongest.ts';

/** What makes images: samples left out in a pattern, or converters that take turns and differ. */
export type ImageKind = 'pattern' | 'interleave';

/** An image of a component of a source that lands in the band. */
export interface ImageArrival {
  readonly kind: ImageKind;
  readonly source: Source;
  readonly component: string;
  /** Where the original is. */
  readonly trueLowHz: number;
  readonly trueHighHz: number;
  readonly recordedLowHz: number;
  readonly recordedHighHz: number;
  /** The highest of the part that lands in the band, on the chain's scale. */
  readonly level: number;
  /** The true frequency at which that is reached. */
  readonly atHz: number;
  readonly levelKnown: boolean;
  /** How far above the original it would be, were it not folded. */
  readonly shiftHz: number;
}

/** An image of the band itself that lands in the band. */
export interface BandImage {
  readonly kind: ImageKind;
  /** What the image loses, dB. */
  readonly lossDb: number;
  readonly shiftHz: number;
  readonly recordedLowHz: number;
  readonly recordedHighHz: number;
}

/** Pieces of images of one component that are followed, and of all of them; the highest images come first. */
const MOST_PIECES = 512;
const MOST_FOLLOWED = 20_000;

/** A sensor's resonance may lift what enters there: what is lower than the limit by more than this can be passed over. */
const MOST_LIFT_DB = 60;

const NOTHING: readonly never[] = [];

/** Whether a channel is sampled so that anything has images. */
export function hasImages({ pattern, digitizer }: Channel): boolean {
  const mismatch = digitizer?.interleave?.value;
  return pattern !== undefined || (mismatch !== undefined && mismatchRatio(1, mismatch) > 0);
}

/** A piece of an image of a range, and how high it is over the original. */
interface ImagePiece {
  readonly kind: ImageKind;
  readonly piece: FoldedPiece;
  readonly shiftHz: number;
  /** Of what is spread over the range. */
  readonly spreadDb: number;
  /** Of a single tone somewhere in it, at worst: where two of its images coincide they add. */
  readonly toneDb: number;
}

/** The images of a range; of those that are too many to tell apart nothing is said. */
function imagePieces(lowHz: number, highHz: number, chain: Chain): readonly ImagePiece[] {
  return [...patternPieces(lowHz, highHz, chain), ...turnPieces(lowHz, highHz, chain)];
}

function patternPieces(lowHz: number, highHz: number, { channel, ratesHz }: Chain): readonly ImagePiece[] {
  const gains = channel.pattern && gainsOf(channel.pattern.value);
  if (!gains) return NOTHING;
  const rates = ratesHz as readonly [number, ...number[]];
  return imagesOfRange(lowHz, highHz, rates, gains, MOST_PIECES)
    .filter(({ shift, collapsed }) => shift !== 0 && !collapsed)
    .map((piece) => ({
      kind: 'pattern',
      piece,
      shiftHz: shiftHzOf(piece.shift, rates[0], gains.slots),
      spreadDb: decibels(piece.gain),
      toneDb: decibels(piece.coincidentGain),
    }));
}

/** Of converters that take turns. */
function turnPieces(lowHz: number, highHz: number, { channel, ratesHz }: Chain): readonly ImagePiece[] {
  const mismatch = channel.digitizer?.interleave?.value;
  if (!mismatch) return NOTHING;
  const rates = ratesHz as readonly [number, ...number[]];
  return interleaveImages(lowHz, highHz, rates, mismatch, MOST_PIECES)
    .filter(({ collapsed }) => !collapsed)
    .map((piece) => ({
      kind: 'interleave',
      piece,
      shiftHz: shiftHzOf(piece.shift, rates[0], mismatch.converters),
      spreadDb: piece.imageDb,
      toneDb: piece.imageDb,
    }));
}

/** A pattern is never changed; of many slots its transform takes long, and every channel that has it asks again. */
const known = new WeakMap<SlotPattern, ReturnType<typeof patternImages>>();

/** The gains of a pattern's images; `undefined` for a pattern that can't be, of which its reader has told. */
function gainsOf(pattern: SlotPattern): PatternGains | undefined {
  const images = known.get(pattern) ?? patternImages(pattern);
  known.set(pattern, images);
  return images.kind === 'gains' ? images : undefined;
}

/**
 * Every image of everything that the channel hears, as far as it lands in the band above the fold limit. What lies
 * behind the converter sees an image where it is; what lies before it saw the original.
 */
export function imageArrivalsOf(chain: Chain): readonly ImageArrival[] {
  if (!hasImages(chain.channel)) return NOTHING;
  const { channel, scale, path, foldLimit, recordedBand } = chain;
  const found: ImageArrival[] = [];
  let followed = 0;
  for (const heard of channel.heard) {
    const levels = sourceLevelsOf(heard, channel.sensor, scale);
    for (const component of componentsOf(heard.source)) {
      const componentDb = componentLevel(levels, component);
      for (const { kind, piece, shiftHz, spreadDb, toneDb } of imagePieces(component.lowHz, component.highHz, chain)) {
        const imageDb = componentDb + (component.nominalHz === undefined ? spreadDb : toneDb);
        if (imageDb + MOST_LIFT_DB <= foldLimit) continue;
        if (++followed > MOST_FOLLOWED) return found;
        const part = landingIn(piece, recordedBand.lowHz, recordedBand.highHz);
        if (!part) continue;
        const { attenuationDb, atHz } = strongestOf(path, piece, levels.entry === 'sensor', part.from, part.to);
        const level = imageDb - attenuationDb;
        if (!(level > foldLimit + LEVEL_ROUNDING_DB)) continue;
        const { trueLowHz, trueHighHz, recordedLowHz, recordedHighHz } = piece;
        const places = { trueLowHz, trueHighHz, recordedLowHz, recordedHighHz };
        const levelKnown = levels.known;
        found.push({
          kind,
          source: heard.source,
          component: component.label,
          ...places,
          level,
          atHz,
          levelKnown,
          shiftHz,
        });
      }
    }
  }
  return found;
}

/** The highest image of the band itself that lands in the band, by each kind of uneven sampling, cut to where it does. */
export function bandImagesOf(chain: Chain): readonly BandImage[] {
  const { channel, ratesHz, bandLowHz, bandHighHz, recordedBand } = chain;
  const gains = channel.pattern && gainsOf(channel.pattern.value);
  const rates = ratesHz as readonly [number, ...number[]];
  const found: BandImage[] = [];
  // The strongest comes first.
  const ofPattern = (gains ? imagesInBand(bandLowHz, bandHighHz, rates, gains, MOST_PIECES) : []).find(
    (piece) => !piece.collapsed && piece.recordedHighHz > piece.recordedLowHz,
  );
  if (gains && ofPattern) {
    const { recordedLowHz, recordedHighHz, gain, shift } = ofPattern;
    const shiftHz = shiftHzOf(shift, rates[0], gains.slots);
    found.push({ kind: 'pattern', lossDb: 0 - decibels(gain), shiftHz, recordedLowHz, recordedHighHz });
  }
  for (const { kind, piece, shiftHz, spreadDb } of turnPieces(bandLowHz, bandHighHz, chain)) {
    const recordedLowHz = Math.max(piece.recordedLowHz, recordedBand.lowHz);
    const recordedHighHz = Math.min(piece.recordedHighHz, recordedBand.highHz);
    if (recordedHighHz <= recordedLowHz) continue;
    // All of them are judged at the whole of the mismatch.
    found.push({ kind, lossDb: 0 - spreadDb, shiftHz, recordedLowHz, recordedHighHz });
    break;
  }
  return found;
}

/** The highest images that uneven sampling makes of anything in the band: how far beside it, and what they lose. */
export function highestImages(
  { channel, ratesHz, bandHighHz }: Chain,
  most: number,
): readonly { readonly shiftHz: number; readonly lossDb: number }[] {
  const rateHz = ratesHz[0]!;
  const gains = channel.pattern && gainsOf(channel.pattern.value);
  // The first is the record itself.
  const ofPattern = Array.from(gains?.strongest.slice(1, 1 + most) ?? [], (k) => ({
    shiftHz: shiftHzOf(k, rateHz, gains!.slots),
    lossDb: -decibels(gains!.gains[k]!),
  }));
  const mismatch = channel.digitizer?.interleave?.value;
  const lossDb = mismatch ? -decibels(mismatchRatio(bandHighHz, mismatch)) : Infinity;
  const turns = lossDb < Infinity ? Math.min(mismatch!.converters - 1, most) : 0;
  const ofTurns = Array.from({ length: turns }, (_, index) => ({
    shiftHz: shiftHzOf(index + 1, rateHz, mismatch!.converters),
    lossDb,
  }));
  return [...ofPattern, ...ofTurns].sort((first, second) => first.lossDb - second.lossDb).slice(0, most);
}
