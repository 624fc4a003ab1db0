import { MOST_CHANNELS } from '../rig/limits.ts';
import {
  type GapKind,
  greatestGap,
  LEAST_PART,
  type PhaseGap,
  phaseAxis,
  type SampledPhase,
  sampledPhase,
} from '../signal/phase-gap.ts';
import { type ChainPhase, chainPhaseOf, type UntoldPhase } from './chain-phase.ts';
import type { Chain, SignalPath } from './model.ts';

/** How the chains of a group are compared. */
export interface Comparison {
  readonly upToHz: number;
  readonly kind: GapKind;
  /** Where their phases are sampled: up to `upToHz`. */
  readonly axis: Float64Array;
}

export function comparisonUpTo(upToHz: number, kind: GapKind): Comparison {
  return { upToHz, kind, axis: phaseAxis(upToHz) };
}

/** The part of what they have apart that sensors, analogue filters or digital ones make, in rad. */
export interface PhaseParts {
  readonly sensor: number;
  readonly analogue: number;
  readonly digital: number;
}

/**
 * The greatest difference of phase of two chains, one less the other; `undefined` where it can't be told: a filter that
 * was not understood, or one that says nothing of its phase and is not in both of them.
 *
 * It is looked for up to `upToHz`, as far as both are recorded, and from where both bands have begun: what is below a
 * band is not used, and there AC coupling turns a phase by up to 90 degrees.
 */
export function phaseApart(one: Chain, other: Chain, comparison: Comparison): PhaseGap | undefined {
  const { upToHz } = comparison;
  const highHz = Math.min(upToHz, nyquistOf(one), nyquistOf(other));
  const lowHz = Math.max(one.bandLowHz, other.bandLowHz, upToHz * LEAST_PART);
  if (lowHz > highHz || !one.understood || !other.understood) return undefined;
  if (one.path === other.path) return { phaseRad: 0, atHz: highHz };
  const { gaps } = pairOf(one.path, other.path, comparison);
  if (gaps.has(lowHz)) return gaps.get(lowHz);
  const gap = comparedPhase(one, other, comparison, lowHz, highHz);
  if (gaps.size >= MOST_CHANNELS) gaps.clear();
  gaps.set(lowHz, gap);
  return gap;
}

/** The difference of phase of two chains at one frequency in rad; `undefined` where it can't be told. */
export function phaseApartAt(one: Chain, other: Chain, hz: number): number | undefined {
  if (!one.understood || !other.understood) return undefined;
  if (one.path === other.path) return 0;
  const phases = comparablePhases(one, other);
  return phases && phases.one.whole.phaseRad(hz) - phases.other.whole.phaseRad(hz);
}

/** What makes the difference of two chains at a frequency. */
export function partsApart(one: Chain, other: Chain, hz: number): PhaseParts {
  const part = (of: keyof PhaseParts): number =>
    (chainPhaseOf(one)?.[of].phaseRad(hz) ?? 0) - (chainPhaseOf(other)?.[of].phaseRad(hz) ?? 0);
  return { sensor: part('sensor'), analogue: part('analogue'), digital: part('digital') };
}

function nyquistOf({ ratesHz }: Chain): number {
  return ratesHz[ratesHz.length - 1]! / 2;
}

function comparedPhase(
  one: Chain,
  other: Chain,
  { upToHz, kind, axis }: Comparison,
  lowHz: number,
  highHz: number,
): PhaseGap | undefined {
  const phases = comparablePhases(one, other);
  if (!phases) return undefined;
  const sampled = ({ path }: Chain, { whole }: ChainPhase): SampledPhase => ({
    response: whole,
    samples: samplesOf(path, whole, upToHz, axis),
  });
  return greatestGap(sampled(one, phases.one), sampled(other, phases.other), axis, lowHz, highHz, kind);
}

function comparablePhases(
  one: Chain,
  other: Chain,
): { readonly one: ChainPhase; readonly other: ChainPhase } | undefined {
  const phase = chainPhaseOf(one);
  const otherPhase = chainPhaseOf(other);
  if (!phase || !otherPhase || !cancel(phase.untold, otherPhase.untold)) return undefined;
  return { one: phase, other: otherPhase };
}

/** Whether what says nothing of its phase is the same in both, so that it makes no difference. */
function cancel(some: readonly UntoldPhase[], others: readonly UntoldPhase[]): boolean {
  if (some.length !== others.length) return false;
  return some.every(({ filter, ofHz }, index) => filter === others[index]!.filter && ofHz === others[index]!.ofHz);
}

/** What two paths have apart, by the frequency from which on it is looked for. */
interface Pair {
  readonly other: SignalPath;
  readonly upToHz: number;
  readonly kind: GapKind;
  readonly gaps: Map<number, PhaseGap | undefined>;
}

/** Pairs kept for each path. */
const MOST_PAIRS = 4;

/** A path is never changed, so that what is kept of it can't go out of date; it goes when the path does. */
const pairs = new WeakMap<SignalPath, Pair[]>();

function pairOf(path: SignalPath, other: SignalPath, { upToHz, kind }: Comparison): Pair {
  const known = pairs.get(path) ?? [];
  const found = known.find((pair) => pair.other === other && pair.upToHz === upToHz && pair.kind === kind);
  if (found) return found;
  const pair: Pair = { other, upToHz, kind, gaps: new Map() };
  pairs.set(path, [pair, ...known.slice(0, MOST_PAIRS - 1)]);
  return pair;
}

interface Samples {
  readonly upToHz: number;
  readonly samples: Float64Array;
}

/** The phases of paths along the axis that they were last asked for: once for each path, whatever it is compared with. */
const sampledPaths = new WeakMap<SignalPath, Samples>();

function samplesOf(path: SignalPath, whole: ChainPhase['whole'], upToHz: number, axis: Float64Array): Float64Array {
  const known = sampledPaths.get(path);
  if (known?.upToHz === upToHz) return known.samples;
  const samples = sampledPhase(whole, axis);
  sampledPaths.set(path, { upToHz, samples });
  return samples;
}
