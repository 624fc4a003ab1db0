import type { Chain } from '../chain/model.ts';
import { formatHz } from '../quantity/write.ts';
import { type BandpassBand, type RateWindow, rateAmongWindows, rateWindow } from '../signal/bandpass.ts';
import type { RateVerdict } from './rates.ts';

/** Windows that are told: the one that the rate is in or beside, and its neighbours. */
const MOST_WINDOWS = 3;

/** What a channel would be found to have at a rate, in a few words. */
export function verdictText({ errors, warnings, worst }: RateVerdict): string {
  return errors + warnings === 0 ? 'clean' : worst.join(', ');
}

/** At which rates a band that is folded on purpose stays whole; `undefined` for one that is not. */
export function windowsText({ isBandpass, bandLowHz, bandHighHz, path, rateHz }: Chain): string | undefined {
  if (!isBandpass) return undefined;
  const band: BandpassBand = { lowHz: bandLowHz, highHz: bandHighHz, rateTolerance: path.clockTolerance };
  const place = rateAmongWindows(band, rateHz);
  if (place.kind === 'none') return undefined;
  const middle = place.kind === 'inside' ? place.window.index : place.above.index;
  const told = Array.from({ length: MOST_WINDOWS }, (_, index) => rateWindow(band, middle + 1 - index));
  return `The band is whole at ${told
    .filter((window) => window !== undefined)
    .map(windowText)
    .join(', ')}.`;
}

function windowText({ lowRateHz, highRateHz, upright }: RateWindow): string {
  const rates =
    highRateHz === Infinity ? `${formatHz(lowRateHz)} and more` : `${formatHz(lowRateHz)} .. ${formatHz(highRateHz)}`;
  return upright ? rates : `${rates} (upside down)`;
}
