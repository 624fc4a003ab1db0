import { formatHz } from '../quantity/write.ts';
import type { MapLayout } from './alias-map-layout.ts';
import { endsOf, layOut, MARGIN } from './alias-map-layout.ts';
import type { AliasMap, MarkKind } from './alias-map-model.ts';
import { frequencyTicks, levelTicks, placeOn } from './axis.ts';
import type { FoldLine } from './fold-line.ts';
import type { Box, LabelWish } from './label-places.ts';
import { placeLabels, textWidth } from './label-places.ts';
import type { Palette, PictureTheme } from './palette.ts';
import { paletteFor } from './palette.ts';
import { element, escaped, short } from './svg.ts';

export interface AliasMapSvgOptions {
  readonly theme: PictureTheme;
  readonly width?: number;
  readonly height?: number;
  /** Past this many bytes labels and then marks are left out, the lightest first. */
  readonly maxBytes?: number;
}

const WIDTH = 560;
const HEIGHT = 430;
const MAX_BYTES = 30_000;
const SMALL = 11;
const LABEL = 11.5;
const FONT = "system-ui, 'Segoe UI', 'Helvetica Neue', Arial, sans-serif";

/** The alias map as SVG: the same text for the same map. */
export function aliasMapSvg(map: AliasMap, options: AliasMapSvgOptions): string {
  const layout = layOut(map, options.width ?? WIDTH, options.height ?? HEIGHT);
  const palette = paletteFor(options.theme);
  for (let most = map.marks.length; ; most = Math.floor(most / 2)) {
    const svg = drawn({ ...map, marks: map.marks.slice(0, most) }, layout, palette);
    if (svg.length <= (options.maxBytes ?? MAX_BYTES) || most === 0) return svg;
  }
}

function drawn(map: AliasMap, layout: MapLayout, palette: Palette): string {
  const { width, height } = layout;
  const content = [
    `<title>${escaped(map.title)}</title><desc>${escaped(map.description)}</desc>`,
    palette.background === 'none' ? '' : element('rect', { width, height, rx: 4, fill: palette.background }),
    heading(map, layout, palette),
    bandOnMap(map, layout, palette),
    mapAxes(map, layout, palette),
    ...map.stretches.map(({ line }, index) => foldLine(line, index, map, layout, palette)),
    marksOnMap(map, layout, palette),
    spectrum(map, layout, palette),
  ];
  return `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}" viewBox="0 0 ${width} ${height}" role="img" font-family="${FONT}" font-size="${SMALL}">${content.join('')}</svg>`;
}

function heading(map: AliasMap, layout: MapLayout, palette: Palette): string {
  const left = text(MARGIN.left, 16, 'recorded', { fill: palette.quiet });
  const key = legend(layout.width - MARGIN.right, 16, palette, map);
  return left + key;
}

/** What the shapes mean; only of those that are there. */
function legend(right: number, baseline: number, palette: Palette, map: AliasMap): string {
  const words: readonly (readonly [MarkKind, string])[] = [
    ['native', 'as it is'],
    ['harmless', 'folded, harmless'],
    ['spoils', 'folded, spoils the band'],
  ];
  let x = right;
  const parts: string[] = [];
  for (const [kind, word] of [...words].reverse()) {
    if (!map.marks.some((mark) => mark.kind === kind)) continue;
    x -= textWidth(word, SMALL);
    parts.push(text(x, baseline, word, { fill: palette.quiet }));
    x -= 10;
    parts.push(shape(kind, x, baseline - 4, palette));
    x -= 18;
  }
  return parts.join('');
}

function bandOnMap(map: AliasMap, { trueAxes, recordedAxis, width }: MapLayout, palette: Palette): string {
  const top = placeOn(recordedAxis, map.bandHighHz);
  const bottom = placeOn(recordedAxis, map.bandLowHz);
  const strips = trueAxes.map(({ from, to }) =>
    element('rect', { x: from, y: top, width: to - from, height: Math.max(1, bottom - top), fill: palette.band }),
  );
  const edge = element('path', {
    d: trueAxes.map(({ from, to }) => `M${short(from)} ${short(top)}H${short(to)}`).join(''),
    stroke: palette.bandEdge,
    'stroke-width': 1,
    fill: 'none',
  });
  const label = text(width - MARGIN.right - 4, top + 13, 'band', { fill: palette.quiet, 'text-anchor': 'end' });
  return strips.join('') + edge + label;
}

