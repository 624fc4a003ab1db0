import type { Check } from './check.ts';
import { foldsOf, saidOfFold } from './folds.ts';

export const foldInBand: Check<'channel'> = {
  name: 'fold-in-band',
  kind: 'channel',
  severity: 'error',
  finds: 'A declared source lands in the band after folding, above the fold limit.',
  why: 'What is above half the sample rate does not vanish: sampling moves it below, where nothing tells it from a signal that belongs there. No processing afterwards takes it out again. The finding names the stage at which it folds and the highest line of the source; its other lines are told with it, each judged by itself and never summed.',
  shows: `rig: Fan bearing
digitizers:
  front-end: { bits: 24, full-scale: ±10 V }
filters:
  card: { response: butterworth, order: 6, cutoff: 8 kHz }
sources:
  inverter: { carrier: 16 kHz, modulation: 50 Hz, level: 400 mV }
channels:
  bearing:
    sensor: { measures: voltage }
    digitizer: front-end
    rate: 25.6 kHz
    filter: card
    band: 10 Hz .. 10 kHz
    fold-limit: -65 dBFS
    flatness: 15 dB
`,
  clean: `rig: Fan bearing
digitizers:
  front-end: { bits: 24, full-scale: ±10 V }
filters:
  card: { response: butterworth, order: 6, cutoff: 8 kHz }
sources:
  # 15.95 kHz is recorded at 9.65 kHz: 27.96 dB below full scale, less 35.96 dB of filter, is -63.92 dBFS.
  inverter: { carrier: 16 kHz, modulation: 50 Hz, level: 400 mV }
channels:
  bearing:
    sensor: { measures: voltage }
    digitizer: front-end
    rate: 25.6 kHz
    filter: card
    band: 10 Hz .. 10 kHz
    fold-limit: -63.9 dBFS
    flatness: 15 dB
`,
  sources: [
    'Oppenheim and Schafer, Discrete-Time Signal Processing, the chapter on sampling: recorded(f) = |f - rate round(f / rate)|.',
  ],
  run: (view) => foldsOf(view, true).map((fold) => saidOfFold(fold, view.chain, 'is')),
};
