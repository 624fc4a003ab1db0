import { type Curve, type Turn, turningCurve } from './curve.ts';
import { powerOfTwoAtLeast, spectrumOf } from './spectrum-fft.ts';

/** Points of the search grid for each tap: eight to a lobe, so that no lobe falls between two of them. */
const GRID_POINTS_PER_TAP = 8;

/** Longer filters are searched on a coarser grid, lest one line of text cost seconds. */
const LARGEST_GRID = 1 << 17;

/** What |H| / sum |h| must be under to be 0: what rounding leaves of an exact null. */
const NULL_RATIO = 1e-13;

/** The same at the bottom of a dip, where the refinement leaves a little more. */
const DIP_RATIO = 1e-9;

/**
 * A digital filter without feedback: A = -20 log10(|sum h[n] exp(-j w n)| / |sum h|), w = 2 pi f / rate, over
 * 0 .. rate / 2. Where |sum h| is under half of the greatest |H| (band-pass taps), that greatest is the reference.
 *
 * No taps attenuate nothing; taps that are all 0 let nothing through.
 */
export function firCurve(givenTaps: readonly number[], rateHz: number): Curve {
  if (givenTaps.length === 0) return turningCurve(() => 0, []);
  const taps = scaledToOne(givenTaps);
  const size = taps.reduce((sum, tap) => sum + Math.abs(tap), 0);
  const points = turningPoints(taps, size);
  const reference = referenceOf(taps, points);
  const toDb = (magnitude: number): number => {
    if (reference === 0) return Infinity;
    // + 0 turns the -0 of a ratio of exactly 1 into 0.
    return magnitude < NULL_RATIO * size ? Infinity : -20 * Math.log10(magnitude / reference) + 0;
  };
  const radiansPerHz = (2 * Math.PI) / rateHz;
  const turns: readonly Turn[] = points.map(({ w, magnitude }) => ({
    x: w / radiansPerHz,
    db: magnitude < DIP_RATIO * size ? Infinity : toDb(magnitude),
  }));
  return turningCurve((hz) => toDb(magnitudeAt(taps, hz * radiansPerHz)), turns);
}

interface TurningPoint {
  readonly w: number;
  readonly magnitude: number;
}

/** Scaled so that no square of them overflows or vanishes. */
function scaledToOne(taps: readonly number[]): Float64Array {
  const finite = taps.map((tap) => (Number.isFinite(tap) ? tap : 0));
  const largest = finite.reduce((most, tap) => Math.max(most, Math.abs(tap)), 0);
  return Float64Array.from(finite, (tap) => (largest > 0 ? tap / largest : 0));
}

function referenceOf(taps: Float64Array, points: readonly TurningPoint[]): number {
  const atZero = Math.abs(taps.reduce((sum, tap) => sum + tap, 0));
  const greatest = points.reduce(
    (most, point) => Math.max(most, point.magnitude),
    Math.max(atZero, magnitudeAt(taps, Math.PI)),
  );
  return atZero < greatest / 2 ? greatest : atZero;
}

/** |H(w)|, the sum turned forward one tap at a time. */
function magnitudeAt(taps: Float64Array, w: number): number {
  const stepRe = Math.cos(w);
  const stepIm = Math.sin(w);
  // Horner's scheme in exp(-jw), from the last tap.
  let re = 0;
  let im = 0;
  for (let n = taps.length - 1; n >= 0; n--) {
    const turned = re * stepRe + im * stepIm + taps[n]!;
    im = im * stepRe - re * stepIm;
    re = turned;
  }
  return Math.hypot(re, im);
}

