import type { NoiseContribution } from '../chain/noise.ts';
import { foldedNoiseAtMostDb } from '../chain/noise-bound.ts';
import { declaresNoise } from '../chain/noise-inputs.ts';
import { type Check, SAYS_NOTHING } from './check.ts';
import { largestOf, noiseText, originInSentence } from './noise-wording.ts';
import { filtersAhead, standingOnStage } from './standing.ts';
import { differenceText, levelFigures, levelText } from './wording.ts';

/** What noise leaves is worked out to this. */
const NOISE_ROUNDING_DB = 0.01;

export const noiseFolds: Check<'channel'> = {
  name: 'noise-folds',
  kind: 'channel',
  severity: 'warning',
  finds: 'The noise that folds into the band, rms, is over the fold limit.',
  why: 'Noise above half the sample rate folds as a tone does, from every multiple of the rate at once, and raises the floor that the band is measured against. Averaging makes that floor smoother, not lower. What is declared adds up by its power: the noise of the sensor, of broadband sources, of the input, of steps and of jitter, each behind the filters that it passes. Noise of which nothing says how high it reaches, such as that of a sensor without `corner` or `resonance` behind no filter, has no sum: it is left out here, and the map of the channel says so.',
  shows: `rig: Fan bearing
digitizers:
  front-end: { full-scale: ±10 V }
sources:
  hiss: { noise: 20 uV/rtHz, spans: 20 kHz .. 24 kHz }
channels:
  bearing:
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 10 kHz
    fold-limit: -75 dBFS
    undeclared: -90 dBFS
`,
  clean: `rig: Fan bearing
digitizers:
  front-end: { full-scale: ±10 V }
sources:
  # 20 uV times the root of 4000 Hz is 1.265 mV rms, as much as a sinusoid 74.95 dB below full scale has.
  hiss: { noise: 20 uV/rtHz, spans: 20 kHz .. 24 kHz }
channels:
  bearing:
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 10 kHz
    fold-limit: -74.9 dBFS
    undeclared: -90 dBFS
`,
  sources: [
    'Oppenheim and Schafer, Discrete-Time Signal Processing, the chapters on sampling and on random signals: power densities fold and add.',
  ],
  run(view) {
    const { chain } = view;
    if (!chain.understood || !declaresNoise(chain.channel)) return SAYS_NOTHING;
    const mostDb = foldedNoiseAtMostDb(chain);
    if (mostDb !== undefined && mostDb <= chain.foldLimit) return SAYS_NOTHING;
    const { noise } = view;
    if (!noise) return SAYS_NOTHING;
    const excess = noise.foldedDb - chain.foldLimit;
    const largest = largestOf(noise.contributions, foldedDbOf);
    if (!(excess > NOISE_ROUNDING_DB) || !largest) return SAYS_NOTHING;
    const stage = largest.enters.at === 'record' ? largest.enters.stage + 1 : 1;
    const standing = standingOnStage(chain, stage);
    const name = originInSentence(largest.origin);
    return [
      {
        message: `Noise will fold into the band: what is left of it there is ${noiseText(noise.foldedDb, chain)}, ${differenceText(excess)} over the fold limit of ${levelText(chain.foldLimit, chain)}. Most of it is ${name} with ${noiseText(foldedDbOf(largest), chain)}.`,
        place: standing.place,
        related: [
          ...standing.related,
          { place: largest.place, message: 'This noise is declared here.' },
          ...filtersAhead(chain, stage),
        ],
        figures: levelFigures(noise.foldedDb, chain),
        excess,
      },
    ];
  },
};

function foldedDbOf({ foldedDb }: NoiseContribution): number {
  return foldedDb ?? -Infinity;
}
