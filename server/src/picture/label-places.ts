/** A rectangle of a picture, in pixels. */
export interface Box {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

/** Something to be labelled: the label's text and the point it belongs to. */
export interface LabelWish {
  readonly text: string;
  readonly x: number;
  readonly y: number;
}

export interface PlacedLabel {
  readonly text: string;
  /** Left end of the text's base line. */
  readonly x: number;
  readonly baseline: number;
  readonly box: Box;
}

/** Advance widths of a plain sans-serif face in units of its size, by kinds of character: an estimate on the wide side. */
export function textWidth(text: string, size: number): number {
  let width = 0;
  for (const character of text) {
    width += /[iljI.,:;'|! ]/.test(character)
      ? 0.3
      : /[mwMW@%]/.test(character)
        ? 0.92
        : /[A-Z]/.test(character)
          ? 0.7
          : 0.57;
  }
  return width * size;
}

/**
 * Places labels beside their points so that none overlaps another, a taken box, or the edge of `area`; the first are
 * placed first, and one that finds no place is left out.
 */
export function placeLabels(
  wishes: readonly LabelWish[],
  size: number,
  area: Box,
  taken: readonly Box[],
): readonly PlacedLabel[] {
  const boxes: Box[] = [...taken];
  const placed: PlacedLabel[] = [];
  for (const wish of wishes) {
    const label = candidatesFor(wish, size).find(
      ({ box }) => isInside(box, area) && !boxes.some((other) => overlap(box, other)),
    );
    if (!label) continue;
    boxes.push(label.box);
    placed.push(label);
  }
  return placed;
}

const GAP = 8;

function candidatesFor({ text, x, y }: LabelWish, size: number): readonly PlacedLabel[] {
  const width = textWidth(text, size);
  const at = (left: number, middle: number): PlacedLabel => ({
    text,
    x: left,
    baseline: middle + size * 0.36,
    box: { left: left - 1, right: left + width + 1, top: middle - size * 0.62, bottom: middle + size * 0.62 },
  });
  const lift = size * 0.95;
  return [
    at(x + GAP, y),
    at(x + GAP, y - lift),
    at(x - GAP - width, y),
    at(x - GAP - width, y - lift),
    at(x + GAP, y + lift),
    at(x - width / 2, y - lift - 4),
    at(x - GAP - width, y + lift),
    at(x - width / 2, y + lift + 4),
    ...[2, 3, 4].flatMap((lines) => [at(x + GAP, y - lines * lift), at(x - GAP - width, y - lines * lift)]),
  ];
}

function isInside(box: Box, area: Box): boolean {
  return box.left >= area.left && box.right <= area.right && box.top >= area.top && box.bottom <= area.bottom;
}

export function overlap(a: Box, b: Box): boolean {
  return a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;
}
