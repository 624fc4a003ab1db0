import type { Scan } from '../chain/scan.ts';
import { type RigFold, SAYS_NOTHING, type SaidOfRig } from './check.ts';
import { rateOverConverter } from './rate-over-converter.ts';
import { type RigTime, timeOf } from './rig-time.ts';
import { standingOn } from './standing.ts';
import { rateText } from './wording.ts';

/** Relative. */
const ROUNDING = 1e-12;

/**
 * What `rate-over-converter` says of scanned digitizers, whose `max-rate` is for all their channels together: once for
 * each, at the first of its fastest channels.
 */
export const scannedRates: RigFold = {
  name: rateOverConverter.name,
  severity: rateOverConverter.severity,
  run: (rig) => ratesTogether(timeOf(rig)),
};

/** What it says of scans. */
export function ratesTogether({ scans }: RigTime): readonly SaidOfRig[] {
  return scans.flatMap(sumOf);
}

function sumOf({ digitizer, channels, count, sumHz, fastestHz }: Scan): readonly SaidOfRig[] {
  const most = digitizer.maxRateHz;
  if (!most || sumHz <= most.value * (1 + ROUNDING)) return SAYS_NOTHING;
  const fastest = channels.find(({ channel, chain }) => (chain?.rateHz ?? channel.rateHz?.value) === fastestHz);
  if (!fastest) return SAYS_NOTHING;
  const { channel } = fastest;
  const standing = standingOn(channel, channel.rateHz);
  const all = count === 1 ? 'its one channel' : `its ${count.toLocaleString('en')} channels`;
  return [
    {
      channel: channel.name,
      about: digitizer.name,
      message: `\`${digitizer.name}\` will not sample ${all} in turn at ${rateText(sumHz)} altogether: its greatest rate is ${rateText(most.value)}.`,
      place: standing.place,
      related: [...standing.related, { place: most.place, message: 'The greatest rate stands here.' }],
      figures: { rateHz: sumHz, maxRateHz: most.value, channels: count },
      excess: sumHz / most.value,
    },
  ];
}
