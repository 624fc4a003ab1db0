import type { ChannelResult, Guard } from '../checks/channel-result.ts';
import { judgeModel } from '../checks/judge.ts';
import type { Channel } from '../rig/model.ts';
import { isProved } from './proof.ts';
import type { RemedyContext } from './remedy.ts';

/** How many made-up channels the search for the remedies of one finding may judge. */
const MOST_JUDGEMENTS = 2000;

/** A search in progress: what it is for, and how much it may still do. */
export interface Search {
  readonly context: RemedyContext;
  /** The finding's channel as it stands. */
  readonly channel: Channel | undefined;
  readonly budget: { left: number };
}

export function startSearch(context: RemedyContext): Search {
  return { context, channel: context.result?.channel, budget: { left: MOST_JUDGEMENTS } };
}

/** A check that fails on a made-up channel says nothing of it; the proof has the text checked as any other. */
const withoutFault: Guard = (_checkName, run, otherwise) => {
  try {
    return run();
  } catch {
    return otherwise;
  }
};

/** A made-up channel as the checks see it; `undefined` where the search has done all that it may, or is cancelled. */
export function judged(search: Search, channel: Channel): ChannelResult | undefined {
  const { budget, context } = search;
  if (budget.left <= 0 || context.isCancelled()) return undefined;
  budget.left--;
  return judgeModel(channel, context.environment.severities, withoutFault);
}

/**
 * The made-up channel as judged, if the finding is gone from it and nothing else has come: the rule of proof, for the
 * channel alone.
 */
export function cured(search: Search, channel: Channel | undefined): ChannelResult | undefined {
  const { finding, result } = search.context;
  if (!channel || !result) return undefined;
  const after = judged(search, channel);
  if (!after) return undefined;
  return isProved(finding, { before: result.findings, after: after.findings }) ? after : undefined;
}

/** The first of the values with which the channel is rid of the finding, and the channel as judged. */
export function firstCured<T>(
  search: Search,
  values: Iterable<T>,
  channelWith: (value: T) => Channel | undefined,
): { readonly value: T; readonly after: ChannelResult } | undefined {
  for (const value of values) {
    const after = cured(search, channelWith(value));
    if (after) return { value, after };
    if (search.budget.left <= 0 || search.context.isCancelled()) return undefined;
  }
  return undefined;
}

/**
 * Between a value that cures and one that does not: the value nearest the latter that still does, as far as halving
 * finds it.
 */
export function furthestCured(
  search: Search,
  cures: number,
  fails: number,
  channelWith: (value: number) => Channel | undefined,
  halvings = 20,
): number {
  let good = cures;
  let bad = fails;
  for (let step = 0; step < halvings; step++) {
    const middle = (good + bad) / 2;
    if (cured(search, channelWith(middle))) good = middle;
    else bad = middle;
  }
  return good;
}
