import { averageCurve, curveOf, isCurveFilter } from './analogue.ts';
import { type Curve, responseOf } from './curve.ts';
import type { DigitalFilter, PoleFilter, StepFilter } from './filter-spec.ts';
import { firCurve } from './fir.ts';
import { digitalPoleCurve } from './poles.ts';
import type { Response } from './response.ts';
import { tapsOf } from './taps.ts';

/**
 * The response of a digital filter at `inputRateHz`, over 0 .. inputRateHz / 2: a frequency must have been folded
 * there; one above is read as half the rate.
 */
export function digitalResponse(filter: DigitalFilter, inputRateHz: number): Response {
  const curve = isCurveFilter(filter) ? curveOf(filter) : computedCurve(filter, inputRateHz);
  return responseOf(curve, filter.tolerance, inputRateHz / 2, filter.passes);
}

function computedCurve(filter: PoleFilter | StepFilter, rateHz: number): Curve {
  switch (filter.response) {
    case 'fir':
    case 'kaiser':
    case 'half-band':
      return firCurve(tapsOf(filter, rateHz), rateHz);
    case 'moving-average':
      return averageCurve(filter.length, 1, filter.length / rateHz);
    case 'cic': {
      const length = filter.decimation * filter.delay;
      return averageCurve(length, filter.order, length / rateHz);
    }
    default:
      return digitalPoleCurve(filter, rateHz);
  }
}
