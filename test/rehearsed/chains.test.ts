import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { lineAmplitudes } from '../../server/src/signal/spectrum-fft.ts';
import { arrivalsOfText } from '../chain/rig.ts';
import { runs } from '../tools/runs.ts';
import { type RandomChain, RECORD, randomChain, type Tone, textOf } from './random-chain.ts';
import { keepEvery, run } from './run-filters.ts';

/** Samples of the record's rate that are thrown away, while the filters settle. */
const SETTLING = 1024;

/** Lines below this are noise of the arithmetic. */
const FLOOR_DBFS = -120;

/** A line this low may be off by more than 0.1 dB by what filters still ring with. */
const LEAST_COMPARED_DBFS = -100;

function dB(ratio: number): number {
  return 20 * Math.log10(ratio);
}

/** Second-order response of a mounted mass. */
function resonanceGain(hz: number, resonance: number, q: number): number {
  const u = hz / resonance;
  return 1 / Math.hypot(1 - u * u, u / q);
}

/** What the converter is given of a tone. */
function amplitudeAtConverter({ bin, peak, atSensor }: Tone, { spacingHz, analogue, resonance }: RandomChain): number {
  const hz = bin * spacingHz;
  const takenDb = analogue.reduce((sum, part) => sum + part.attenuationDb(hz), 0);
  return peak * 10 ** (-takenDb / 20) * (atSensor ? resonanceGain(hz, resonance, 5) : 1);
}

/** The record that a chain leaves, synthesised sample by sample. */
function recordOf(chain: RandomChain): Float64Array {
  const { decimation, decimationFilter, steps, tones } = chain;
  const period = RECORD * decimation;
  const samples = new Float64Array((RECORD + SETTLING) * decimation);
  for (const tone of tones) {
    const amplitude = amplitudeAtConverter(tone, chain);
    for (let n = 0; n < samples.length; n++) {
      // Whole turns are taken off first, which keeps the phase exact.
      samples[n]! += amplitude * Math.cos((2 * Math.PI * ((tone.bin * n) % period)) / period + tone.phase);
    }
  }
  let record: Float64Array = samples;
  for (const { filter, factor } of decimationFilter ? [decimationFilter, ...steps] : steps) {
    record = keepEvery(factor, filter ? run(filter, record) : record);
  }
  return record.slice(-RECORD);
}

/** Bins on which more than one tone lands, or whose height depends on the phase. */
function isClear(bins: readonly number[]): boolean {
  return new Set(bins).size === bins.length && bins.every((bin) => bin > 0 && bin < RECORD / 2);
}

function landing(bin: number): number {
  const rest = bin % RECORD;
  return Math.min(rest, RECORD - rest);
}

/** A tone on a multiple of half a rate on the way is recorded by its phase, whatever comes after. */
function meetsNyquist({ bin }: Tone, { decimation, decimationFilter, steps }: RandomChain): boolean {
  let half = (RECORD * decimation) / 2;
  const factors = [1, ...(decimationFilter ? [decimationFilter.factor] : []), ...steps.map(({ factor }) => factor)];
  return factors.some((factor) => {
    half /= factor;
    return bin % half === 0;
  });
}

describe('a chain, rehearsed', () => {
  it('leaves every line where and as high as predicted, and no other', { timeout: 600_000 }, () => {
    let compared = 0;
    let folded = 0;
    fc.assert(
      fc.property(randomChain, (chain) => {
        fc.pre(isClear(chain.tones.map(({ bin }) => landing(bin))));
        fc.pre(!chain.tones.some((tone) => meetsNyquist(tone, chain)));
        const arrivals = arrivalsOfText(textOf(chain)).filter(({ source }) => source.name.startsWith('tone-'));
        expect(arrivals).toHaveLength(chain.tones.length);
        const spectrum = lineAmplitudes(recordOf(chain));
        const predicted = new Map<number, number>();
        for (const { recordedLowHz, recordedHighHz, level, folded: isFolded } of arrivals) {
          expect(recordedHighHz).toBe(recordedLowHz);
          predicted.set(Math.round(recordedLowHz / chain.spacingHz), level);
          expect(recordedLowHz / chain.spacingHz).toBeCloseTo(Math.round(recordedLowHz / chain.spacingHz), 6);
          if (isFolded) folded++;
        }
        for (const [bin, amplitude] of spectrum.entries()) {
          const level = predicted.get(bin);
          if (level === undefined) expect(dB(amplitude)).toBeLessThan(FLOOR_DBFS);
          else if (level > LEAST_COMPARED_DBFS) {
            expect(Math.abs(dB(amplitude) - level)).toBeLessThan(0.1);
            compared++;
          } else expect(dB(amplitude)).toBeLessThan(LEAST_COMPARED_DBFS + 0.1);
        }
      }),
      { seed: 20250611, numRuns: runs(300) },
    );
    // The comparison would be worth little if most lines were too low to compare, or none of them folded.
    expect(compared).toBeGreaterThan(runs(300));
    expect(folded).toBeGreaterThan(runs(300));
  });
});
