import { gainOf } from '../chain/level-scale.ts';
import type { Channel, FullScale, Given, Level } from '../rig/model.ts';
import { decibels, ratioOf } from '../signal/decibel.ts';
import type { ChannelView, InputRange, Volts } from './check.ts';
import { voltsText } from './wording.ts';

/** What volts are reckoned from. */
type View = Pick<ChannelView, 'channel' | 'chain' | 'bandResponse'>;

export const DEFAULT_HEADROOM_DB = 3;

/** How a channel's `peak` stands to its full scale; `undefined` where either is not known in volts. */
export function inputRangeOf(view: View): InputRange | undefined {
  const given = fullScaleOf(view.channel);
  if (!given || !view.channel.peak) return undefined;
  const ends = endsOf(given.value, gainOf(view.channel));
  const peak = peakAt(view, ends);
  return peak && { peak, ends, headroomDb: headroomOf(peak, ends) };
}

/** The full scale that holds for a channel: its own, or the digitizer's. */
export function fullScaleOf(channel: Channel): Given<FullScale> | undefined {
  return channel.fullScale ?? channel.digitizer?.fullScale;
}

/** Ends of a full scale as seen from ahead of the gain. */
export function endsOf({ lowV, highV }: FullScale, gain: number): Volts {
  return { lowV: lowV / gain, highV: highV / gain };
}

/** What is expected, in volts, where the full scale has these ends: a single value means ± where it has two sides. */
export function peakAt(view: View, ends: Volts): Volts | undefined {
  const given = view.channel.peak?.value;
  if (!given) return undefined;
  const first = voltsOf(given.low, view);
  const second = voltsOf(given.high, view);
  if (first === undefined || second === undefined) return undefined;
  if (!given.single) return { lowV: Math.min(first, second), highV: Math.max(first, second) };
  const size = Math.abs(second);
  return { lowV: ends.lowV >= 0 ? 0 : -size, highV: ends.highV <= 0 ? 0 : size };
}

/** With what the sensor makes of it at worst, inside the band. */
function voltsOf(level: Level, { chain, bandResponse }: View): number | undefined {
  const { fullScaleV, sensitivity } = chain.scale;
  switch (level.kind) {
    case 'dbfs':
      return fullScaleV === undefined ? undefined : fullScaleV * ratioOf(level.dbfs);
    case 'volts':
      return level.peakV;
    case 'measured':
      return sensitivity === undefined ? undefined : level.peak * sensitivity * ratioOf(bandResponse.liftDb);
  }
}

/** The least of 20 log10(end / extreme) over the ends other than 0. */
export function headroomOf(peak: Volts, ends: Volts): number {
  let least = Infinity;
  if (ends.highV > 0 && peak.highV > 0) least = Math.min(least, decibels(ends.highV / peak.highV));
  if (ends.lowV < 0 && peak.lowV < 0) least = Math.min(least, decibels(ends.lowV / peak.lowV));
  return least;
}

/** How far the peak goes past the ends, over half the span; 0 or less where it does not. */
export function overshootOf(peak: Volts, ends: Volts): number {
  const halfSpan = (ends.highV - ends.lowV) / 2;
  return Math.max(peak.highV - ends.highV, ends.lowV - peak.lowV) / halfSpan;
}

/** `±10 V`, or `0 V .. 5 V`. */
export function endsText({ lowV, highV }: Volts): string {
  return lowV === -highV ? `±${voltsText(highV)}` : `${voltsText(lowV)} .. ${voltsText(highV)}`;
}
