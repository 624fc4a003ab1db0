import type { StepFilter } from './filter-spec.ts';
import { halfBandTaps, kaiserTaps } from './kaiser.ts';

/** The responses that are taps, given or designed. */
export type TapFilter = Extract<StepFilter, { response: 'fir' | 'kaiser' | 'half-band' }>;

/** The taps of a filter that is given samples at `rateHz`. */
export function tapsOf(filter: TapFilter, rateHz: number): readonly number[] {
  switch (filter.response) {
    case 'fir':
      return filter.taps;
    case 'kaiser':
      return kaiserTaps(filter.stopbandDb, filter.passHz, filter.stopHz, rateHz);
    case 'half-band':
      return 'taps' in filter ? filter.taps : halfBandTaps(filter.stopbandDb, filter.passHz, rateHz);
  }
}
