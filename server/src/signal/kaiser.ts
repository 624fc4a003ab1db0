/** Windowed-sinc designs after Kaiser, Nonrecursive digital filter design using the I0-sinh window function, 1974. */

/** A design that would need more taps gets this many, and the response that they achieve. */
export const MOST_TAPS = 4095;

/** A deeper stop band than doubles can hold is designed as this. */
const DEEPEST_STOPBAND_DB = 300;

/** The window's shape parameter for ripples of `stopbandDb`. */
export function kaiserBeta(stopbandDb: number): number {
  if (stopbandDb > 50) return 0.1102 * (stopbandDb - 8.7);
  if (stopbandDb > 21) return 0.5842 * (stopbandDb - 21) ** 0.4 + 0.07886 * (stopbandDb - 21);
  return 0;
}

/**
 * Number of taps, odd, for a transition from `passHz` to `stopHz`: ceil((A - 7.95) / (14.36 df / rate)) + 1, rounded
 * up to odd. 1 at least, `MOST_TAPS` at most.
 */
export function kaiserLength(stopbandDb: number, passHz: number, stopHz: number, rateHz: number): number {
  const width = Math.abs(stopHz - passHz) / rateHz;
  const steps = Math.ceil((stopbandDb - 7.95) / (14.36 * width));
  // Also where there is no width at all.
  if (!(steps < MOST_TAPS - 1)) return MOST_TAPS;
  const length = Math.max(steps, 0) + 1;
  return length % 2 === 1 ? length : length + 1;
}

/** Taps of the low-pass with ripples of `stopbandDb` below `passHz` and above `stopHz`; cutoff midway between. */
export function kaiserTaps(stopbandDb: number, passHz: number, stopHz: number, rateHz: number): readonly number[] {
  const length = kaiserLength(stopbandDb, passHz, stopHz, rateHz);
  return windowedSinc(length, (passHz + stopHz) / 2 / rateHz, stopbandDb);
}

/**
 * Taps of the half-band low-pass that is flat to `passHz` and stops from rate / 2 - `passHz`: every second tap but the
 * middle one is exactly 0, the middle one 1/2. The number of taps is 4 m + 3, so that the outermost are not 0.
 */
export function halfBandTaps(stopbandDb: number, passHz: number, rateHz: number): readonly number[] {
  const needed = kaiserLength(stopbandDb, passHz, rateHz / 2 - passHz, rateHz);
  const length = Math.max(4 * Math.ceil((needed - 3) / 4) + 3, 3);
  const middle = (length - 1) / 2;
  return windowedSinc(length, 0.25, stopbandDb).map((tap, n) => {
    if (n === middle) return 0.5;
    return (n - middle) % 2 === 0 ? 0 : tap;
  });
}

/** @param cutoff in cycles a sample */
function windowedSinc(length: number, cutoff: number, stopbandDb: number): readonly number[] {
  const beta = kaiserBeta(Math.min(stopbandDb, DEEPEST_STOPBAND_DB));
  const middle = (length - 1) / 2;
  const scale = besselI0(beta);
  return Array.from({ length }, (_, n) => {
    const offset = n - middle;
    const ideal = offset === 0 ? 2 * cutoff : Math.sin(2 * Math.PI * cutoff * offset) / (Math.PI * offset);
    const part = middle === 0 ? 0 : offset / middle;
    return (ideal * besselI0(beta * Math.sqrt(1 - part * part))) / scale;
  });
}

/** Modified Bessel function of the first kind, order 0, by its power series. */
function besselI0(x: number): number {
  const quarterSquare = (x * x) / 4;
  let term = 1;
  let sum = 1;
  for (let k = 1; k < 500 && term > 1e-17 * sum; k++) {
    term *= quarterSquare / (k * k);
    sum += term;
  }
  return sum;
}
