import { highestImages, type ImageArrival, imageArrivalsOf } from '../chain/images.ts';
import type { Arrival, Chain } from '../chain/model.ts';
import { formatHz } from '../quantity/write.ts';
import type { MarkKind } from './arrival-words.ts';
import { clippedName, kindOf, labelOf } from './arrival-words.ts';
import type { FoldLine, FoldPoint } from './fold-line.ts';
import { foldLineOf, pointAt } from './fold-line.ts';
import type { Stretch } from './stretches.ts';
import { stretchesOf } from './stretches.ts';

/** An arrival as a mark on the fold line and a line of the record's spectrum. */
export interface Mark {
  readonly kind: MarkKind;
  readonly sourceName: string;
  /** The source's name, with the component where that is not its plain self. */
  readonly label: string;
  /** Where it comes from and where it arrives, as labels say it. */
  readonly trueText: string;
  readonly recordedText: string;
  /** Ends of a range, the same point twice for a single frequency. */
  readonly from: FoldPoint;
  readonly to: FoldPoint;
  /** False for what stands for more folds than can be told apart: it has no place on the fold line. */
  readonly isOnLine: boolean;
  readonly recordedLowHz: number;
  readonly recordedHighHz: number;
  readonly level: number;
  readonly inBand: boolean;
  /** Places in the picture go to the heaviest first. */
  readonly weight: number;
}

/** An alias map, ready to be drawn in any way: frequencies in Hz, levels in decibels on the chain's scale. */
export interface AliasMap {
  readonly title: string;
  /** The same in words, for those who do not see the picture. */
  readonly description: string;
  readonly recordRateHz: number;
  readonly nyquistHz: number;
  /** The rate of each sampling, the record's last. */
  readonly ratesHz: readonly number[];
  readonly bandLowHz: number;
  readonly bandHighHz: number;
  readonly stretches: readonly (Stretch & {
    readonly line: FoldLine;
    /** Of the images that uneven sampling makes, the highest few. */
    readonly images: readonly FoldLine[];
  })[];
  readonly marks: readonly Mark[];
  readonly foldLimit: number;
  readonly levelUnit: string;
  /** The attenuation at which the fold line has faded away: what is quieter than this by the filters cannot spoil the band. */
  readonly fadedAtDb: number;
  readonly levelLow: number;
  readonly levelHigh: number;
  /** Marks that were left out because there were too many. */
  readonly leftOut: number;
}

/** More marks than this make a picture that nobody reads; the lightest are left out and counted. */
const MOST_MARKS = 160;
const LEAST_FADE_DB = 40;
/** The lines of more images than a few would be a thicket. */
const MOST_IMAGE_LINES = 6;

/** What the picture of a channel's alias map shows. */
export function aliasMapModel(chain: Chain, arrivals: readonly Arrival[]): AliasMap {
  const last = chain.stages.at(-1)!;
  const images = highestImages(chain, MOST_IMAGE_LINES);
  const imageArrivals = imageArrivalsOf(chain);
  const marks = [
    ...arrivals.filter(({ level }) => Number.isFinite(level)).map((arrival) => markOf(arrival, chain)),
    ...imageArrivals.map((image) => markOfImage(image, chain)),
  ].sort((a, b) => b.weight - a.weight);
  const shown = marks.slice(0, MOST_MARKS);
  const levels = shown.map(({ level }) => level);
  const limit = Number.isFinite(chain.foldLimit) ? chain.foldLimit : 0;
  const levelHigh = 10 * Math.ceil(Math.max(chain.levelUnit === 'dbfs' ? 0 : limit + 40, ...levels) / 10);
  const levelLow = 10 * Math.floor((Math.min(limit, ...levels.filter((level) => level > limit - 60)) - 15) / 10);
  return {
    title: `Alias map of ${chain.channel.name}`,
    description: describe(chain, arrivals, imageArrivals.length),
    recordRateHz: last.rateHz,
    nyquistHz: last.nyquistHz,
    ratesHz: chain.ratesHz,
    bandLowHz: chain.recordedBand.lowHz,
    bandHighHz: chain.recordedBand.highHz,
    stretches: stretchesOf(chain, arrivals).map((stretch) => ({
      ...stretch,
      line: foldLineOf(chain, stretch.lowHz, stretch.highHz),
      images: images.map((image) => foldLineOf(chain, stretch.lowHz, stretch.highHz, image)),
    })),
    marks: shown,
    foldLimit: limit,
    levelUnit: unitOf(chain),
    fadedAtDb: Math.max(LEAST_FADE_DB, chain.levelUnit === 'dbfs' || chain.levelUnit === 'relative' ? -limit : 80),
    levelLow,
    levelHigh,
    leftOut: marks.length - shown.length,
  };
}

