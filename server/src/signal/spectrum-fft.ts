import FFT from 'fft.js';

/** One half of the transform of a real sequence: bins 0 .. size / 2. */
export interface Spectrum {
  readonly size: number;
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/**
 * Discrete Fourier transform of a real sequence, sum x[n] exp(-j 2 pi k n / size), not scaled.
 *
 * @param samples filled up with zeros to `size`; those past it are left out
 * @param size a power of two, 2 or more; rounded up to one
 */
export function spectrumOf(samples: ArrayLike<number>, size: number = samples.length): Spectrum {
  const transformSize = powerOfTwoAtLeast(size);
  const fft = new FFT(transformSize);
  const input = new Float64Array(transformSize);
  for (let n = 0; n < Math.min(samples.length, transformSize); n++) input[n] = samples[n]!;
  const output = new Float64Array(2 * transformSize);
  fft.realTransform(output, input);
  const bins = transformSize / 2 + 1;
  const re = new Float64Array(bins);
  const im = new Float64Array(bins);
  for (let k = 0; k < bins; k++) {
    re[k] = output[2 * k]!;
    im[k] = output[2 * k + 1]!;
  }
  return { size: transformSize, re, im };
}

/** Peak amplitude of the sinusoid on each bin 0 .. size / 2 of a record whose length is a power of two. */
export function lineAmplitudes(samples: ArrayLike<number>): Float64Array {
  const { size, re, im } = spectrumOf(samples);
  const last = size / 2;
  // A constant, and a tone at the Nyquist frequency, have no mirror image to share with.
  return re.map((real, k) => (Math.hypot(real, im[k]!) * (k === 0 || k === last ? 1 : 2)) / size);
}

/** The least power of two that is at least `size`, and at least 2. */
export function powerOfTwoAtLeast(size: number): number {
  let power = 2;
  while (power < size) power *= 2;
  return power;
}
