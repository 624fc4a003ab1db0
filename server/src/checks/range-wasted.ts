import { gainOf } from '../chain/level-scale.ts';
import { formatQuantity } from '../quantity/write.ts';
import type { FullScale } from '../rig/model.ts';
import type { Volts } from './check.ts';
import { type ChannelView, type Check, SAYS_NOTHING } from './check.ts';
import { DEFAULT_HEADROOM_DB, endsOf, endsText, fullScaleOf, headroomOf, overshootOf, peakAt } from './input-range.ts';
import { standingOn } from './standing.ts';

/** How many times as much of full scale another range has to use before it is worth a word. */
const WORTH_A_WORD = 3;
const ROUNDING = 1e-9;

/** A setting that the digitizer has and this channel does not use. */
interface Setting {
  readonly fullScale: FullScale;
  readonly gain: number;
  readonly ends: Volts;
}

export const rangeWasted: Check<'channel'> = {
  name: 'range-wasted',
  kind: 'channel',
  severity: 'hint',
  finds:
    'A range or gain that the digitizer has would hold `peak` with headroom and use three times as much of full scale.',
  why: "The converter's steps and its noise stay what they are while the signal shrinks. A setting that fits makes everything small three times as clear, at no cost.",
  shows: `rig: Fan bearing
digitizers:
  front-end: { full-scale: ±10 V, ranges: [±10 V, ±1 V] }
channels:
  bearing:
    measures: acceleration
    sensitivity: 100 mV/g
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 5 kHz
    peak: 7 g
`,
  clean: `rig: Fan bearing
digitizers:
  front-end: { full-scale: ±10 V, ranges: [±10 V, ±1 V] }
channels:
  bearing:
    measures: acceleration
    sensitivity: 100 mV/g
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 5 kHz
    # 0.8 V leaves less than 3 dB below 1 V.
    peak: 8 g
`,
  sources: ['Common practice: use the smallest range that holds the signal with headroom.'],
  run(view) {
    const { channel } = view;
    const { digitizer } = channel;
    if (!channel.peak || !digitizer || !(digitizer.ranges || digitizer.gains)) return SAYS_NOTHING;
    const today = view.input;
    if (!today || overshootOf(today.peak, today.ends) > ROUNDING) return SAYS_NOTHING;
    const best = bestSetting(view);
    const todaySpanV = today.ends.highV - today.ends.lowV;
    const times = best ? todaySpanV / (best.ends.highV - best.ends.lowV) : 0;
    if (!best || times < WORTH_A_WORD * (1 - ROUNDING)) return SAYS_NOTHING;
    const standing = standingOn(
      channel,
      channel.gain ?? channel.fullScale ?? { place: channel.digitizerPlace ?? channel.place },
    );
    const listed = digitizer.gains ?? digitizer.ranges;
    return [
      {
        message: `The signal will use a small part of the converter: an input of ${endsText(best.ends)}${settingText(best, view)} would hold \`peak\` with headroom and use ${formatQuantity(times, 'number', 3)} times as much of it as ${endsText(today.ends)}.`,
        place: standing.place,
        related: [
          ...standing.related,
          ...(listed ? [{ place: listed.place, message: 'What it has stands here.' }] : []),
        ],
        figures: { times, lowV: best.ends.lowV, highV: best.ends.highV },
        excess: times,
      },
    ];
  },
};

function settingText({ fullScale, gain }: Setting, { channel }: ChannelView): string {
  const parts: string[] = [];
  const today = fullScaleOf(channel)?.value;
  if (today && (today.lowV !== fullScale.lowV || today.highV !== fullScale.highV)) {
    parts.push(`\`full-scale: ${endsText(fullScale)}\``);
  }
  if (gain !== gainOf(channel)) parts.push(`\`gain: ${formatQuantity(gain, 'number')}\``);
  return parts.length === 0 ? '' : ` (${parts.join(', ')})`;
}

/** The smallest of the listed settings that holds the peak with headroom. */
function bestSetting(view: ChannelView): Setting | undefined {
  const { channel } = view;
  const wantedDb = channel.headroomDb?.value ?? DEFAULT_HEADROOM_DB;
  let best: Setting | undefined;
  for (const setting of settingsOf(view)) {
    const peak = peakAt(view, setting.ends);
    if (!peak || overshootOf(peak, setting.ends) > ROUNDING) continue;
    if (headroomOf(peak, setting.ends) < wantedDb - ROUNDING) continue;
    if (!best || spanOf(setting) < spanOf(best)) best = setting;
  }
  return best;
}

function spanOf({ ends }: Setting): number {
  return ends.highV - ends.lowV;
}

function settingsOf({ channel }: ChannelView): readonly Setting[] {
  const today = fullScaleOf(channel)?.value;
  const scales = channel.digitizer?.ranges?.value ?? (today ? [today] : []);
  const gains = channel.digitizer?.gains?.value ?? [gainOf(channel)];
  return scales.flatMap((fullScale) => gains.map((gain) => ({ fullScale, gain, ends: endsOf(fullScale, gain) })));
}
