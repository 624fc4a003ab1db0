import { besselPrototype } from './bessel.ts';
import { butterworthPrototype, singlePolesCutoff, singlePolesPrototype } from './butterworth.ts';
import { chebyshevCutoff, chebyshevPrototype, inverseChebyshevCutoff, inverseChebyshevPrototype } from './chebyshev.ts';
import type { Curve } from './curve.ts';
import { ellipticPrototype } from './elliptic.ts';
import type { PoleFilter } from './filter-spec.ts';
import { bilinearCurve, prewarped, shapedCurve } from './frequency-map.ts';

/** The responses that have edges; `rc` has corners instead. */
type EdgedFilter = Exclude<PoleFilter, { response: 'rc' }>;

/** Just under half the rate, where the reader's limit is. */
const GREATEST_CYCLES = 0.5 - 1e-12;

/** A filter with poles, over frequency in Hz, ahead of a converter. */
export function analoguePoleCurve(filter: PoleFilter): Curve {
  return poleCurve(filter, (hz) => hz);
}

/**
 * The same filter through the bilinear transform: the frequency that was given is prewarped, so that it stays where it
 * was asked for, and the rest of the curve follows from it on the warped axis.
 */
export function digitalPoleCurve(filter: PoleFilter, rateHz: number): Curve {
  return bilinearCurve(
    poleCurve(filter, (hz) => prewarpedEdge(hz, rateHz)),
    rateHz,
  );
}

/** The frequency given of a filter that is to be transformed, just under half the rate at most, on the prewarped axis. */
export function prewarpedEdge(hz: number, rateHz: number): number {
  return prewarped(Math.min(hz, GREATEST_CYCLES * rateHz), rateHz);
}

function poleCurve(filter: PoleFilter, axis: (hz: number) => number): Curve {
  const { scale, lowHz, highHz } = placementOf(filter);
  const prototype = scale === 1 ? prototypeOf(filter) : scaled(prototypeOf(filter), scale);
  return shapedCurve(prototype, filter.shape, axis(lowHz), axis(highHz));
}

/** The low-pass prototype over x, with x = 1 where its own formula has its edge. */
function prototypeOf(filter: PoleFilter): Curve {
  switch (filter.response) {
    case 'butterworth':
      return butterworthPrototype(filter.order);
    case 'bessel':
      return besselPrototype(filter.order);
    case 'chebyshev':
      return chebyshevPrototype(filter.order, filter.rippleDb);
    case 'inverse-chebyshev':
      return inverseChebyshevPrototype(filter.order, filter.stopbandDb);
    case 'elliptic':
      return ellipticPrototype(filter.order, filter.rippleDb, filter.stopbandDb).curve;
    case 'rc':
      return singlePolesPrototype(filter.order);
  }
}

/** Where a prototype is put. */
interface Placement {
  /** Where the frequency that was given is on the prototype's own axis. */
  readonly scale: number;
  readonly lowHz: number;
  readonly highHz: number;
}

/** The frequencies at which a filter is held, and the point of its prototype that is put there. */
export function placementOf(filter: PoleFilter): Placement {
  if (filter.response !== 'rc') return { ...filter.edge, scale: edgeOf(filter) };
  const { lowHz, highHz } = filter.cornerHz;
  if (filter.given !== 'cutoff' || filter.shape === 'band-pass') return { scale: 1, lowHz, highHz };
  const scale = singlePolesCutoff(filter.order);
  const cutoffHz = filter.shape === 'low-pass' ? lowHz * scale : lowHz / scale;
  return { scale, lowHz: cutoffHz, highHz: cutoffHz };
}

/** Where the edge that was given is on the prototype's own axis. */
function edgeOf(filter: EdgedFilter): number {
  switch (filter.response) {
    case 'butterworth':
    case 'bessel':
      return 1;
    case 'chebyshev':
      return filter.edge.at === 'cutoff' ? chebyshevCutoff(filter.order, filter.rippleDb) : 1;
    case 'inverse-chebyshev':
      return filter.edge.at === 'cutoff' ? inverseChebyshevCutoff(filter.order, filter.stopbandDb) : 1;
    case 'elliptic': {
      if (filter.edge.at === 'pass-edge') return 1;
      const { cutoff, stopEdge } = ellipticPrototype(filter.order, filter.rippleDb, filter.stopbandDb);
      return filter.edge.at === 'cutoff' ? cutoff : stopEdge;
    }
  }
}

function scaled(curve: Curve, factor: number): Curve {
  return {
    at: (x) => curve.at(x * factor),
    least: (low, high) => curve.least(low * factor, high * factor),
    greatest: (low, high) => curve.greatest(low * factor, high * factor),
  };
}
