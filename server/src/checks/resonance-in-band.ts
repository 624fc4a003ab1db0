import { formatHz } from '../quantity/write.ts';
import { DEFAULT_FLATNESS_DB } from './band-droop.ts';
import { type Check, SAYS_NOTHING } from './check.ts';
import { standingOn } from './standing.ts';
import { differenceText } from './wording.ts';

const ROUNDING_DB = 1e-9;

export const resonanceInBand: Check<'channel'> = {
  name: 'resonance-in-band',
  kind: 'channel',
  severity: 'warning',
  finds: "The sensor's own resonance lifts the band by more than `flatness`, the filters apart.",
  why: 'A mounted accelerometer is a mass on a spring: long before its resonance it reads too high, by 1 dB at a third of it. The rise is in every figure that is read from there, and no filter straightens it.',
  shows: `rig: Fan bearing
sensors:
  stud-mounted: { measures: acceleration, sensitivity: 100 mV/g, resonance: 27 kHz }
channels:
  bearing:
    sensor: stud-mounted
    rate: 51.2 kHz
    band: 10 Hz .. 10 kHz
`,
  clean: `rig: Fan bearing
sensors:
  stud-mounted: { measures: acceleration, sensitivity: 100 mV/g, resonance: 27 kHz }
channels:
  bearing:
    sensor: stud-mounted
    rate: 51.2 kHz
    # 1 dB is reached at 8.9 kHz.
    band: 10 Hz .. 8.8 kHz
`,
  sources: ['Second-order response of a mounted mass: |H| = 1 / sqrt((1 - u^2)^2 + (u / Q)^2), u = f / resonance.'],
  run({ channel, bandResponse }) {
    const { liftDb, liftAtHz } = bandResponse;
    const flatnessDb = channel.flatnessDb?.value ?? DEFAULT_FLATNESS_DB;
    if (liftDb <= flatnessDb + ROUNDING_DB) return SAYS_NOTHING;
    const standing = standingOn(channel, channel.band);
    const resonance = channel.sensor?.resonanceHz;
    const cause = resonance ? `, because the sensor resonates at ${formatHz(resonance.value)}` : '';
    return [
      {
        message: `What is at ${formatHz(liftAtHz)} will be recorded ${differenceText(liftDb)} too high, inside the band${cause}; \`flatness\` allows ${differenceText(flatnessDb)}.`,
        place: standing.place,
        related: [
          ...standing.related,
          ...(resonance ? [{ place: resonance.place, message: 'The resonance stands here.' }] : []),
        ],
        figures: { liftDb, atHz: liftAtHz, flatnessDb, ...(resonance ? { resonanceHz: resonance.value } : {}) },
        excess: liftDb - flatnessDb,
      },
    ];
  },
};
