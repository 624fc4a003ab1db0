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

/** An image that uneven sampling makes: so far beside the original, and so much lower. */
export interface LineImage {
  readonly shiftHz: number;
  readonly lossDb: number;
}

const NO_IMAGE: LineImage = { shiftHz: 0, lossDb: 0 };

/** The fold line over a stretch of true frequency, or that of an image. */
export function foldLineOf(chain: Chain, lowHz: number, highHz: number, image: LineImage = NO_IMAGE): FoldLine {
  const { shiftHz } = image;
  const pieces = foldThrough(lowHz + shiftHz, highHz + shiftHz, chain.ratesHz, MOST_PIECES).filter(
    ({ collapsed }) => !collapsed,
  );
  const count = Math.max(LEAST_POINTS_A_PIECE, Math.round(POINTS / Math.max(1, pieces.length)));
  return pieces.map(({ trueLowHz, trueHighHz }) =>
    Array.from({ length: count }, (_, index) => {
      const part = index / (count - 1);
      const hz = index === count - 1 ? trueHighHz : trueLowHz + (trueHighHz - trueLowHz) * part;
      return pointAt(chain, hz - shiftHz, image);
    }),
  );
}

/** Where a true frequency arrives in the record, and what the filters take off on the way, nominally. */
export function pointAt(chain: Chain, trueHz: number, { shiftHz, lossDb }: LineImage = NO_IMAGE): FoldPoint {
  let hz = trueHz;
  let attenuationDb = lossDb;
  for (const [index, stage] of chain.stages.entries()) {
    for (const { response } of stage.filters) attenuationDb += response.attenuationDb(hz);
    hz = foldHz(index === 0 ? hz + shiftHz : hz, stage.rateHz);
  }
  for (const { response } of chain.after) attenuationDb += response.attenuationDb(hz);
  return { trueHz, recordedHz: hz, attenuationDb };
}
