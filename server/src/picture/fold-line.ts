import type { Chain } from '../chain/model.ts';
import { foldHz, foldThrough } from '../signal/folding.ts';

/** A point of the fold line: where a true frequency arrives, and what the filters take off on the way. */
export interface FoldPoint {
  readonly trueHz: number;
  readonly recordedHz: number;
  readonly attenuationDb: number;
}

/** The straight pieces of the fold line over a stretch of true frequency, each as points of ascending frequency. */
export type FoldLine = readonly (readonly FoldPoint[])[];

/** Points on all pieces together: enough for what the filters take off to be followed smoothly. */
const POINTS = 320;
const LEAST_POINTS_A_PIECE = 5;
/** More pieces than this on one stretch are a thicket; stretches are chosen so that they have fewer. */
const MOST_PIECES = 96;

/** The fold line over a stretch of true frequency. */
export function foldLineOf(chain: Chain, lowHz: number, highHz: number): FoldLine {
  const pieces = foldThrough(lowHz, highHz, chain.ratesHz, MOST_PIECES).filter(({ collapsed }) => !collapsed);
  const count = Math.max(LEAST_POINTS_A_PIECE, Math.round(POINTS / Math.max(1, pieces.length)));
  return pieces.map(({ trueLowHz, trueHighHz }) =>
    Array.from({ length: count }, (_, index) => {
      const part = index / (count - 1);
      return pointAt(chain, index === count - 1 ? trueHighHz : trueLowHz + (trueHighHz - trueLowHz) * part);
    }),
  );
}

/** Where a true frequency arrives in the record, and what the filters take off on the way, nominally. */
export function pointAt(chain: Chain, trueHz: number): FoldPoint {
  let hz = trueHz;
  let attenuationDb = 0;
  for (const stage of chain.stages) {
    for (const { response } of stage.filters) attenuationDb += response.attenuationDb(hz);
    hz = foldHz(hz, stage.rateHz);
  }
  for (const { response } of chain.after) attenuationDb += response.attenuationDb(hz);
  return { trueHz, recordedHz: hz, attenuationDb };
}
