/**
 * Digital filters that are really run, sample by sample, designed here from textbooks and not from the code under
 * test: Oppenheim and Schafer, Discrete-Time Signal Processing (bilinear transform, windowed design); Kaiser 1974;
 * Hogenauer 1981 (a CIC filter is a cascade of running sums).
 */

/** A second-order section: b0 + b1 z^-1 + b2 z^-2 over 1 + a1 z^-1 + a2 z^-2. */
interface Section {
  readonly b: readonly [number, number, number];
  readonly a: readonly [number, number];
}

export type RunnableFilter =
  | { readonly kind: 'taps'; readonly taps: readonly number[] }
  | { readonly kind: 'sections'; readonly sections: readonly Section[] };

/** What the filter makes of a record; the first samples hold its start. */
export function run(filter: RunnableFilter, input: Float64Array): Float64Array {
  return filter.kind === 'taps' ? convolve(filter.taps, input) : filter.sections.reduce(runSection, input);
}

function convolve(taps: readonly number[], input: Float64Array): Float64Array {
  const output = new Float64Array(input.length);
  for (let n = 0; n < input.length; n++) {
    let sum = 0;
    for (let k = Math.min(taps.length - 1, n); k >= 0; k--) sum += taps[k]! * input[n - k]!;
    output[n] = sum;
  }
  return output;
}

function runSection(input: Float64Array, { b, a }: Section): Float64Array {
  const output = new Float64Array(input.length);
  for (let n = 0; n < input.length; n++) {
    const x1 = input[n - 1] ?? 0;
    const x2 = input[n - 2] ?? 0;
    const y1 = output[n - 1] ?? 0;
    const y2 = output[n - 2] ?? 0;
    output[n] = b[0] * input[n]! + b[1] * x1 + b[2] * x2 - a[0] * y1 - a[1] * y2;
  }
  return output;
}

/** Keeps every `factor`-th sample. */
export function keepEvery(factor: number, input: Float64Array): Float64Array {
  return Float64Array.from({ length: Math.floor(input.length / factor) }, (_, n) => input[n * factor]!);
}

/** Taps scaled to pass a constant as it is; band-pass taps are not used here. */
export function passingConstant(taps: readonly number[]): RunnableFilter {
  const sum = taps.reduce((total, tap) => total + tap, 0);
  return { kind: 'taps', taps: taps.map((tap) => tap / sum) };
}

export function runningMean(length: number): RunnableFilter {
  return { kind: 'taps', taps: new Array<number>(length).fill(1 / length) };
}

/** `order` running sums of `length` one after the other. */
export function repeatedMean(length: number, order: number): RunnableFilter {
  let taps: number[] = [1];
  for (let pass = 0; pass < order; pass++) {
    const next = new Array<number>(taps.length + length - 1).fill(0);
    taps.forEach((tap, at) => {
      for (let k = 0; k < length; k++) next[at + k]! += tap / length;
    });
    taps = next;
  }
  return { kind: 'taps', taps };
}

/** Kaiser's windowed sinc; all frequencies in cycles a sample. */
export function kaiserDesign(pass: number, stop: number, stopbandDb: number): RunnableFilter {
  const plain = Math.ceil((stopbandDb - 7.95) / (14.36 * (stop - pass))) + 1;
  const length = plain % 2 === 1 ? plain : plain + 1;
  const beta =
    stopbandDb > 50 ? 0.1102 * (stopbandDb - 8.7) : 0.5842 * (stopbandDb - 21) ** 0.4 + 0.07886 * (stopbandDb - 21);
  const middle = (length - 1) / 2;
  const cutoff = (pass + stop) / 2;
  const taps = Array.from({ length }, (_, n) => {
    const offset = n - middle;
    const sinc = offset === 0 ? 2 * cutoff : Math.sin(2 * Math.PI * cutoff * offset) / (Math.PI * offset);
    return sinc * besselI0(beta * Math.sqrt(1 - (offset / middle) ** 2));
  });
  return passingConstant(taps);
}

function besselI0(x: number): number {
  let sum = 1;
  let term = 1;
  for (let k = 1; k < 200; k++) {
    term *= (x / (2 * k)) ** 2;
    sum += term;
  }
  return sum;
}

/** Butterworth low-pass by the bilinear transform, cutoff in cycles a sample prewarped. */
export function butterworthDesign(order: number, cutoff: number): RunnableFilter {
  const poles = Array.from({ length: order }, (_, k) => {
    const angle = (Math.PI * (2 * k + order + 1)) / (2 * order);
    return { re: Math.cos(angle), im: Math.sin(angle) };
  });
  return sectionsOf(poles, cutoff);
}

/** Chebyshev low-pass by the bilinear transform, the edge of the ripple in cycles a sample prewarped. */
export function chebyshevDesign(order: number, rippleDb: number, passEdge: number): RunnableFilter {
  const e = Math.sqrt(10 ** (rippleDb / 10) - 1);
  const spread = Math.asinh(1 / e) / order;
  const poles = Array.from({ length: order }, (_, k) => {
    const angle = (Math.PI * (2 * k + 1)) / (2 * order);
    return { re: -Math.sinh(spread) * Math.sin(angle), im: Math.cosh(spread) * Math.cos(angle) };
  });
  // An even order starts at the bottom of its ripple.
  return sectionsOf(poles, passEdge, order % 2 === 0 ? 10 ** (-rippleDb / 20) : 1);
}

interface Pole {
  readonly re: number;
  readonly im: number;
}

/** All-pole prototype (edge at 1 rad/s) to second-order sections through s = (1 / w) (1 - z^-1) / (1 + z^-1). */
function sectionsOf(poles: readonly Pole[], edge: number, gain = 1): RunnableFilter {
  const w = Math.tan(Math.PI * edge);
  const sections: Section[] = [];
  for (const { re, im } of poles) {
    if (im < -1e-12) continue;
    if (Math.abs(im) <= 1e-12) {
      // -re / (s - re)
      const p = -re * w;
      const scale = p / (1 + p);
      sections.push({ b: [scale, scale, 0], a: [(p - 1) / (1 + p), 0] });
      continue;
    }
    // |p|^2 / (s^2 - 2 re s + |p|^2)
    const square = (re * re + im * im) * w * w;
    const cross = -2 * re * w;
    const norm = 1 + cross + square;
    const scale = square / norm;
    sections.push({ b: [scale, 2 * scale, scale], a: [(2 * square - 2) / norm, (1 - cross + square) / norm] });
  }
  const [first, ...rest] = sections;
  const [b0, b1, b2] = first!.b;
  return { kind: 'sections', sections: [{ ...first!, b: [b0 * gain, b1 * gain, b2 * gain] }, ...rest] };
}
