import { chainPhaseOf, filterPhaseOf, keepsFrequencies } from '../chain/chain-phase.ts';
import type { Chain } from '../chain/model.ts';
import type { FilterPlace } from '../picture/filter-place.ts';
import { formatHz, formatQuantity } from '../quantity/write.ts';

/** How late a filter is where its channel's band begins and ends, in a sentence; none where it meets other frequencies. */
export function filterDelayWords({ chain, filter, stage }: FilterPlace): string | undefined {
  if (stage > 0 && !keepsFrequencies(chain)) return undefined;
  const phase = filterPhaseOf(chain, stage, filter);
  if (!phase) return 'Its phase is not known, and so neither is its delay.';
  const { bandLowHz, bandHighHz } = chain;
  const low = `${delayText(phase.groupDelayS(bandLowHz))} at low frequency (${formatHz(bandLowHz)})`;
  const high = `${delayText(phase.groupDelayS(bandHighHz))} at the band's top (${formatHz(bandHighHz)})`;
  const isTakenOut = stage > 0 && chain.channel.digitizer?.delayCompensated === true;
  return `Group delay: ${low}, ${high}${isTakenOut ? '; the time stamps are put right by it' : ''}.`;
}

/** How late a chain is at mid band; `undefined` where that can't be told. */
export function chainDelayWords(chain: Chain): string | undefined {
  const phase = chainPhaseOf(chain);
  if (!phase) return undefined;
  const middleHz = (chain.bandLowHz + chain.bandHighHz) / 2;
  const apart = phase.untold.length === 0 ? '' : ', filters of unknown phase apart';
  return `group delay ${delayText(phase.whole.groupDelayS(middleHz))} at mid band (${formatHz(middleHz)})${apart}`;
}

/** A time with its sign; what is less than a femtosecond is rounding. */
export function delayText(seconds: number): string {
  return Math.abs(seconds) < 1e-15 ? '0 s' : formatQuantity(seconds, 'time', 4);
}
