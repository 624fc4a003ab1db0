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

/** Points on each straight piece: enough for it to fade smoothly. */
const POINTS_A_PIECE = 9;
/** A picture with more pieces than this shows a grey block; a stretch is chosen so that it has fewer. */
const MOST_PIECES = 96;

/** The fold line over a stretch of true frequency. */
export function foldLineOf(chain: Chain, lowHz: number, highHz: number): FoldLine {
  return foldThrough(lowHz, highHz, chain.ratesHz, MOST_PIECES).map((piece) =>
    Array.from({ length: POINTS_A_PIECE }, (_, index) => {
      const trueHz = piece.trueLowHz + ((piece.trueHighHz - piece.trueLowHz) * index) / (POINTS_A_PIECE - 1);
      return pointAt(chain, trueHz);
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