function mapAxes(map: AliasMap, layout: MapLayout, palette: Palette): string {
  const { trueAxes, recordedAxis } = layout;
  const bottom = recordedAxis.from;
  const grid: string[] = [];
  const labels: string[] = [];
  for (const { value, label } of frequencyTicks(0, map.nyquistHz, 5)) {
    const y = placeOn(recordedAxis, value);
    if (Math.abs(y - recordedAxis.to) < 12 && value < map.nyquistHz) continue;
    grid.push(...trueAxes.map(({ from, to }) => `M${short(from)} ${short(y)}H${short(to)}`));
    labels.push(text(MARGIN.left - 7, y + 4, label, { fill: palette.quiet, 'text-anchor': 'end' }));
  }
  labels.push(
    text(MARGIN.left - 7, recordedAxis.to + 4, formatHz(map.nyquistHz, 3), { fill: palette.ink, 'text-anchor': 'end' }),
  );
  const taken: Box[] = [];
  for (const axis of trueAxes) {
    const most = Math.max(1, Math.floor((axis.to - axis.from) / 80));
    for (const { value, label } of frequencyTicks(axis.low, axis.high, most)) {
      const x = placeOn(axis, value);
      const half = textWidth(label, SMALL) / 2;
      const box = { left: x - half - 4, right: x + half + 4, top: bottom, bottom: bottom + 20 };
      grid.push(`M${short(x)} ${short(bottom)}v4`);
      if (
        box.right > layout.width ||
        box.left < 0 ||
        taken.some((other) => other.left < box.right && box.left < other.right)
      )
        continue;
      taken.push(box);
      labels.push(text(x, bottom + 16, label, { fill: palette.quiet, 'text-anchor': 'middle' }));
    }
  }
  const breaks = trueAxes.slice(1).map(({ from }) => `M${short(from - 12)} ${short(bottom + 4)}l4 -8m4 8l4 -8`);
  const axisName = text(layout.width - MARGIN.right, bottom + 30, 'true frequency at the sensor', {
    fill: palette.quiet,
    'text-anchor': 'end',
  });
  return (
    element('path', { d: grid.join(''), stroke: palette.grid, 'stroke-width': 0.8, fill: 'none' }) +
    (breaks.length === 0 ? '' : element('path', { d: breaks.join(''), stroke: palette.quiet, fill: 'none' })) +
    labels.join('') +
    axisName
  );
}

/** The fold line; it fades as the chain attenuates, in eight steps. */
function foldLine(
  line: FoldLine,
  index: number,
  map: AliasMap,
  { trueAxes, recordedAxis }: MapLayout,
  palette: Palette,
): string {
  const axis = trueAxes[index]!;
  const runs: { opacity: number; d: string; lastX: number }[] = [];
  for (const piece of line) {
    for (let at = 1; at < piece.length; at++) {
      const a = piece[at - 1]!;
      const b = piece[at]!;
      const opacity = visibility((a.attenuationDb + b.attenuationDb) / 2, map.fadedAtDb);
      const x1 = placeOn(axis, a.trueHz);
      const y1 = placeOn(recordedAxis, a.recordedHz);
      const to = `L${short(placeOn(axis, b.trueHz))} ${short(placeOn(recordedAxis, b.recordedHz))}`;
      const last = runs.at(-1);
      if (last && last.opacity === opacity && Math.abs(last.lastX - x1) < 0.05) {
        last.d += to;
        last.lastX = placeOn(axis, b.trueHz);
      } else runs.push({ opacity, d: `M${short(x1)} ${short(y1)}${to}`, lastX: placeOn(axis, b.trueHz) });
    }
  }
  return runs
    .map(({ opacity, d }) =>
      element('path', {
        d,
        stroke: palette.ink,
        'stroke-width': 1.6,
        'stroke-opacity': opacity,
        'stroke-linecap': 'round',
        fill: 'none',
      }),
    )
    .join('');
}

