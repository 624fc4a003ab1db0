import { type Check, SAYS_NOTHING } from './check.ts';
import { DEFAULT_HEADROOM_DB, endsText, fullScaleOf, overshootOf } from './input-range.ts';
import { standingOn } from './standing.ts';
import { differenceText } from './wording.ts';

const ROUNDING_DB = 1e-9;

export const headroomThin: Check<'channel'> = {
  name: 'headroom-thin',
  kind: 'channel',
  severity: 'warning',
  finds: 'Less than `headroom` is left between `peak` and full scale.',
  why: 'An expected peak is an estimate. With little above it the first run that is livelier than expected is cut off, and has to be run again.',
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
    peak: 40 g
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
    peak: 35 g
`,
  sources: ['Arithmetic: 20 log10(end of full scale / peak). 3 dB: common practice.'],
  run(view) {
    const { channel, input: range } = view;
    if (!range) return SAYS_NOTHING;
    const { headroomDb, peak, ends } = range;
    const wantedDb = channel.headroomDb?.value ?? DEFAULT_HEADROOM_DB;
    // What is past full scale has no headroom at all, and is told as that.
    if (headroomDb >= wantedDb - ROUNDING_DB || overshootOf(peak, ends) > 1e-9) return SAYS_NOTHING;
    const standing = standingOn(channel, channel.peak);
    return [
      {
        message: `A signal a little over \`peak\` will be cut off: ${differenceText(Math.max(headroomDb, 0))} are left to the input's ${endsText(ends)}, and \`headroom\` wants ${differenceText(wantedDb)}.`,
        place: standing.place,
        related: [...standing.related, { place: fullScaleOf(channel)!.place, message: 'The full scale stands here.' }],
        figures: { headroomDb, wantedDb },
        excess: wantedDb - headroomDb,
      },
    ];
  },
};
