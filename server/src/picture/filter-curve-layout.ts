import type { Axis } from './axis.ts';
import { placeOn } from './axis.ts';
import type { FilterCurve } from './filter-curve-model.ts';

/** Where everything of a filter's curve stands, in pixels. */
export interface CurveLayout {
  readonly width: number;
  readonly height: number;
  /** Powers of ten of a frequency in Hz, to the right. */
  readonly frequencyAxis: Axis;
  /** Attenuation in dB, downward. */
  readonly attenuationAxis: Axis;
  readonly headBaseline: number;
  readonly tickBaseline: number;
  /** Of the names of the band and of what folds into it, under their stretches of the axis. */
  readonly nameBaseline: number;
}

// Editors cut a hover at 250 pixels, its edges included.
const WIDTH = 520;
const HEIGHT = 228;
/** Above the 0 dB line there is room for a row of labels, since most of a pass band lies on it. */
const MARGIN = { left: 44, right: 14, top: 34, bottom: 33 } as const;
/** Down to here the head has the picture for itself. */
export const HEAD_BOTTOM = 15;

export function layOutCurve({ lowHz, highHz, leastDb, mostDb }: FilterCurve): CurveLayout {
  const bottom = HEIGHT - MARGIN.bottom;
  return {
    width: WIDTH,
    height: HEIGHT,
    frequencyAxis: {
      low: Math.log10(lowHz),
      high: Math.log10(highHz),
      from: MARGIN.left,
      to: WIDTH - MARGIN.right,
    },
    attenuationAxis: { low: leastDb, high: mostDb, from: MARGIN.top, to: bottom },
    headBaseline: 12,
    tickBaseline: bottom + 15,
    nameBaseline: bottom + 28,
  };
}

/** Where a frequency stands; one off the axis, at its end. */
export function acrossAt({ frequencyAxis }: CurveLayout, hz: number): number {
  return placeOn(frequencyAxis, Math.log10(hz));
}

/** Where an attenuation stands; one that is off the scale, at its end. */
export function downAt({ attenuationAxis }: CurveLayout, attenuationDb: number): number {
  return placeOn(attenuationAxis, attenuationDb);
}
