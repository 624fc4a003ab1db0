import type { Chain, StageFilter } from '../chain/model.ts';

/** The filter of a chain that takes most off somewhere in a range; `undefined` where there is none. */
export function worstFilter({ stages, after }: Chain, lowHz: number, highHz: number): StageFilter | undefined {
  let worst: StageFilter | undefined;
  let worstDb = -Infinity;
  for (const filter of [...stages.flatMap(({ filters }) => filters), ...after]) {
    const db = filter.response.greatestDb(lowHz, highHz);
    if (db <= worstDb) continue;
    worst = filter;
    worstDb = db;
  }
  return worst;
}

/** Whether a filter is the channel's own to change: one that it names, or one of its steps. */
export function isOwnFilter({ role }: StageFilter): boolean {
  return role === 'channel' || role === 'step';
}
