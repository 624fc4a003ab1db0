import type { Source } from '../rig/model.ts';
import { decibels } from '../signal/decibel.ts';
import type { FoldedPiece } from '../signal/folding.ts';
import { mismatchRatio } from '../signal/interleave.ts';
import { patternImages, type SlotPattern } from '../signal/pattern.ts';
import { coincidenceOf, foldShifted, partnerOf, shiftHzOf } from '../signal/shifted-folding.ts';
import { type Component, componentsOf } from './components.ts';
import { landingIn } from './landing.ts';
import type { Chain } from './model.ts';
import { componentLevel, sourceLevelsOf } from './source-level.ts';
import { strongestOf } from './strongest.ts';

/**
 * Images that uneven sampling makes: of what arrives at a frequency, another at so many hertz beside it, that much
 * lower.
 */
export interface ImageRule {
  readonly kind: 'pattern' | 'interleave';
  /** It stands k / turns of the first rate above what it is an image of. */
  readonly k: number;
  /** Slots of the pattern, or converters. */
  readonly turns: number;
  /** Height over the original's, at a true frequency in Hz. */
  readonly ratioAt: (hz: number) => number;
  /** What another image of a single tone adds where the two coincide, at worst in phase. */
  readonly partnerGain: (hz: number, rateHz: number) => number;
}

/** An image of a component of a source that lands in the band. */
export interface ImageArrival {
  readonly kind: ImageRule['kind'];
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
  readonly shiftHz: number;
}

/** An image of the band itself that lands in the band. */
export interface BandImage {
  readonly kind: ImageRule['kind'];
  /** What the image loses, dB. */
  readonly lossDb: number;
  readonly shiftHz: number;
  readonly recordedLowHz: number;
  readonly recordedHighHz: number;
}

/** Images that are followed; the highest come first. */
const MOST_RULES = 512;
const MOST_FOLLOWED = 20_000;
const MOST_PIECES = 16;

/** Every image that the channel's pattern and its digitizer's converters make, the highest of each first. */
export function imageRulesOf({ channel }: Chain): readonly ImageRule[] {
  const rules: ImageRule[] = [];
  const pattern = channel.pattern?.value;
  const images = pattern && gainsOf(pattern);
  if (images?.kind === 'gains') {
    const { slots } = images;
    // The first is the record itself.
    for (const k of images.strongest.slice(1, 1 + MOST_RULES)) {
      const partnerGain = (hz: number, rateHz: number): number => {
        const coincidence = coincidenceOf(hz, rateHz, slots);
        const partner = coincidence === undefined ? k : partnerOf(k, coincidence, slots);
        return partner === k ? 0 : images.gains[partner]!;
      };
      rules.push({ kind: 'pattern', k, turns: slots, ratioAt: () => images.gains[k]!, partnerGain });
    }
  }
  const mismatch = channel.digitizer?.interleave?.value;
  if (mismatch && (mismatch.gainMismatch > 0 || mismatch.timingMismatchS > 0)) {
    const ratioAt = (hz: number): number => mismatchRatio(hz, mismatch);
    for (let k = 1; k < Math.min(mismatch.converters, MOST_RULES); k++) {
      rules.push({ kind: 'interleave', k, turns: mismatch.converters, ratioAt, partnerGain: () => 0 });
    }
  }
  return rules;
}

/** A pattern is never changed; of many slots its transform takes long, and every channel that has it asks again. */
const gains = new WeakMap<SlotPattern, ReturnType<typeof patternImages>>();

function gainsOf(pattern: SlotPattern): ReturnType<typeof patternImages> {
  const known = gains.get(pattern) ?? patternImages(pattern);
  gains.set(pattern, known);
  return known;
}

/** How far beside what it is an image of, in Hz. */
export function shiftOf({ k, turns }: ImageRule, { ratesHz }: Chain): number {
  return shiftHzOf(k, ratesHz[0]!, turns);
}

/**
 * Every image of everything that the channel hears, as far as it lands in the band above the fold limit. What lies
 * behind the converter sees an image where it is; what lies before it saw the original.
 */
