import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { arrivalsOf, recordedAtHz } from '../../server/src/chain/arrivals.ts';
import { runs } from '../tools/runs.ts';
import { analogueFilters, decimations, followed } from './random-path.ts';
import { chainOfText } from './rig.ts';

function rig(low: number, high: number, filters: readonly string[], then: readonly string[], band: string): string {
  return `rig: Test
digitizers: { d: { full-scale: ±1 V } }
sources: { s: { frequency: ${low} .. ${high} Hz, level: 0 dBFS } }
channels:
  one:
    digitizer: d
    rate: 1000 Hz
    band: ${band}
    fold-limit: -70 dBFS
    filter: [${filters.join(', ')}]
    then: [${then.join(', ')}]
`;
}

describe('a source that spans many zones', () => {
  it('is never said to arrive lower than any of its frequencies does', () => {
    fc.assert(
      fc.property(
        analogueFilters,
        decimations,
        fc.integer({ min: 0, max: 12 }),
        fc.integer({ min: 1, max: 3000 }),
        fc.integer({ min: 1, max: 9000 }),
        fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { minLength: 200, maxLength: 200 }),
        (filters, then, bandLow, low, width, places) => {
          const chain = chainOfText(rig(low, low + width, filters, then, `${bandLow} Hz .. ${bandLow + 6} Hz`));
          const arrivals = arrivalsOf(chain);
          const highestAt = (stage: number): number =>
            Math.max(...arrivals.filter((one) => one.inBand && one.foldsAtStage === stage).map(({ level }) => level));
          const last = chain.ratesHz[chain.ratesHz.length - 1]!;
          for (const place of places) {
            const hz = low + place * width;
            const inBand = Math.round(hz / last) * last + chain.bandLowHz + place * 6;
            for (const candidate of [hz, inBand]) {
              if (candidate < low || candidate > low + width) continue;
              const left = followed(chain, candidate);
              if (left) expect(left.level).toBeLessThanOrEqual(highestAt(left.stage) + 1e-5);
            }
          }
          for (const one of arrivals) {
            expect(one.level).not.toBeNaN();
            expect(one.trueLowHz).toBeLessThanOrEqual(one.trueHighHz);
            // What is over the limit is so at the frequency that is named, and lands in the band from there.
            if (!one.overLimit) continue;
            const left = followed(chain, one.atHz);
            if (left) expect(left.level).toBeGreaterThan(one.level - 0.1);
            const recordedHz = recordedAtHz(one, chain);
            expect(recordedHz).toBeGreaterThan(chain.bandLowHz - 1e-6);
            expect(recordedHz).toBeLessThan(chain.bandHighHz + 1e-6);
          }
        },
      ),
      { seed: 19, numRuns: runs(300) },
    );
  });

  it('is covered by its arrivals without gap', () => {
    fc.assert(
      fc.property(
        decimations,
        fc.integer({ min: 1, max: 3000 }),
        fc.integer({ min: 1, max: 90_000 }),
        (then, low, width) => {
          const arrivals = arrivalsOf(chainOfText(rig(low, low + width, [], then, '0 Hz .. 5 Hz')));
          expect(arrivals[0]!.trueLowHz).toBe(low);
          expect(arrivals[arrivals.length - 1]!.trueHighHz).toBe(low + width);
          for (let index = 1; index < arrivals.length; index++) {
            expect(arrivals[index]!.trueLowHz).toBe(arrivals[index - 1]!.trueHighHz);
          }
        },
      ),
      { seed: 23, numRuns: runs(300) },
    );
  });

  it('is no fault of a slow record whose digital filters take it off', () => {
    const then = ['{ decimate: 100, filter: { response: kaiser, pass: 0.001 fs, stop: 0.005 fs, stopband: 90 dB } }'];
    const chain = chainOfText(rig(20, 480, [], then, '0 Hz .. 2 Hz'));
    expect(arrivalsOf(chain).filter(({ overLimit }) => overLimit)).toEqual([]);
    const [only] = arrivalsOf(chain);
    expect(only).toMatchObject({ folded: true, foldsAtStage: 2, inBand: true, recordedLowHz: 0, recordedHighHz: 5 });
    expect(only!.level).toBeLessThan(-88);
  });

  it('is read in no time however wide it is', () => {
    const start = performance.now();
    const chain = chainOfText(rig(1, 1e12, ['{ response: bessel, order: 4, cutoff: 300 Hz }'], [], '0 Hz .. 20 Hz'));
    expect(arrivalsOf(chain).at(-1)).toMatchObject({ trueHighHz: 1e12, foldsAtStage: 1, overLimit: true });
    expect(performance.now() - start).toBeLessThan(500);
  });
});
