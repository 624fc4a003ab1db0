import FFT from 'fft.js';
import { powerOfTwoAtLeast } from './spectrum-fft.ts';

/** Complex numbers, real and imaginary parts apart, of one length. */
export interface ComplexSequence {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/**
 * Discrete Fourier transform of a sequence of any length, X[k] = sum x[n] exp(-j 2 pi k n / N), not scaled.
 *
 * A length that is no power of two is a convolution with a chirp, k n = (k^2 + n^2 - (k - n)^2) / 2, done by transforms
 * of a power of two that is at least 2 N - 1. No sample gives no bins, one sample is its own transform.
 * Source: L. I. Bluestein, A linear filtering approach to the computation of the discrete Fourier transform, IEEE
 * Trans. Audio and Electroacoustics 1970.
 *
 * @param re real parts; their number N is the length, to be bounded by the caller
 * @param im imaginary parts, 0 where left out or missing
 */
export function transformOf(re: ArrayLike<number>, im: ArrayLike<number> = []): ComplexSequence {
  const length = re.length;
  const samples = interleaved(re, im, length, length);
  if (length < 2) return parted(samples, length);
  return parted(powerOfTwoAtLeast(length) === length ? transformed(samples) : chirped(samples), length);
}

/** Real and imaginary parts by turns, as the library has them, filled up with zeros. */
function interleaved(re: ArrayLike<number>, im: ArrayLike<number>, length: number, size: number): Float64Array {
  const result = new Float64Array(2 * size);
  for (let n = 0; n < length; n++) {
    result[2 * n] = re[n]!;
    result[2 * n + 1] = im[n] ?? 0;
  }
  return result;
}

function parted(samples: Float64Array, length: number): ComplexSequence {
  const re = new Float64Array(length);
  const im = new Float64Array(length);
  for (let n = 0; n < length; n++) {
    re[n] = samples[2 * n]!;
    im[n] = samples[2 * n + 1]!;
  }
  return { re, im };
}

function transformed(samples: Float64Array, fft: FFT = new FFT(samples.length / 2)): Float64Array {
  const output = new Float64Array(samples.length);
  fft.transform(output, samples);
  return output;
}

function chirped(samples: Float64Array): Float64Array {
  const length = samples.length / 2;
  const size = powerOfTwoAtLeast(2 * length - 1);
  const chirp = chirpOf(length);
  const { re, im } = parted(product(samples, chirp), length);
  const fft = new FFT(size);
  const convolved = new Float64Array(2 * size);
  fft.inverseTransform(
    convolved,
    product(transformed(interleaved(re, im, length, size), fft), transformed(backwardChirp(chirp, size), fft)),
  );
  return product(convolved.subarray(0, 2 * length), chirp);
}

/** exp(-j pi n^2 / N). Whole turns are taken off n^2 first, which keeps the angle exact. */
function chirpOf(length: number): Float64Array {
  const chirp = new Float64Array(2 * length);
  for (let n = 0; n < length; n++) {
    const angle = (Math.PI * ((n * n) % (2 * length))) / length;
    chirp[2 * n] = Math.cos(angle);
    chirp[2 * n + 1] = -Math.sin(angle);
  }
  return chirp;
}

/** The conjugate of a chirp at n = -(N - 1) .. N - 1, those below 0 at the end. */
function backwardChirp(chirp: Float64Array, size: number): Float64Array {
  const result = new Float64Array(2 * size);
  for (let n = 0; n < chirp.length / 2; n++) {
    for (const place of n === 0 ? [0] : [n, size - n]) {
      result[2 * place] = chirp[2 * n]!;
      result[2 * place + 1] = -chirp[2 * n + 1]!;
    }
  }
  return result;
}

/** Element by element. */
function product(first: Float64Array, second: Float64Array): Float64Array {
  const result = new Float64Array(first.length);
  for (let n = 0; n < first.length; n += 2) {
    result[n] = first[n]! * second[n]! - first[n + 1]! * second[n + 1]!;
    result[n + 1] = first[n]! * second[n + 1]! + first[n + 1]! * second[n]!;
  }
  return result;
}
