import type { Mark } from './alias-map-model.ts';
import type { MarkKind } from './arrival-words.ts';
import type { LabelWish } from './label-places.ts';

/** A mark that stands somewhere in the picture. */
export interface PlacedMark {
  readonly mark: Mark;
  readonly x: number;
  readonly y: number;
}

export interface MarkWish extends LabelWish {
  readonly kind: MarkKind;
}

/**
 * The labels that marks ask for, the heaviest first, to be given once for each source and each thing it is to the
 * record: with the frequency where it spoils the band; what is harmless only where its source is named by nothing else.
 */
export function markWishes(marks: readonly PlacedMark[], frequencyOf: (mark: Mark) => string): readonly MarkWish[] {
  const important = new Set(marks.flatMap(({ mark }) => (mark.kind === 'harmless' ? [] : [mark.sourceName])));
  return marks
    .filter(({ mark }) => mark.kind !== 'harmless' || !important.has(mark.sourceName))
    .map(({ mark, x, y }) => {
      const { kind, sourceName, label } = mark;
      const texts = kind === 'spoils' ? [`${label} ${frequencyOf(mark)}`, label] : [label];
      return {
        kind,
        names: `${kind} ${sourceName}`,
        texts: label === sourceName ? texts : [...texts, sourceName],
        x,
        y,
      };
    });
}
