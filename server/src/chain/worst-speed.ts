import type { Channel } from '../rig/model.ts';
import { arrivalsOf } from './arrivals.ts';
import { chainAt } from './chain-at.ts';
import type { Chain } from './model.ts';
import { atSpeed, type PerTurnStep, speedsToLookAt } from './shaft-speed.ts';

/**
 * The chain of a channel that is resampled to shaft angle, at the speed at which most is folded into its band. Its rate
 * is the number of samples a turn times the speed, so that every speed is a chain of its own. Where nothing folds, the
 * lowest speed, at which the record reaches least far.
 */
export function chainAtWorstSpeed(channel: Channel, step: PerTurnStep): Chain | undefined {
  const lowest = at(channel, step, step.speed.value.lowHz);
  if (!lowest || lowest.bandHighHz >= lowest.stages.at(-1)!.nyquistHz) return lowest;
  let worst = lowest;
  let worstDb = -Infinity;
  for (const speedHz of speedsToLookAt(channel, step, lowest.bandLowHz, lowest.bandHighHz)) {
    const chain = at(channel, step, speedHz);
    if (!chain) continue;
    for (const { folded, inBand, level } of arrivalsOf(chain)) {
      if (!folded || !inBand || level <= worstDb) continue;
      worst = chain;
      worstDb = level;
    }
  }
  return worstDb > worst.foldLimit ? worst : lowest;
}

function at(channel: Channel, step: PerTurnStep, speedHz: number): Chain | undefined {
  return chainAt(atSpeed(channel, step, speedHz));
}
