import { powerSum } from '../chain/noise.ts';
import { jitterLevelOf } from '../chain/noise-inputs.ts';
import { formatHz, formatQuantity } from '../quantity/write.ts';
import { type Check, SAYS_NOTHING } from './check.ts';
import { noiseText } from './noise-wording.ts';
import { standingOnStage } from './standing.ts';
import { differenceText, levelFigures, levelText } from './wording.ts';

/** What noise leaves is worked out to this. */
const NOISE_ROUNDING_DB = 0.01;

export const jitterLimited: Check<'channel'> = {
  name: 'jitter-limited',
  kind: 'channel',
  severity: 'warning',
  finds: "The noise that jitter makes of a signal as high as `peak` at the band's top is over the fold limit.",
  why: 'A sample that is taken a little early or late has the value of another instant. The faster the signal changes the more that matters, so jitter makes noise in proportion to frequency and level, which no filter ahead of the converter takes off. It is judged where it is worst, at the top of the band, true frequency, by the part of the noise that stays in the band. Without `peak` there is nothing to judge it by.',
  shows: `rig: Fan bearing
digitizers:
  front-end: { full-scale: ±10 V, jitter: 5 ns }
channels:
  bearing:
    measures: voltage
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 10 kHz
    fold-limit: -75 dBFS
    undeclared: -90 dBFS
    peak: 7 V
`,
  clean: `rig: Fan bearing
digitizers:
  # 5 ns at 10 kHz are 70.06 dB under 7 V, which are 3.10 dB under full scale; 1.08 dB of it lie outside the band.
  front-end: { full-scale: ±10 V, jitter: 5 ns }
channels:
  bearing:
    measures: voltage
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 10 kHz
    fold-limit: -74 dBFS
    undeclared: -90 dBFS
    peak: 7 V
`,
  sources: ['IEEE Std 1241: 20 log10(2 pi f jitter), less 10 log10(rate / (2 bandwidth)).'],
  run(view) {
    const { channel, chain } = view;
    const jitter = channel.digitizer?.jitterS;
    // All of it, in the band or not, is seen at once; how much of it is in the band has to be worked out.
    if (!jitter || !((jitterLevelOf(chain) ?? -Infinity) > chain.foldLimit)) return SAYS_NOTHING;
    const share = view.noise?.contributions.find(({ origin }) => origin.kind === 'jitter');
    if (!share || !chain.understood) return SAYS_NOTHING;
    const level = powerSum([share.nativeDb, share.foldedDb ?? -Infinity]);
    const excess = level - chain.foldLimit;
    if (!(excess > NOISE_ROUNDING_DB)) return SAYS_NOTHING;
    const standing = standingOnStage(chain, 1);
    const { peak } = channel;
    return [
      {
        message: `Jitter will put noise into the band: of a signal as high as \`peak\` at ${formatHz(chain.bandHighHz)}, ${formatQuantity(jitter.value, 'time')} rms leave ${noiseText(level, chain)}, ${differenceText(excess)} over the fold limit of ${levelText(chain.foldLimit, chain)}.`,
        place: standing.place,
        related: [
          ...standing.related,
          { place: jitter.place, message: 'The jitter stands here.' },
          ...(peak ? [{ place: peak.place, message: '`peak` stands here.' }] : []),
        ],
        figures: { atHz: chain.bandHighHz, jitterS: jitter.value, ...levelFigures(level, chain) },
        excess,
      },
    ];
  },
};
