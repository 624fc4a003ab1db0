import type { ChannelResult, Guard } from '../checks/channel-result.ts';
import type { Finding } from '../checks/finding.ts';
import { judgeBy, judgeWhile } from '../checks/judge.ts';
import type { Channel } from '../rig/model.ts';
import { mayStandBeside } from './proof.ts';
import type { RemedyContext } from './remedy.ts';

/** How many made-up channels the search for the remedies of one finding may judge. */
const MOST_JUDGEMENTS = 2000;

/** A search in progress: what it is for, and how much it may still do. */
export interface Search {
  readonly context: RemedyContext;
  /** The finding's channel as it stands. */
  readonly channel: Channel | undefined;
  /** The rule of proof, for one finding of a made-up channel after the other. */
  readonly mayStand: (finding: Finding) => boolean;
  readonly budget: { left: number };
}

export function startSearch(context: RemedyContext): Search {
  const { finding, result } = context;
  return {
    context,
    channel: result?.channel,
    mayStand: mayStandBeside(finding, result?.findings ?? []),
    budget: { left: MOST_JUDGEMENTS },
  };
}

/** A check that fails on a made-up channel says nothing of it; the proof has the text checked as any other. */
const withoutFault: Guard = (_checkName, run, otherwise) => {
  try {
    return run();
  } catch {
    return otherwise;
  }
};

/**
 * The made-up channel as judged, if the finding is gone from it and nothing else has come: the rule of proof, for the
 * channel alone. `undefined` too where the search has done all that it may, or is cancelled.
 */
export function cured(search: Search, channel: Channel | undefined): ChannelResult | undefined {
  const { context, budget, mayStand } = search;
  if (!channel || !context.result || budget.left <= 0 || context.isCancelled()) return undefined;
  budget.left--;
  const { finding, environment } = context;
  const { severities } = environment;
  const narrowed = hearingOnly(channel, finding.about);
  // Most candidates fail by the one source that the finding is about; the others need not be followed to know it.
  if (narrowed && !judgeBy(finding.check, narrowed, severities, withoutFault).every(mayStand)) return undefined;
  return judgeWhile(channel, severities, withoutFault, finding.check, mayStand);
}

/** The channel as it would be if it heard one of its sources only; `undefined` where that is no less than it hears. */
function hearingOnly(channel: Channel, sourceName: string | undefined): Channel | undefined {
  const heard = channel.heard.filter(({ source }) => source.name === sourceName);
  return heard.length === 0 || heard.length === channel.heard.length ? undefined : { ...channel, heard };
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
