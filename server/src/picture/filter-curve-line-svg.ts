import type { CurveLayout } from './filter-curve-layout.ts';
import { acrossAt, downAt } from './filter-curve-layout.ts';
import type { CurvePoint } from './filter-curve-line.ts';
import type { FilterCurve } from './filter-curve-model.ts';
import type { Segment } from './label-places.ts';
import type { Palette } from './palette.ts';
import { element, short } from './svg.ts';

interface Point {
  readonly x: number;
  readonly y: number;
}

/** The curve: a line, dashed where nothing is promised, and thin ones for the worst that a tolerance allows. */
export function curveSvg(curve: FilterCurve, layout: CurveLayout, palette: Palette): string {
  const { unpromised, line, worst } = curve;
  const solid = unpromised
    ? [line.filter(({ hz }) => hz <= unpromised.lowHz), line.filter(({ hz }) => hz >= unpromised.highHz)]
    : [line];
  const between = unpromised ? line.filter(({ hz }) => hz >= unpromised.lowHz && hz <= unpromised.highHz) : [];
  // Both ends alone: the line only joins two promises.
  const joining = between.filter((_, index) => index === 0 || index === between.length - 1);
  const drawn = (lines: readonly (readonly Level[])[], attributes: Readonly<Record<string, string | number>>): string =>
    path(
      lines.flatMap((one) => onScale(one, curve.mostDb)).map((one) => placed(one, layout)),
      attributes,
    );
  return [
    drawn([worst.map(({ hz, leastDb }) => ({ hz, attenuationDb: leastDb }))], thin(palette)),
    drawn([worst.map(({ hz, greatestDb }) => ({ hz, attenuationDb: greatestDb }))], thin(palette)),
    denseSvg(line, layout, palette),
    drawn(solid, { stroke: palette.ink, 'stroke-width': 1.7 }),
    drawn([joining], { stroke: palette.ink, 'stroke-width': 1.2, 'stroke-dasharray': '5 4' }),
  ].join('');
}

/** The curve in straight pieces, in pixels, as few as labels need to keep clear of it. */
export function curveSegments({ line, mostDb }: FilterCurve, layout: CurveLayout): readonly Segment[] {
  return onScale(line, mostDb).flatMap((part) => {
    const points = thinned(placed(part, layout), 1);
    return points.slice(1).map(({ x, y }, index) => ({ x1: points[index]!.x, y1: points[index]!.y, x2: x, y2: y }));
  });
}

interface Level {
  readonly hz: number;
  readonly attenuationDb: number;
}

/** The parts of a line down to the end of the scale: beyond it a line would seem to run level. */
function onScale(line: readonly Level[], mostDb: number): readonly (readonly Level[])[] {
  const parts: Level[][] = [];
  let part: Level[] = [];
  for (const [index, point] of line.entries()) {
    const before = line[index - 1];
    const isOn = point.attenuationDb <= mostDb;
    const wasOn = before !== undefined && before.attenuationDb <= mostDb;
    if (before && isOn !== wasOn) part.push(crossing(before, point, mostDb));
    if (isOn) part.push(point);
    else if (wasOn) {
      parts.push(part);
      part = [];
    }
  }
  return [...parts, part].filter(({ length }) => length > 1);
}

/** Where a line between two points, one of them perhaps `Infinity` dB, crosses a level; over the ratio of frequencies. */
function crossing(a: Level, b: Level, attenuationDb: number): Level {
  const part = (attenuationDb - a.attenuationDb) / (b.attenuationDb - a.attenuationDb);
  if (!Number.isFinite(part)) return { hz: a.attenuationDb > b.attenuationDb ? a.hz : b.hz, attenuationDb };
  return { hz: a.hz * (b.hz / a.hz) ** part, attenuationDb };
}

function placed(line: readonly Level[], layout: CurveLayout): readonly Point[] {
  return line.map(({ hz, attenuationDb }) => ({ x: acrossAt(layout, hz), y: downAt(layout, attenuationDb) }));
}

function thin(palette: Palette): Readonly<Record<string, string | number>> {
  return { stroke: palette.quiet, 'stroke-width': 0.8 };
}

/** Where lobes are too narrow to be drawn, the space between their tops and their bottoms. */
function denseSvg(line: readonly CurvePoint[], layout: CurveLayout, palette: Palette): string {
  const bars = line.flatMap(({ hz, attenuationDb, downToDb }, index) => {
    const next = line[index + 1];
    if (next === undefined || downToDb <= attenuationDb) return [];
    const [x, y] = [acrossAt(layout, hz), downAt(layout, attenuationDb)];
    return [
      `M${short(x)} ${short(y)}H${short(acrossAt(layout, next.hz))}V${short(downAt(layout, downToDb))}H${short(x)}z`,
    ];
  });
  return bars.length === 0 ? '' : element('path', { d: bars.join(''), fill: palette.ink, 'fill-opacity': '0.25' });
}

function path(lines: readonly (readonly Point[])[], attributes: Readonly<Record<string, string | number>>): string {
  const d = lines
    .filter((points) => points.length > 1)
    .map(
      (points) =>
        `M${thinned(points, 0.1)
          .map(({ x, y }) => `${short(x)} ${short(y)}`)
          .join('L')}`,
    )
    .join('');
  return d === '' ? '' : element('path', { d, 'stroke-linejoin': 'round', fill: 'none', ...attributes });
}

/** The points of a line without those that lie, to within `slack` pixels, straight between their neighbours. */
function thinned(points: readonly Point[], slack: number): readonly Point[] {
  const kept: Point[] = points.slice(0, 1);
  let start = 0;
  for (let end = 2; end < points.length; end++) {
    if (isStraight(points, start, end, slack)) continue;
    start = end - 1;
    kept.push(points[start]!);
  }
  return points.length > 1 ? [...kept, points.at(-1)!] : kept;
}

function isStraight(points: readonly Point[], start: number, end: number, slack: number): boolean {
  const a = points[start]!;
  const b = points[end]!;
  const span = b.x - a.x;
  for (let index = start + 1; index < end; index++) {
    const { x, y } = points[index]!;
    const part = span > 0 ? (x - a.x) / span : 0;
    if (Math.abs(a.y + (b.y - a.y) * part - y) > slack) return false;
  }
  return true;
}
