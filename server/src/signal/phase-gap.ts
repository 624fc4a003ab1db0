import type { PhaseResponse } from './phase-response.ts';

/** How two phases are compared: as an angle, or as the time that the angle is at its frequency. */
export type GapKind = 'angle' | 'time';

/** The greatest difference between two phases over a range. */
export interface PhaseGap {
  /** One less the other in rad; negative where the one is late. */
  readonly phaseRad: number;
  readonly atHz: number;
}

/** Points of a sampled phase. */
const POINTS = 64;

/** Below this part of its top a range is not looked at: at 0 Hz a time is no angle, and a high-pass leaves nothing. */
export const LEAST_PART = 1e-4;

/** Halvings, or nearly, of the stretch that the greatest difference is in. */
const STEPS = 32;
const GOLDEN = (Math.sqrt(5) - 1) / 2;

/**
 * Where phases are sampled below a frequency, ascending: 32 points evenly over the logarithm, where corners of
 * high-passes are told apart, and 32 evenly over the frequency, where delays are.
 */
export function phaseAxis(topHz: number): Float64Array {
  const half = POINTS / 2;
  const points = Array.from({ length: half }, (_, n) => [
    topHz * LEAST_PART ** (1 - n / half),
    (topHz * (n + 1)) / half,
  ]);
  return Float64Array.from(points.flat()).sort();
}

/** A phase along an axis, in rad. */
export function sampledPhase(response: PhaseResponse, axis: Float64Array): Float64Array {
  return axis.map((hz) => response.phaseRad(hz));
}

/** A phase, and what it is along an axis that it shares with others. */
export interface SampledPhase {
  readonly response: PhaseResponse;
  readonly samples: Float64Array;
}

/**
 * The greatest difference over `lowHz .. highHz` (low above 0), to within what a bump narrower than the axis may hide:
 * the greatest sample within and the two ends are compared, and the stretch around it searched.
 */
export function greatestGap(
  one: SampledPhase,
  other: SampledPhase,
  axis: Float64Array,
  lowHz: number,
  highHz: number,
  kind: GapKind,
): PhaseGap {
  const gapAt = (hz: number): PhaseGap => ({
    phaseRad: one.response.phaseRad(hz) - other.response.phaseRad(hz),
    atHz: hz,
  });
  let best = greater(gapAt(lowHz), gapAt(highHz), kind);
  let bestIndex = -1;
  for (let index = 0; index < axis.length; index++) {
    const atHz = axis[index]!;
    if (atHz <= lowHz || atHz >= highHz) continue;
    const gap = { phaseRad: one.samples[index]! - other.samples[index]!, atHz };
    if (sizeOf(gap, kind) <= sizeOf(best, kind)) continue;
    best = gap;
    bestIndex = index;
  }
  // At an end a difference that still grows is greatest there, to within the first stretch.
  const fromHz = bestIndex >= 0 ? Math.max(axis[bestIndex - 1] ?? lowHz, lowHz) : lowHz;
  const toHz = bestIndex >= 0 ? Math.min(axis[bestIndex + 1] ?? highHz, highHz) : highHz;
  return bestIndex >= 0 ? greater(searched(gapAt, fromHz, toHz, kind), best, kind) : best;
}

/** The size of a difference in rad, or in s. */
export function sizeOf({ phaseRad, atHz }: PhaseGap, kind: GapKind): number {
  const size = Math.abs(phaseRad);
  return kind === 'angle' ? size : size / (2 * Math.PI * atHz);
}

/** The first of two where they are the same. */
function greater(one: PhaseGap, other: PhaseGap, kind: GapKind): PhaseGap {
  return sizeOf(other, kind) > sizeOf(one, kind) ? other : one;
}

/** Golden section. Source: Press et al., Numerical Recipes, the chapter on minimization in one dimension. */
function searched(gapAt: (hz: number) => PhaseGap, fromHz: number, toHz: number, kind: GapKind): PhaseGap {
  let low = fromHz;
  let high = toHz;
  let left = gapAt(high - GOLDEN * (high - low));
  let right = gapAt(low + GOLDEN * (high - low));
  for (let step = 0; step < STEPS; step++) {
    if (sizeOf(left, kind) >= sizeOf(right, kind)) {
      high = right.atHz;
      right = left;
      left = gapAt(high - GOLDEN * (high - low));
    } else {
      low = left.atHz;
      left = right;
      right = gapAt(low + GOLDEN * (high - low));
    }
  }
  return greater(left, right, kind);
}
