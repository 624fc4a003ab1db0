import type { KnownChannel } from './channel-reading.ts';
import type { Entry } from './entry.ts';
import type { Environment } from './environment.ts';
import type { PlacedProblem } from './placed-problem.ts';

/**
 * What is wrong with the text of a rig file and is no one channel's: problems outside the channels, problems of
 * inherited text (once, at their origin, however many inherit it), and keys that are not computed (once each).
 *
 * @param channels in document order
 * @param noted those of them that have anything to say of the two latter, or more
 */
export function rigProblems(
  environment: Environment,
  channels: readonly KnownChannel[],
  noted: readonly KnownChannel[] = channels,
): readonly PlacedProblem[] {
  const inherited = [...environment.core.origin];
  const notComputed = new Map<string | undefined, PlacedProblem>();
  const noteNotComputed = (problem: PlacedProblem): void => {
    if (!notComputed.has(problem.problem.about)) notComputed.set(problem.problem.about, problem);
  };
  environment.notComputed.forEach(noteNotComputed);
  for (const { reading } of noted) {
    if (reading.origin.length > 0) inherited.push(...reading.origin);
    if (reading.notComputed.length > 0) reading.notComputed.forEach(noteNotComputed);
  }
  return [...environment.problems, ...toldNowhere(inherited, environment, channels), ...notComputed.values()];
}

/** Of the problems of inherited text, once each, those that the entry they stand in doesn't tell of itself. */
function toldNowhere(
  inherited: readonly PlacedProblem[],
  environment: Environment,
  channels: readonly KnownChannel[],
): readonly PlacedProblem[] {
  if (inherited.length === 0) return inherited;
  const isNew = firstOfEach();
  environment.problems.forEach(isNew);
  for (const { reading } of channels) if (reading.entry.anchors.length > 0) reading.problems.forEach(isNew);
  return inherited.filter(isNew);
}

/**
 * Tells of each problem whether it is the first of those that say the same. Ten thousand channels may inherit one, so
 * that nothing is made of it but a comparison with those that begin at the same place.
 */
function firstOfEach(): (problem: PlacedProblem) => boolean {
  const known = new Map<Entry, Map<number, PlacedProblem[]>>();
  return (problem) => {
    const { entry, start } = problem.place;
    let byStart = known.get(entry);
    if (!byStart) {
      byStart = new Map();
      known.set(entry, byStart);
    }
    const alike = byStart.get(start);
    if (!alike) {
      byStart.set(start, [problem]);
      return true;
    }
    if (alike.some((other) => saysTheSame(problem, other))) return false;
    alike.push(problem);
    return true;
  };
}

/** Two problems of one name at one place are the same, but that several keys may be missing there. */
function saysTheSame(one: PlacedProblem, other: PlacedProblem): boolean {
  return (
    one.problem.name === other.problem.name &&
    one.place.end === other.place.end &&
    missingKey(one) === missingKey(other)
  );
}

function missingKey({ problem }: PlacedProblem): string | undefined {
  return problem.cure?.kind === 'add-key' ? problem.cure.key : undefined;
}
