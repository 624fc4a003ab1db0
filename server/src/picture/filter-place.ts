import { frequenciesOf, hzOf } from '../chain/filter-response.ts';
import type { Chain, StageFilter } from '../chain/model.ts';
import { foldHz, foldsInto, foldThrough } from '../signal/folding.ts';

/** A filter as it stands in a chain. */
export interface FilterPlace {
  readonly chain: Chain;
  readonly filter: StageFilter;
  /** The stage that it stands ahead of, from 0; the number of stages where it stands behind the last. */
  readonly stage: number;
}

/** A range of frequencies at a filter's input, in Hz. */
export interface HzRange {
  readonly lowHz: number;
  readonly highHz: number;
}

/** A band in more pieces than this is a slip in the rig, and no picture of a filter. */
const MOST_PIECES = 8;
/** Ranges that fold into the band and are told apart; one stands for all beyond. */
const MOST_FOLDS = 512;

/** The rate of what a filter is given; `undefined` ahead of the converter. */
export function inputRateOf({ chain, stage }: FilterPlace): number | undefined {
  return stage === 0 ? undefined : chain.ratesHz[stage - 1]!;
}

/** Where a true frequency is when it reaches the filter. */
export function atInput({ chain, stage }: FilterPlace, trueHz: number): number {
  return chain.ratesHz.slice(0, stage).reduce(foldHz, trueHz);
}

/** The band as the filter meets it, ascending: one range, where the samplings ahead of it leave it in one piece. */
export function bandAt({ chain, stage }: FilterPlace): readonly HzRange[] {
  return foldThrough(chain.bandLowHz, chain.bandHighHz, chain.ratesHz, MOST_PIECES)
    .filter(({ collapsed }) => !collapsed)
    .map(({ inputs, recordedLowHz, recordedHighHz }): HzRange => {
      const { lowHz, highHz } = inputs[stage] ?? { lowHz: recordedLowHz, highHz: recordedHighHz };
      return { lowHz, highHz };
    })
    .sort((a, b) => a.lowHz - b.lowHz);
}

/** What the sampling behind the filter folds into the band, up to a frequency, ascending; nothing behind the last. */
export function foldsBehind(place: FilterPlace, upToHz: number): readonly HzRange[] {
  const { chain, stage } = place;
  const ratesHz = chain.ratesHz.slice(stage);
  if (ratesHz.length === 0) return [];
  const band = bandAt(place);
  const recorded = foldThrough(chain.bandLowHz, chain.bandHighHz, chain.ratesHz, MOST_PIECES);
  return recorded
    .flatMap(({ recordedLowHz, recordedHighHz }) =>
      foldsInto(recordedLowHz, recordedHighHz, ratesHz, upToHz, MOST_FOLDS),
    )
    .filter(({ foldsAtStage, collapsed }) => foldsAtStage === 1 || collapsed)
    .map(({ trueLowHz, trueHighHz }): HzRange => ({ lowHz: trueLowHz, highHz: trueHighHz }))
    .filter((fold) => !band.some((kept) => fold.lowHz < kept.highHz && kept.lowHz < fold.highHz))
    .sort((a, b) => a.lowHz - b.lowHz);
}

/** The frequencies by which the filter is given, in Hz; none for one that is given otherwise. */
export function edgesOf(place: FilterPlace): readonly number[] {
  const response = place.filter.use?.filter?.response;
  return response ? frequenciesOf(response).map((frequency) => hzOf(frequency, fractionOfHz(place))) : [];
}

/** What a frequency of the filter that is given as a fraction of a rate is a fraction of. */
function fractionOfHz({ chain, stage }: FilterPlace): number {
  const isOfChannel = stage === 0 || chain.stages[stage]?.kind === 'modulator-decimation';
  return isOfChannel ? chain.rateHz : chain.ratesHz[stage - 1]!;
}
