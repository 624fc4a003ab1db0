import { formatQuantity } from '../quantity/write.ts';
import { LEAST_PULSE_SAMPLES, leastPulseRateHz, shorterPulseS } from '../signal/pulse-train.ts';
import { type Check, SAYS_NOTHING } from './check.ts';
import { standingOn } from './standing.ts';
import { rateText } from './wording.ts';

export const pulseMissed: Check<'channel'> = {
  name: 'pulse-missed',
  kind: 'channel',
  severity: 'error',
  finds: 'At the highest speed a pulse, or the gap behind it, is shorter than two samples.',
  why: 'A pulse train is read for its edges. What is shorter than two samples may fall between them, and is then not there: pulses are lost, and the speed that is computed from them is too low just where it is highest.',
  shows: `rig: Turbine
channels:
  key-phasor:
    rate: 10 kHz
    pulses: { per-turn: 60, speed: 600..3000 rpm, duty: 50 % }
`,
  clean: `rig: Turbine
channels:
  key-phasor:
    # 60 pulses a turn at 50 turns a second: each half lasts 167 us, two samples at 12 kHz.
    rate: 12 kHz
    pulses: { per-turn: 60, speed: 600..3000 rpm, duty: 50 % }
`,
  sources: ['Two samples for the shorter of high and low: common practice; no source.'],
  run({ chain, channel }) {
    const { pulses } = channel;
    if (!pulses) return SAYS_NOTHING;
    const { rateHz } = chain.stages.at(-1)!;
    const leastHz = leastPulseRateHz(pulses.value);
    if (rateHz >= leastHz * (1 - ROUNDING)) return SAYS_NOTHING;
    const { perTurn, topSpeedRpm, duty } = pulses.value;
    const shortestS = shorterPulseS(pulses.value);
    const standing = standingOn(channel, channel.rateHz);
    const lasts = formatQuantity(shortestS, 'time');
    return [
      {
        message: `Pulses will be missed: at ${Number(topSpeedRpm.toPrecision(6))} rpm, ${perTurn} a turn, the shorter of high and low lasts ${lasts}, which is ${Number((shortestS * rateHz).toPrecision(3))} samples at ${rateText(rateHz)} where ${LEAST_PULSE_SAMPLES} are due. From ${rateText(leastHz)} on none is missed.`,
        place: standing.place,
        related: [...standing.related, { place: pulses.place, message: 'The pulses are these.' }],
        figures: { rateHz, leastRateHz: leastHz, shortestS, samples: shortestS * rateHz, topSpeedRpm, duty },
        excess: leastHz / rateHz,
      },
    ];
  },
};

const ROUNDING = 1e-9;
