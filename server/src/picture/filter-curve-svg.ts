import { formatHz } from '../quantity/write.ts';
import { levelTicks, logarithmicTicks } from './axis.ts';
import type { CurveLayout } from './filter-curve-layout.ts';
import { acrossAt, downAt, layOutCurve } from './filter-curve-layout.ts';
import { curveSegments, curveSvg } from './filter-curve-line-svg.ts';
import { curveMarksSvg } from './filter-curve-marks-svg.ts';
import type { FilterCurve } from './filter-curve-model.ts';
import type { HzRange } from './filter-place.ts';
import { textWidth } from './label-places.ts';
import { legend } from './marks-svg.ts';
import type { Palette, PictureTheme } from './palette.ts';
import { paletteFor } from './palette.ts';
import { element, escaped, short } from './svg.ts';
import { FONT, SMALL, text } from './text-svg.ts';

/** The curve as SVG: the same text for the same curve. Small enough for a hover, whatever the filter. */
export function filterCurveSvg(curve: FilterCurve, theme: PictureTheme): string {
  const layout = layOutCurve(curve);
  const palette = paletteFor(theme);
  const { width, height } = layout;
  const { drawn, kinds, unplaced } = curveMarksSvg(curve, layout, palette, curveSegments(curve, layout));
  const content = [
    `<title>${escaped(curve.title)}</title><desc>${escaped(curve.description)}</desc>`,
    palette.background === 'none' ? '' : element('rect', { width, height, rx: 4, fill: palette.background }),
    strips(curve, layout, palette),
    grid(curve, layout, palette),
    stretchNames(curve, layout, palette),
    head(kinds, curve.leftOut + unplaced, layout, palette),
    curveSvg(curve, layout, palette),
    drawn,
  ];
  return element(
    'svg',
    {
      xmlns: 'http://www.w3.org/2000/svg',
      width,
      height,
      viewBox: `0 0 ${width} ${height}`,
      role: 'img',
      'font-family': FONT,
      'font-size': SMALL,
    },
    content.join(''),
  );
}

/** What the scales are, what the shapes mean, and how many marks there is no room for. */
function head(
  kinds: Parameters<typeof legend>[0],
  leftOut: number,
  { width, headBaseline, frequencyAxis }: CurveLayout,
  palette: Palette,
): string {
  const { drawn, left } = legend(kinds, frequencyAxis.to, headBaseline, palette);
  const names = ['dB taken off, over the frequency at its input', 'dB taken off, over frequency', 'dB taken off'];
  const more = leftOut > 0 ? `; ${leftOut} more not marked` : '';
  const fits = (name: string): boolean => EDGE + textWidth(name, SMALL) <= Math.min(left, width);
  const name = names.map((one) => one + more).find(fits) ?? names.find(fits) ?? '';
  return text(EDGE, headBaseline, name, { fill: palette.quiet }) + drawn;
}

/** The least distance of words from the picture's edge. */
const EDGE = 6;
/** The height of the bars that mark stretches of the axis. */
const BAR = 3;

/** The band, and what folds into it, across the picture and as bars on the axis. */
function strips(curve: FilterCurve, layout: CurveLayout, palette: Palette): string {
  const { from: top, to: bottom } = layout.attenuationAxis;
  const drawn = (ranges: readonly HzRange[], fill: string, opacity: number, stroke: string, dashes: string): string => {
    const stretches = stretchesOf(ranges, layout);
    if (stretches.length === 0) return '';
    const bars = stretches.map(({ x, width }) => `M${short(x)} ${short(bottom + BAR / 2)}h${short(width)}`).join('');
    const areas = stretches.map(
      ({ x, width }) => `M${short(x)} ${short(top)}h${short(width)}V${short(bottom)}h${short(-width)}z`,
    );
    return (
      element('path', { d: areas.join(''), fill, 'fill-opacity': String(opacity) }) +
      element('path', { d: bars, stroke, 'stroke-width': BAR, 'stroke-dasharray': dashes, fill: 'none' })
    );
  };
  return (
    drawn(curve.band, palette.band, 1, palette.bandEdge, 'none') +
    drawn(curve.folds, palette.spoils, 0.1, palette.spoils, '3 2')
  );
}