/** From 1 for what passes whole to a trace for what the filters have taken away, in steps of an eighth. */
function visibility(attenuationDb: number, fadedAtDb: number): number {
  const left = 1 - Math.max(0, attenuationDb) / fadedAtDb;
  return Math.max(0.1, Math.round(8 * left) / 8);
}

function marksOnMap(map: AliasMap, layout: MapLayout, palette: Palette): string {
  const shapes: string[] = [];
  const wishes: LabelWish[] = [];
  const taken: Box[] = [];
  const named = new Set<string>();
  for (const mark of map.marks) {
    const ends = endsOf(mark, layout);
    if (!ends) continue;
    const { x1, y1, x2, y2 } = ends;
    const [x, y] = [(x1 + x2) / 2, (y1 + y2) / 2];
    const isRun = Math.hypot(x2 - x1, y2 - y1) > 8;
    if (isRun) {
      shapes.push(
        element('path', {
          d: `M${short(x1)} ${short(y1)}L${short(x2)} ${short(y2)}`,
          stroke: colourOf(mark.kind, palette),
          'stroke-width': mark.kind === 'harmless' ? 3 : 5,
          'stroke-opacity': mark.kind === 'harmless' ? 0.6 : 0.85,
          fill: 'none',
        }),
      );
    }
    shapes.push(shape(mark.kind, x, y, palette));
    taken.push({ left: x - 6, right: x + 6, top: y - 6, bottom: y + 6 });
    // A source is named once for each thing it is to the record.
    const name = `${mark.kind} ${mark.label.split(' ')[0]}`;
    if (mark.kind !== 'harmless' && !named.has(name)) {
      named.add(name);
      wishes.push({ text: mark.label, x, y });
    }
  }
  const area = {
    left: MARGIN.left + 2,
    right: layout.width - MARGIN.right,
    top: layout.recordedAxis.to - 4,
    bottom: layout.recordedAxis.from,
  };
  const labels = placeLabels(wishes, LABEL, area, taken).map(({ text: label, x, baseline }) =>
    haloed(x, baseline, label, palette),
  );
  // The heaviest last, so that they lie on top.
  return shapes.reverse().join('') + labels.join('');
}

