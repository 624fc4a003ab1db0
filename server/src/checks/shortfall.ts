import type { UndeclaredFold } from '../chain/undeclared.ts';
import type { ChannelView, Shortfall } from './check.ts';
import { hasFoldInBand } from './folds.ts';

/** What is known of a channel before it is known what its filtering lacks. */
type View = Pick<ChannelView, 'channel' | 'chain' | 'arrivals' | 'undeclared'>;

/** Margin that spectrum work leaves between its band and half the rate: rate / 2.56. Common practice; no source. */
export const COMMON_MARGIN = 1.28;
const MARGIN_ROUNDING = 1e-9;

/**
 * A bound on what nobody declares is no more exact than this: the ripple of a digital filter alone must not carry one
 * that is stated to be at the limit over it.
 */
const BOUND_ROUNDING_DB = 0.01;

/** What is to be said of a channel's filtering, if anything. */
export function shortfallOf(view: View): Shortfall | undefined {
  const { chain } = view;
  if (!chain.understood || hasFoldInBand(view)) return undefined;
  const first = view.undeclared[0];
  if (first && isOver(view, first) && lacksFilter(view)) return { kind: 'no-filter', fold: first };
  // Where the band itself does not fit below half the rate, that is what has to be said.
  if (!chain.isBandpass && chain.stages.some(({ nyquistHz }) => chain.bandHighHz >= nyquistHz)) return undefined;
  const worst = worstShort(view);
  if (!worst) return undefined;
  const margin = chain.stages[worst.stage - 1]!.nyquistHz / chain.bandHighHz;
  if (!chain.isBandpass && margin < COMMON_MARGIN - MARGIN_ROUNDING)
    return { kind: 'thin-margin', fold: worst, margin };
  return { kind: 'filter-short', fold: worst, isHint: isOnlyHint(view, worst) };
}

/** Whether more may be left of what nobody declares than the fold limit allows. */
export function isOver({ chain }: View, fold: UndeclaredFold): boolean {
  return fold.level > chain.foldLimit + BOUND_ROUNDING_DB;
}

/** AC coupling keeps nothing out that could fold. */
function lacksFilter({ chain }: View): boolean {
  const stage = chain.stages[0]!;
  return stage.kind === 'converter' && stage.filters.every(({ role }) => role === 'low-corner');
}

/** The worst stage that is short; one of which only a hint is given comes after all others. */
function worstShort(view: View): UndeclaredFold | undefined {
  let worst: UndeclaredFold | undefined;
  for (const fold of view.undeclared) {
    if (!fold || !isOver(view, fold) || isToldOtherwise(view, fold)) continue;
    if (!worst || isGraver(view, fold, worst)) worst = fold;
  }
  return worst;
}

function isGraver(view: View, fold: UndeclaredFold, than: UndeclaredFold): boolean {
  const isHint = isOnlyHint(view, fold);
  return isHint === isOnlyHint(view, than) ? fold.level > than.level : !isHint;
}

function isOnlyHint({ chain, channel }: View, fold: UndeclaredFold): boolean {
  return chain.stages[fold.stage - 1]!.kind === 'modulator' && channel.undeclared === undefined;
}

/** A decimation without any filter is told as that. */
function isToldOtherwise({ chain }: View, fold: UndeclaredFold): boolean {
  const { kind, filters } = chain.stages[fold.stage - 1]!;
  return kind === 'decimate' && filters.length === 0;
}
