import type { AliasMap, Mark } from './alias-map-model.ts';
import type { Axis } from './axis.ts';
import { placeOn } from './axis.ts';

/** Where everything of an alias map stands, in pixels. */
export interface MapLayout {
  readonly width: number;
  readonly height: number;
  /** One axis of true frequency a stretch, side by side. */
  readonly trueAxes: readonly Axis[];
  /** Recorded frequency, upward. */
  readonly recordedAxis: Axis;
  /** Recorded frequency of the spectrum, to the right. */
  readonly spectrumAxis: Axis;
  readonly levelAxis: Axis;
}

export const MARGIN = { left: 62, right: 18, top: 30, bottom: 34 } as const;
/** Between the map and the spectrum: the map's axis with its labels and the spectrum's heading. */
const BETWEEN = 58;
const SPECTRUM_PART = 0.3;
/** Between two stretches of a broken axis. */
const BREAK = 16;

/** Lays an alias map out on a picture of some size. */
export function layOut(map: AliasMap, width: number, height: number): MapLayout {
  const inner = height - MARGIN.top - MARGIN.bottom - BETWEEN;
  const mapBottom = MARGIN.top + inner * (1 - SPECTRUM_PART);
  const spectrumTop = mapBottom + BETWEEN;
  const right = width - MARGIN.right;
  const room = right - MARGIN.left - BREAK * (map.stretches.length - 1);
  // The first stretch, which holds the band as it is, is the widest.
  const parts = map.stretches.map((_, index) => (index === 0 && map.stretches.length > 1 ? 1.4 : 1));
  const total = parts.reduce((sum, part) => sum + part, 0);
  let from: number = MARGIN.left;
  const trueAxes = map.stretches.map(({ lowHz, highHz }, index): Axis => {
    const to = from + (room * parts[index]!) / total;
    const axis = { low: lowHz, high: highHz, from, to };
    from = to + BREAK;
    return axis;
  });
  return {
    width,
    height,
    trueAxes,
    recordedAxis: { low: 0, high: map.nyquistHz, from: mapBottom, to: MARGIN.top },
    spectrumAxis: { low: 0, high: map.nyquistHz, from: MARGIN.left, to: right },
    levelAxis: { low: map.levelLow, high: map.levelHigh, from: height - MARGIN.bottom, to: spectrumTop },
  };
}

/** A mark's ends on the map; `undefined` where it comes from a stretch that is not shown, or has no place on the line. */
export function endsOf(
  { from, to, isOnLine }: Mark,
  { trueAxes, recordedAxis }: MapLayout,
): { readonly x1: number; readonly y1: number; readonly x2: number; readonly y2: number } | undefined {
  if (!isOnLine) return undefined;
  const middle = (from.trueHz + to.trueHz) / 2;
  const axis = trueAxes.find(({ low, high }) => middle >= low && middle <= high);
  if (!axis) return undefined;
  return {
    x1: placeOn(axis, from.trueHz),
    y1: placeOn(recordedAxis, from.recordedHz),
    x2: placeOn(axis, to.trueHz),
    y2: placeOn(recordedAxis, to.recordedHz),
  };
}
