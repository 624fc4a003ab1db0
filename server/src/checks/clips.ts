import { quantityOfSensor } from '../rig/levels.ts';
import { type ChannelView, type Check, SAYS_NOTHING, type Said } from './check.ts';
import { endsText, fullScaleOf, overshootOf } from './input-range.ts';
import { standingOn } from './standing.ts';
import { differenceText, voltsText } from './wording.ts';

const ROUNDING = 1e-9;

export const clips: Check<'channel'> = {
  name: 'clips',
  kind: 'channel',
  severity: 'error',
  finds: '`peak` goes past full scale, or past the range of the sensor.',
  why: 'A converter that is driven past its end records the end, and a sensor past its range something of its own. Tops are cut off, and a single one spreads over the whole spectrum. The resonance of the sensor is reckoned in as far as it lifts the band.',
  shows: `rig: Fan bearing
digitizers:
  front-end: { full-scale: ±5 V }
channels:
  bearing:
    measures: acceleration
    sensitivity: 100 mV/g
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 5 kHz
    peak: 60 g
`,
  clean: `rig: Fan bearing
digitizers:
  front-end: { full-scale: ±5 V }
channels:
  bearing:
    measures: acceleration
    sensitivity: 100 mV/g
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 5 kHz
    peak: 50 g
`,
  sources: ['Arithmetic: peak x sensitivity x gain against the ends of the full scale.'],
  run(view) {
    if (!view.channel.peak) return SAYS_NOTHING;
    return [...pastFullScale(view), ...pastSensor(view)];
  },
};

function pastFullScale(view: ChannelView): readonly Said[] {
  const { channel, input: range } = view;
  if (!range) return SAYS_NOTHING;
  const { peak, ends } = range;
  const overshoot = overshootOf(peak, ends);
  if (overshoot <= ROUNDING) return SAYS_NOTHING;
  const standing = standingOn(channel, channel.peak);
  const isHigh = peak.highV - ends.highV >= ends.lowV - peak.lowV;
  const extremeV = isHigh ? peak.highV : peak.lowV;
  return [
    {
      about: 'full-scale',
      message: `The signal will be cut off: \`peak\` puts ${voltsText(extremeV)} on the input, which takes ${endsText(ends)}${range.headroomDb < 0 ? `, ${differenceText(-range.headroomDb)} less` : ''}.`,
      place: standing.place,
      related: [...standing.related, { place: fullScaleOf(channel)!.place, message: 'The full scale stands here.' }],
      figures: { peakV: extremeV, endV: isHigh ? ends.highV : ends.lowV },
      excess: overshoot,
    },
  ];
}

function pastSensor({ channel }: ChannelView): readonly Said[] {
  const range = channel.sensor?.range;
  const peak = channel.peak?.value;
  if (!range || !peak || peak.high.kind !== 'measured' || quantityOfSensor(channel.sensor) === undefined) {
    return SAYS_NOTHING;
  }
  const low = peak.low.kind === 'measured' ? Math.abs(peak.low.peak) : 0;
  const ratio = Math.max(Math.abs(peak.high.peak), low) / range.value;
  if (ratio <= 1 + ROUNDING) return SAYS_NOTHING;
  const standing = standingOn(channel, channel.peak);
  return [
    {
      about: 'range',
      message: `The sensor will not follow: \`peak\` is ${ratio.toFixed(2)} times the end of its range.`,
      place: standing.place,
      related: [...standing.related, { place: range.place, message: "The sensor's range stands here." }],
      figures: { timesRange: ratio },
      excess: ratio,
    },
  ];
}
