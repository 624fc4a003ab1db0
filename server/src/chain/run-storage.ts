import type { Channel, Run, Step } from '../rig/model.ts';
import {
  bytesOfDuration,
  bytesOfRecords,
  bytesPerSecond,
  defaultSampleBits,
  type StoredStream,
} from '../signal/storage.ts';
import type { Chain } from './model.ts';

/** What a run makes of data, as far as it can be known. */
export interface RunStorage {
  /** While samples are taken. */
  readonly bytesPerSecond: number;
  /** Of the whole run: of its triggered records where it has some, of its duration otherwise. */
  readonly bytes: number | undefined;
  /** Channels that are counted, and those that are not, because their rate or the size of their samples is not known. */
  readonly channels: number;
  readonly channelsLeftOut: number;
}

/** A channel with its chain, where it is complete enough to have one. */
export interface StoredChannel {
  readonly channel: Channel;
  readonly chain: Chain | undefined;
}

/** Triggered records, where a run has them. */
export interface TriggeredRecords {
  readonly records: number;
  readonly recordS: number;
}

export function triggeredRecords({ records, recordS }: Run): TriggeredRecords | undefined {
  return records && recordS && { records: records.value, recordS: recordS.value };
}

/** The bytes of all channels together, each of a brace range counted, samples at the rate of each one's last stage. */
export function runStorage(run: Run, channels: readonly { readonly result: StoredChannel }[]): RunStorage {
  const streams: StoredStream[] = [];
  let channelsLeftOut = 0;
  for (const { result } of channels) {
    const stream = streamOf(result, run);
    const { count } = result.channel;
    if (stream) for (let each = 0; each < count; each++) streams.push(stream);
    else channelsLeftOut += count;
  }
  const triggered = triggeredRecords(run);
  const bytes = triggered
    ? bytesOfRecords(streams, triggered.records, triggered.recordS)
    : run.durationS && bytesOfDuration(streams, run.durationS.value);
  return { bytesPerSecond: bytesPerSecond(streams), bytes, channels: streams.length, channelsLeftOut };
}

function streamOf({ channel, chain }: StoredChannel, { sampleBits }: Run): StoredStream | undefined {
  const keptRateHz = keptRateOf(channel, chain);
  const bits = sampleBits?.value ?? (channel.digitizer?.bits && defaultSampleBits(channel.digitizer.bits.value));
  return keptRateHz === undefined || bits === undefined ? undefined : { keptRateHz, sampleBits: bits };
}

/** What is not checked, for want of a band, say, is stored all the same. */
function keptRateOf({ rateHz, steps, pattern }: Channel, chain: Chain | undefined): number | undefined {
  const sampledHz = chain?.rateHz ?? rateHz?.value;
  if (sampledHz === undefined) return undefined;
  const kept = pattern ? pattern.value.taken.length / pattern.value.slots : 1;
  return steps.length === 0 ? sampledHz * kept : steps.reduce(rateBehind, sampledHz * kept);
}

/** A record that follows a shaft is as large as the shaft is fast: at its highest speed. */
function rateBehind(hz: number, step: Step): number {
  if (step.kind === 'decimate') return hz / step.factor.value;
  return step.kind === 'per-turn' ? step.perTurn.value * step.speed.value.highHz : hz;
}
