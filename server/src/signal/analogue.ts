import { type Curve, responseOf } from './curve.ts';
import type { AnalogueFilter, CurveFilter } from './filter-spec.ts';
import { lobedCurve } from './lobes.ts';
import { maskCurve } from './mask.ts';
import { pointsCurve } from './points.ts';
import { analoguePoleCurve } from './poles.ts';
import type { Response } from './response.ts';

/** The response of a filter ahead of a converter, over 0 Hz to any frequency. */
export function analogueResponse(filter: AnalogueFilter): Response {
  return responseOf(isCurveFilter(filter) ? curveOf(filter) : analoguePoleCurve(filter), filter.tolerance);
}

/** Whether a filter is one of those that are a curve over frequency and nothing else. */
export function isCurveFilter<Other extends { readonly response: string }>(
  filter: CurveFilter | Other,
): filter is CurveFilter {
  return filter.response === 'mask' || filter.response === 'points' || filter.response === 'aperture';
}

/** The nominal curve of a filter without poles, ahead of a converter or after it. */
export function curveOf(filter: CurveFilter): Curve {
  switch (filter.response) {
    case 'mask':
      return maskCurve(filter);
    case 'points':
      return pointsCurve(filter.points);
    case 'aperture':
      return averageCurve(Infinity, 1, filter.timeS);
  }
}

/**
 * The response of an average over `length` samples, or of `count` such averages in a row, over frequency.
 *
 * @param length `Infinity` for a continuous average
 * @param timeS what it lasts; the first null is at its reciprocal
 */
export function averageCurve(length: number, count: number, timeS: number): Curve {
  const lobes = lobedCurve(length, count);
  return {
    at: (hz) => lobes.at(hz * timeS),
    least: (low, high) => lobes.least(low * timeS, high * timeS),
    greatest: (low, high) => lobes.greatest(low * timeS, high * timeS),
  };
}
