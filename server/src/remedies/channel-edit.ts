import type { ChannelResult } from '../checks/channel-result.ts';
import type { Channel, Given } from '../rig/model.ts';
import type { Proposal } from './definition.ts';
import { replaceScalar, setEntryKey } from './edit-text.ts';
import type { Search } from './search.ts';
import type { NewValue } from './written-value.ts';

export type Edited = Pick<Proposal, 'edits' | 'shared'>;

/**
 * Edits that give the finding's channel a value for a key: over its own value, or as a key of its own where it has the
 * value from elsewhere. In the latter case also the edit of the origin, for all channels that have it from there.
 *
 * @param of the same value of any channel: those whose value stands at the same place share it
 */
export function channelValue(
  search: Search,
  key: string,
  of: (channel: Channel) => Given<unknown> | undefined,
  value: NewValue,
): Edited | undefined {
  const { channel } = search;
  if (!channel) return undefined;
  const { snapshot } = search.context;
  const given = of(channel);
  const { entry } = channel.place;
  if (given && !given.inherited && given.place.entry === entry && typeof value === 'string') {
    const edit = replaceScalar(snapshot, given.place, value);
    return edit && { edits: [edit] };
  }
  const edits = setEntryKey(snapshot, entry, key, value);
  if (!edits) return undefined;
  const shared = given && typeof value === 'string' ? sharedValue(search, given, of, value) : undefined;
  return shared ? { edits, shared } : { edits };
}

function sharedValue(
  search: Search,
  given: Given<unknown>,
  of: (channel: Channel) => Given<unknown> | undefined,
  value: string,
): Proposal['shared'] {
  const { snapshot, results } = search.context;
  const edit = replaceScalar(snapshot, given.place, value);
  if (!edit) return undefined;
  const users = results.filter(({ channel }) => isSamePlace(of(channel), given));
  return users.length > 1 ? { edits: [edit], channels: channelsOf(users) } : undefined;
}

/** How many channels these are, each of a brace range counted. */
export function channelsOf(results: readonly ChannelResult[]): number {
  return results.reduce((sum, { channel }) => sum + channel.count, 0);
}

function isSamePlace(a: Given<unknown> | undefined, b: Given<unknown>): boolean {
  return a !== undefined && a.place.entry === b.place.entry && a.place.start === b.place.start;
}
