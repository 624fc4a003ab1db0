/** How many deaths of the server within {@link WINDOW_MS} end the quiet restarting. */
export const DEATHS_BEFORE_GIVING_UP = 5;

/** Span within which deaths are counted together, in milliseconds. */
export const WINDOW_MS = 3 * 60 * 1000;

export interface RestartDecision {
  readonly restart: boolean;
  /** Times of the deaths that still count, in milliseconds, oldest first; hand them in at the next death. */
  readonly deathsMs: readonly number[];
}

/**
 * Decides what to do when the server has died: a rare death is repaired in silence, the fifth within three minutes is
 * not, since a server that dies on every start would otherwise die for ever.
 *
 * @param earlierDeathsMs the times that the last decision returned
 * @param nowMs the time of this death, in milliseconds
 */
export function decideOnDeath(earlierDeathsMs: readonly number[], nowMs: number): RestartDecision {
  const deathsMs = [...earlierDeathsMs.filter((time) => nowMs - time < WINDOW_MS), nowMs];
  return { restart: deathsMs.length < DEATHS_BEFORE_GIVING_UP, deathsMs };
}
