import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { decibels } from '../../server/src/signal/decibel.ts';
import { besselI0 } from '../../server/src/signal/modified-bessel.ts';
import { spectrumOf } from '../../server/src/signal/spectrum-fft.ts';
import { overlapCorrelation, windowFigures } from '../../server/src/signal/window-figures.ts';
import { SHORTEST_RECORD_SAMPLES, sideLobeEnvelopeDb } from '../../server/src/signal/window-leakage.ts';
import { WINDOW_NAMES, WINDOWS, windowSamples } from '../../server/src/signal/windows.ts';
import { runs } from '../tools/runs.ts';

const window = fc.constantFrom(...WINDOW_NAMES);
const place = fc.double({ min: 0, max: 0.5, noNaN: true });

/** What a flat top swings above its line, and what rounding does. */
const RIPPLE_DB = 0.01;

/** Below this a transform in doubles is rounding. */
const FLOOR_DB = -280;

describe('the shape of a window', () => {
  it('is 1 in the middle, the same on both sides, and never above the middle', () => {
    fc.assert(
      fc.property(window, place, (name, at) => {
        const { weightAt } = WINDOWS[name];
        expect(weightAt(0)).toBeCloseTo(1, 12);
        expect(weightAt(-at)).toBe(weightAt(at));
        expect(Math.abs(weightAt(at))).toBeLessThanOrEqual(1 + 1e-12);
      }),
      { seed: 61, numRuns: runs(1000), endOnFailure: true },
    );
  });

  it.each(WINDOW_NAMES)('%s jumps where it says: its differences at the ends', (name) => {
    // Differences over a step, divided by it as often as there are derivatives before the one that jumps.
    const { weightAt, jumps } = WINDOWS[name];
    const step = 1e-4;
    const at = (n: number): number => (n < 0 ? 0 : weightAt(-0.5 + n * step));
    const differences = [at(0), (at(1) - at(0)) / step, (2 * at(1)) / step ** 2];
    const atBothEnds = 2 * Math.abs(differences[jumps.derivative]!);
    // The triangle's slope jumps once more, by as much as at both ends; a taper's curvature where it begins.
    const share = jumps.atEndsOnly ? 1 : 2;
    expect((share * atBothEnds) / jumps.total).toBeCloseTo(1, 3);
  });

  it('uses a Bessel function that agrees with a handbook', () => {
    // Source: Abramowitz and Stegun, Handbook of Mathematical Functions, table 9.8; from memory.
    expect(besselI0(0)).toBe(1);
    expect(besselI0(1)).toBeCloseTo(1.2660658778, 9);
    expect(besselI0(5)).toBeCloseTo(27.2398718236, 8);
  });
});

describe('the envelope of side lobes', () => {
  it('is above every side lobe of a transform, whatever the length of the record', () => {
    fc.assert(
      fc.property(window, fc.integer({ min: SHORTEST_RECORD_SAMPLES, max: 3000 }), (name, length) => {
        const samples = windowSamples(name, length);
        const sum = samples.reduce((total, weight) => total + weight, 0);
        const { size, re, im } = spectrumOf(samples, length * 8);
        re.forEach((real, k) => {
          const levelDb = decibels(Math.hypot(real, im[k]!) / sum);
          if (levelDb < FLOOR_DB) return;
          const excessDb = levelDb - sideLobeEnvelopeDb(name, (k * length) / size);
          if (!(excessDb <= RIPPLE_DB)) expect.fail(`${name}, ${length} samples, bin ${k / 8}: ${excessDb} dB over`);
        });
      }),
      { seed: 62, numRuns: runs(400), endOnFailure: true },
    );
  });

  it('is within 5 dB of the highest side lobe just outside the main lobe, though it holds for short records too', () => {
    for (const name of WINDOW_NAMES) {
      const { highestSideLobeDb } = windowFigures(name);
      const { re, im } = spectrumOf(windowSamples(name, 1024), 1024 * 16);
      // The last place at which the main lobe is still above all side lobes.
      const level = 10 ** (highestSideLobeDb / 20) * Math.hypot(re[0]!, im[0]!);
      const last = re.reduce((latest, real, k) => (Math.hypot(real, im[k]!) > level * 1.02 ? k : latest), 0);
      const outside = last + 2;
      expect(sideLobeEnvelopeDb(name, outside / 16), name).toBeLessThan(highestSideLobeDb + 5);
    }
  });

  it('never rises with the offset, and is the same on both sides', () => {
    const offset = fc.double({ min: 0, max: 1e5, noNaN: true });
    const near = fc.double({ min: 0, max: 40, noNaN: true });
    fc.assert(
      fc.property(window, fc.oneof(offset, near), fc.oneof(offset, near), (name, first, second) => {
        const [nearer, farther] = [Math.min(first, second), Math.max(first, second)];
        expect(sideLobeEnvelopeDb(name, farther)).toBeLessThanOrEqual(sideLobeEnvelopeDb(name, nearer));
        expect(sideLobeEnvelopeDb(name, -nearer)).toBe(sideLobeEnvelopeDb(name, nearer));
      }),
      { seed: 63, numRuns: runs(2000), endOnFailure: true },
    );
  });

  it('falls far away by as much as the figures say', () => {
    for (const name of WINDOW_NAMES) {
      const octave = sideLobeEnvelopeDb(name, 1000) - sideLobeEnvelopeDb(name, 2000);
      expect(octave).toBeCloseTo(windowFigures(name).sideLobeFallDbPerOctave, 6);
    }
  });

  it('is 0 dB on the line and where there is no offset, nothing at an infinite one', () => {
    for (const name of WINDOW_NAMES) {
      expect(sideLobeEnvelopeDb(name, 0)).toBe(0);
      expect(sideLobeEnvelopeDb(name, Number.NaN)).toBe(0);
      expect(sideLobeEnvelopeDb(name, Infinity)).toBe(-Infinity);
    }
  });
});

describe('the correlation of records that overlap', () => {
  it('is 0 without overlap, 1 in full, and never more', () => {
    fc.assert(
      fc.property(window, fc.double({ min: 0, max: 1, noNaN: true }), (name, overlap) => {
        expect(Math.abs(overlapCorrelation(name, overlap))).toBeLessThanOrEqual(1 + 1e-3);
      }),
      { seed: 64, numRuns: runs(500), endOnFailure: true },
    );
    for (const name of WINDOW_NAMES) {
      expect(overlapCorrelation(name, 0)).toBe(0);
      expect(overlapCorrelation(name, 1)).toBe(1);
      expect(overlapCorrelation(name, Number.NaN)).toBe(0);
      expect(overlapCorrelation(name, 7)).toBe(1);
    }
  });
});