export function imageArrivalsOf(chain: Chain): readonly ImageArrival[] {
  const rules = imageRulesOf(chain);
  if (rules.length === 0) return NOTHING;
  const { recordedBand } = chain;
  const found: ImageArrival[] = [];
  let followed = 0;
  for (const heard of chain.channel.heard) {
    const levels = sourceLevelsOf(heard, chain.channel.sensor, chain.scale);
    for (const component of componentsOf(heard.source)) {
      const componentDb = componentLevel(levels, component);
      for (const rule of rules) {
        const highestDb = componentDb + decibels(rule.ratioAt(component.highHz)) + MOST_LIFT_DB;
        if (highestDb <= chain.foldLimit) continue;
        if (++followed > MOST_FOLLOWED) return found;
        const shiftHz = shiftOf(rule, chain);
        const added = coincidingGain(rule, component, chain);
        for (const piece of piecesOf(component.lowHz, component.highHz, shiftHz, chain)) {
          const part = landingIn(piece, recordedBand.lowHz, recordedBand.highHz);
          if (!part) continue;
          const strongest = strongestOf(chain.path, piece, levels.entry === 'sensor', part.from, part.to);
          const level = componentDb + decibels(rule.ratioAt(strongest.atHz) + added) - strongest.attenuationDb;
          if (!(level > chain.foldLimit)) continue;
          found.push({
            kind: rule.kind,
            source: heard.source,
            component: component.label,
            trueLowHz: piece.trueLowHz,
            trueHighHz: piece.trueHighHz,
            recordedLowHz: piece.recordedLowHz,
            recordedHighHz: piece.recordedHighHz,
            level,
            atHz: strongest.atHz,
            levelKnown: levels.known,
            shiftHz,
          });
        }
      }
    }
  }
  return found;
}

/** What a second image adds where a single tone may stand at a place where two of its own images coincide. */
function coincidingGain(rule: ImageRule, { lowHz, highHz, nominalHz }: Component, { ratesHz }: Chain): number {
  if (nominalHz === undefined) return 0;
  const halfSpacingHz = ratesHz[0]! / (2 * rule.turns);
  const nearestHz = Math.round(nominalHz / halfSpacingHz) * halfSpacingHz;
  const isWithin = nearestHz >= lowHz * (1 - 1e-9) && nearestHz <= highHz * (1 + 1e-9);
  return isWithin ? rule.partnerGain(nearestHz, ratesHz[0]!) : 0;
}

const NOTHING: readonly never[] = [];

/** A sensor's resonance may lift what enters there: what is lower than the limit by more than this can be passed over. */
const MOST_LIFT_DB = 60;

/** The highest image of the band itself that lands in the band, by each kind of uneven sampling. */
export function bandImagesOf(chain: Chain): readonly BandImage[] {
  const { recordedBand } = chain;
  const found = new Map<ImageRule['kind'], BandImage>();
  for (const rule of imageRulesOf(chain)) {
    const { kind, ratioAt } = rule;
    const lossDb = -decibels(ratioAt(chain.bandHighHz));
    const known = found.get(kind);
    if (known && known.lossDb <= lossDb) continue;
    const shiftHz = shiftOf(rule, chain);
    const inBand = piecesOf(chain.bandLowHz, chain.bandHighHz, shiftHz, chain).find((piece) => {
      const part = landingIn(piece, recordedBand.lowHz, recordedBand.highHz);
      return part !== undefined && part.to > part.from;
    });
    if (!inBand) continue;
    const { recordedLowHz, recordedHighHz } = inBand;
    found.set(kind, { kind, lossDb, shiftHz, recordedLowHz, recordedHighHz });
  }
  return [...found.values()];
}

/** Pieces of a range as its image is recorded. */
function piecesOf(lowHz: number, highHz: number, shiftHz: number, { ratesHz }: Chain): readonly FoldedPiece[] {
  return foldShifted(lowHz, highHz, shiftHz, ratesHz, MOST_PIECES).filter(({ collapsed }) => !collapsed);
}
