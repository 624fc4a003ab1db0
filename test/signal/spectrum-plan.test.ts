import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { spectrumOf } from '../../server/src/signal/spectrum-fft.ts';
import {
  effectiveAverages,
  linesOf,
  planSpectrum,
  type RecordLength,
  type SpectrumSettings,
  tellsApart,
} from '../../server/src/signal/spectrum-plan.ts';
import { WINDOW_NAMES, windowSamples } from '../../server/src/signal/windows.ts';
import { runs } from '../tools/runs.ts';

const window = fc.constantFrom(...WINDOW_NAMES);
const overlap = fc.double({ min: 0, max: 0.99, noNaN: true });
const averages = fc.integer({ min: 1, max: 10_000 });

function settings(length: RecordLength, more: Partial<SpectrumSettings> = {}): SpectrumSettings {
  return { length, window: 'hann', overlap: 0, averages: 1, ...more };
}

/** Gaussian noise by the sum of twelve numbers of a linear congruential generator, the same on every run. */
function noise(count: number): Float64Array {
  let state = 1;
  const uniform = (): number => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
  return Float64Array.from({ length: count }, () => {
    let sum = -6;
    for (let n = 0; n < 12; n++) sum += uniform();
    return sum;
  });
}

describe('the plan of a spectrum', () => {
  it.each<readonly [RecordLength, number, number, number, number]>([
    // Length, rate, samples, seconds, lines. 2.56 samples a line: common practice.
    [{ by: 'lines', lines: 800 }, 25_600, 2048, 0.08, 800],
    [{ by: 'lines', lines: 100 }, 1000, 256, 0.256, 100],
    [{ by: 'lines', lines: 802 }, 2560, 2054, 0.80234375, 802],
    [{ by: 'resolution', resolutionHz: 1.25 }, 25_600, 20_480, 0.8, 8000],
    [{ by: 'resolution', resolutionHz: 1.3333 }, 25_600, 19_200, 0.75, 7500],
    [{ by: 'record', recordS: 0.8 }, 25_600, 20_480, 0.8, 8000],
    [{ by: 'record', recordS: 1e-9 }, 100, 1, 0.01, 0],
  ])('%o at %d samples a second', (length, rateHz, samples, seconds, lines) => {
    const plan = planSpectrum(settings(length), rateHz);
    expect(plan).toMatchObject({ recordSamples: samples, lines, independentAverages: 1, randomError: 1 });
    expect(plan?.recordS).toBeCloseTo(seconds, 12);
    expect((plan?.resolutionHz ?? 0) * seconds).toBeCloseTo(1, 12);
    expect(plan?.totalS).toBeCloseTo(seconds, 12);
  });

  it('lasts as long as its averages take', () => {
    // By hand: 16 records of 80 ms, each starting 40 ms after the one before.
    const plan = planSpectrum(settings({ by: 'lines', lines: 800 }, { overlap: 0.5, averages: 16 }), 25_600);
    expect(plan?.totalS).toBeCloseTo(0.68, 12);
    expect(plan?.leastSeparationHz).toBeCloseTo(25, 6);
  });

  it('is the same however its length is given', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 100_000 }),
        fc.double({ min: 0.1, max: 1e8, noNaN: true }),
        (lines, rateHz) => {
          const byLines = planSpectrum(settings({ by: 'lines', lines }), rateHz)!;
          const { recordS, resolutionHz } = byLines;
          expect(linesOf(byLines.recordSamples)).toBe(lines);
          expect(planSpectrum(settings({ by: 'record', recordS }), rateHz)).toEqual(byLines);
          expect(planSpectrum(settings({ by: 'resolution', resolutionHz }), rateHz)).toEqual(byLines);
        },
      ),
      { seed: 65, numRuns: runs(1000), endOnFailure: true },
    );
  });

  it.each<readonly [RecordLength, number]>([
    [{ by: 'lines', lines: 0 }, 1000],
    [{ by: 'lines', lines: Number.NaN }, 1000],
    [{ by: 'lines', lines: 100 }, 0],
    [{ by: 'lines', lines: 100 }, -5],
    [{ by: 'lines', lines: 100 }, Infinity],
    [{ by: 'resolution', resolutionHz: 0 }, 1000],
    [{ by: 'resolution', resolutionHz: -1 }, -1000],
    [{ by: 'record', recordS: -1 }, 1000],
    [{ by: 'record', recordS: Infinity }, 1000],
  ])('is none where there is no record: %o at %d', (length, rateHz) => {
    expect(planSpectrum(settings(length), rateHz)).toBeUndefined();
  });
});

