import { arrivalsOf } from '../chain/arrivals.ts';
import type { Arrival } from '../chain/model.ts';
import type { ChannelResult } from '../checks/channel-result.ts';
import { formatHz } from '../quantity/write.ts';
import { noiseOutcome } from './noise-outcome.ts';
import type { Search } from './search.ts';

/**
 * What comes of a change for what the finding is about: where the source arrives then, how much noise is left, or what
 * margin the channel has.
 */
export function outcomeOf(search: Search, after: ChannelResult): string {
  const { about, check } = search.context.finding;
  const { chain } = after;
  if (!chain) return '';
  const ofNoise = noiseOutcome(check, chain);
  if (ofNoise !== undefined) return ofNoise;
  const arrival =
    about === undefined ? undefined : loudest(arrivalsOf(chain).filter(({ source }) => source.name === about));
  if (about !== undefined && arrival) return `${about} ${whereabouts(arrival)}`;
  return `the margin is ${formatNumber(chain.margin)}`;
}

function whereabouts(arrival: Arrival): string {
  const recorded =
    arrival.recordedLowHz === arrival.recordedHighHz
      ? formatHz(arrival.recordedLowHz)
      : `${formatHz(arrival.recordedLowHz)} .. ${formatHz(arrival.recordedHighHz)}`;
  if (!arrival.inBand) return `arrives at ${recorded}, outside the band`;
  if (!arrival.folded) return `arrives at ${recorded}, unfolded`;
  return `arrives at ${recorded}, within the limit`;
}

/** Of what arrives, the piece that decides: in the band before outside it, folded before native, then the highest. */
function loudest(arrivals: readonly Arrival[]): Arrival | undefined {
  let found: Arrival | undefined;
  for (const arrival of arrivals) if (!found || isLouder(arrival, found)) found = arrival;
  return found;
}

function isLouder(a: Arrival, b: Arrival): boolean {
  const rank = ({ inBand, folded }: Arrival): number => (inBand && folded ? 2 : inBand ? 0 : 1);
  return rank(a) - rank(b) > 0 || (rank(a) === rank(b) && a.level > b.level);
}

/** What a change does to the amount of data: `data x2`. */
export function dataCost(before: number, after: number): string {
  return `data x${formatNumber(after / before)}`;
}

/** Three significant digits, no more. */
export function formatNumber(value: number): string {
  return String(Number(value.toPrecision(3)));
}
