import type { Arrival } from '../chain/model.ts';
import { formatHz } from '../quantity/write.ts';
import { clippedName } from './arrival-words.ts';
import type { CurvePoint, WorstPoint } from './filter-curve-line.ts';
import { curveLine, worstLines } from './filter-curve-line.ts';
import type { CurveMark } from './filter-curve-marks.ts';
import { curveMarks, sourceMarks } from './filter-curve-marks.ts';
import type { FilterPlace, HzRange } from './filter-place.ts';
import { bandAt, edgesOf, foldsBehind, inputRateOf } from './filter-place.ts';

/** A filter's curve in one channel, ready to be drawn in any way: Hz at the filter's input, dB taken off. */
export interface FilterCurve {
  readonly title: string;
  /** The same in words, for those who do not see the picture. */
  readonly description: string;
  /** The ends of the axis, both above 0. */
  readonly lowHz: number;
  readonly highHz: number;
  /** The ends of the scale: 0, or less where the response lifts, and the most that the picture shows. */
  readonly leastDb: number;
  readonly mostDb: number;
  readonly line: readonly CurvePoint[];
  /** Where nothing is promised; the line there only joins two promises. */
  readonly unpromised: HzRange | undefined;
  /** The worst that the filter's tolerance allows either way; empty without one. */
  readonly worst: readonly WorstPoint[];
  readonly band: readonly HzRange[];
  /** What the sampling behind the filter folds into the band, as far as it is on the axis. */
  readonly folds: readonly HzRange[];
  /** Where the attenuation matters, the gravest first. */
  readonly marks: readonly CurveMark[];
  /** Marks that were left out because there were too many. */
  readonly leftOut: number;
}

/** The axis goes on to this much beyond the last thing that matters. */
const ROOM = 1.08;
/** Of the rate behind the filter: sources beyond are farther off than a curve is of use for. */
const FARTHEST_RATES = 200;
const MOST_DECADES = 6;
/** What the scale of attenuation shows at least and at most, and its grain. */
const SCALE = { least: 40, most: 160, grain: 20 } as const;

/** What the picture of a filter's curve shows, as the filter stands in a channel. */
export function filterCurveModel(place: FilterPlace, arrivals: readonly Arrival[]): FilterCurve {
  const { chain, filter } = place;
  const band = bandAt(place);
  const farthestHz = inputRateOf(place) === undefined ? FARTHEST_RATES * chain.ratesHz[0]! : inputRateOf(place)! / 2;
  const sources = sourceMarks(place, arrivals).filter(({ hz }) => hz <= farthestHz);
  const { lowHz, highHz } = axisEnds(place, band, sources, farthestHz);
  const folds = foldsBehind(place, highHz);
  const { marks, leftOut } = curveMarks(place, band, folds, sources, { lowHz, highHz });
  const unpromised = unpromisedBy(place);
  const line = curveLine(filter.response, lowHz, highHz, unpromised);
  const depths = marks.map(({ attenuationDb }) => attenuationDb).filter((db) => Number.isFinite(db));
  const deepest = SCALE.grain * Math.ceil((Math.max(0, ...depths) + 6) / SCALE.grain);
  const lift = Math.min(0, ...line.map(({ attenuationDb }) => attenuationDb));
  return {
    title: `${clippedName(filter.use?.filter?.name ?? '') || 'Filter'} in ${clippedName(chain.channel.name)}`,
    description: describe(place, band, marks, unpromised),
    lowHz,
    highHz,
    leastDb: lift < -0.2 ? Math.max(-SCALE.most, 5 * Math.floor(lift / 5)) : 0,
    mostDb: Math.min(SCALE.most, Math.max(SCALE.least, deepest)),
    line,
    unpromised,
    worst: unpromised ? [] : worstLines(filter.response, toleranceOf(place), lowHz, highHz),
    band,
    folds: folds.filter((fold) => fold.highHz > lowHz),
    marks,
    leftOut,
  };
}

/**
 * The axis holds the band's upper part and the filter's edges, and what folds into the band for the first time; after
 * the converter it ends where the samples' own axis does.
 */