describe('averages that overlap', () => {
  it('are worth no more than their number, and no less than those of them that do not overlap', () => {
    fc.assert(
      fc.property(window, overlap, averages, (name, shared, count) => {
        const effective = effectiveAverages(name, shared, count);
        const apart = 1 + Math.floor((count - 1) / Math.ceil(1 / (1 - shared)));
        expect(effective).toBeLessThanOrEqual(count * (1 + 1e-9));
        // Each is worth something: equal weights are not the best ones, so a little less than those alone.
        expect(effective).toBeGreaterThanOrEqual(Math.max(1, 0.8 * apart));
        expect(effectiveAverages(name, 0, count)).toBe(count);
      }),
      { seed: 66, numRuns: runs(200), endOnFailure: true },
    );
  });

  it('are summed alike one by one and by the trapezoidal rule', () => {
    // From 128 neighbours on the rule stands in: both sides of that, and far beyond.
    const perRecord = (shared: number): number => effectiveAverages('hann', shared, 1e15) / (1e15 * (1 - shared));
    expect(perRecord(1 - 1 / 129.5) / perRecord(1 - 1 / 128.5)).toBeCloseTo(1, 6);
    expect(perRecord(1 - 1e-6) / perRecord(1 - 1 / 100)).toBeCloseTo(1, 6);
  });

  it('leave the scatter that noise shows', () => {
    const [size, count, step, trials] = [64, 12, 16, 500];
    const weights = windowSamples('hann', size);
    const samples = noise(trials * (size + (count - 1) * step));
    const averaged: number[] = [];
    for (let trial = 0; trial < trials; trial++) {
      const start = trial * (size + (count - 1) * step);
      const power = new Float64Array(size / 2 + 1);
      for (let record = 0; record < count; record++) {
        const from = start + record * step;
        const { re, im } = spectrumOf(weights.map((weight, n) => weight * samples[from + n]!));
        for (let k = 0; k < power.length; k++) power[k]! += re[k]! ** 2 + im[k]! ** 2;
      }
      // Lines far enough from one another, and from both ends, to be independent.
      for (const k of [5, 10, 15, 20, 25]) averaged.push(power[k]!);
    }
    const mean = averaged.reduce((sum, power) => sum + power, 0) / averaged.length;
    const variance = averaged.reduce((sum, power) => sum + (power - mean) ** 2, 0) / averaged.length;
    const error = 1 / Math.sqrt(effectiveAverages('hann', 1 - step / size, count));
    // 2500 values give the scatter to 2 %.
    expect(Math.abs(Math.sqrt(variance) / mean / error - 1)).toBeLessThan(0.06);
  });

  it('that make no sense count as the nearest that do', () => {
    expect(effectiveAverages('hann', 0.5, 0)).toBe(1);
    expect(effectiveAverages('hann', Number.NaN, 7.9)).toBe(7);
    expect(effectiveAverages('hann', 1, 50)).toBeCloseTo(1, 9);
    expect(effectiveAverages('hann', 2, 1e6)).toBeCloseTo(1, 6);
    expect(Number.isFinite(effectiveAverages('hann', 0.75, Infinity))).toBe(true);
    expect(effectiveAverages('hann', 1, Infinity)).toBeCloseTo(1, 6);
  });
});

describe('two tones', () => {
  it('are told apart from the 6 dB bandwidth on', () => {
    // Source: Harris 1978, 6 dB bandwidths of table 1: Hann 2.00, rectangle 1.21 bins; from memory.
    expect(tellsApart('hann', 1.25, 2.5)).toBe(true);
    expect(tellsApart('hann', 1.25, 2.49)).toBe(false);
    expect(tellsApart('rectangle', 1, 1.21)).toBe(true);
    expect(tellsApart('rectangle', 1, 1.2)).toBe(false);
    expect(tellsApart('hann', 1, Number.NaN)).toBe(false);
  });
});
