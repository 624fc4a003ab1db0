import type { AliasMap, Mark } from './alias-map-model.ts';
import type { Axis } from './axis.ts';
import { placeOn } from './axis.ts';

/** `large` where a picture has room of its own, `compact` where a hover has little. */
export type MapSize = 'large' | 'compact';

/** What the sizes differ in, in pixels. */
interface Measures {
  readonly width: number;
  readonly height: number;
  readonly margin: Margin;
  /** Between the map and the spectrum: the map's axis with its labels and the spectrum's heading. */
  readonly between: number;
  /** Of the height of both, the spectrum's. */
  readonly spectrumPart: number;
  readonly headBaseline: number;
  /** From an axis to the base line of its labels. */
  readonly tickDrop: number;
  /** From the map's axis to the base line of its name; `undefined` where the head names it. */
  readonly nameDrop: number | undefined;
  /** From the base line of the spectrum's heading to the spectrum. */
  readonly headingRise: number;
}

interface Margin {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

const MEASURES: Readonly<Record<MapSize, Measures>> = {
  large: {
    width: 560,
    height: 430,
    margin: { left: 62, right: 18, top: 30, bottom: 34 },
    between: 58,
    spectrumPart: 0.3,
    headBaseline: 16,
    tickDrop: 16,
    nameDrop: 31,
    headingRise: 8,
  },
  // Editors cut a hover at 250 pixels, its edges included: so high, the line under the picture is seen whole.
  compact: {
    width: 520,
    height: 206,
    margin: { left: 58, right: 14, top: 22, bottom: 18 },
    between: 36,
    spectrumPart: 0.4,
    headBaseline: 12,
    tickDrop: 14,
    nameDrop: undefined,
    headingRise: 6,
  },
};

/** Where everything of an alias map stands, in pixels. */
export interface MapLayout extends Measures {
  /** One axis of true frequency a stretch, side by side. */
  readonly trueAxes: readonly Axis[];
  /** Recorded frequency, upward. */
  readonly recordedAxis: Axis;
  /** Recorded frequency of the spectrum, to the right. */
  readonly spectrumAxis: Axis;
  readonly levelAxis: Axis;
}

/** Between two stretches of a broken axis. */
const BREAK = 16;

/** Lays an alias map out on a picture of some size. */
export function layOut(map: AliasMap, size: MapSize): MapLayout {
  const measures = MEASURES[size];
  const { width, height, margin, between, spectrumPart } = measures;
  const inner = height - margin.top - margin.bottom - between;
  const mapBottom = margin.top + inner * (1 - spectrumPart);
  const right = width - margin.right;
  const room = right - margin.left - BREAK * (map.stretches.length - 1);
  // The first stretch, which holds the band as it is, is the widest.
  const parts = map.stretches.map((_, index) => (index === 0 && map.stretches.length > 1 ? 1.4 : 1));
  const total = parts.reduce((sum, part) => sum + part, 0);
  let from = margin.left;
  const trueAxes = map.stretches.map(({ lowHz, highHz }, index): Axis => {
    const to = from + (room * parts[index]!) / total;
    const axis = { low: lowHz, high: highHz, from, to };
    from = to + BREAK;
    return axis;
  });
  return {
    ...measures,
    trueAxes,
    recordedAxis: { low: 0, high: map.nyquistHz, from: mapBottom, to: margin.top },
    spectrumAxis: { low: 0, high: map.nyquistHz, from: margin.left, to: right },
    levelAxis: { low: map.levelLow, high: map.levelHigh, from: height - margin.bottom, to: mapBottom + between },
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
