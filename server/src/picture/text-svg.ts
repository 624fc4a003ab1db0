import type { LabelWish, PlacedLabel } from './label-places.ts';
import type { Palette } from './palette.ts';
import { element, escaped } from './svg.ts';

/** Sizes of the two kinds of text in a picture, in pixels. */
export const SMALL = 11;
export const LABEL = 11.5;

export const FONT = "system-ui, 'Segoe UI', 'Helvetica Neue', Arial, sans-serif";

export type TextAttributes = Readonly<Record<string, string | number>>;

export function text(x: number, y: number, content: string, attributes: TextAttributes): string {
  return element('text', { x, y, ...attributes }, escaped(content));
}

/** Labels beside their points; each stays legible where it crosses a line. */
export function labelGroup<Wish extends LabelWish>(
  labels: readonly PlacedLabel<Wish>[],
  inkOf: (wish: Wish) => string,
  palette: Palette,
): string {
  if (labels.length === 0) return '';
  const drawn = labels.map((label) => text(label.x, label.baseline, label.text, { fill: inkOf(label.wish) })).join('');
  return element(
    'g',
    {
      'font-size': LABEL,
      stroke: palette.background === 'none' ? palette.halo : palette.background,
      'stroke-width': 3,
      'stroke-opacity': 0.8,
      'stroke-linejoin': 'round',
      'paint-order': 'stroke',
    },
    drawn,
  );
}
