import type { Response } from './response.ts';

/** What a low-pass must do: sag no more than `mostDb` up to `passHz`, take off at least `leastDb` from `stopHz` on. */
export interface LowPassNeed {
  readonly passHz: number;
  readonly mostDb: number;
  readonly stopHz: number;
  readonly leastDb: number;
}

/** The cutoffs with which a low-pass of one order does what it must. */
export interface LowPassFit {
  readonly order: number;
  readonly lowestCutoffHz: number;
  readonly highestCutoffHz: number;
}

/** A family of low-pass filters, each the steeper the higher its order. */
export type LowPassFamily = (order: number, cutoffHz: number) => Response;

/** Where the edges of `LowPassNeed` are searched for the cutoff, relative to them. */
const SEARCHED_RATIO = 1000;

/** Halvings of the searched ratio: to a relative 1e-12. */
const HALVINGS = 44;

/**
 * The least order of a family, up to `mostOrder`, that does what is needed with some cutoff, and the range of such
 * cutoffs; `undefined` where none does. The responses' tolerance counts against them.
 */
export function leastOrder(family: LowPassFamily, need: LowPassNeed, mostOrder = 12): LowPassFit | undefined {
  for (let order = 1; order <= mostOrder; order++) {
    const fit = fittingCutoffs((cutoffHz) => family(order, cutoffHz), need);
    if (fit !== undefined) return { order, ...fit };
  }
  return undefined;
}

/** The range of cutoffs with which one low-pass does what is needed; `undefined` where there is none. */
export function fittingCutoffs(
  lowPass: (cutoffHz: number) => Response,
  { passHz, mostDb, stopHz, leastDb }: LowPassNeed,
): Omit<LowPassFit, 'order'> | undefined {
  const sagsLittle = (cutoffHz: number): boolean => lowPass(cutoffHz).greatestDb(0, passHz) <= mostDb;
  const takesEnough = (cutoffHz: number): boolean => lowPass(cutoffHz).leastDb(stopHz, Infinity) >= leastDb;
  const lowest = passHz / SEARCHED_RATIO;
  const highest = stopHz * SEARCHED_RATIO;
  if (!(lowest > 0 && lowest < highest) || !sagsLittle(highest) || !takesEnough(lowest)) return undefined;
  // A higher cutoff sags less and takes off less, so each condition holds on one side of one cutoff.
  const lowestCutoffHz = sagsLittle(lowest) ? lowest : lastOf(highest, lowest, sagsLittle);
  const highestCutoffHz = takesEnough(highest) ? highest : lastOf(lowest, highest, takesEnough);
  return lowestCutoffHz <= highestCutoffHz ? { lowestCutoffHz, highestCutoffHz } : undefined;
}

/** From `holds`, where the condition does, towards `fails`, where it doesn't: the last place found where it does. */
function lastOf(holds: number, fails: number, condition: (hz: number) => boolean): number {
  let good = holds;
  let bad = fails;
  for (let step = 0; step < HALVINGS; step++) {
    const middle = Math.sqrt(good * bad);
    if (condition(middle)) good = middle;
    else bad = middle;
  }
  return good;
}
