import type { MarkKind } from './arrival-words.ts';
import type { CurveLayout } from './filter-curve-layout.ts';
import { acrossAt, downAt, HEAD_BOTTOM } from './filter-curve-layout.ts';
import type { CurveMark } from './filter-curve-marks.ts';
import type { FilterCurve } from './filter-curve-model.ts';
import { decibelsOff } from './filter-curve-model.ts';
import type { Box, LabelWish, Segment } from './label-places.ts';
import { placeLabels } from './label-places.ts';
import { shape } from './marks-svg.ts';
import type { Palette } from './palette.ts';
import { element, short } from './svg.ts';
import { LABEL, labelGroup } from './text-svg.ts';

interface MarkOnCurve extends LabelWish {
  readonly mark: CurveMark;
}

/** The marks of a curve that there is room to label, and how many there is none for. */
export interface DrawnMarks {
  readonly drawn: string;
  readonly kinds: ReadonlySet<MarkKind>;
  readonly unplaced: number;
}

/** The marked points, each with its label; one that finds no room for it is left out, since it would tell nothing. */
export function curveMarksSvg(
  curve: FilterCurve,
  layout: CurveLayout,
  palette: Palette,
  lines: readonly Segment[],
): DrawnMarks {
  const wishes = curve.marks.map((mark, index): MarkOnCurve => {
    const place = { x: acrossAt(layout, mark.hz), y: downAt(layout, mark.attenuationDb) };
    return { mark, names: String(index), texts: textsOf(mark), ...place };
  });
  const { frequencyAxis, attenuationAxis } = layout;
  const uprights = wishes.filter(({ mark }) => mark.kind === 'nyquist').map(({ x }) => upright(x, layout));
  const taken = wishes.map(({ x, y }): Box => ({ left: x - 6, right: x + 6, top: y - 6, bottom: y + 6 }));
  const labels = placeLabels(wishes, {
    size: LABEL,
    area: {
      left: frequencyAxis.from + 2,
      right: layout.width - 4,
      top: HEAD_BOTTOM,
      bottom: attenuationAxis.to - 1,
    },
    taken,
    lines: [...lines, ...uprights],
    crossingCost: 12,
  });
  const shown = labels.map(({ wish }) => wish);
  return {
    drawn: [
      ...shown.filter(({ mark }) => mark.kind === 'nyquist').map(({ x }) => nyquistSvg(upright(x, layout), palette)),
      // What a source is matters more than where folding begins.
      ...[...shown].sort((a, b) => drawnAfter(a) - drawnAfter(b)).map((wish) => markSvg(wish, palette)),
      labelGroup(labels, ({ mark }) => (mark.kind === 'harmless' ? palette.quiet : palette.ink), palette),
    ].join(''),
    kinds: new Set(shown.flatMap(({ mark }) => (isSource(mark.kind) ? [mark.kind] : []))),
    unplaced: wishes.length - shown.length,
  };
}

function drawnAfter({ mark }: MarkOnCurve): number {
  return ['nyquist', 'first-fold', 'native', 'harmless', 'spoils'].indexOf(mark.kind);
}

function isSource(kind: CurveMark['kind']): kind is MarkKind {
  return kind !== 'nyquist' && kind !== 'first-fold';
}

/** The longest first. */
function textsOf({ name, longName, hzText, attenuationDb }: CurveMark): readonly string[] {
  const off = decibelsOff(attenuationDb);
  return [...new Set([`${longName} ${hzText}: ${off}`, `${name} ${hzText}: ${off}`, `${name}: ${off}`, name])];
}

function upright(x: number, { attenuationAxis }: CurveLayout): Segment {
  return { x1: x, x2: x, y1: attenuationAxis.from, y2: attenuationAxis.to };
}

function nyquistSvg({ x1, y1, y2 }: Segment, palette: Palette): string {
  const d = `M${short(x1)} ${short(y1)}V${short(y2)}`;
  return element('path', { d, stroke: palette.quiet, 'stroke-width': 1, 'stroke-dasharray': '2 3', fill: 'none' });
}

/** Sources as on the alias map; the others as small squares, filled where folding into the band begins. */
function markSvg({ mark: { kind }, x, y }: MarkOnCurve, palette: Palette): string {
  if (isSource(kind)) return shape(kind, x, y, palette);
  const open = palette.background === 'none' ? palette.halo : palette.background;
  return element('rect', {
    x: x - 3.5,
    y: y - 3.5,
    width: 7,
    height: 7,
    fill: kind === 'first-fold' ? palette.ink : open,
    stroke: palette.ink,
    'stroke-width': 1.4,
  });
}
