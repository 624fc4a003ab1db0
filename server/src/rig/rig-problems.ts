import type { ChannelReading } from './channel-reading.ts';
import type { Environment } from './environment.ts';
import { clipped } from './fields.ts';
import type { Place } from './place.ts';
import type { PlacedProblem } from './placed-problem.ts';
import { type Lookup, placedProblem } from './reader.ts';
import type { ThingKind } from './vocabulary-kinds.ts';

/**
 * Everything that is wrong with the text of a rig file and is no one channel's: problems outside the channels,
 * problems of inherited text (once, at their origin), keys that are not computed (once each), and names that nobody
 * names.
 *
 * @param readings of every channel, in document order
 */
export function rigProblems(environment: Environment, readings: readonly ChannelReading[]): readonly PlacedProblem[] {
  return [
    ...environment.problems,
    ...inheritedProblems(environment, readings),
    ...notComputedOnce(environment, readings),
    ...unusedNames(environment, readings),
  ];
}

/** Problems of text that others inherit, but for those that the entry they stand in tells of itself. */
function inheritedProblems(environment: Environment, readings: readonly ChannelReading[]): readonly PlacedProblem[] {
  const inherited = [...environment.core.origin];
  for (const { origin } of readings) if (origin.length > 0) inherited.push(...origin);
  if (inherited.length === 0) return inherited;
  const said = new Map<object, Set<string>>();
  const sayOnce = ({ problem, place }: PlacedProblem): boolean => {
    const identity = `${problem.name} ${place.start} ${place.end} ${problem.name === 'missing-key' ? problem.about : ''}`;
    let known = said.get(place.entry);
    if (!known) {
      known = new Set();
      said.set(place.entry, known);
    }
    const isNew = !known.has(identity);
    known.add(identity);
    return isNew;
  };
  const origins = new Set(inherited.map(({ place }) => place.entry));
  for (const problem of environment.problems) sayOnce(problem);
  for (const { entry, problems } of readings) if (origins.has(entry)) problems.forEach(sayOnce);
  return inherited.filter(sayOnce);
}

function notComputedOnce(environment: Environment, readings: readonly ChannelReading[]): readonly PlacedProblem[] {
  const first = new Map<string | undefined, PlacedProblem>();
  const note = (problem: PlacedProblem): void => {
    if (!first.has(problem.problem.about)) first.set(problem.problem.about, problem);
  };
  environment.notComputed.forEach(note);
  for (const { notComputed } of readings) if (notComputed.length > 0) notComputed.forEach(note);
  return [...first.values()];
}

/** Kinds whose things do nothing unless they are named. A source is heard by all who don't say otherwise. */
const USED_BY_NAME = ['clock', 'digitizer', 'sensor', 'filter'] as const;

function unusedNames(environment: Environment, readings: readonly ChannelReading[]): readonly PlacedProblem[] {
  // A file without channels holds things for others to name.
  if (readings.length === 0) return [];
  const { things } = environment.core.scope;
  const unused = new Map<ThingKind, Map<string, Place>>(
    USED_BY_NAME.map((kind) => [
      kind,
      new Map([...things[kind].values()].map(({ name, place }): [string, Place] => [name, place])),
    ]),
  );
  for (const { kind, name } of environment.mentions) unused.get(kind)?.delete(name);
  for (const { dependencies } of environment.core.readings.values()) dropLookedUp(unused, dependencies.lookups);
  let left = 0;
  for (const names of unused.values()) left += names.size;
  for (const { dependencies } of readings) {
    if (left === 0) break;
    left -= dropLookedUp(unused, dependencies.lookups);
  }
  return [...unused].flatMap(([kind, names]) => [...names].map(([name, place]) => unusedName(kind, name, place)));
}

/** Takes out what was looked up, inherited text included; how many names that were. */
function dropLookedUp(unused: ReadonlyMap<ThingKind, Map<string, Place>>, lookups: readonly Lookup[]): number {
  let dropped = 0;
  for (const lookup of lookups) if ('name' in lookup && unused.get(lookup.kind)?.delete(lookup.name)) dropped++;
  return dropped;
}

function unusedName(kind: ThingKind, name: string, place: Place): PlacedProblem {
  return placedProblem({
    name: 'unused-name',
    place,
    message: `No channel, and nothing that a channel names, names the ${kind} \`${clipped(name)}\`.`,
    about: name,
  });
}
