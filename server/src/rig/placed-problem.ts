import type { Place } from './place.ts';
import type { Problem } from './problem.ts';

/** A problem with its place, once it is known which entry it stands in. */
export interface PlacedProblem {
  readonly problem: Problem;
  readonly place: Place;
  readonly related: readonly { readonly place: Place; readonly message: string }[];
}
