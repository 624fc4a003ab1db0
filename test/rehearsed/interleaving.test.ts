import { describe, expect, it } from 'vitest';
import { transformOf } from '../../server/src/signal/any-length-fft.ts';
import { foldHz } from '../../server/src/signal/folding.ts';
import { type Interleave, interleaveImages, mismatchRatio, offsetLines } from '../../server/src/signal/interleave.ts';

/** Samples of each converter in a record. */
const TURNS = 64;

const RATE_HZ = 1e9;

/** Numbers from 0 to 1: a generator by Marsaglia (xorshift, 32 bits). */
function generator(seed: number): () => number {
  let state = seed;
  return () => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return (state >>> 0) / 2 ** 32;
  };
}

/** Twelve uniform numbers make a normal one, of rms 1. */
function normal(uniform: () => number): number {
  let sum = -6;
  for (let n = 0; n < 12; n++) sum += uniform();
  return sum;
}

/** Per converter. */
interface Converters {
  readonly gains: readonly number[];
  readonly delaysS: readonly number[];
  readonly offsets: readonly number[];
}

function drawn(count: number, { gainMismatch, timingMismatchS, offsetMismatch }: Interleave, seed: number): Converters {
  const uniform = generator(seed);
  const values = (rms: number) => Array.from({ length: count }, () => rms * normal(uniform));
  return { gains: values(gainMismatch), delaysS: values(timingMismatchS), offsets: values(offsetMismatch) };
}

/** About the mean and of exactly this rms, as a data sheet's figure is of the part at hand. */
function exactly(values: readonly number[], rms: number): readonly number[] {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const spread = Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / values.length);
  return values.map((value) => ((value - mean) * rms) / spread);
}

/** Peak of the line on each bin of a record of a tone of peak 1. */
function rehearsed({ gains, delaysS, offsets }: Converters, bin: number): Float64Array {
  const count = gains.length;
  const length = count * TURNS;
  const hz = (bin * RATE_HZ) / length;
  const samples = Float64Array.from({ length }, (_, n) => {
    const converter = n % count;
    const angle = (2 * Math.PI * ((bin * n) % length)) / length + 2 * Math.PI * hz * delaysS[converter]!;
    return (1 + gains[converter]!) * Math.cos(angle + 0.3) + offsets[converter]!;
  });
  const { re, im } = transformOf(samples);
  return Float64Array.from({ length: Math.floor(length / 2) + 1 }, (_, k) => {
    const isAlone = k === 0 || 2 * k === length;
    return (Math.hypot(re[k]!, im[k]!) * (isAlone ? 1 : 2)) / length;
  });
}

/** Bins of the predicted images of a tone on a bin. */
function imageBins(interleave: Interleave, bin: number): readonly number[] {
  const length = interleave.converters * TURNS;
  const hz = (bin * RATE_HZ) / length;
  return interleaveImages(hz, hz, [RATE_HZ], interleave).map(({ recordedLowHz }) =>
    Math.round((recordedLowHz * length) / RATE_HZ),
  );
}

const SMALL: Omit<Interleave, 'converters'> = { gainMismatch: 1e-3, timingMismatchS: 2e-12, offsetMismatch: 5e-4 };

const COUNTS = [2, 3, 4, 5, 7, 8, 16, 32];

/** A bin in the first, second and fourth zone, off the places where images coincide. */
const places = (count: number) =>
  [5, count * 37 + 3, Math.floor(count * TURNS * 1.6) + 1].filter((bin) => bin % 32 !== 0);

describe('interleaved converters, rehearsed', () => {
  it.each(COUNTS)(
    '%i of them: images where predicted, their power together within 0.1 dB, none above the whole',
    (count) => {
      const interleave = { ...SMALL, converters: count };
      for (const bin of places(count)) {
        const drawnOnes = drawn(count, interleave, 20_250_611 + count);
        const lines = rehearsed(
          {
            gains: exactly(drawnOnes.gains, interleave.gainMismatch),
            delaysS: exactly(drawnOnes.delaysS, interleave.timingMismatchS),
            offsets: drawnOnes.offsets.map(() => 0),
          },
          bin,
        );
        const whole = mismatchRatio((bin * RATE_HZ) / (count * TURNS), interleave);
        const bins = imageBins(interleave, bin);
        expect(new Set(bins).size).toBe(count - 1);
        const power = bins.reduce((sum, k) => sum + lines[k]! ** 2, 0);
        expect(Math.abs(10 * Math.log10(power / whole ** 2))).toBeLessThan(0.1);
        for (const k of bins) expect(20 * Math.log10(lines[k]! / whole)).toBeLessThan(0.1);
        const own = foldHz(bin, count * TURNS);
        for (const [k, amplitude] of lines.entries()) {
          if (k !== own && !bins.includes(k)) expect(amplitude).toBeLessThan(1e-9);
        }
      }
    },
  );

  it.each([4, 8, 16])(
    '%i of them, drawn at random over and over: Black and Hodges hold on average within 0.3 dB',
    (count) => {
      const interleave = { ...SMALL, converters: count };
      const bin = count * 23 + 5;
      const bins = imageBins(interleave, bin);
      const TRIALS = 400;
      let power = 0;
      for (let trial = 1; trial <= TRIALS; trial++) {
        const lines = rehearsed({ ...drawn(count, interleave, trial * 7919), offsets: new Array(count).fill(0) }, bin);
        power += bins.reduce((sum, k) => sum + lines[k]! ** 2, 0) / TRIALS;
      }
      // Of independent values the rms about their own mean is less than that about the true one, by (M - 1) / M.
      const expected = (mismatchRatio((bin * RATE_HZ) / (count * TURNS), interleave) ** 2 * (count - 1)) / count;
      expect(Math.abs(10 * Math.log10(power / expected))).toBeLessThan(0.3);
    },
  );

  it.each(COUNTS)('%i of them: lines of the offsets where predicted, their power together within 0.1 dB', (count) => {
    const interleave = { ...SMALL, converters: count };
    const offsets = exactly(drawn(count, interleave, 77 + count).offsets, interleave.offsetMismatch);
    const lines = rehearsed({ gains: offsets.map(() => 0), delaysS: offsets.map(() => 0), offsets }, 5);
    const { recordedHz, togetherDbfs } = offsetLines(RATE_HZ, interleave)!;
    const length = count * TURNS;
    const bins = recordedHz.map((hz) => Math.round((hz * length) / RATE_HZ));
    // At half the rate a line has all its power in one place: peak^2, where a sinusoid has half of that.
    const power = bins.reduce((sum, k) => sum + lines[k]! ** 2 / (2 * k === length ? 1 : 2), 0);
    expect(Math.abs(10 * Math.log10(2 * power) - togetherDbfs)).toBeLessThan(0.1);
    for (const [k, amplitude] of lines.entries())
      if (k !== 5 && !bins.includes(k)) expect(amplitude).toBeLessThan(1e-9);
  });
});
