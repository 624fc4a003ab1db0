import type { Core } from './core.ts';
import { type Dependencies, dependenciesHold, followedAliases } from './dependencies.ts';
import type { Entry } from './entry.ts';
import { yamlProblem } from './entry-problems.ts';
import type { Environment } from './environment.ts';
import { namePlace, noteNotComputed, readEntryFields } from './fields.ts';
import type { Channel } from './model.ts';
import type { PlacedProblem } from './placed-problem.ts';
import { addDefaults, channelOf, reportMissingChannelKeys } from './read-channel.ts';
import { type Mention, startReading } from './reader.ts';

/** A channel as read, what was wrong with it, and what the reading looked at. */
export interface ChannelReading {
  readonly entry: Entry;
  readonly channel: Channel;
  /** What is wrong in the channel's own text. */
  readonly problems: readonly PlacedProblem[];
  /** What is wrong in text that it inherits: to be said once, at its origin, however many inherit it. */
  readonly origin: readonly PlacedProblem[];
  /** Keys of its own that are known but not computed: to be said once for each key of the file. */
  readonly notComputed: readonly PlacedProblem[];
  /** Where it names things in its own text. */
  readonly mentions: readonly Mention[];
  readonly dependencies: ChannelDependencies;
}

/** A channel, as far as the rig file is concerned: what was read of it. */
export interface KnownChannel {
  readonly reading: ChannelReading;
}

interface ChannelDependencies extends Dependencies {
  readonly sources: Core['scope']['sources'];
  readonly defaults: Core['defaults'];
  /**
   * The latest core that the reading is known to hold for. A memo: a reading that holds for two cores is the same
   * for both, so it does not matter which one stands here.
   */
  holdsFor: Core;
}

const NONE: readonly never[] = [];
const BRACE_RANGE = /\{\d+\.\.\d+\}/;

/** Reads a channel. */
export function readChannel(entry: Entry, environment: Environment): ChannelReading {
  const { core } = environment;
  const reader = startReading(entry, core.scope, environment.epochOf(entry));
  for (const problem of entry.problems) reader.own.push(yamlProblem(entry, problem));
  if (entry.name.includes('{') && BRACE_RANGE.test(entry.name))
    noteNotComputed(reader, 'a brace range in a name', namePlace(entry));
  const fields = readEntryFields(reader, 'channel');
  addDefaults(fields, core.defaults);
  reportMissingChannelKeys(reader, fields);
  const channel = channelOf(reader, fields);
  return {
    entry,
    channel,
    problems: orNone(reader.own),
    origin: orNone(reader.origin),
    notComputed: orNone(reader.notComputed),
    mentions: orNone(reader.mentions),
    dependencies: {
      lookups: orNone(reader.lookups),
      anchors: followedAliases(reader) ? core.scope.anchors : undefined,
      epoch: reader.epoch,
      sources: core.scope.sources,
      defaults: core.defaults,
      holdsFor: core,
    },
  };
}

/** Spares ten thousand channels an empty list each. */
function orNone<T>(items: readonly T[]): readonly T[] {
  return items.length === 0 ? NONE : items;
}

/**
 * Whether a reading is what reading the same entry in this environment would give: everything that it looked at is
 * the very same object. Takes the same short time whatever the file's size where only channels have changed.
 */
export function stillHolds(reading: ChannelReading, environment: Environment): boolean {
  const { dependencies, entry } = reading;
  const { core } = environment;
  const epoch = environment.epochOf(entry);
  if (dependencies.holdsFor === core) return entry.aliases.length === 0 || dependencies.epoch === epoch;
  if (dependencies.sources !== core.scope.sources || dependencies.defaults !== core.defaults) return false;
  if (!dependenciesHold(dependencies, core.scope, epoch)) return false;
  dependencies.holdsFor = core;
  return true;
}
