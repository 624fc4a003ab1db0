import { reportChannelRange } from './channel-range.ts';
import type { Core } from './core.ts';
import { type Dependencies, dependenciesHold, dependenciesOf } from './dependencies.ts';
import type { Entry } from './entry.ts';
import { yamlProblem } from './entry-problems.ts';
import type { Environment } from './environment.ts';
import { readEntryFields } from './fields.ts';
import type { Channel } from './model.ts';
import { addDefaults, channelOf, reportMissingChannelKeys } from './read-channel.ts';
import { type Noted, notedBy, startReading } from './reader.ts';

/** A channel as read, what was wrong with it, and what the reading looked at. */
export interface ChannelReading extends Noted {
  readonly entry: Entry;
  readonly channel: Channel;
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

/** Reads a channel. */
export function readChannel(entry: Entry, environment: Environment): ChannelReading {
  const { core } = environment;
  const reader = startReading(entry, core.scope, environment.epochOf(entry));
  for (const problem of entry.problems) reader.own.push(yamlProblem(entry, problem));
  reportChannelRange(reader);
  const fields = readEntryFields(reader, 'channel');
  addDefaults(fields, core.defaults);
  reportMissingChannelKeys(reader, fields);
  const channel = channelOf(reader, fields);
  return {
    entry,
    channel,
    ...notedBy(reader),
    dependencies: {
      ...dependenciesOf(reader),
      sources: core.scope.sources,
      defaults: core.defaults,
      holdsFor: core,
    },
  };
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
