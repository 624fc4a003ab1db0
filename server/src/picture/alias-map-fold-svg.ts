import { formatHz } from '../quantity/write.ts';
import type { PlacedMark } from './alias-map-labels.ts';
import { markWishes } from './alias-map-labels.ts';
import type { MapLayout } from './alias-map-layout.ts';
import { endsOf } from './alias-map-layout.ts';
import type { AliasMap, Mark } from './alias-map-model.ts';
import { frequencyTicks, placeOn } from './axis.ts';
import { foldLineSvg, foldSegments } from './fold-line-svg.ts';
import type { Box, Segment } from './label-places.ts';
import { crosses, overlap, placeLabels, textWidth } from './label-places.ts';
import { apartFromTheirLike, colourOf, shape } from './marks-svg.ts';
import type { Palette } from './palette.ts';
import { element, short } from './svg.ts';
import { LABEL, labelGroup, SMALL, text } from './text-svg.ts';

/** Fold lines of images are lighter than the record's own. */
const IMAGE_WIDTH = 0.8;

/** The upper part of an alias map: the fold line over true frequency, the band across, what arrives as marks. */
export function foldMapSvg(map: AliasMap, layout: MapLayout, palette: Palette): string {
  const { trueAxes, recordedAxis } = layout;
  const lines = map.stretches.flatMap(({ line }, index) => foldSegments(line, trueAxes[index]!, recordedAxis));
  const marks = placedMarks(map, layout);
  const shapes = apartFromTheirLike(marks, 'both');
  const taken = shapes.map(({ x, y }): Box => ({ left: x - 6, right: x + 6, top: y - 6, bottom: y + 6 }));
  const area = {
    left: layout.margin.left + 2,
    right: layout.width - layout.margin.right,
    top: recordedAxis.to - 6,
    bottom: recordedAxis.from - 1,
  };
  const labels = placeLabels(
    markWishes(shapes, ({ trueText }) => trueText),
    { size: LABEL, area, taken, lines },
  );
  const bandLabel = bandName(map, layout, [...taken, ...labels.map(({ box }) => box)], lines);
  return [
    bandStrip(map, layout, palette),
    grid(map, layout, palette),
    ...map.stretches.flatMap(({ images }, index) =>
      images.map((line) =>
        foldLineSvg(line, trueAxes[index]!, recordedAxis, map.fadedAtDb, { ...palette, faintest: 0 }, IMAGE_WIDTH),
      ),
    ),
    ...map.stretches.map(({ line }, index) =>
      foldLineSvg(line, trueAxes[index]!, recordedAxis, map.fadedAtDb, palette),
    ),
    bandLabel ? text(bandLabel.x, bandLabel.y, bandLabel.name, { fill: palette.quiet }) : '',
    // The heaviest last, so that they lie on top.
    ...[...marks].reverse().map((mark) => run(mark, palette)),
    ...[...shapes].reverse().map(({ mark, x, y }) => shape(mark.kind, x, y, palette)),
    labelGroup(labels, ({ kind }) => (kind === 'harmless' ? palette.quiet : palette.ink), palette),
  ].join('');
}

interface MarkOnMap extends PlacedMark {
  readonly like: string;
  readonly ends: Segment;
}

function placedMarks(map: AliasMap, layout: MapLayout): readonly MarkOnMap[] {
  return map.marks.flatMap((mark: Mark) => {
    const ends = endsOf(mark, layout);
    if (!ends) return [];
    const [x, y] = [(ends.x1 + ends.x2) / 2, (ends.y1 + ends.y2) / 2];
    return [{ mark, like: `${mark.kind} ${mark.sourceName}`, ends, x, y }];
  });
}

/** A range is a thick run along the fold line. */
function run({ mark, ends }: MarkOnMap, palette: Palette): string {
  const { x1, y1, x2, y2 } = ends;
  if (Math.hypot(x2 - x1, y2 - y1) < 4) return '';
  return element('path', {
    d: `M${short(x1)} ${short(y1)}L${short(x2)} ${short(y2)}`,
    stroke: colourOf(mark.kind, palette),
    'stroke-width': mark.kind === 'harmless' ? 3 : 5,
    'stroke-opacity': mark.kind === 'harmless' ? 0.55 : 0.85,
    fill: 'none',
  });
}

