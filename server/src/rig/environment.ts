import type { Acceptance } from './acceptance.ts';
import { sameItems } from './anchors.ts';
import { ChannelNames } from './channel-names.ts';
import { type Core, readCore } from './core.ts';
import type { Entry } from './entry.ts';
import { tooManyChannels, yamlProblem } from './entry-problems.ts';
import { epochsOf } from './epochs.ts';
import type { Clock, Digitizer, Filter, Given, Group, Run, Sensor, Source } from './model.ts';
import type { PlacedProblem } from './placed-problem.ts';
import type { SeverityChoice } from './read-top-level.ts';
import type { Mention } from './reader.ts';
import type { Snapshot } from './snapshot.ts';
import { NO_USED_FILES, type UsedFiles } from './used-things.ts';

export type { SeverityChoice } from './read-top-level.ts';
export type { Mention } from './reader.ts';

/**
 * A rig file without its channels: everything that they name, inherit, or share; the things of used files among it,
 * behind its own.
 *
 * Environments share whatever an edit leaves alone, object by object: a thing is the same object as before where its
 * text and everything it names are.
 */
export interface Environment {
  readonly clocks: ReadonlyMap<string, Clock>;
  readonly digitizers: ReadonlyMap<string, Digitizer>;
  readonly sensors: ReadonlyMap<string, Sensor>;
  readonly filters: ReadonlyMap<string, Filter>;
  /** Those that could be read, `mains` included, in document order. */
  readonly sources: ReadonlyMap<string, Source>;
  readonly groups: ReadonlyMap<string, Group>;
  /** The top-level entry `defaults`. */
  readonly defaults: Entry | undefined;
  readonly acceptances: readonly Acceptance[];
  readonly severities: ReadonlyMap<string, SeverityChoice>;
  readonly rigName: Given<string> | undefined;
  readonly run: Run | undefined;
  /** Of everything but the channels; of these, only that a name stands there twice. */
  readonly problems: readonly PlacedProblem[];
  /** Keys outside the channels that are known but not computed. */
  readonly notComputed: readonly PlacedProblem[];
  /** Where things are named by things, or by `defaults`. */
  readonly mentions: readonly Mention[];
  /** The first channel of each name, in document order. */
  readonly channelEntries: readonly Entry[];
  /** Everything above but the channels; the same object as before where all of it is. */
  readonly core: Core;
  /** How many anchor-setting entries stand before an entry that follows aliases. */
  readonly epochOf: (entry: Entry) => number;
  /** What the next reading can grow out of. */
  readonly sorting: Sorting;
}

/**
 * Reads everything but the channels.
 *
 * @param checkNames the names that `checks` may hold
 * @param previous an environment of an earlier text, whose unchanged parts are kept; the answer is the same without
 * @param used what became of the files that the text uses; the same object as before where all of it is
 */
export function readEnvironment(
  snapshot: Snapshot,
  checkNames: readonly string[],
  previous?: Environment,
  used: UsedFiles = NO_USED_FILES,
): Environment {
  const { entries } = snapshot;
  const sorted = (previous && sortedAsBefore(entries, previous.sorting)) ?? sortEntries(entries);
  const { significant } = sorted;
  const old = previous?.core;
  const unchanged =
    old !== undefined &&
    old.used === used &&
    sameItems(old.significant, significant) &&
    sameItems(old.checkNames, checkNames);
  const epochs = epochsOf(snapshot.entries);
  const core = unchanged ? old : readCore(significant, checkNames, epochs, used, old);
  const { things } = core.scope;
  return {
    clocks: things.clock,
    digitizers: things.digitizer,
    sensors: things.sensor,
    filters: things.filter,
    sources: things.source,
    groups: things.group,
    defaults: core.defaultsEntry,
    acceptances: core.acceptances,
    severities: core.severities,
    rigName: core.rigName,
    run: core.run,
    problems: [...snapshot.problems, ...core.problems, ...sorted.problems],
    notComputed: core.notComputed,
    mentions: core.mentions,
    channelEntries: sorted.channels,
    core,
    epochOf: epochs.epochOf,
    sorting: { entries, sorted },
  };
}

/** The entries of a text, and how they were sorted. */
interface Sorting {
  readonly entries: readonly Entry[];
  readonly sorted: SortedEntries;
}

/**
 * The sorting where it is known from before, but for one channel that has kept its name: that is what typing in a
 * channel makes, and the names of ten thousand others need not be compared for it.
 */
function sortedAsBefore(entries: readonly Entry[], before: Sorting): SortedEntries | undefined {
  const { sorted } = before;
  if (entries.length !== before.entries.length || sorted.problems.length > 0) return undefined;
  let first = 0;
  while (first < entries.length && entries[first] === before.entries[first]) first++;
  let last = entries.length - 1;
  while (last > first && entries[last] === before.entries[last]) last--;
  if (first === entries.length) return sorted;
  const now = entries[first]!;
  const old = before.entries[first]!;
  if (first !== last || now.name !== old.name || !isPlainChannel(now) || !isPlainChannel(old)) return undefined;
  const channels = [...sorted.channels];
  const place = channels.indexOf(old);
  if (place < 0) return undefined;
  channels[place] = now;
  return { ...sorted, channels };
}

/** One that sets no anchor and stands for itself alone. */
function isPlainChannel({ section, key, name, anchors }: Entry): boolean {
  return section === 'channels' && key !== undefined && anchors.length === 0 && !name.includes('{');
}

interface SortedEntries {
  /** Everything that can matter to more than one channel: all entries but channels that set no anchor. */
  readonly significant: readonly Entry[];
  readonly channels: readonly Entry[];
  readonly problems: readonly PlacedProblem[];
}

function sortEntries(entries: readonly Entry[]): SortedEntries {
  const significant: Entry[] = [];
  const problems: PlacedProblem[] = [];
  const channels = new ChannelNames();
  for (const entry of entries) {
    if (entry.section !== 'channels') {
      significant.push(entry);
      continue;
    }
    if (entry.anchors.length > 0) significant.push(entry);
    if (entry.key === undefined) {
      for (const problem of entry.problems) problems.push(yamlProblem(entry, problem));
      continue;
    }
    // Of a channel that is not read its text is told all the same.
    if (!channels.take(entry)) for (const problem of entry.problems) problems.push(yamlProblem(entry, problem));
  }
  problems.push(...channels.problems);
  if (channels.beyond) problems.push(tooManyChannels(channels.beyond));
  return { significant, channels: channels.entries, problems };
}
