// CONTRACT BY THE LEAD (helper on chain/checks: please fill in; the signatures are used by workbench/ and remedies/).
import type { Chain } from '../chain/model.ts';
import type { Channel } from '../rig/model.ts';
import type { ChannelReading } from '../rig/channel-reading.ts';
import type { Environment } from '../rig/environment.ts';
import type { Finding, Severity } from './finding.ts';

/** Runs a check so that one that throws costs only itself: the workbench hands it in and logs what was caught. */
export type Guard = <T>(checkName: string, run: () => T, otherwise: T) => T;

/** A channel as judged. Arrivals are not kept (10,000 channels): `arrivalsOf(chain)` makes them again when asked. */
export interface ChannelResult {
  readonly channel: Channel;
  readonly chain: Chain | undefined;
  /** By severity, then position. */
  readonly findings: readonly Finding[];
}

/** Judges one channel: the reader's problems as findings, and every channel check. `severities` holds overrides by check name (`off` drops). */
export declare function judgeChannel(reading: ChannelReading, severities: Environment['severities'], guard: Guard): ChannelResult;

/** As `judgeChannel`, for a channel that a search has made up (no text, no problems of reading). */
export declare function judgeModel(channel: Channel, severities: Environment['severities'], guard: Guard): ChannelResult;

/**
 * Folds over all channels: rates-conflict, unused-name, not-computed, duplicates, problems of everything but channels. Must cost only a few ms
 * for 10,000 channels (it runs after every keystroke).
 */
export declare function judgeRig(
  environment: Environment,
  channels: readonly { readonly reading: ChannelReading; readonly result: ChannelResult }[],
  guard: Guard,
): readonly Finding[];

export type { Severity };
