import type { PlacedMark } from './alias-map-labels.ts';
import { markWishes } from './alias-map-labels.ts';
import type { MapLayout } from './alias-map-layout.ts';
import type { AliasMap } from './alias-map-model.ts';
import { frequencyTicks, levelTicks, placeOn } from './axis.ts';
import type { Box, Segment } from './label-places.ts';
import { placeLabels, textWidth } from './label-places.ts';
import { apartFromTheirLike, colourOf, shape } from './marks-svg.ts';
import type { Palette } from './palette.ts';
import { element, short } from './svg.ts';
import { LABEL, labelGroup, SMALL, text } from './text-svg.ts';

/** The lower part of an alias map: the record's spectrum, each line by its origin, with the fold limit over the band. */
export function spectrumSvg(map: AliasMap, layout: MapLayout, palette: Palette): string {
  const { spectrumAxis, levelAxis } = layout;
  const bandLeft = placeOn(spectrumAxis, map.bandLowHz);
  const bandRight = placeOn(spectrumAxis, map.bandHighHz);
  const limitY = placeOn(levelAxis, map.foldLimit);
  const height = levelAxis.from - levelAxis.to;
  return [
    element('rect', { x: bandLeft, y: levelAxis.to, width: bandRight - bandLeft, height, fill: palette.band }),
    heading(map, layout, palette),
    grid(map, layout, palette, limitY),
    limitLine(bandLeft, bandRight, limitY, palette),
    lines(map, layout, palette, { x1: bandLeft, x2: bandRight, y1: limitY, y2: limitY }),
  ].join('');
}

function heading(
  map: AliasMap,
  { spectrumAxis, levelAxis, headingRise, nameDrop }: MapLayout,
  palette: Palette,
): string {
  const baseline = levelAxis.to - headingRise;
  const name = `fold limit ${levelText(map.foldLimit)}`;
  const left = spectrumAxis.to - textWidth(name, SMALL);
  // Where the axis above has a row for its name, that row counts what is left out.
  const leftOut = nameDrop === undefined && map.leftOut > 0 ? `; ${map.leftOut} marks left out` : '';
  return (
    text(spectrumAxis.from, baseline, `in the record, ${map.levelUnit}${leftOut}`, { fill: palette.quiet }) +
    text(left, baseline, name, { fill: palette.quiet }) +
    limitLine(left - 30, left - 6, baseline - 4, palette)
  );
}

/** The least distance of level lines, in pixels. */
const LINES_APART = 16;

function grid(map: AliasMap, layout: MapLayout, palette: Palette, limitY: number): string {
  const { spectrumAxis, levelAxis, tickDrop } = layout;
  const left = spectrumAxis.from;
  const right = spectrumAxis.to;
  const strokes: string[] = [];
  const labels: string[] = [];
  const most = Math.min(4, Math.floor((levelAxis.from - levelAxis.to) / LINES_APART));
  for (const { value } of levelTicks(map.levelLow, map.levelHigh, most)) {
    const y = placeOn(levelAxis, value);
    strokes.push(`M${short(left)} ${short(y)}H${short(right)}`);
    if (Math.abs(y - limitY) < 13) continue;
    labels.push(text(left - 7, y + 4, levelText(value), { fill: palette.quiet, 'text-anchor': 'end' }));
  }
  labels.push(text(left - 7, limitY + 4, levelText(map.foldLimit), { fill: palette.spoils, 'text-anchor': 'end' }));
  for (const { value, label } of frequencyTicks(0, map.nyquistHz, 6)) {
    const x = placeOn(spectrumAxis, value);
    strokes.push(`M${short(x)} ${short(levelAxis.from)}v4`);
    const half = textWidth(label, SMALL) / 2;
    const middle = Math.min(x, layout.width - 4 - half);
    labels.push(text(middle, levelAxis.from + tickDrop, label, { fill: palette.quiet, 'text-anchor': 'middle' }));
  }
  return (
    element('path', { d: strokes.join(''), stroke: palette.grid, 'stroke-width': 0.8, fill: 'none' }) + labels.join('')
  );
}

