import type { MarkKind } from './arrival-words.ts';
import { KIND_WORDS } from './arrival-words.ts';
import { textWidth } from './label-places.ts';
import type { Palette } from './palette.ts';
import { element, short } from './svg.ts';
import { SMALL, text } from './text-svg.ts';

/** Native: an open circle. Folded, harmless: a small open diamond. Folded, spoils: a filled triangle. */
export function shape(kind: MarkKind, x: number, y: number, palette: Palette): string {
  const colour = colourOf(kind, palette);
  const fill = palette.background === 'none' ? palette.halo : palette.background;
  switch (kind) {
    case 'native':
      return element('circle', { cx: x, cy: y, r: 3.8, fill, stroke: colour, 'stroke-width': 1.8 });
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

export function colourOf(kind: MarkKind, palette: Palette): string {
  switch (kind) {
    case 'native':
      return palette.native;
    case 'harmless':
      return palette.quiet;
    case 'spoils':
      return palette.spoils;
  }
}

/** What the shapes mean, of kinds that are there, in a row that ends at `right`; and where the row begins. */
export function legend(
  kinds: ReadonlySet<MarkKind>,
  right: number,
  baseline: number,
  palette: Palette,
): { readonly drawn: string; readonly left: number } {
  let drawn = '';
  let x = right;
  for (const kind of LEGEND.filter((one) => kinds.has(one))) {
    const word = KIND_WORDS[kind];
    drawn += text(x, baseline, word, { fill: palette.quiet, 'text-anchor': 'end' });
    x -= textWidth(word, SMALL) + 8;
    drawn += shape(kind, x, baseline - 4, palette);
    x -= 20;
  }
  return { drawn, left: x };
}

const LEGEND: readonly MarkKind[] = ['spoils', 'harmless', 'native'];

/** Closer than this, shapes of one kind and source are one. */
const APART = 9;

/** Something to be drawn with a shape at a point. */
export interface ShapePoint {
  readonly like: string;
  readonly x: number;
  readonly y: number;
}

/**
 * Of points in turn, those that do not lie so close to one like them that both would blur.
 *
 * @param by `across` counts the horizontal distance alone: of lines side by side the first has the shape
 */
export function apartFromTheirLike<Point extends ShapePoint>(
  points: readonly Point[],
  by: 'both' | 'across',
): readonly Point[] {
  const kept = new Map<string, Point[]>();
  return points.filter((point) => {
    const like = kept.get(point.like) ?? [];
    if (like.some(({ x, y }) => Math.hypot(x - point.x, by === 'both' ? y - point.y : 0) < APART)) return false;
    kept.set(point.like, [...like, point]);
    return true;
  });
}
