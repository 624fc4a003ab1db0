import type { Response } from '../signal/response.ts';
import type { HzRange } from './filter-place.ts';

/** A point of a filter's curve. */
export interface CurvePoint {
  readonly hz: number;
  /** Nominal; the least of a lobe where lobes are narrower than can be drawn. */
  readonly attenuationDb: number;
  /** The same again, or the greatest, `Infinity` in a null, where lobes are narrower than can be drawn. */
  readonly downToDb: number;
}

/** The worst that a filter's tolerance allows at a frequency, either way. */
export interface WorstPoint {
  readonly hz: number;
  readonly leastDb: number;
  readonly greatestDb: number;
}

const POINTS = 360;
const WORST_POINTS = 120;
/** A lobe that rises this far between two points of the line is too narrow to be followed. */
const LOBE_DB = 1;

/**
 * A filter's curve over frequencies in equal ratios.
 *
 * A long digital filter has more lobes than a picture has columns. Points picked from them would show lobes that are
 * not there, so there the line follows the least of each column and a second one the greatest.
 */
export function curveLine(
  response: Response,
  lowHz: number,
  highHz: number,
  unpromised: HzRange | undefined,
): readonly CurvePoint[] {
  const ends = unpromised ? [unpromised.lowHz, unpromised.highHz].filter((hz) => hz > lowHz && hz < highHz) : [];
  const points = [...frequencies(lowHz, highHz, POINTS), ...ends].sort((a, b) => a - b);
  return points.map((hz, index): CurvePoint => {
    const attenuationDb = response.attenuationDb(hz);
    const next = points[index + 1];
    if (unpromised || next === undefined) return { hz, attenuationDb, downToDb: attenuationDb };
    const least = response.leastDb(hz, next);
    const lower = Math.min(attenuationDb, response.attenuationDb(next));
    const isLobe = least < lower - LOBE_DB && response.leastDb(hz, hz) > attenuationDb - LOBE_DB / 2;
    return isLobe
      ? { hz, attenuationDb: least, downToDb: response.greatestDb(hz, next) }
      : { hz, attenuationDb, downToDb: attenuationDb };
  });
}

/** The worst of a filter at frequencies in equal ratios; none without a tolerance. */
export function worstLines(
  response: Response,
  tolerance: number,
  lowHz: number,
  highHz: number,
): readonly WorstPoint[] {
  if (!(tolerance > 0)) return [];
  return frequencies(lowHz, highHz, WORST_POINTS).map((hz) => ({
    hz,
    leastDb: response.leastDb(hz, hz),
    greatestDb: response.greatestDb(hz, hz),
  }));
}

function frequencies(lowHz: number, highHz: number, count: number): readonly number[] {
  return Array.from({ length: count }, (_, index) =>
    index === count - 1 ? highHz : lowHz * (highHz / lowHz) ** (index / (count - 1)),
  );
}