function bandStrip(map: AliasMap, { trueAxes, recordedAxis }: MapLayout, palette: Palette): string {
  const top = placeOn(recordedAxis, map.bandHighHz);
  const bottom = placeOn(recordedAxis, map.bandLowHz);
  const strips = trueAxes.map(({ from, to }) =>
    element('rect', { x: from, y: top, width: to - from, height: Math.max(1, bottom - top), fill: palette.band }),
  );
  const edge = element('path', {
    d: trueAxes.map(({ from, to }) => `M${short(from)} ${short(top)}H${short(to)}`).join(''),
    stroke: palette.bandEdge,
    fill: 'none',
  });
  return strips.join('') + edge;
}

/** The band's name, under its upper edge or over it, as far right as nothing is in the way; left out where all is full. */
function bandName(
  map: AliasMap,
  { trueAxes, recordedAxis }: MapLayout,
  taken: readonly Box[],
  lines: readonly Segment[],
): { readonly x: number; readonly y: number; readonly name: string } | undefined {
  const top = placeOn(recordedAxis, map.bandHighHz);
  const bottom = placeOn(recordedAxis, map.bandLowHz);
  const names = [`band ${formatHz(map.bandLowHz, 3)} .. ${formatHz(map.bandHighHz, 3)}`, 'band'];
  const left = trueAxes[0]!.from + 4;
  const right = trueAxes.at(-1)!.to - 4;
  const baselines = [...(bottom - top >= 16 ? [top + 13] : []), ...(top - recordedAxis.to >= 16 ? [top - 5] : [])];
  for (const name of names) {
    const width = textWidth(name, SMALL);
    for (const y of baselines) {
      for (let x = right - width; x >= left; x -= 6) {
        const box = { left: x - 2, right: x + width + 2, top: y - 10, bottom: y + 3 };
        const isFree = !taken.some((other) => overlap(box, other)) && !lines.some((line) => crosses(line, box));
        if (isFree) return { x, y, name };
      }
    }
  }
  return undefined;
}

/** Ticks closer than this to the end of the axis, in pixels, make room for the Nyquist frequency. */
const ROOM_AT_TOP = 14;
/** The least distance of level lines. */
const LINES_APART = 20;

function grid(map: AliasMap, layout: MapLayout, palette: Palette): string {
  const { trueAxes, recordedAxis, tickDrop } = layout;
  const bottom = recordedAxis.from;
  const lines: string[] = [];
  const labels: string[] = [];
  const rowLabel = (y: number, label: string, fill: string): string =>
    text(layout.margin.left - 7, y + 4, label, { fill, 'text-anchor': 'end' });
  const most = Math.min(5, Math.floor((bottom - recordedAxis.to) / LINES_APART));
  for (const { value, label } of frequencyTicks(0, map.nyquistHz, most)) {
    const y = placeOn(recordedAxis, value);
    if (y - recordedAxis.to < ROOM_AT_TOP) continue;
    lines.push(...trueAxes.map(({ from, to }) => `M${short(from)} ${short(y)}H${short(to)}`));
    labels.push(rowLabel(y, label, palette.quiet));
  }
  labels.push(rowLabel(recordedAxis.to, formatHz(map.nyquistHz, 4), palette.ink));
  const taken: Box[] = [];
  for (const axis of trueAxes) {
    const mostOfAxis = Math.max(1, Math.floor((axis.to - axis.from) / 80));
    for (const { value, label } of frequencyTicks(axis.low, axis.high, mostOfAxis)) {
      const x = placeOn(axis, value);
      const half = textWidth(label, SMALL) / 2;
      const middle = Math.min(x, layout.width - 4 - half);
      const box = { left: middle - half - 4, right: middle + half + 4, top: bottom, bottom: bottom + 20 };
      lines.push(`M${short(x)} ${short(bottom)}v4`);
      if (taken.some((other) => overlap(box, other))) continue;
      taken.push(box);
      labels.push(text(middle, bottom + tickDrop, label, { fill: palette.quiet, 'text-anchor': 'middle' }));
    }
  }
  const breaks = trueAxes.slice(1).map(({ from }) => `M${short(from - 12)} ${short(bottom + 4)}l4 -8m4 8l4 -8`);
  return (
    element('path', { d: lines.join(''), stroke: palette.grid, 'stroke-width': 0.8, fill: 'none' }) +
    (breaks.length === 0 ? '' : element('path', { d: breaks.join(''), stroke: palette.quiet, fill: 'none' })) +
    labels.join('')
  );
}
