import { describe, expect, it } from 'vitest';
import { arrivalsOf } from '../../server/src/chain/arrivals.ts';
import { foldedBand } from '../../server/src/chain/recorded-band.ts';
import { undeclaredFolds } from '../../server/src/chain/undeclared.ts';
import { chainOfText } from './rig.ts';

const MHZ = 1e6;

const RIG = (rate: string, more = ''): string => `rig: R
digitizers: { d: { full-scale: ±1 V, bits: 14 } }
filters: { bp: { response: butterworth, order: 8, shape: band-pass, cutoff: 19 MHz .. 26 MHz } }
sources:
  want: { frequency: 21 MHz .. 24 MHz, level: 0.5 V, wanted: true }
  low: { frequency: 3 MHz, level: 0.5 V }
  edge: { frequency: 24 MHz .. 30 MHz, level: 0.1 V }
channels:
  a: { measures: voltage, digitizer: d, rate: ${rate}, sampling: bandpass, filter: bp, band: 20 MHz .. 25 MHz${more} }
`;

describe('a channel whose band is folded on purpose', () => {
  const chain = chainOfText(RIG('18 MHz'));
  const arrivals = arrivalsOf(chain);
  const of = (name: string) => arrivals.filter(({ source }) => source.name === name);

  it('records its band where it is folded to, the right way up or not', () => {
    // 20 MHz - 18 MHz and 25 MHz - 18 MHz.
    expect(chain.recordedBand).toEqual({ lowHz: 2 * MHZ, highHz: 7 * MHZ, mirrored: false });
    // 30 MHz - 25 MHz and 30 MHz - 20 MHz: upside down.
    expect(foldedBand(20 * MHZ, 25 * MHZ, [30 * MHZ])).toEqual({ lowHz: 5 * MHZ, highHz: 10 * MHZ, mirrored: true });
  });

  it('holds what belongs to the band to be no fold', () => {
    expect(of('want')).toMatchObject([{ folded: false, inBand: true, overLimit: false, recordedLowHz: 3 * MHZ }]);
  });

  it('is spoiled by what is native to the record, were it not filtered', () => {
    // 3 MHz is recorded at 3 MHz, inside 2 .. 7 MHz; the band-pass takes 218 dB off it.
    expect(of('low')).toMatchObject([{ folded: true, foldsAtStage: 1, inBand: true, overLimit: false }]);
    expect(of('low')[0]!.attenuationDb).toBeGreaterThan(200);
  });

  it('is spoiled by what folds back onto it, and not by what lies beside it', () => {
    const [inside, beside, back] = of('edge');
    expect(inside).toMatchObject({ trueLowHz: 24 * MHZ, trueHighHz: 25 * MHZ, folded: false });
    expect(beside).toMatchObject({ trueLowHz: 25 * MHZ, trueHighHz: 27 * MHZ, inBand: false });
    // 36 MHz - 29 MHz = 7 MHz, the highest that lands in the band: 8th order, x = (29^2 - 494) / (29 * 7).
    expect(back).toMatchObject({ inBand: true, overLimit: true, atHz: 29 * MHZ });
    expect(back!.attenuationDb).toBeCloseTo(160 * Math.log10((29 ** 2 - 494) / (29 * 7)), 2);
  });

  it('weighs what nobody declares without the band itself', () => {
    const [fold] = undeclaredFolds(chain);
    expect(fold).toMatchObject({ stage: 1, atHz: 29 * MHZ });
  });
});
