import type { KnownChannel } from './channel-reading.ts';
import type { Lookup } from './reader.ts';
import type { ThingKind } from './vocabulary-kinds.ts';

/** How often the channels of a file look names up, and the channels that were counted. */
export interface NameUses {
  readonly channels: readonly KnownChannel[];
  /** By kind and name; nothing stands at 0. */
  readonly counts: ReadonlyMap<ThingKind, ReadonlyMap<string, number>>;
}

/** Of no channels. */
export const NO_USES: NameUses = { channels: [], counts: new Map() };

/** By kind and name, how many uses more (or fewer) there are. */
type Changes = Map<ThingKind, Map<string, number>>;

/**
 * Counts the names that channels look up, in their own text or in text that they inherit: each reading knows all of
 * them, because it depends on them.
 *
 * @param channels in document order
 * @param before of an earlier text. Between two keystrokes ten thousand channels differ in one: counting what differs
 *   gives what counting all would give, in a thousandth of the time
 */
export function nameUses(channels: readonly KnownChannel[], before: NameUses): NameUses {
  const steps = countingNames(channels, before);
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
  }
}

/** The same, yielding between one piece of work and the next: an edit of what all channels use has all of them looked at. */
export function* countingNames(channels: readonly KnownChannel[], before: NameUses): Generator<undefined, NameUses> {
  return { channels, counts: changed(before.counts, yield* changesBetween(before.channels, channels)) };
}

/** Channels that are looked at in one piece. */
const AT_ONCE = 1_000;

function* changesBetween(
  before: readonly KnownChannel[],
  after: readonly KnownChannel[],
): Generator<undefined, Changes> {
  const most = Math.min(before.length, after.length);
  let head = 0;
  while (head < most && before[head] === after[head]) head++;
  let tail = 0;
  while (tail < most - head && before[before.length - 1 - tail] === after[after.length - 1 - tail]) tail++;
  const changes: Changes = new Map();
  const end = Math.max(before.length, after.length) - tail;
  for (let index = head; index < end; index++) {
    if ((index - head) % AT_ONCE === AT_ONCE - 1) yield undefined;
    const removed = index < before.length - tail ? before[index]!.reading.dependencies.lookups : NOTHING;
    const added = index < after.length - tail ? after[index]!.reading.dependencies.lookups : NOTHING;
    // Where a thing that all channels use is edited, all of them are read again, and look up what they did before.
    if (lookUpTheSame(removed, added)) continue;
    for (const lookup of removed) note(changes, lookup, -1);
    for (const lookup of added) note(changes, lookup, 1);
  }
  return changes;
}

const NOTHING: readonly Lookup[] = [];

function lookUpTheSame(some: readonly Lookup[], others: readonly Lookup[]): boolean {
  return (
    some.length === others.length &&
    some.every(({ kind, name }, index) => name === others[index]!.name && kind === others[index]!.kind)
  );
}

function note(changes: Changes, { kind, name }: Lookup, by: number): void {
  let names = changes.get(kind);
  if (!names) {
    names = new Map();
    changes.set(kind, names);
  }
  names.set(name, (names.get(name) ?? 0) + by);
}

function changed(counts: NameUses['counts'], changes: Changes): NameUses['counts'] {
  let result: Map<ThingKind, ReadonlyMap<string, number>> | undefined;
  for (const [kind, byName] of changes) {
    const net = [...byName].filter(([, by]) => by !== 0);
    if (net.length === 0) continue;
    const names = new Map(counts.get(kind));
    for (const [name, by] of net) {
      const count = (names.get(name) ?? 0) + by;
      if (count === 0) names.delete(name);
      else names.set(name, count);
    }
    result ??= new Map(counts);
    result.set(kind, names);
  }
  return result ?? counts;
}
