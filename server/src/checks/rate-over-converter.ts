import { type Check, SAYS_NOTHING } from './check.ts';
import { standingOn } from './standing.ts';
import { rateText } from './wording.ts';

/** Relative. */
const ROUNDING = 1e-12;

export const rateOverConverter: Check<'channel'> = {
  name: 'rate-over-converter',
  kind: 'channel',
  severity: 'error',
  finds:
    "The rate is above the digitizer's `max-rate`; for a scanned digitizer, the sum of the rates of all its channels.",
  why: 'Above its greatest rate a converter does not start, drops samples, or does not settle between them.',
  shows: `rig: Fan bearing
digitizers:
  front-end: { max-rate: 102.4 kHz }
channels:
  bearing:
    digitizer: front-end
    rate: 204.8 kHz
    band: 10 Hz .. 20 kHz
`,
  clean: `rig: Fan bearing
digitizers:
  front-end: { max-rate: 102.4 kHz }
channels:
  bearing:
    digitizer: front-end
    rate: 102.4 kHz
    band: 10 Hz .. 20 kHz
`,
  sources: ["The digitizer's data sheet, as the rig file gives it."],
  run({ chain, channel }) {
    const most = channel.digitizer?.maxRateHz;
    // The one of a scanned digitizer is for all its channels together.
    if (!most || channel.digitizer?.sampling?.value === 'scanned' || chain.rateHz <= most.value * (1 + ROUNDING))
      return SAYS_NOTHING;
    const standing = standingOn(channel, channel.rateHz);
    return [
      {
        message: `\`${channel.digitizer?.name}\` will not sample at ${rateText(chain.rateHz)}: its greatest rate is ${rateText(most.value)}.`,
        place: standing.place,
        related: [...standing.related, { place: most.place, message: 'The greatest rate stands here.' }],
        figures: { rateHz: chain.rateHz, maxRateHz: most.value },
        excess: chain.rateHz / most.value,
      },
    ];
  },
};
