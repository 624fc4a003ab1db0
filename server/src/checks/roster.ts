import type { ChannelReading } from '../rig/channel-reading.ts';
import type { ChannelResult } from './channel-result.ts';

/** A channel as read and judged: what checks over many channels fold. */
export interface ChannelSummary {
  readonly reading: ChannelReading;
  readonly result: ChannelResult;
  /** What it has to do with others: see `partOf`. */
  readonly part: number;
}

/** What a channel has to do with others, one bit each: most of ten thousand have to do with few of these. */
const GROUPED = 1;
const SCANNED = 2;
const TOGETHER = 4;
const UNHEARING = 8;
const RANGED = 16;
const NOTED = 32;

/** The channels that each fold over all of them has to look at, in document order. */
export interface Roster {
  /** In a group. */
  readonly grouped: readonly ChannelSummary[];
  /** On a digitizer that takes its channels in turn. */
  readonly scanned: readonly ChannelSummary[];
  /** On a digitizer that can't run every rate beside every other. */
  readonly together: readonly ChannelSummary[];
  /** Those that leave a source out for its quantity. */
  readonly unhearing: readonly ChannelSummary[];
  /** Those whose entry stands for several. */
  readonly ranged: readonly ChannelSummary[];
  /** Those with something to say of text that they inherit, or of keys that are not computed. */
  readonly noted: readonly ChannelSummary[];
}

/** What a channel has to do with others, worked out once when it is judged. */
export function partOf(reading: ChannelReading, { channel }: Pick<ChannelResult, 'channel'>): number {
  const { digitizer } = channel;
  return (
    (channel.group ? GROUPED : 0) |
    (digitizer?.sampling?.value === 'scanned' ? SCANNED : 0) |
    (digitizer && digitizer.together.value !== 'free' ? TOGETHER : 0) |
    (channel.unheard.length > 0 ? UNHEARING : 0) |
    (channel.count > 1 ? RANGED : 0) |
    (reading.origin.length > 0 || reading.notComputed.length > 0 ? NOTED : 0)
  );
}

/** Sorts channels by what they have to do with others: one look at each, after every keystroke. */
export function rosterOf(channels: readonly ChannelSummary[]): Roster {
  const lists: readonly (readonly [number, ChannelSummary[]])[] = [
    [GROUPED, []],
    [SCANNED, []],
    [TOGETHER, []],
    [UNHEARING, []],
    [RANGED, []],
    [NOTED, []],
  ];
  for (const one of channels) {
    if (one.part === 0) continue;
    for (const [bit, list] of lists) if (one.part & bit) list.push(one);
  }
  const [grouped, scanned, together, unhearing, ranged, noted] = lists.map(([, list]) => list);
  return {
    grouped: grouped!,
    scanned: scanned!,
    together: together!,
    unhearing: unhearing!,
    ranged: ranged!,
    noted: noted!,
  };
}
