import type { ScannedChannel } from '../chain/scan.ts';
import type { SaidOfRig } from '../checks/check.ts';
import { type RigTime, timeFrom } from '../checks/rig-time.ts';
import { skews } from '../checks/scan-skew.ts';
import { ratesTogether } from '../checks/scanned-rates.ts';
import { shortSettlings } from '../checks/settling-short.ts';
import { formatHz } from '../quantity/write.ts';
import type { Channel } from '../rig/model.ts';
import type { Proposal } from './definition.ts';
import { dataCost } from './describe.ts';
import { rateEdits, sampledAt } from './rates.ts';
import { firstCured, type Search } from './search.ts';

/** What is said of a scan and depends on the rates of all its channels, and what another rate does for it. */
interface ScanFold {
  readonly says: (time: RigTime) => readonly SaidOfRig[];
  readonly outcome: string;
}

const FOLDS: ReadonlyMap<string, ScanFold> = new Map([
  ['rate-over-converter', { says: ratesTogether, outcome: 'the scan fits the converter' }],
  ['settling-short', { says: shortSettlings, outcome: 'the input has time to settle' }],
  ['scan-skew', { says: skews, outcome: 'the group is sampled close enough together' }],
]);

/** Whether a finding is about a scan, which no channel decides by itself. */
export function isOfScan({ channel, context: { finding } }: Search): boolean {
  return FOLDS.has(finding.check) && finding.about !== undefined && channel?.digitizer?.sampling?.value === 'scanned';
}

/**
 * The rate nearest today's that cures what is said of a scan, for the channel alone, and for all that have their rate
 * from where it has it.
 *
 * @param rates from today's on, in the direction that helps: the further, the more
 */
export function scanProposals(search: Search, rates: readonly number[]): readonly Proposal[] {
  const { channel, context } = search;
  const today = channel?.rateHz?.value;
  const fold = FOLDS.get(context.finding.check);
  if (!channel || today === undefined || !fold) return [];
  const chosen = new Set<number>();
  for (const isMeant of [(other: Channel) => other === channel, (other: Channel) => hasSameRate(other, channel)]) {
    const from = firstOf(rates, (hz) => isGone(search, fold, isMeant, hz));
    const found = firstCured(search, rates.slice(from), (hz) => sampledAt(channel, hz));
    if (found) chosen.add(found.value);
  }
  return [...chosen].flatMap((hz): readonly Proposal[] => {
    const edited = rateEdits(search, hz);
    if (!edited) return [];
    return [{ does: `Sample at ${formatHz(hz)}`, outcome: `${fold.outcome} (${dataCost(today, hz)})`, ...edited }];
  });
}

function hasSameRate({ rateHz }: Channel, { rateHz: given }: Channel): boolean {
  return rateHz?.place.entry === given?.place.entry && rateHz?.place.start === given?.place.start;
}

/** Whether nothing would be said of the finding's scan or group if some of the channels were sampled at another rate. */
function isGone({ context }: Search, { says }: ScanFold, isMeant: (channel: Channel) => boolean, hz: number): boolean {
  const { environment, results, finding } = context;
  const channels = results.map(
    ({ channel, chain }): ScannedChannel => ({
      channel,
      chain: chain && isMeant(channel) ? { ...chain, rateHz: hz } : chain,
    }),
  );
  return says(timeFrom(environment, channels)).every(({ about }) => about !== finding.about);
}

/** The index of the first value that holds, of values that hold from one on; their number where none does. */
function firstOf<T>(values: readonly T[], holds: (value: T) => boolean): number {
  let low = 0;
  let high = values.length;
  while (low < high) {
    const middle = Math.floor((low + high) / 2);
    if (holds(values[middle]!)) high = middle;
    else low = middle + 1;
  }
  return low;
}
