import { KIND_OF_SECTION } from './entry.ts';
import type { Environment } from './environment.ts';
import { clipped } from './fields.ts';
import type { Source } from './model.ts';
import type { NameUses } from './name-uses.ts';
import type { Place } from './place.ts';
import type { PlacedProblem } from './placed-problem.ts';
import { placedProblem } from './reader.ts';

/** Kinds whose things do nothing unless they are named. A source is heard by all who don't say otherwise. */
const USED_BY_NAME = ['clock', 'digitizer', 'sensor', 'filter', 'group'] as const;

/**
 * Named things that neither a channel nor `defaults` nor another thing names, and sources that no channel hears. A file
 * without channels holds things for others to name: nothing is said of it, and neither is anything of used files.
 */
export function unusedNames(environment: Environment, uses: NameUses): readonly PlacedProblem[] {
  if (uses.channels.length === 0) return [];
  const byThings = namedByThings(environment);
  const said: PlacedProblem[] = [];
  for (const kind of USED_BY_NAME) {
    const byChannels = uses.counts.get(kind);
    for (const { name, place } of environment.core.scope.things[kind].values()) {
      if (!environment.core.readings.has(place.entry)) continue;
      if (byChannels?.has(name) || byThings.has(`${kind} ${name}`)) continue;
      said.push(unused(place, `Nothing names the ${kind} \`${clipped(name)}\`, so it has no part in any channel.`));
    }
  }
  for (const { name, place } of unheardByAll(environment, uses)) {
    said.push(unused(place, `No channel hears the source \`${clipped(name)}\`, so it has no part in the check.`));
  }
  return said;
}

function unused(place: Place, message: string): PlacedProblem {
  return placedProblem({ name: 'unused-name', place, message });
}

/** What things and `defaults` look up, in text that they inherit too, as `kind name`. */
function namedByThings({ core }: Environment): ReadonlySet<string> {
  const named = new Set<string>();
  for (const [entry, { dependencies }] of core.readings) {
    for (const { kind, name } of dependencies.lookups) {
      const isItself = name === entry.name && entry.section && KIND_OF_SECTION[entry.section] === kind;
      if (!isItself) named.add(`${kind} ${name}`);
    }
  }
  return named;
}

/** Sources that every channel leaves out; those left out for their quantity are told elsewhere. */
function unheardByAll({ sources, core }: Environment, { channels }: NameUses): Iterable<Source> {
  const silent = new Set([...sources.values()].filter(({ place }) => core.readings.has(place.entry)));
  let before: readonly object[] | undefined;
  for (const { reading } of channels) {
    if (silent.size === 0) break;
    const { channel } = reading;
    // Channels that hear all share one list.
    if (channel.heard === before) continue;
    before = channel.heard;
    for (const { source } of channel.heard) silent.delete(source);
    for (const source of channel.unheard) silent.delete(source);
  }
  return silent;
}
