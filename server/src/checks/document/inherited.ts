import type { PlacedProblem } from '../../rig/placed-problem.ts';
import type { RigView } from '../check.ts';
import { type SaidOfDocument, saidOfThing } from './problems.ts';

/**
 * What is wrong in text that channels inherit: each said once, where it stands, however many inherit it; and keys that
 * are not computed, once for each key of the file.
 */
export function sharedProblems({ environment, channels }: RigView): readonly SaidOfDocument[] {
  const said: SaidOfDocument[] = environment.problems.map(saidOfThing);
  const places = new Set<string>();
  const entries = new Map<object, number>();
  const isNew = ({ problem, place }: PlacedProblem): boolean => {
    const entry = entries.get(place.entry) ?? entries.size;
    entries.set(place.entry, entry);
    const key = `${problem.name} ${entry} ${place.start} ${place.end}`;
    if (places.has(key)) return false;
    places.add(key);
    return true;
  };
  for (const problem of environment.problems) isNew(problem);
  const keys = new Set<string | undefined>();
  const noteKeys = (problems: readonly PlacedProblem[]): void => {
    for (const placed of problems) {
      if (keys.has(placed.problem.about)) continue;
      keys.add(placed.problem.about);
      said.push({ ...saidOfThing(placed), thing: 'not-computed' });
    }
  };
  noteKeys(environment.notComputed);
  for (const { reading } of channels) {
    if (reading.notComputed.length > 0) noteKeys(reading.notComputed);
    if (reading.origin.length === 0) continue;
    for (const problem of reading.origin) if (isNew(problem)) said.push(saidOfThing(problem));
  }
  return said;
}
