import type { Channel, Digitizer } from '../rig/model.ts';
import type { Chain } from './model.ts';

/** A channel, and its chain where it is complete enough to have one. */
export interface ScannedChannel {
  readonly channel: Channel;
  readonly chain: Chain | undefined;
}

/** What one converter does that takes its channels in turn. */
export interface Scan {
  readonly digitizer: Digitizer;
  /** In the order in which they are scanned. */
  readonly channels: readonly ScannedChannel[];
  /** From one conversion to the next; `undefined` where no channel has a rate to spread them over. */
  readonly intervalS: number | undefined;
  /** The greatest of their rates; 0 where none has one. */
  readonly fastestHz: number;
  /** Of all its channels together. */
  readonly sumHz: number;
}

/**
 * The scans of a rig, in the order of their first channels. Channels are scanned as they stand in the file; a slow one
 * has its turn in every scan all the same, so that a scan lasts no longer than the sample period of the fastest.
 */
export function scansOf(channels: readonly ScannedChannel[]): readonly Scan[] {
  const scanned = new Map<Digitizer, ScannedChannel[]>();
  for (const one of channels) {
    const { digitizer } = one.channel;
    if (digitizer?.sampling?.value !== 'scanned') continue;
    const others = scanned.get(digitizer);
    if (others) others.push(one);
    else scanned.set(digitizer, [one]);
  }
  return [...scanned].map(([digitizer, members]) => scanOf(digitizer, members));
}

/**
 * How late channels are by their turns in a scan, asked of all of them in document order: 0 where all are sampled at
 * once, `undefined` where nobody can tell.
 */
export function scanDelays(scans: readonly Scan[]): (channel: Channel) => number | undefined {
  const turns = new Map(scans.map(({ digitizer, intervalS }) => [digitizer, { intervalS, next: 0 }]));
  return ({ digitizer }) => {
    const turn = digitizer && turns.get(digitizer);
    if (!turn) return 0;
    const index = turn.next++;
    return turn.intervalS === undefined ? undefined : index * turn.intervalS;
  };
}

/** The rate that a channel is sampled at; `undefined` where it has none. */
function rateOf({ channel, chain }: ScannedChannel): number | undefined {
  return chain?.rateHz ?? channel.rateHz?.value;
}

function scanOf(digitizer: Digitizer, channels: readonly ScannedChannel[]): Scan {
  let fastestHz = 0;
  let sumHz = 0;
  for (const one of channels) {
    const rateHz = rateOf(one) ?? 0;
    fastestHz = Math.max(fastestHz, rateHz);
    sumHz += rateHz;
  }
  const spreadS = fastestHz > 0 ? 1 / (channels.length * fastestHz) : undefined;
  return { digitizer, channels, intervalS: digitizer.scanIntervalS?.value ?? spreadS, fastestHz, sumHz };
}
