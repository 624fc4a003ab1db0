import type { Arrival } from '../chain/model.ts';
import { formatHz } from '../quantity/write.ts';
import type { MarkKind } from './arrival-words.ts';
import { KIND_WORDS, kindOf, labelOf } from './arrival-words.ts';
import type { FilterPlace, HzRange } from './filter-place.ts';
import { atInput } from './filter-place.ts';

/** What a marked point of a curve is: the Nyquist frequency, where folding into the band begins, or a source. */
export type CurveMarkKind = 'nyquist' | 'first-fold' | MarkKind;

/** A frequency at which the filter's attenuation matters. */
export interface CurveMark {
  readonly kind: CurveMarkKind;
  /** What the label names, and a longer name for where there is room. */
  readonly name: string;
  readonly longName: string;
  /** What it is, as a phrase of a sentence. */
  readonly meaning: string;
  readonly hz: number;
  readonly hzText: string;
  /** Nominal. */
  readonly attenuationDb: number;
}

/** More marks of sources than this make a picture that nobody reads. */
const MOST_SOURCES = 10;

/** Each source once for each thing that it is to the record, where it meets the filter, the gravest first. */
export function sourceMarks(place: FilterPlace, arrivals: readonly Arrival[]): readonly CurveMark[] {
  const named = new Set<string>();
  return [...arrivals]
    .filter(({ level }) => Number.isFinite(level))
    .sort((a, b) => weightOf(b) - weightOf(a))
    .flatMap((arrival): readonly CurveMark[] => {
      const kind = kindOf(arrival);
      const key = `${kind} ${arrival.source.name}`;
      if (named.has(key)) return [];
      named.add(key);
      const hz = atInput(place, arrival.nominalHz ?? arrival.atHz);
      const name = labelOf(arrival);
      return [{ kind, name, longName: name, meaning: KIND_WORDS[kind], ...pointOf(place, hz) }];
    });
}

function weightOf({ overLimit, folded, inBand, level }: Arrival): number {
  const rank = Number(overLimit) * 8 + Number(folded && inBand) * 4 + Number(inBand) * 2 + Number(folded);
  return 10_000 * rank + Math.max(-4_000, Math.min(4_000, level));
}

/**
 * The marks of a curve, and how many more there would be. Sources that are not folded, below the axis, do not count:
 * the filter is of no consequence to them.
 */
export function curveMarks(
  place: FilterPlace,
  band: readonly HzRange[],
  folds: readonly HzRange[],
  sources: readonly CurveMark[],
  axis: HzRange,
): { readonly marks: readonly CurveMark[]; readonly leftOut: number } {
  const onAxis = sources.filter(({ hz }) => hz >= axis.lowHz && hz <= axis.highHz);
  const belowAxis = sources.filter(({ kind, hz }) => kind === 'native' && hz < axis.lowHz);
  const marks = [...firstFold(place, band, folds), ...nyquist(place), ...onAxis.slice(0, MOST_SOURCES)];
  return {
    marks: marks.filter(({ hz }) => hz >= axis.lowHz && hz <= axis.highHz),
    leftOut: sources.length - belowAxis.length - Math.min(onAxis.length, MOST_SOURCES),
  };
}

/** The frequency nearest to the band that folds into it. */
function firstFold(place: FilterPlace, band: readonly HzRange[], folds: readonly HzRange[]): readonly CurveMark[] {
  const edges = folds.flatMap(({ lowHz, highHz }) => [lowHz, highHz]).filter((hz) => hz > 0);
  const distance = (hz: number): number =>
    Math.min(...band.map(({ lowHz, highHz }) => (hz > highHz ? hz - highHz : Math.max(0, lowHz - hz))));
  const hz = edges.reduce<number | undefined>(
    (nearest, edge) => (nearest === undefined || distance(edge) < distance(nearest) ? edge : nearest),
    undefined,
  );
  if (hz === undefined) return [];
  const meaning = `${formatHz(hz)}, the nearest to the band that folds into it`;
  return [
    { kind: 'first-fold', name: 'first fold', longName: 'first fold into the band', meaning, ...pointOf(place, hz) },
  ];
}

/** The Nyquist frequency of the sampling behind the filter, where there is one. */
function nyquist(place: FilterPlace): readonly CurveMark[] {
  const rateHz = place.chain.ratesHz[place.stage];
  if (rateHz === undefined) return [];
  const meaning = `The Nyquist frequency behind it, ${formatHz(rateHz / 2)}`;
  return [{ kind: 'nyquist', name: 'Nyquist', longName: 'Nyquist', meaning, ...pointOf(place, rateHz / 2) }];
}

function pointOf({ filter }: FilterPlace, hz: number): Pick<CurveMark, 'hz' | 'hzText' | 'attenuationDb'> {
  return { hz, hzText: formatHz(hz, 4), attenuationDb: filter.response.attenuationDb(hz) };
}
