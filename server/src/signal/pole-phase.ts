import { besselPhase } from './bessel-phase.ts';
import type { PoleFilter } from './filter-spec.ts';
import type { PhaseResponse } from './phase-response.ts';
import { placementOf, prewarpedEdge } from './poles.ts';
import { type PrototypePhase, phaseOfPoles, stretchedPhase } from './prototype-phase.ts';
import {
  butterworthPoles,
  chebyshevPoles,
  ellipticPoles,
  inverseChebyshevPoles,
  singlePoles,
} from './prototype-poles.ts';

/** A point on the axis of a filter: over / under, and how fast it goes: over' under - over under', per Hz. */
interface AxisPoint {
  readonly over: number;
  readonly under: number;
  readonly pace: number;
}

/** Keeps an edge at 0 Hz, or a band without width, from making 0 / 0; its square is still a double. */
const SMALLEST = 1e-150;

/** Phase and delay of a filter with poles, ahead of a converter. */
export function analoguePolePhase(filter: PoleFilter): PhaseResponse {
  const { scale, lowHz, highHz } = placementOf(filter);
  return shapedPhase(filter, scale, lowHz, highHz, (hz) => ({ over: hz, under: 1, pace: 1 }));
}

/** The same through the bilinear transform: the axis is tan(pi f / rate), as for `digitalPoleCurve`. */
export function digitalPolePhase(filter: PoleFilter, rateHz: number): PhaseResponse {
  const { scale, lowHz, highHz } = placementOf(filter);
  const pace = Math.PI / rateHz;
  return shapedPhase(filter, scale, prewarpedEdge(lowHz, rateHz), prewarpedEdge(highHz, rateHz), (hz) => {
    const angle = pace * Math.min(hz, rateHz / 2);
    return { over: Math.sin(angle), under: Math.cos(angle), pace };
  });
}

/** @param axis where a frequency is on the axis that the edges are on */
function shapedPhase(
  filter: PoleFilter,
  scale: number,
  givenLow: number,
  givenHigh: number,
  axis: (hz: number) => AxisPoint,
): PhaseResponse {
  const low = Math.max(givenLow, SMALLEST);
  const high = Math.max(givenHigh, SMALLEST);
  const prototype = prototypePhase(filter);
  const { phaseRad, scaledDelay } = scale === 1 ? prototype : stretchedPhase(prototype, scale);
  const shaped = (hz: number): AxisPoint => {
    const { over, under, pace } = axis(hz);
    switch (filter.shape) {
      case 'low-pass':
        return { over, under: under * low, pace: pace * low };
      case 'high-pass':
        return { over: -under * low, under: over, pace: pace * low };
      case 'band-pass': {
        const product = low * high;
        const width = Math.max(high - low, SMALLEST);
        return {
          over: over * over - product * under * under,
          under: over * under * width,
          pace: pace * width * (over * over + product * under * under),
        };
      }
    }
  };
  return {
    phaseRad(hz) {
      const { over, under } = ofSizeOne(shaped(hz));
      return phaseRad(over, under);
    },
    groupDelayS(hz) {
      const { over, under, pace } = ofSizeOne(shaped(hz));
      return (scaledDelay(over, under) * pace) / (2 * Math.PI);
    },
  };
}

/** The same point, so that no square vanishes. */
function ofSizeOne({ over, under, pace }: AxisPoint): AxisPoint {
  const size = Math.max(Math.abs(over), under);
  // The lower end of a band at 0 Hz, which stands still there.
  if (size === 0) return { over: 0, under: 1, pace: 0 };
  return { over: over / size, under: under / size, pace: pace / size / size };
}

function prototypePhase(filter: PoleFilter): PrototypePhase {
  switch (filter.response) {
    case 'butterworth':
      return phaseOfPoles(butterworthPoles(filter.order));
    case 'bessel':
      return besselPhase(filter.order);
    case 'chebyshev':
      return phaseOfPoles(chebyshevPoles(filter.order, filter.rippleDb));
    case 'inverse-chebyshev':
      return phaseOfPoles(inverseChebyshevPoles(filter.order, filter.stopbandDb));
    case 'elliptic':
      return phaseOfPoles(ellipticPoles(filter.order, filter.rippleDb, filter.stopbandDb));
    case 'rc':
      return phaseOfPoles(singlePoles(filter.order));
  }
}
