import { foldHz } from '../signal/folding.ts';
import type { Component } from './components.ts';
import type { SignalPath } from './model.ts';

/** Frequencies closer than this, relative to a rate, are the same. */
const ROUNDING = 1e-9;

/**
 * The first stage, from 1, at which a component may stand on a multiple of half the rate: within its own tolerance
 * and the clock's. `null` where it can't.
 *
 * What sweeps over a range passes such a point and does not stay there; what has a tolerance of half a zone is near
 * a multiple whatever the rate. Neither is meant.
 */
export function onNyquistAtStage(component: Component, path: SignalPath): number | null {
  const { nominalHz, lowHz, highHz } = component;
  if (nominalHz === undefined) return null;
  return nearNyquistAtStage(nominalHz, Math.max(nominalHz - lowHz, highHz - nominalHz), path);
}

/**
 * The first stage, from 1, at which a frequency is within `reachHz` of a multiple of half the rate, or farther by no
 * more than the clock's tolerance. `null` where it is at none, or where the reach is half a zone.
 */
export function nearNyquistAtStage(
  nominalHz: number,
  reachHz: number,
  { ratesHz, clockTolerance }: SignalPath,
): number | null {
  let hz = nominalHz;
  for (let index = 0; index < ratesHz.length; index++) {
    const rateHz = ratesHz[index]!;
    const pointHz = pointNear(hz, rateHz);
    const slackHz = reachHz + pointHz * clockTolerance + ROUNDING * rateHz;
    if (pointHz > 0 && reachHz < rateHz / 4 && Math.abs(hz - pointHz) <= slackHz) return index + 1;
    hz = foldHz(hz, rateHz);
  }
  return null;
}

/** Where the multiple of half a stage's rate that is nearest to a component is recorded in the end. */
export function recordedPointHz(nominalHz: number, stage: number, ratesHz: readonly number[]): number {
  let hz = nominalHz;
  for (let index = 0; index < ratesHz.length; index++) {
    const rateHz = ratesHz[index]!;
    hz = foldHz(index === stage - 1 ? pointNear(hz, rateHz) : hz, rateHz);
  }
  return hz;
}

function pointNear(hz: number, rateHz: number): number {
  return (Math.round((2 * hz) / rateHz) * rateHz) / 2;
}
