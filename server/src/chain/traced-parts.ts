import { type FoldedPiece, foldThrough } from '../signal/folding.ts';
import type { Component } from './components.ts';
import type { SignalPath } from './model.ts';
import { onNyquistAtStage } from './on-nyquist.ts';
import type { Strongest } from './strongest.ts';

/** Pieces of one component that are told apart. */
const MOST_PIECES = 16;

interface TracedBase {
  readonly component: Component;
  readonly onNyquistAtStage: number | null;
}

/** One piece of a component. */
export interface TracedPiece extends TracedBase {
  readonly kind: 'piece';
  readonly piece: FoldedPiece;
  /** True where it is beside a band that is folded on purpose, moves with it, and so never gets into it. */
  readonly isBesideBand: boolean;
  /** Where the whole piece comes through best: worked out when it is first needed, and the same for all who need it. */
  whole: Strongest | undefined;
  /** What the whole piece is sure to lose, likewise. */
  surely: Strongest | undefined;
}

/** What would be very many pieces that all first fold at one stage. */
export interface TracedMany extends TracedBase {
  readonly kind: 'many';
  readonly lowHz: number;
  readonly highHz: number;
  /** From 1. */
  readonly stage: number;
}

export type TracedPart = TracedPiece | TracedMany;

/** A component in parts that each fold as one, or all at one stage. */
export function tracedParts(component: Component, path: SignalPath): readonly TracedPart[] {
  const { ratesHz } = path;
  const base: TracedBase = { component, onNyquistAtStage: onNyquistAtStage(component, path) };
  const pieces = fewPieces(component.lowHz, component.highHz, ratesHz);
  if (pieces) return piecesOf(base, pieces);
  const parts: TracedPart[] = [];
  // From the top of the record upward: what is native, what first folds at the last stage, ..., at the first.
  let lowHz = component.lowHz;
  for (let stage = ratesHz.length + 1; stage >= 1; stage--) {
    const topHz = stage === 1 ? Infinity : ratesHz[stage - 2]! / 2;
    const highHz = Math.min(component.highHz, topHz);
    if (lowHz >= highHz) continue;
    const few = fewPieces(lowHz, highHz, ratesHz);
    if (few) parts.push(...piecesOf(base, few));
    else parts.push({ ...base, kind: 'many', lowHz, highHz, stage });
    lowHz = highHz;
  }
  return parts;
}

function piecesOf(base: TracedBase, pieces: readonly FoldedPiece[]): readonly TracedPart[] {
  const { component, onNyquistAtStage } = base;
  return pieces.map((piece) => ({
    kind: 'piece',
    component,
    onNyquistAtStage,
    piece,
    isBesideBand: false,
    whole: undefined,
    surely: undefined,
  }));
}

/** The pieces of a range, where they are few enough to be told apart. */
function fewPieces(lowHz: number, highHz: number, ratesHz: readonly number[]): readonly FoldedPiece[] | undefined {
  const pieces = foldThrough(lowHz, highHz, ratesHz, MOST_PIECES);
  return pieces.some(({ collapsed }) => collapsed) ? undefined : pieces;
}
