/** A rectangle of a picture, in pixels. */
export interface Box {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

/** A straight line of a picture, in pixels. */
export interface Segment {
  readonly x1: number;
  readonly y1: number;
  readonly x2: number;
  readonly y2: number;
}

/** Something to be labelled: the point it belongs to and the label's text, with shorter ones to fall back on. */
export interface LabelWish {
  /** What is named: once one of its labels has a place, the others are not wanted. */
  readonly names: string;
  readonly texts: readonly string[];
  readonly x: number;
  readonly y: number;
}

export interface PlacedLabel<Wish extends LabelWish = LabelWish> {
  readonly wish: Wish;
  readonly text: string;
  /** Left end of the text's base line. */
  readonly x: number;
  readonly baseline: number;
  readonly box: Box;
}

/** Where labels may go, what they must not cover, and what they had better not cross. */
export interface LabelRoom {
  readonly size: number;
  readonly area: Box;
  readonly taken: readonly Box[];
  readonly lines: readonly Segment[];
  /** How much farther down the list of places a label would rather go than cross a line; left out, 5. */
  readonly crossingCost?: number;
}

/** Advance widths of a plain sans-serif face in units of its size, by kinds of character: an estimate on the wide side. */
export function textWidth(text: string, size: number): number {
  let width = 0;
  for (const character of text) width += characterWidth(character);
  return width * size;
}

function characterWidth(character: string): number {
  if (/[iljI.,:;'|! ]/.test(character)) return 0.33;
  if (/[mwMW@%→…\u2212]/.test(character)) return 0.95;
  if (character.codePointAt(0)! >= 0x1100) return 1.1;
  return /[A-Z]/.test(character) ? 0.72 : 0.6;
}

const CROSSING = 5;
/** A shorter text is worth less than a place without crossings. */
const SHORTENING = 9;

/**
 * Places labels beside their points so that none overlaps another, a taken box, or the edge of the area, and few cross
 * a line; the first are placed first, one for each thing that is named, and one that finds no place is left out.
 */
export function placeLabels<Wish extends LabelWish>(
  wishes: readonly Wish[],
  { size, area, taken, lines, crossingCost = CROSSING }: LabelRoom,
): readonly PlacedLabel<Wish>[] {
  const boxes: Box[] = [...taken];
  const placed: PlacedLabel<Wish>[] = [];
  const named = new Set<string>();
  for (const wish of wishes) {
    if (named.has(wish.names)) continue;
    let best: { readonly label: PlacedLabel<Wish>; readonly cost: number } | undefined;
    for (const [shorter, text] of wish.texts.entries()) {
      for (const [place, label] of candidatesFor(wish, text, size).entries()) {
        const cost = place + shorter * SHORTENING;
        if (best && cost >= best.cost) break;
        if (!isInside(label.box, area) || boxes.some((other) => overlap(label.box, other))) continue;
        const crossings = lines.filter((line) => crosses(line, label.box)).length;
        const whole = cost + crossingCost * Math.min(2, crossings);
        if (!best || whole < best.cost) best = { label, cost: whole };
      }
    }
    if (!best) continue;
    named.add(wish.names);
    boxes.push(best.label.box);
    placed.push(best.label);
  }
  return placed;
}

const GAP = 8;

/** Places for a label, the best first. */
function candidatesFor<Wish extends LabelWish>(wish: Wish, text: string, size: number): readonly PlacedLabel<Wish>[] {
  const { x, y } = wish;
  const width = textWidth(text, size);
  const at = (left: number, middle: number): PlacedLabel<Wish> => ({
    wish,
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
    ...[2, 3].flatMap((lines) => [at(x + GAP, y - lines * lift), at(x - GAP - width, y - lines * lift)]),
  ];
}

function isInside(box: Box, area: Box): boolean {
  return box.left >= area.left && box.right <= area.right && box.top >= area.top && box.bottom <= area.bottom;
}

export function overlap(a: Box, b: Box): boolean {
  return a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;
}

/** Whether a line passes through a box, by what is left of it between the box's sides (Liang and Barsky). */
export function crosses({ x1, y1, x2, y2 }: Segment, box: Box): boolean {
  let from = 0;
  let to = 1;
  const sides: readonly (readonly [step: number, distance: number])[] = [
    [x1 - x2, x1 - box.left],
    [x2 - x1, box.right - x1],
    [y1 - y2, y1 - box.top],
    [y2 - y1, box.bottom - y1],
  ];
  for (const [step, distance] of sides) {
    if (step === 0) {
      if (distance < 0) return false;
      continue;
    }
    const part = distance / step;
    if (step < 0) from = Math.max(from, part);
    else to = Math.min(to, part);
  }
  return from <= to;
}
