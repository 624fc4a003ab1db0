import { type Check, SAYS_NOTHING } from './check.ts';
import { saidOfImages } from './images-said.ts';
import { standingOn } from './standing.ts';

export const patternImage: Check<'channel'> = {
  name: 'pattern-image',
  kind: 'channel',
  severity: 'error',
  finds:
    'A pattern of kept samples puts an image of a source, or of the band itself, into the band above the fold limit.',
  why: 'Where samples are left out in a steady pattern, the record is the whole one multiplied by a train of gaps, and everything in it appears again beside itself, at every multiple of the rate of the pattern. One slot missing of P puts images at 1 / (P - 1) of the original at each of them. No filter before the converter can help, for the original is in the band.',
  shows: `rig: Bench
digitizers:
  front-end: { bits: 16, full-scale: ±1 V }
filters:
  card: { response: elliptic, order: 8, ripple: 0.1 dB, stopband: 80 dB, pass-edge: 4 kHz }
channels:
  strut:
    digitizer: front-end
    rate: 10.24 kHz
    filter: card
    band: 10 Hz .. 4 kHz
    fold-limit: -20 dBFS
    # One slot of ten is missing: images at 1 / 9, 19.1 dB below the original.
    pattern: { of: 10, take: [0, 1, 2, 3, 4, 5, 6, 7, 8] }
`,
  clean: `rig: Bench
digitizers:
  front-end: { bits: 16, full-scale: ±1 V }
filters:
  card: { response: elliptic, order: 8, ripple: 0.1 dB, stopband: 80 dB, pass-edge: 4 kHz }
channels:
  strut:
    digitizer: front-end
    rate: 10.24 kHz
    filter: card
    band: 10 Hz .. 4 kHz
    fold-limit: -19 dBFS
    pattern: { of: 10, take: [0, 1, 2, 3, 4, 5, 6, 7, 8] }
`,
  sources: [
    'Oppenheim and Schafer, Discrete-Time Signal Processing: the spectrum of a product is the convolution of the spectra.',
  ],
  run(view) {
    const { channel } = view;
    const { pattern } = channel;
    if (!pattern) return SAYS_NOTHING;
    const { slots, taken } = pattern.value;
    const because = `only ${taken.length} of every ${slots} samples ${taken.length === 1 ? 'is' : 'are'} kept`;
    return saidOfImages(view, 'pattern', because, standingOn(channel, pattern));
  },
};