/** Ascending ranges in pixels; those that would run into one another are one. */
function stretchesOf(ranges: readonly HzRange[], layout: CurveLayout): readonly Stretch[] {
  const joined: Stretch[] = [];
  for (const { x, width } of ranges.map((range) => stretchOf(range, layout))) {
    if (width <= 0) continue;
    const before = joined.at(-1);
    if (before && x < before.x + before.width + 1) {
      joined[joined.length - 1] = { x: before.x, width: Math.max(before.width, x + width - before.x) };
    } else joined.push({ x, width });
  }
  return joined;
}

interface Stretch {
  readonly x: number;
  readonly width: number;
}

/** A range of frequencies in pixels, at least one wide where any of it is on the axis. */
function stretchOf({ lowHz, highHz }: HzRange, layout: CurveLayout): Stretch {
  const x = acrossAt(layout, lowHz);
  const right = acrossAt(layout, highHz);
  const { from, to } = layout.frequencyAxis;
  if (right <= from || x >= to) return { x, width: 0 };
  return { x, width: Math.max(1, right - x) };
}

/** The names of the band and of what folds into it, under them, as long as there is room for. */
function stretchNames(curve: FilterCurve, layout: CurveLayout, palette: Palette): string {
  const { width, nameBaseline } = layout;
  const [band] = curve.band;
  const first = curve.marks.find(({ kind }) => kind === 'first-fold')?.hz;
  const fold = curve.folds.find(({ lowHz, highHz }) => lowHz === first || highHz === first) ?? curve.folds[0];
  const placed = (stretch: Stretch, name: string): { readonly left: number; readonly right: number } => {
    const half = textWidth(name, SMALL) / 2;
    const middle = Math.min(width - EDGE - half, Math.max(EDGE + half, stretch.x + stretch.width / 2));
    return { left: middle - half, right: middle + half };
  };
  const bandNames = band ? [`band ${formatHz(band.lowHz, 3)} .. ${formatHz(band.highHz, 3)}`, 'band'] : [];
  const foldNames = fold ? ['folds into the band', 'folds'] : [];
  const write = (name: string, left: number, fill: string): string => text(left, nameBaseline, name, { fill });
  if (!band || !fold) {
    const [name, stretch] = band
      ? [bandNames[0]!, stretchOf(band, layout)]
      : [foldNames[0], fold && stretchOf(fold, layout)];
    return name && stretch ? write(name, placed(stretch, name).left, palette.quiet) : '';
  }
  for (const foldName of foldNames) {
    for (const bandName of bandNames) {
      const a = placed(stretchOf(band, layout), bandName);
      const b = placed(stretchOf(fold, layout), foldName);
      if (a.left < b.right + EDGE && b.left < a.right + EDGE) continue;
      return write(bandName, a.left, palette.quiet) + write(foldName, b.left, palette.quiet);
    }
  }
  return write('band', placed(stretchOf(band, layout), 'band').left, palette.quiet);
}

function grid(curve: FilterCurve, layout: CurveLayout, palette: Palette): string {
  const { frequencyAxis, attenuationAxis, tickBaseline, width } = layout;
  const { from: left, to: right } = frequencyAxis;
  const strokes: string[] = [];
  const labels: string[] = [];
  for (const { value, label } of levelTicks(curve.leastDb, curve.mostDb, MOST_LEVELS)) {
    const y = downAt(layout, value);
    strokes.push(`M${short(left)} ${short(y)}H${short(right)}`);
    labels.push(text(left - 7, y + 4, label.replace('-', '\u2212'), { fill: palette.quiet, 'text-anchor': 'end' }));
  }
  let taken = -Infinity;
  for (const { value, label } of logarithmicTicks(curve.lowHz, curve.highHz, MOST_FREQUENCIES)) {
    const x = acrossAt(layout, value);
    strokes.push(`M${short(x)} ${short(attenuationAxis.to)}v5`);
    const half = textWidth(label, SMALL) / 2;
    const middle = Math.min(x, width - EDGE - half);
    if (middle - half < taken + EDGE) continue;
    taken = middle + half;
    labels.push(text(middle, tickBaseline, label, { fill: palette.quiet, 'text-anchor': 'middle' }));
  }
  return (
    element('path', { d: strokes.join(''), stroke: palette.grid, 'stroke-width': 0.8, fill: 'none' }) + labels.join('')
  );
}

const MOST_LEVELS = 6;
const MOST_FREQUENCIES = 9;
