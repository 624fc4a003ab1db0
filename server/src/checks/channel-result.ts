import type { Chain } from '../chain/model.ts';
import type { Acceptance } from '../rig/acceptance.ts';
import type { Channel } from '../rig/model.ts';
import type { Finding } from './finding.ts';

/** Runs a check so that one that throws costs only itself: the workbench hands it in and logs what was caught. */
export type Guard = <T>(checkName: string, run: () => T, otherwise: T) => T;

/** A channel as judged. Arrivals are not kept (10,000 channels): `arrivalsOf(chain)` makes them again when asked. */
export interface ChannelResult {
  readonly channel: Channel;
  readonly chain: Chain | undefined;
  /** By severity, then position. */
  readonly findings: readonly Finding[];
  /** The items of `accept` that are about any of them, where there are any. */
  readonly acceptances?: readonly Acceptance[];
}
