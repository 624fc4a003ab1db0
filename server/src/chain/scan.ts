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
  /** In the order in which they are scanned; one with a brace range has as many turns as it stands for. */
  readonly channels: readonly ScannedChannel[];
  /** How many turns a scan has. */
  readonly count: number;
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

/** How late a channel is by its turn in a scan: those of a brace range from the first to the last of them. */
export interface ScanDelay {
  readonly firstS: number;
  readonly lastS: number;
}

const AT_ONCE: ScanDelay = { firstS: 0, lastS: 0 };

/**
 * How late channels are by their turns in a scan, asked of all of them in document order: not at all where all are
 * sampled at once, `undefined` where nobody can tell.
 */
export function scanDelays(scans: readonly Scan[]): (channel: Channel) => ScanDelay | undefined {
  const turns = new Map(scans.map(({ digitizer, intervalS }) => [digitizer, { intervalS, next: 0 }]));
  return ({ digitizer, count }) => {
    const turn = digitizer && turns.get(digitizer);
    if (!turn) return AT_ONCE;
    const first = turn.next;
    turn.next += count;
    const { intervalS } = turn;
    return intervalS === undefined ? undefined : { firstS: first * intervalS, lastS: (turn.next - 1) * intervalS };
  };
}

/** The rate that a channel is sampled at; `undefined` where it has none. */
function rateOf({ channel, chain }: ScannedChannel): number | undefined {
  return chain?.rateHz ?? channel.rateHz?.value;
}

function scanOf(digitizer: Digitizer, channels: readonly ScannedChannel[]): Scan {
  let fastestHz = 0;
  let sumHz = 0;
  let count = 0;
  for (const one of channels) {
    const rateHz = rateOf(one) ?? 0;
    fastestHz = Math.max(fastestHz, rateHz);
    sumHz += rateHz * one.channel.count;
    count += one.channel.count;
  }
  const spreadS = fastestHz > 0 ? 1 / (count * fastestHz) : undefined;
  return { digitizer, channels, count, intervalS: digitizer.scanIntervalS?.value ?? spreadS, fastestHz, sumHz };
}