function spectrum(map: AliasMap, layout: MapLayout, palette: Palette): string {
  const { spectrumAxis, levelAxis } = layout;
  const left = spectrumAxis.from;
  const right = spectrumAxis.to;
  const bandLeft = placeOn(spectrumAxis, map.bandLowHz);
  const bandRight = placeOn(spectrumAxis, map.bandHighHz);
  const parts = [
    element('rect', {
      x: bandLeft,
      y: levelAxis.to,
      width: bandRight - bandLeft,
      height: levelAxis.from - levelAxis.to,
      fill: palette.band,
    }),
    text(left, levelAxis.to - 8, `in the record, ${map.levelUnit}`, { fill: palette.quiet }),
    text(right, levelAxis.to - 8, 'fold limit', { fill: palette.quiet, 'text-anchor': 'end' }),
    limitLine(
      right - textWidth('fold limit', SMALL) - 28,
      right - textWidth('fold limit', SMALL) - 4,
      levelAxis.to - 12,
      palette,
    ),
  ];
  const grid: string[] = [];
  const limitY = placeOn(levelAxis, map.foldLimit);
  for (const { value, label } of levelTicks(map.levelLow, map.levelHigh, 4)) {
    const y = placeOn(levelAxis, value);
    grid.push(`M${short(left)} ${short(y)}H${short(right)}`);
    if (Math.abs(y - limitY) >= 11)
      parts.push(text(left - 7, y + 4, label, { fill: palette.quiet, 'text-anchor': 'end' }));
  }
  for (const { value, label } of frequencyTicks(0, map.nyquistHz, 6)) {
    const x = placeOn(spectrumAxis, value);
    grid.push(`M${short(x)} ${short(levelAxis.from)}v4`);
    const anchor = x > right - 20 ? 'end' : x < left + 12 ? 'start' : 'middle';
    parts.push(text(x, levelAxis.from + 16, label, { fill: palette.quiet, 'text-anchor': anchor }));
  }
  parts.push(element('path', { d: grid.join(''), stroke: palette.grid, 'stroke-width': 0.8, fill: 'none' }));
  parts.push(
    limitLine(bandLeft, bandRight, limitY, palette),
    text(left - 7, limitY + 4, Number(map.foldLimit.toFixed(1)).toString(), {
      fill: palette.spoils,
      'text-anchor': 'end',
    }),
  );
  parts.push(spectrumLines(map, layout, palette));
  return parts.join('');
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

function spectrumLines(map: AliasMap, { spectrumAxis, levelAxis }: MapLayout, palette: Palette): string {
  const lines: string[] = [];
  // Many ranges lie over one another: each is drawn the fainter.
  const spoiling = map.marks.filter(({ kind }) => kind === 'spoils').length;
  const faintness = { native: 0.16, harmless: 0, spoils: Math.min(0.25, 0.6 / Math.max(1, spoiling)) } as const;
  for (const mark of [...map.marks].reverse()) {
    if (mark.level < map.levelLow) continue;
    const y = placeOn(levelAxis, mark.level);
    const from = placeOn(spectrumAxis, mark.recordedLowHz);
    const to = placeOn(spectrumAxis, mark.recordedHighHz);
    const colour = colourOf(mark.kind, palette);
    if (to - from > 3) {
      lines.push(
        element('rect', {
          x: from,
          y,
          width: to - from,
          height: levelAxis.from - y,
          fill: colour,
          'fill-opacity': faintness[mark.kind],
        }),
        element('path', {
          d: `M${short(from)} ${short(y)}H${short(to)}`,
          stroke: colour,
          'stroke-width': 1.4,
          fill: 'none',
        }),
      );
    } else {
      lines.push(
        element('path', {
          d: `M${short((from + to) / 2)} ${short(levelAxis.from)}V${short(y)}`,
          stroke: colour,
          'stroke-width': mark.kind === 'harmless' ? 1 : 1.6,
          fill: 'none',
        }),
      );
    }
    lines.push(shape(mark.kind, (from + to) / 2, y, palette));
  }
  return lines.join('');
}

/** Native: an open circle. Folded, harmless: a small open diamond. Folded, spoils: a filled triangle. */
function shape(kind: MarkKind, x: number, y: number, palette: Palette): string {
  const colour = colourOf(kind, palette);
  const fill = palette.background === 'none' ? 'none' : palette.background;
  switch (kind) {
    case 'native':
      return element('circle', { cx: x, cy: y, r: 4, fill, stroke: colour, 'stroke-width': 1.8 });
    case 'harmless':
      return element('path', {
        d: `M${short(x)} ${short(y - 4)}l4 4l-4 4l-4 -4z`,
        fill,
        stroke: colour,
        'stroke-width': 1.2,
      });
    case 'spoils':
      return element('path', { d: `M${short(x)} ${short(y - 5.5)}l5.5 9.5h-11z`, fill: colour });
  }
}

function colourOf(kind: MarkKind, palette: Palette): string {
  switch (kind) {
    case 'native':
      return palette.native;
    case 'harmless':
      return palette.quiet;
    case 'spoils':
      return palette.spoils;
  }
}

function text(x: number, y: number, content: string, attributes: Readonly<Record<string, string | number>>): string {
  return element('text', { x, y, ...attributes }, escaped(content));
}

/** A label that stays legible where it crosses a line. */
function haloed(x: number, y: number, content: string, palette: Palette): string {
  const halo = palette.background === 'none' ? palette.halo : palette.background;
  return text(x, y, content, {
    fill: palette.ink,
    'font-size': LABEL,
    stroke: halo,
    'stroke-width': 3,
    'stroke-opacity': 0.75,
    'stroke-linejoin': 'round',
    'paint-order': 'stroke',
  });
}