/** Every peak and every dip of |H| inside 0 .. pi: found on a grid, then refined on the sum itself. */
function turningPoints(taps: Float64Array, size: number): readonly TurningPoint[] {
  const gridSize = Math.min(powerOfTwoAtLeast(GRID_POINTS_PER_TAP * taps.length), LARGEST_GRID);
  const { re, im } = spectrumOf(taps, gridSize);
  const spacing = (2 * Math.PI) / gridSize;
  const power = re.map((real, k) => real * real + im[k]! * im[k]!);
  const negligible = (NULL_RATIO * size) ** 2;
  const slopeAt = powerSlopeOf(taps);
  // Flat tops turn once more between an end, where every response is level, and the first point beside it.
  const places = [refined(slopeAt, spacing / 2, spacing / 2), refined(slopeAt, Math.PI - spacing / 2, spacing / 2)];
  for (let k = 1; k < power.length - 1; k++) {
    const before = power[k]! - power[k - 1]!;
    const after = power[k + 1]! - power[k]!;
    if (before * after > 0 || (before === 0 && after === 0)) continue;
    const isPeak = before > 0 || after < 0;
    // Between two nulls closer than the grid there is nothing but rounding.
    if (isPeak && power[k]! < negligible) continue;
    places.push(refined(slopeAt, k * spacing, spacing));
  }
  return places.sort((first, second) => first - second).map((w) => ({ w, magnitude: magnitudeAt(taps, w) }));
}

/** Newton's method on the slope of |H|^2, kept within `reach` of where it began. */
function refined(slopeAt: PowerSlope, start: number, reach: number): number {
  let w = start;
  for (let step = 0; step < 8; step++) {
    const { slope, curvature } = slopeAt(w);
    const next = Math.min(Math.max(w - slope / curvature, start - reach), start + reach);
    if (!Number.isFinite(next)) break;
    const change = Math.abs(next - w);
    w = next;
    // The step after this one would be of the order of the square.
    if (change < 1e-5 * reach) break;
  }
  return w;
}

/** First and second derivative of |H|^2 over w. */
type PowerSlope = (w: number) => {
  readonly slope: number;
  readonly curvature: number;
};

function powerSlopeOf(taps: Float64Array): PowerSlope {
  const isSymmetric = taps.every((tap, n) => tap === taps[taps.length - 1 - n]);
  return isSymmetric ? (w) => symmetricPowerSlope(taps, w) : (w) => powerSlope(taps, w);
}

/** Taps that mirror one another make H real but for its delay: half of them, cosines alone. */
function symmetricPowerSlope(taps: Float64Array, w: number): ReturnType<PowerSlope> {
  const middle = (taps.length - 1) / 2;
  const upper = Math.ceil(middle + 0.25);
  const stepRe = Math.cos(w);
  const stepIm = Math.sin(w);
  let cosine = Math.cos(w * (upper - middle));
  let sine = Math.sin(w * (upper - middle));
  let value = Number.isInteger(middle) ? taps[middle]! / 2 : 0;
  let first = 0;
  let second = 0;
  for (let n = upper; n < taps.length; n++) {
    const offset = n - middle;
    const real = taps[n]! * cosine;
    value += real;
    first -= offset * taps[n]! * sine;
    second -= offset * offset * real;
    const turned = cosine * stepRe - sine * stepIm;
    sine = sine * stepRe + cosine * stepIm;
    cosine = turned;
  }
  return {
    slope: 8 * value * first,
    curvature: 8 * (first * first + value * second),
  };
}

/** Phases are counted from the middle tap. */
function powerSlope(taps: Float64Array, w: number): ReturnType<PowerSlope> {
  const middle = (taps.length - 1) / 2;
  const stepRe = Math.cos(w);
  const stepIm = -Math.sin(w);
  let turnRe = Math.cos(w * middle);
  let turnIm = Math.sin(w * middle);
  let re = 0;
  let im = 0;
  let firstRe = 0;
  let firstIm = 0;
  let secondRe = 0;
  let secondIm = 0;
  for (let n = 0; n < taps.length; n++) {
    const offset = n - middle;
    const tapRe = taps[n]! * turnRe;
    const tapIm = taps[n]! * turnIm;
    re += tapRe;
    im += tapIm;
    firstRe += offset * tapIm;
    firstIm -= offset * tapRe;
    secondRe -= offset * offset * tapRe;
    secondIm -= offset * offset * tapIm;
    const turned = turnRe * stepRe - turnIm * stepIm;
    turnIm = turnRe * stepIm + turnIm * stepRe;
    turnRe = turned;
  }
  return {
    slope: 2 * (re * firstRe + im * firstIm),
    curvature: 2 * (firstRe * firstRe + firstIm * firstIm + re * secondRe + im * secondIm),
  };
}
