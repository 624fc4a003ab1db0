import type { Arrival, Chain } from '../chain/model.ts';
import type { Channel } from '../rig/model.ts';
import type { Finding, Severity } from './finding.ts';

/** Everything a check of one channel may look at. */
export interface ChannelView {
  readonly channel: Channel;
  /** `undefined` where the channel is not complete enough to have one. */
  readonly chain: Chain | undefined;
  readonly arrivals: readonly Arrival[];
}

/** What a check says; severity, channel and check name are filled in by the list that runs it. */
export type Said = Omit<
  Finding,
  'check' | 'severity' | 'channel' | 'thing' | 'stage' | 'about' | 'related' | 'figures' | 'excess'
> &
  Partial<Pick<Finding, 'stage' | 'about' | 'related' | 'figures' | 'excess'>>;

/** One check, as its file exports it: documentation, examples and the function. */
export interface Check<Kind extends 'channel' | 'rig'> {
  readonly name: string;
  readonly kind: Kind;
  readonly severity: Severity;
  /** One sentence: what it finds. */
  readonly finds: string;
  /** Why it matters to the data, in a paragraph. */
  readonly why: string;
  /** A rig file that shows it, and one that just doesn't. */
  readonly shows: string;
  readonly clean: string;
  readonly sources: readonly string[];
  readonly run: Kind extends 'channel' ? (view: ChannelView) => readonly Said[] : (rig: RigView) => readonly Finding[];
}

/**
 * The small summary of a channel that checks over many channels fold: rates one digitizer must run together.
 */
export interface ChannelSummary {
  readonly channel: Channel;
}

export interface RigView {
  readonly channels: readonly ChannelSummary[];
}
