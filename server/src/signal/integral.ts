import { MinimumHeap } from './minimum-heap.ts';

/**
 * Integrals by the rule of Gauss with 7 points and its extension by Kronrod to 15, parted where the two disagree.
 * Source: Kronrod 1965; nodes and weights as in Piessens and others, QUADPACK, 1983.
 */

const NODES = [
  0.9914553711208126, 0.9491079123427585, 0.8648644233597691, 0.7415311855993945, 0.5860872354676911,
  0.4058451513773972, 0.2077849550078985,
];
const WEIGHTS = [
  0.0229353220105292, 0.0630920926299786, 0.1047900103222502, 0.1406532597155259, 0.1690047266392679,
  0.1903505780647854, 0.2044329400752989,
];
const MIDDLE_WEIGHT = 0.2094821410847278;
/** Of the rule with 7 points, which has every second node; 0 at the others. */
const FEWER_WEIGHTS = [0, 0.1294849661688697, 0, 0.2797053914892767, 0, 0.3818300505051189, 0];
const FEWER_MIDDLE_WEIGHT = 0.4179591836734694;

/** A peak this much higher than all 15 points may have slipped between them. */
const HIDDEN_RATIO = 16;

/** Relative difference of the two rules at which the better one is taken; its own error is far less. */
const CLOSE = 1e-3;

/** Parts that an integral is made of at most. */
const MOST_PARTS = 256;

/** A function that is nowhere negative, and a bound on it over a closed interval. */
export interface Integrand {
  at(x: number): number;
  /** No less than the greatest value over the interval. */
  bound(low: number, high: number): number;
}

export interface Estimate {
  readonly value: number;
  /** How far off it may be: far more than it is, as a rule. */
  readonly error: number;
}

/** The integral over `low..high` as 15 points see it. Where the bound says that a peak is hidden, the error holds it. */
export function estimateOver(integrand: Integrand, low: number, high: number): Estimate {
  const half = (high - low) / 2;
  const middle = low + half;
  const centre = integrand.at(middle);
  let sum = MIDDLE_WEIGHT * centre;
  let fewer = FEWER_MIDDLE_WEIGHT * centre;
  let greatest = centre;
  for (let i = 0; i < NODES.length; i++) {
    const reach = half * NODES[i]!;
    const below = integrand.at(middle - reach);
    const above = integrand.at(middle + reach);
    sum += WEIGHTS[i]! * (below + above);
    fewer += FEWER_WEIGHTS[i]! * (below + above);
    greatest = Math.max(greatest, below, above);
  }
  const bound = integrand.bound(low, high);
  const hidden = bound > HIDDEN_RATIO * greatest ? bound * (high - low) : 0;
  return { value: half * sum, error: Math.max(half * Math.abs(sum - fewer), hidden) };
}

/** Whether an estimate is as close as it need be: to a thousandth, or to what is `negligible`. */
export function isClose({ value, error }: Estimate, negligible: number): boolean {
  return error <= Math.max(CLOSE * value, negligible);
}

interface Part extends Estimate {
  readonly low: number;
  readonly high: number;
}

/**
 * The integral over `low..high`, both finite, to a thousandth of itself or to within `negligible`, whichever is more;
 * what 256 parts can do where that is not enough.
 */
export function integralOver(integrand: Integrand, low: number, high: number, negligible: number): number {
  if (!(low < high) || integrand.bound(low, high) * (high - low) <= negligible) return 0;
  const parts = new MinimumHeap<Part>((part) => -part.error);
  let { value, error } = estimateOver(integrand, low, high);
  parts.add({ value, error, low, high });
  for (let count = 1; count < MOST_PARTS && !isClose({ value, error }, negligible); count++) {
    const worst = parts.least();
    if (worst === undefined) break;
    const middle = (worst.low + worst.high) / 2;
    if (middle <= worst.low || middle >= worst.high) break;
    parts.removeLeast();
    const below = estimateOver(integrand, worst.low, middle);
    const above = estimateOver(integrand, middle, worst.high);
    value += below.value + above.value - worst.value;
    error += below.error + above.error - worst.error;
    parts.add({ ...below, low: worst.low, high: middle });
    parts.add({ ...above, low: middle, high: worst.high });
  }
  return Math.max(value, 0);
}
