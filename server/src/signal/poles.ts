import { besselPrototype } from './bessel.ts';
import { butterworthPrototype, singlePolesCutoff, singlePolesPrototype } from './butterworth.ts';
import { chebyshevCutoff, chebyshevPrototype, inverseChebyshevCutoff, inverseChebyshevPrototype } from './chebyshev.ts';
import type { Curve } from './curve.ts';
import { ellipticPrototype } from './elliptic.ts';
import type { FilterEdge, PoleFilter } from './filter-spec.ts';
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
    poleCurve(filter, (hz) => prewarped(Math.min(hz, GREATEST_CYCLES * rateHz), rateHz)),
    rateHz,
  );
}

function poleCurve(filter: PoleFilter, axis: (hz: number) => number): Curve {
  if (filter.response === 'rc') return singlePolesCurve(filter, axis);
  const { lowHz, highHz } = filter.edge;
  return shapedCurve(prototypeAtEdge(filter), filter.shape, axis(lowHz), axis(highHz));
}

/** The low-pass prototype over x, with x = 1 where the given edge is. */
function prototypeAtEdge(filter: EdgedFilter): Curve {
  switch (filter.response) {
    case 'butterworth':
      return butterworthPrototype(filter.order);
    case 'bessel':
      return besselPrototype(filter.order);
    case 'chebyshev': {
      const curve = chebyshevPrototype(filter.order, filter.rippleDb);
      return filter.edge.at === 'cutoff' ? scaled(curve, chebyshevCutoff(filter.order, filter.rippleDb)) : curve;
    }
    case 'inverse-chebyshev': {
      const curve = inverseChebyshevPrototype(filter.order, filter.stopbandDb);
      return filter.edge.at === 'cutoff'
        ? scaled(curve, inverseChebyshevCutoff(filter.order, filter.stopbandDb))
        : curve;
    }
    case 'elliptic': {
      const prototype = ellipticPrototype(filter.order, filter.rippleDb, filter.stopbandDb);
      const edges: Record<FilterEdge['at'], number> = {
        'pass-edge': 1,
        cutoff: prototype.cutoff,
        'stop-edge': prototype.stopEdge,
      };
      return scaled(prototype.curve, edges[filter.edge.at]);
    }
  }
}

function singlePolesCurve(filter: Extract<PoleFilter, { response: 'rc' }>, axis: (hz: number) => number): Curve {
  const curve = singlePolesPrototype(filter.order);
  const { lowHz, highHz } = filter.cornerHz;
  if (filter.given !== 'cutoff' || filter.shape === 'band-pass') {
    return shapedCurve(curve, filter.shape, axis(lowHz), axis(highHz));
  }
  const cutoff = singlePolesCutoff(filter.order);
  const cutoffHz = filter.shape === 'low-pass' ? lowHz * cutoff : lowHz / cutoff;
  return shapedCurve(scaled(curve, cutoff), filter.shape, axis(cutoffHz), axis(cutoffHz));
}

function scaled(curve: Curve, factor: number): Curve {
  return {
    at: (x) => curve.at(x * factor),
    least: (low, high) => curve.least(low * factor, high * factor),
    greatest: (low, high) => curve.greatest(low * factor, high * factor),
  };
}
