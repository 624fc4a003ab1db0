import type { Curve } from './curve.ts';
import type { FilterShape } from './filter-spec.ts';

/** Keeps quotients of an edge at 0 Hz, or of a band without width, from having no value. */
const SMALLEST_HZ = 1e-300;

/**
 * A low-pass prototype over x, where x = 1 is the edge that was given, turned into a filter over frequency:
 * low-pass x = f / edge, high-pass x = edge / f, band-pass low..high x = |f^2 - low high| / (f (high - low)).
 *
 * Each map is continuous, so the image of an interval is an interval and the prototype's extremes stay exact.
 */
export function shapedCurve(prototype: Curve, shape: FilterShape, lowHz: number, highHz: number): Curve {
  if (shape === 'low-pass') return lowPass(prototype, Math.max(lowHz, SMALLEST_HZ));
  if (shape === 'high-pass') return highPass(prototype, Math.max(lowHz, SMALLEST_HZ));
  return bandPass(prototype, Math.max(lowHz, SMALLEST_HZ), Math.max(highHz, SMALLEST_HZ));
}

function lowPass(prototype: Curve, edgeHz: number): Curve {
  return {
    at: (f) => prototype.at(f / edgeHz),
    least: (low, high) => prototype.least(low / edgeHz, high / edgeHz),
    greatest: (low, high) => prototype.greatest(low / edgeHz, high / edgeHz),
  };
}

function highPass(prototype: Curve, edgeHz: number): Curve {
  return {
    at: (f) => prototype.at(edgeHz / f),
    least: (low, high) => prototype.least(edgeHz / high, edgeHz / low),
    greatest: (low, high) => prototype.greatest(edgeHz / high, edgeHz / low),
  };
}

function bandPass(prototype: Curve, lowHz: number, highHz: number): Curve {
  const width = Math.max(highHz - lowHz, SMALLEST_HZ);
  const centreHz = Math.sqrt(lowHz) * Math.sqrt(highHz);
  const at = (f: number): number => (f > 0 ? Math.abs(f - lowHz * (highHz / f)) / width : Infinity);
  const lowest = (low: number, high: number): number =>
    low <= centreHz && centreHz <= high ? 0 : Math.min(at(low), at(high));
  return {
    at: (f) => prototype.at(at(f)),
    least: (low, high) => prototype.least(lowest(low, high), Math.max(at(low), at(high))),
    greatest: (low, high) => prototype.greatest(lowest(low, high), Math.max(at(low), at(high))),
  };
}

/** The bilinear transform's frequency scale, up to a factor that cancels: tan(pi f / rate), `Infinity` from half the rate on. */
export function prewarped(frequencyHz: number, rateHz: number): number {
  const cycles = frequencyHz / rateHz;
  return cycles < 0.5 ? Math.tan(Math.PI * cycles) : Infinity;
}

/** A curve over the prewarped axis, seen over frequency. */
export function bilinearCurve(warped: Curve, rateHz: number): Curve {
  return {
    at: (f) => warped.at(prewarped(f, rateHz)),
    least: (low, high) => warped.least(prewarped(low, rateHz), prewarped(high, rateHz)),
    greatest: (low, high) => warped.greatest(prewarped(low, rateHz), prewarped(high, rateHz)),
  };
}
