import type { Entry } from './entry.ts';
import { clipped, namePlace } from './fields.ts';
import type { PlacedProblem } from './placed-problem.ts';
import { placedProblem } from './reader.ts';
import { type Brought, type ByKind, type JoinedThings, NAMED_KINDS, type NamedKind } from './used-things.ts';

/** Tells which names of a file hide the same names of used files. */
export function hiddenThings(named: ByKind<readonly Entry[]>, joined: JoinedThings): readonly PlacedProblem[] {
  return NAMED_KINDS.flatMap((kind) => {
    const brought = joined.things[kind];
    if (brought.size === 0) return [];
    return named[kind].flatMap((entry) => {
      const hidden = brought.get(entry.name);
      return hidden ? [hiddenThing(kind, entry, hidden)] : [];
    });
  });
}

function hiddenThing(kind: NamedKind, entry: Entry, { item, place }: Brought): PlacedProblem {
  const file = `\`${clipped(item.path)}\``;
  return placedProblem({
    name: 'duplicate-name',
    severity: 'hint',
    place: namePlace(entry),
    message: `${file} brings a ${kind} \`${clipped(entry.name)}\` too: here this one is taken, and that one is hidden.`,
    about: entry.name,
    related: [{ place, message: 'The one that is hidden stands here.' }],
  });
}
