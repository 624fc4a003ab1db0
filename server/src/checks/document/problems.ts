import type { Entry } from '../../rig/entry.ts';
import type { PlacedProblem } from '../../rig/placed-problem.ts';
import type { SaidOfRig } from '../check.ts';
import { documentSeverity } from './pages.ts';

/** Something that the reader found, as it is said of a channel or of a thing. */
export interface SaidOfDocument extends SaidOfRig {
  readonly check: string;
}

/** A problem of a channel's own text. */
export function saidOfProblem({ problem, place, related }: PlacedProblem): SaidOfDocument {
  return {
    check: problem.name,
    severity: problem.severity ?? documentSeverity(problem.name),
    ...(problem.about === undefined ? {} : { about: problem.about }),
    ...(problem.cure === undefined ? {} : { cure: problem.cure }),
    message: problem.message,
    place,
    related,
    excess: 1,
  };
}

/**
 * A problem of anything else, about the thing that it stands in. That a key is not computed is said once for the whole
 * file, and stays the same finding wherever the first such key stands.
 */
export function saidOfThing(placed: PlacedProblem): SaidOfDocument {
  const { problem, place } = placed;
  return { ...saidOfProblem(placed), thing: problem.name === 'not-computed' ? problem.name : thingOf(place.entry) };
}

/** The name by which findings tell an entry: `filters/tidy`, `mains`, `defaults`. */
export function thingOf({ section, name }: Entry): string {
  return section === undefined ? name : `${section}/${name}`;
}