function axisEnds(
  place: FilterPlace,
  band: readonly HzRange[],
  sources: readonly CurveMark[],
  farthestHz: number,
): HzRange {
  const { chain, stage } = place;
  const edges = edgesOf(place).filter((hz) => hz > 0 && hz < Infinity);
  const bandHighHz = band.at(-1)?.highHz ?? chain.bandHighHz;
  const bandLowHz = band[0]?.lowHz ?? chain.bandLowHz;
  const rateHz = chain.ratesHz[stage];
  const reach = rateHz === undefined ? bandHighHz : Math.max(rateHz, bandHighHz) + (bandHighHz - bandLowHz);
  const highestEdgeHz = edges.reduce((high, hz) => Math.max(high, hz), 0);
  const farthestSourceHz = sources.reduce((high, { hz }) => Math.max(high, hz), 0);
  const last = Math.max(reach * ROOM, highestEdgeHz * 2, farthestSourceHz * ROOM);
  const highHz = stage === 0 ? Math.min(last, farthestHz) : farthestHz;
  const lowestEdgeHz = edges.reduce((low, hz) => Math.min(low, hz), Infinity);
  const first = Math.min(highHz / 10, Math.max(bandHighHz / 20, bandLowHz / 4), lowestEdgeHz / 4);
  return { lowHz: Math.max(first, highHz / 10 ** MOST_DECADES), highHz };
}

/** Where a datasheet's promise leaves off, with the filter's tolerance. */
function unpromisedBy(place: FilterPlace): HzRange | undefined {
  if (place.filter.use?.filter?.response?.response !== 'mask') return undefined;
  const [passHz, stopHz] = edgesOf(place);
  const tolerance = toleranceOf(place);
  if (passHz === undefined || stopHz === undefined) return undefined;
  return { lowHz: passHz * Math.max(0, 1 - tolerance), highHz: stopHz * (1 + tolerance) };
}

function toleranceOf({ filter }: FilterPlace): number {
  return filter.use?.filter?.tolerance ?? 0;
}

/** Sources that the text alternative names. */
const MOST_TOLD = 3;

function describe(
  place: FilterPlace,
  band: readonly HzRange[],
  marks: readonly CurveMark[],
  unpromised: HzRange | undefined,
): string {
  const { response } = place.filter;
  const sag = Math.max(0, ...band.map(({ lowHz, highHz }) => response.greatestDb(lowHz, highHz)));
  const bandText = band.map(({ lowHz, highHz }) => `${formatHz(lowHz)} to ${formatHz(highHz)}`).join(', ');
  const tolerance = toleranceOf(place);
  const sources = marks.filter(({ kind }) => kind !== 'nyquist' && kind !== 'first-fold');
  return [
    sagText(sag, bandText, unpromised !== undefined),
    ...(unpromised
      ? [`Between ${formatHz(unpromised.lowHz)} and ${formatHz(unpromised.highHz)} nothing is promised.`]
      : []),
    ...(tolerance > 0 ? [`Its frequencies are good to ${Number((100 * tolerance).toPrecision(3))} %.`] : []),
    ...marks
      .filter((mark) => !sources.includes(mark))
      .map((mark) => `${mark.meaning}: ${decibelsOff(mark.attenuationDb)}.`),
    ...sources
      .slice(0, MOST_TOLD)
      .map((mark) => `${mark.name} at ${mark.hzText}, ${mark.meaning}: ${decibelsOff(mark.attenuationDb)}.`),
    ...(sources.length > MOST_TOLD ? [`${sources.length - MOST_TOLD} more meet it.`] : []),
  ].join(' ');
}

function sagText(sagDb: number, bandText: string, isMask: boolean): string {
  if (Number.isFinite(sagDb)) return `The filter takes at most ${decibelsOff(sagDb)} off the band, ${bandText}.`;
  return isMask
    ? `The filter promises nothing for part of the band, ${bandText}.`
    : `The filter takes everything off part of the band, ${bandText}.`;
}

/** How much is taken off, in words of a picture. */
export function decibelsOff(attenuationDb: number): string {
  return Number.isFinite(attenuationDb) ? `${attenuationDb.toFixed(1).replace(/^-0\.0$/, '0.0')} dB` : 'everything';
}
