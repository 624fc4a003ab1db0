import type { Clock } from '../rig/model.ts';

/** A clock, the one that it is locked to, and so on to the one that drives them all; each once, in a circle too. */
export function drivenBy(clock: Clock, clocks: ReadonlyMap<string, Clock>): readonly Clock[] {
  const drivers: Clock[] = [];
  let next: Clock | undefined = clock;
  while (next && !drivers.includes(next)) {
    drivers.push(next);
    next = next.lockedTo && clocks.get(next.lockedTo.value);
  }
  return drivers;
}

/** How far two clocks may run apart, relative; 0 where the same clock drives both of them. */
export function relativeDrift(one: Clock, other: Clock, clocks: ReadonlyMap<string, Clock>): number {
  const drivers = drivenBy(one, clocks);
  const others = drivenBy(other, clocks);
  if (drivers.some((clock) => others.includes(clock))) return 0;
  return drivers[drivers.length - 1]!.tolerance + others[others.length - 1]!.tolerance;
}