function limitLine(from: number, to: number, y: number, palette: Palette): string {
  return element('path', {
    d: `M${short(from)} ${short(y)}H${short(to)}`,
    stroke: palette.spoils,
    'stroke-width': 1.2,
    'stroke-dasharray': '5 3',
    fill: 'none',
  });
}

interface LineOfRecord extends PlacedMark {
  readonly like: string;
  readonly from: number;
  readonly to: number;
}

/** Narrower than this, in pixels, a range is a line. */
const NARROW = 3;

function lines(map: AliasMap, layout: MapLayout, palette: Palette, limit: Segment): string {
  const { spectrumAxis, levelAxis } = layout;
  const shown = linesOfRecord(map, layout);
  const shapes = apartFromTheirLike(shown, 'across');
  const bottom = levelAxis.from;
  const taken = shapes.map(({ x, y }): Box => ({ left: x - 6, right: x + 6, top: y - 6, bottom: y + 6 }));
  const labels = placeLabels(
    markWishes(shapes, ({ recordedText }) => recordedText),
    {
      size: LABEL,
      area: { left: spectrumAxis.from + 2, right: spectrumAxis.to, top: levelAxis.to - 2, bottom: bottom - 1 },
      taken,
      lines: [limit, ...shown.map(({ from, to, x, y }) => stem(from, to, x, y, bottom))],
    },
  );
  // Many ranges lie over one another: each is drawn the fainter.
  const many = Math.max(1, shown.filter(({ from, to }) => to - from > NARROW).length);
  const fill = Math.min(0.22, 1.2 / many);
  return [
    ...[...shown].reverse().map((line) => drawnLine(line, bottom, fill, palette)),
    ...[...shapes].reverse().map(({ mark, x, y }) => shape(mark.kind, x, y, palette)),
    labelGroup(labels, ({ kind }) => (kind === 'harmless' ? palette.quiet : palette.ink), palette),
  ].join('');
}

function linesOfRecord(map: AliasMap, { spectrumAxis, levelAxis }: MapLayout): readonly LineOfRecord[] {
  return map.marks
    .filter(({ level }) => level >= map.levelLow)
    .map((mark) => {
      const from = placeOn(spectrumAxis, mark.recordedLowHz);
      const to = placeOn(spectrumAxis, mark.recordedHighHz);
      const y = placeOn(levelAxis, mark.level);
      return { mark, like: `${mark.kind} ${mark.sourceName}`, from, to, x: (from + to) / 2, y };
    });
}

/** What a label had better not cross: the upright of a line, the top of a range. */
function stem(from: number, to: number, x: number, y: number, bottom: number): Segment {
  return to - from > NARROW ? { x1: from, x2: to, y1: y, y2: y } : { x1: x, x2: x, y1: y, y2: bottom };
}

function drawnLine({ mark, from, to, x, y }: LineOfRecord, bottom: number, fill: number, palette: Palette): string {
  const stroke = colourOf(mark.kind, palette);
  const thin = mark.kind === 'harmless' ? 1 : 1.5;
  if (to - from <= NARROW) {
    return element('path', {
      d: `M${short(x)} ${short(bottom)}V${short(y)}`,
      stroke,
      'stroke-width': thin,
      fill: 'none',
    });
  }
  const area =
    mark.kind === 'harmless'
      ? ''
      : element('rect', {
          x: from,
          y,
          width: to - from,
          height: bottom - y,
          fill: stroke,
          'fill-opacity': fill.toFixed(3),
        });
  return (
    area +
    element('path', { d: `M${short(from)} ${short(y)}H${short(to)}`, stroke, 'stroke-width': thin, fill: 'none' })
  );
}

function levelText(level: number): string {
  return String(Number(level.toFixed(1))).replace('-', '\u2212');
}
