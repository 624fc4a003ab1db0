import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { noiseBudgetOf } from '../../server/src/chain/noise.ts';
import { foldedNoiseAtMostDb } from '../../server/src/chain/noise-bound.ts';
import { runs } from '../tools/runs.ts';
import { chainOfText } from './rig.ts';

const rig = (filter: string, rate: number, top: number, extra = ''): string => `rig: R
digitizers: { d: { bits: 24, full-scale: ±10 V, noise: 10 uV } }
sensors: { s: { measures: acceleration, sensitivity: 100 mV/g, resonance: 30 kHz, noise: 20 mm/s2/rtHz } }
filters: { f: { ${filter} } }
sources: { hiss: { noise: 10 uV/rtHz, spans: 100 Hz .. 60 kHz } }
channels:
  a: { sensor: s, digitizer: d, rate: ${rate} Hz, filter: f, band: 5 Hz .. ${top} Hz${extra} }
`;

describe('the bound on the noise that folds', () => {
  it('is never under what is worked out', () => {
    fc.assert(
      fc.property(
        fc.constantFrom('butterworth', 'bessel'),
        fc.integer({ min: 2, max: 12 }),
        fc.integer({ min: 1000, max: 20_000 }),
        fc.integer({ min: 4000, max: 60_000 }),
        fc.integer({ min: 50, max: 1900 }),
        (response, order, cutoff, rate, top) => {
          const chain = chainOfText(rig(`response: ${response}, order: ${order}, cutoff: ${cutoff} Hz`, rate, top));
          expect(foldedNoiseAtMostDb(chain)).toBeGreaterThanOrEqual(noiseBudgetOf(chain)!.foldedDb - 1e-6);
        },
      ),
      { numRuns: runs(200), seed: 12 },
    );
  });

  it('is not known where a filter lets some through for good, nor past several samplings', () => {
    const floor = 'response: elliptic, order: 6, ripple: 0.1 dB, stopband: 60 dB, pass-edge: 5 kHz';
    expect(
      foldedNoiseAtMostDb(chainOfText(rig(floor, 20_000, 4000).replace(', resonance: 30 kHz', ''))),
    ).toBeUndefined();
    const butterworth = 'response: butterworth, order: 8, cutoff: 5 kHz';
    expect(
      foldedNoiseAtMostDb(chainOfText(rig(butterworth, 20_000, 400, ', then: [{ decimate: 4 }]'))),
    ).toBeUndefined();
  });
});
