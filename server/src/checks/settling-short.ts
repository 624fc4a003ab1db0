import type { Chain } from '../chain/model.ts';
import type { Scan, ScannedChannel } from '../chain/scan.ts';
import { formatQuantity } from '../quantity/write.ts';
import type { Digitizer } from '../rig/model.ts';
import { decibels } from '../signal/decibel.ts';
import { type Check, SAYS_NOTHING, type SaidOfRig } from './check.ts';
import type { RelatedPlace } from './finding.ts';
import { timeText } from './group-finding.ts';
import { type RigTime, timeOf } from './rig-time.ts';
import { standingOn } from './standing.ts';
import { levelText } from './wording.ts';

const ROUNDING_DB = 1e-9;
/** Of one time constant. */
const DECIBELS_PER_CONSTANT = 20 * Math.LOG10E;

/** What its neighbour in the scan leaves in a channel. */
interface Leftover {
  readonly channel: ScannedChannel;
  /** The time that the input has to settle. */
  readonly settlesS: number;
  /** In dB. */
  readonly excess: number;
}

export const settlingShort: Check<'rig'> = {
  name: 'settling-short',
  kind: 'rig',
  severity: 'warning',
  finds: 'The input of a scanned digitizer has no time to settle from one channel to the next.',
  why: 'When the switch moves on, the input still stands where the channel before it left it, and comes to the new value with a time constant of its own. What is left when the converter takes its sample is a part of the neighbour, in the band like the signal itself: no filter takes it out, and it looks as if the channels were coupled. A neighbour at full scale is assumed, and the larger of half a step of the converter and `fold-limit` is allowed.',
  shows: `rig: Tower
digitizers:
  scanner: { sampling: scanned, scan-interval: 10 us, settling: 2 us, bits: 16, full-scale: ±10 V }
defaults: { digitizer: scanner, rate: 10 kHz, band: 1 Hz .. 1 kHz, undeclared: -90 dBFS }
channels:
  base: {}
  top: {}
`,
  clean: `rig: Tower
digitizers:
  # 7 time constants leave 0.09 %, and 0.1 % may fold where nothing is said.
  scanner: { sampling: scanned, scan-interval: 14 us, settling: 2 us, bits: 16, full-scale: ±10 V }
defaults: { digitizer: scanner, rate: 10 kHz, band: 1 Hz .. 1 kHz, undeclared: -90 dBFS }
channels:
  base: {}
  top: {}
`,
  sources: ['Horowitz and Hill, The Art of Electronics: exp(-t / time constant) is left after a time t (from memory).'],
  run: (rig) => shortSettlings(timeOf(rig)),
};

/** What `settling-short` says of scans. */
export function shortSettlings({ scans }: RigTime): readonly SaidOfRig[] {
  return scans.flatMap(shortOf);
}

function shortOf(scan: Scan): readonly SaidOfRig[] {
  const { digitizer, channels, count, intervalS, fastestHz } = scan;
  const constantS = digitizer.settlingS?.value;
  if (constantS === undefined || intervalS === undefined || count < 2) return SAYS_NOTHING;
  // The first one of a scan has the rest of the sample period, behind the last.
  const restS = fastestHz > 0 ? 1 / fastestHz - (count - 1) * intervalS : intervalS;
  let worst: Leftover | undefined;
  let short = 0;
  for (let index = 0; index < channels.length; index++) {
    const { channel } = channels[index]!;
    const settlesS = index === 0 && channel.count === 1 ? Math.max(restS, intervalS) : intervalS;
    const excess = excessOf(channels[index]!, settlesS / constantS);
    if (!(excess > ROUNDING_DB)) continue;
    short += channel.count;
    if (!worst || excess > worst.excess) worst = { channel: channels[index]!, settlesS, excess };
  }
  return worst ? [saidOf(worst, short - worst.channel.channel.count, scan)] : SAYS_NOTHING;
}

/** Of a neighbour at full scale, on the chain's scale. */
function levelOf({ scale }: Chain, constants: number): number {
  return scale.fullScaleDb - DECIBELS_PER_CONSTANT * constants;
}

function halfStepOf({ scale }: Chain, digitizer: Digitizer | undefined): number {
  return digitizer?.bits ? scale.fullScaleDb - decibels(2) * digitizer.bits.value : -Infinity;
}

/** What is left over the limit in dB; of a channel without a chain nothing is known. */
function excessOf({ chain, channel }: ScannedChannel, constants: number): number {
  if (!chain) return -Infinity;
  return levelOf(chain, constants) - Math.max(chain.foldLimit, halfStepOf(chain, channel.digitizer));
}

function saidOf({ channel: scanned, settlesS, excess }: Leftover, others: number, scan: Scan): SaidOfRig {
  const { digitizer } = scan;
  const { channel } = scanned;
  const chain = scanned.chain!;
  const constants = settlesS / digitizer.settlingS!.value;
  const level = levelOf(chain, constants);
  const halfStep = halfStepOf(chain, digitizer);
  const limit = Math.max(chain.foldLimit, halfStep);
  const limitIs = halfStep > chain.foldLimit ? 'half a step of the converter' : '`fold-limit`';
  const more =
    others === 0
      ? ''
      : others === 1
        ? ' It is so in 1 other of its channels too.'
        : ` It is so in ${others.toLocaleString('en')} others of its channels too.`;
  const standing = standingOn(channel, { place: channel.digitizerPlace ?? channel.place });
  return {
    channel: channel.name,
    about: digitizer.name,
    message: `${formatQuantity(Math.exp(-constants), 'ratio', 3)} of the channel that is scanned before it will be left in this one: \`${digitizer.name}\` gives its input ${timeText(settlesS)} to settle, which is ${formatQuantity(constants, 'number', 3)} time constants. Of a full-scale neighbour that is ${levelText(level, chain)}, and the limit is ${levelText(limit, chain)} (${limitIs}).${more}`,
    place: standing.place,
    related: [...standing.related, ...placesOf(scan)],
    figures: { settlesS, left: Math.exp(-constants), level, limit },
    excess,
  };
}

function placesOf({ digitizer }: Scan): readonly RelatedPlace[] {
  const { settlingS, scanIntervalS, sampling } = digitizer;
  const interval = scanIntervalS ?? sampling;
  const intervalMessage = scanIntervalS
    ? 'The time from one channel to the next stands here.'
    : 'Its channels are spread evenly over the sample period, in turn.';
  return [
    ...(settlingS ? [{ place: settlingS.place, message: 'The time constant stands here.' }] : []),
    ...(interval ? [{ place: interval.place, message: intervalMessage }] : []),
  ];
}
