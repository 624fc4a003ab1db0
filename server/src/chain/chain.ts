import type { Channel } from '../rig/model.ts';
import { chainAt } from './chain-at.ts';
import type { Chain } from './model.ts';
import { perTurnStepOf } from './shaft-speed.ts';
import { chainAtWorstSpeed } from './worst-speed.ts';

/**
 * A channel's signal chain; `undefined` for a channel whose rate or band is missing. One that is resampled to shaft
 * angle has a chain for every speed, of which the worst is given.
 */
export function chainOf(channel: Channel): Chain | undefined {
  const step = perTurnStepOf(channel);
  return step ? chainAtWorstSpeed(channel, step) : chainAt(channel);
}
