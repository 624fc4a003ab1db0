import type { AnalogueFilter, CurveFilter, DigitalFilter } from './filter-spec.ts';
import { firPhase } from './fir-phase.ts';
import { averagePhase, NO_PHASE, type PhaseResponse } from './phase-response.ts';
import { analoguePolePhase, digitalPolePhase } from './pole-phase.ts';
import { tapsOf } from './taps.ts';

/**
 * Phase and delay of a filter ahead of a converter; `undefined` for a mask or points, which say nothing of them.
 * An average over a time is late by half of it.
 */
export function analoguePhase(filter: AnalogueFilter): PhaseResponse | undefined {
  switch (filter.response) {
    case 'mask':
    case 'points':
    case 'aperture':
      return curvePhase(filter);
    default:
      return analoguePolePhase(filter);
  }
}

/**
 * The same of a digital filter at `inputRateHz`, over 0 .. inputRateHz / 2; a frequency above is read as half the rate.
 * Run forward and backward, any filter has neither phase nor delay, a mask or points included.
 */
export function digitalPhase(filter: DigitalFilter, inputRateHz: number): PhaseResponse | undefined {
  if (filter.passes === 2) return NO_PHASE;
  switch (filter.response) {
    case 'mask':
    case 'points':
    case 'aperture':
      return curvePhase(filter);
    case 'fir':
    case 'kaiser':
    case 'half-band':
      return firPhase(tapsOf(filter, inputRateHz), inputRateHz);
    case 'moving-average':
      return averagePhase(filter.length, 1, filter.length / inputRateHz);
    case 'cic': {
      const length = filter.decimation * filter.delay;
      return averagePhase(length, filter.order, length / inputRateHz);
    }
    default:
      return digitalPolePhase(filter, inputRateHz);
  }
}

function curvePhase(filter: CurveFilter): PhaseResponse | undefined {
  return filter.response === 'aperture' ? averagePhase(Infinity, 1, filter.timeS) : undefined;
}