function markOf(arrival: Arrival, chain: Chain): Mark {
  const kind = kindOf(arrival);
  const rank = kind === 'spoils' ? 3_000 : arrival.inBand ? (kind === 'native' ? 2_000 : 1_000) : 0;
  const from = pointAt(chain, arrival.trueLowHz);
  const to = pointAt(chain, arrival.trueHighHz);
  return {
    kind,
    sourceName: clippedName(arrival.source.name),
    label: labelOf(arrival),
    ...placesOf(arrival, chain),
    from,
    to,
    isOnLine: isStraight(from, to),
    recordedLowHz: arrival.recordedLowHz,
    recordedHighHz: arrival.recordedHighHz,
    level: arrival.level,
    inBand: arrival.inBand,
    weight: rank + Math.max(-900, Math.min(900, arrival.level)),
  };
}

function markOfImage(image: ImageArrival, chain: Chain): Mark {
  const line = { shiftHz: image.shiftHz, lossDb: 0 };
  return {
    kind: 'spoils',
    sourceName: `${clippedName(image.source.name)} image`,
    label: `${clippedName(image.source.name)} image`,
    trueText: spanText(image.trueLowHz, image.trueHighHz),
    recordedText: spanText(image.recordedLowHz, image.recordedHighHz),
    from: pointAt(chain, image.trueLowHz, line),
    to: pointAt(chain, image.trueHighHz, line),
    isOnLine: true,
    recordedLowHz: image.recordedLowHz,
    recordedHighHz: image.recordedHighHz,
    level: image.level,
    inBand: true,
    weight: 3_000 + Math.max(-900, Math.min(900, image.level)),
  };
}

/** A single frequency without its tolerance, or the ends of a range. */
function placesOf(arrival: Arrival, chain: Chain): Pick<Mark, 'trueText' | 'recordedText'> {
  const { nominalHz } = arrival;
  if (nominalHz === undefined) {
    return {
      trueText: spanText(arrival.trueLowHz, arrival.trueHighHz),
      recordedText: spanText(arrival.recordedLowHz, arrival.recordedHighHz),
    };
  }
  return { trueText: formatHz(nominalHz, 4), recordedText: formatHz(pointAt(chain, nominalHz).recordedHz, 4) };
}

function spanText(lowHz: number, highHz: number): string {
  return lowHz === highHz ? formatHz(lowHz, 4) : `${formatHz(lowHz, 3)} .. ${formatHz(highHz, 3)}`;
}

/** Along a piece of the fold line a step of true frequency is as large a step of recorded frequency. */
function isStraight(from: FoldPoint, to: FoldPoint): boolean {
  const trueSpan = Math.abs(to.trueHz - from.trueHz);
  return Math.abs(Math.abs(to.recordedHz - from.recordedHz) - trueSpan) <= 1e-6 * Math.max(trueSpan, to.trueHz * 1e-6);
}

/** How a chain's levels are called. */
export function unitOf(chain: Chain): string {
  switch (chain.levelUnit) {
    case 'dbfs':
      return 'dBFS';
    case 'db-volt':
      return 'dB re 1 V';
    case 'db-measured':
      return 'dB re 1 unit';
    case 'relative':
      return 'dB';
  }
}

function describe(chain: Chain, arrivals: readonly Arrival[], images: number): string {
  const unit = unitOf(chain);
  const spoiling = arrivals.filter(({ overLimit }) => overLimit).sort((a, b) => b.level - a.level);
  const folded = arrivals.filter((arrival) => arrival.folded && !arrival.overLimit).length;
  const native = arrivals.filter((arrival) => !arrival.folded).length;
  const record = `The record of ${chain.channel.name} is sampled at ${formatHz(chain.stages.at(-1)!.rateHz)}; its band is ${formatHz(chain.bandLowHz)} to ${formatHz(chain.bandHighHz)}${foldedBandText(chain)}.`;
  const told = spoiling
    .slice(0, 3)
    .map(
      (arrival) =>
        `${arrival.source.name} ${arrival.component} at ${formatHz(arrival.atHz)} folds into the band at ${spanOf(arrival)}, ${arrival.level.toFixed(1)} ${unit}, ${(arrival.level - chain.foldLimit).toFixed(1)} dB over the limit.`,
    );
  const more = spoiling.length > 3 ? [`${spoiling.length - 3} more fold into the band over the limit.`] : [];
  const rest = `${count(folded, 'arrival folds', 'arrivals fold')} without harm, ${count(native, 'arrives', 'arrive')} unfolded.`;
  const uneven =
    images === 0 ? [] : [`Uneven sampling puts ${count(images, 'image', 'images')} into the band over the limit.`];
  return [record, ...told, ...more, ...uneven, rest].join(' ');
}

function foldedBandText({ isBandpass, recordedBand }: Chain): string {
  if (!isBandpass) return '';
  const { lowHz, highHz, mirrored } = recordedBand;
  return `, recorded at ${formatHz(lowHz)} to ${formatHz(highHz)}${mirrored ? ', upside down' : ''}`;
}

function spanOf({ recordedLowHz, recordedHighHz }: Arrival): string {
  return recordedLowHz === recordedHighHz
    ? formatHz(recordedLowHz)
    : `${formatHz(recordedLowHz)} to ${formatHz(recordedHighHz)}`;
}

function count(number: number, one: string, many: string): string {
  return `${number} ${number === 1 ? one : many}`;
}
