import type { Axis } from './axis.ts';
import { placeOn } from './axis.ts';
import type { FoldLine, FoldPoint } from './fold-line.ts';
import type { Segment } from './label-places.ts';
import type { Palette } from './palette.ts';
import { element, short } from './svg.ts';

/** Fading is followed to this, of 1: less is not seen. */
const SEEN = 0.02;

/**
 * The fold line of one stretch: one path, whose stroke fades from left to right with what the filters leave, since
 * the attenuation is a function of the true frequency alone.
 */
export function foldLineSvg(
  line: FoldLine,
  trueAxis: Axis,
  recordedAxis: Axis,
  fadedAtDb: number,
  palette: Palette,
  width = 1.7,
): string {
  if (line.length === 0) return '';
  const stops = fadeStops(line, fadedAtDb, palette.faintest).map(({ trueHz, opacity }) =>
    element('stop', {
      offset: String(Math.round(1000 * ((trueHz - trueAxis.low) / (trueAxis.high - trueAxis.low))) / 1000),
      'stop-color': palette.ink,
      'stop-opacity': String(Math.round(100 * opacity) / 100),
    }),
  );
  const gradient = { gradientUnits: 'userSpaceOnUse', x1: trueAxis.from, x2: trueAxis.to, y1: 0, y2: 0 };
  // Named by what it holds: two pictures on one page share a name only where they share the fading.
  const id = `fade-${checksum(`${stops.join('')}${trueAxis.from} ${trueAxis.to}`)}`;
  const d = foldSegments(line, trueAxis, recordedAxis)
    .map(({ x1, y1, x2, y2 }, index, all) => {
      const before = all[index - 1];
      const goesOn = before && Math.abs(before.x2 - x1) < 0.05 && Math.abs(before.y2 - y1) < 0.05;
      return `${goesOn ? '' : `M${short(x1)} ${short(y1)}`}L${short(x2)} ${short(y2)}`;
    })
    .join('');
  return (
    element('linearGradient', { id, ...gradient }, stops.join('')) +
    element('path', { d, stroke: `url(#${id})`, 'stroke-width': width, 'stroke-linejoin': 'round', fill: 'none' })
  );
}

/** The straight pieces of a fold line, in pixels. */
export function foldSegments(line: FoldLine, trueAxis: Axis, recordedAxis: Axis): readonly Segment[] {
  return line.map((piece) => {
    const from = piece[0]!;
    const to = piece.at(-1)!;
    return {
      x1: placeOn(trueAxis, from.trueHz),
      y1: placeOn(recordedAxis, from.recordedHz),
      x2: placeOn(trueAxis, to.trueHz),
      y2: placeOn(recordedAxis, to.recordedHz),
    };
  });
}

interface Fading {
  readonly trueHz: number;
  readonly opacity: number;
}

/** The opacity along the line, at as few points as straight lines between them need. */
function fadeStops(line: FoldLine, fadedAtDb: number, faintest: number): readonly Fading[] {
  const points = line.flat().map((point) => ({ trueHz: point.trueHz, opacity: opacityOf(point, fadedAtDb, faintest) }));
  const stops: Fading[] = [points[0]!];
  let start = 0;
  for (let end = 2; end < points.length; end++) {
    if (isStraight(points, start, end)) continue;
    start = end - 1;
    stops.push(points[start]!);
  }
  stops.push(points.at(-1)!);
  return stops;
}

function isStraight(points: readonly Fading[], start: number, end: number): boolean {
  const a = points[start]!;
  const b = points[end]!;
  const span = b.trueHz - a.trueHz;
  for (let index = start + 1; index < end; index++) {
    const point = points[index]!;
    const part = span > 0 ? (point.trueHz - a.trueHz) / span : 0;
    if (Math.abs(a.opacity + (b.opacity - a.opacity) * part - point.opacity) > SEEN) return false;
  }
  return true;
}

/** From 1 for what passes whole to a trace for what the filters have taken away. */
function opacityOf({ attenuationDb }: FoldPoint, fadedAtDb: number, faintest: number): number {
  const left = 1 - Math.max(0, attenuationDb) / fadedAtDb;
  return Number.isNaN(left) ? faintest : Math.max(faintest, left);
}

/** A short name for a text (FNV-1a, 32 bits). */
function checksum(content: string): string {
  let hash = 0x811c9dc5;
  for (let index = 0; index < content.length; index++) {
    hash = Math.imul(hash ^ content.charCodeAt(index), 0x01000193);
  }
  return (hash >>> 0).toString(36);
}
