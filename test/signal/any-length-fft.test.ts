import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type ComplexSequence, transformOf } from '../../server/src/signal/any-length-fft.ts';
import { runs } from '../tools/runs.ts';

/** Source: the definition, X[k] = sum x[n] exp(-j 2 pi k n / N), summed term by term. */
function directSum({ re, im }: ComplexSequence): ComplexSequence {
  const length = re.length;
  const sum = { re: new Float64Array(length), im: new Float64Array(length) };
  for (let k = 0; k < length; k++) {
    for (let n = 0; n < length; n++) {
      const angle = (-2 * Math.PI * ((k * n) % length)) / length;
      sum.re[k]! += re[n]! * Math.cos(angle) - im[n]! * Math.sin(angle);
      sum.im[k]! += re[n]! * Math.sin(angle) + im[n]! * Math.cos(angle);
    }
  }
  return sum;
}

function greatestMiss(actual: ComplexSequence, expected: ComplexSequence): number {
  expect(actual.re.length).toBe(expected.re.length);
  expect(actual.im.length).toBe(expected.im.length);
  return actual.re.reduce(
    (most, re, k) => Math.max(most, Math.hypot(re - expected.re[k]!, actual.im[k]! - expected.im[k]!)),
    0,
  );
}

const parts = (length: number) =>
  fc
    .array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: length, maxLength: length })
    .map((values) => Float64Array.from(values));

const sequence = fc
  .integer({ min: 1, max: 200 })
  .chain((length) => fc.record({ re: parts(length), im: parts(length) }));

/** Values that look random and are the same in every run. */
function scattered(length: number, seed: number): Float64Array {
  return Float64Array.from({ length }, (_, n) => Math.sin(seed + 12.9898 * n * n) * 0.999);
}

describe('a transform of any length', () => {
  it('is the direct sum to 1e-9, at every length from 1 to 200', () => {
    for (let length = 1; length <= 200; length++) {
      const given = { re: scattered(length, 1), im: scattered(length, 2) };
      expect(greatestMiss(transformOf(given.re, given.im), directSum(given)), `${length} samples`).toBeLessThan(1e-9);
    }
  });

  it('is the direct sum to 1e-9, whatever the values', () => {
    fc.assert(
      fc.property(sequence, (given) => {
        expect(greatestMiss(transformOf(given.re, given.im), directSum(given))).toBeLessThan(1e-9);
      }),
      { seed: 31, numRuns: runs(1000) },
    );
  });

  it('takes imaginary parts that are left out as 0', () => {
    const re = scattered(45, 3);
    expect(greatestMiss(transformOf(re), directSum({ re, im: new Float64Array(45) }))).toBeLessThan(1e-9);
    expect(
      greatestMiss(transformOf(re, [1]), directSum({ re, im: Float64Array.from(re, (_, n) => (n === 0 ? 1 : 0)) })),
    ).toBeLessThan(1e-9);
  });

  it('loses no more than 1e-14 of a line for each doubling of the length', () => {
    // An exponential on a bin is known without a sum: all of it on that bin.
    for (const length of [3, 9, 97, 999, 4096, 9973, 65_537, 100_000]) {
      const bin = Math.floor(length / 3);
      const angle = (n: number) => (2 * Math.PI * ((bin * n) % length)) / length;
      const re = Float64Array.from({ length }, (_, n) => Math.cos(angle(n)) / length);
      const im = Float64Array.from({ length }, (_, n) => Math.sin(angle(n)) / length);
      const line = { re: new Float64Array(length), im: new Float64Array(length) };
      line.re[bin] = 1;
      expect(greatestMiss(transformOf(re, im), line), `${length} samples`).toBeLessThan(
        1e-14 * Math.log2(length) + 1e-15,
      );
    }
  });

  it('has nothing to say of nothing', () => {
    expect(transformOf([])).toEqual({ re: new Float64Array(0), im: new Float64Array(0) });
    expect(transformOf([3], [4])).toEqual({ re: Float64Array.of(3), im: Float64Array.of(4) });
  });
});
