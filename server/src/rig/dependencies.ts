import type { AnchorTable } from './anchors.ts';
import { type Lookup, orNone, type Reader, type Scope } from './reader.ts';

/** What a reading has looked at besides its own entry's text. */
export interface Dependencies {
  readonly lookups: readonly Lookup[];
  /** `undefined` for a reading that followed no alias. */
  readonly anchors: AnchorTable | undefined;
  readonly epoch: number;
}

export function dependenciesOf(reader: Reader): Dependencies {
  return {
    lookups: orNone(reader.lookups),
    anchors: followedAliases(reader) ? reader.scope.anchors : undefined,
    epoch: reader.epoch,
  };
}

/** Whether what was read may depend on what aliases stand for. */
function followedAliases(reader: Reader): boolean {
  return reader.expansions > 0 || reader.entry.aliases.length > 0;
}

/** Whether everything that was looked at is still the very same. */
export function dependenciesHold(dependencies: Dependencies, scope: Scope, epoch: number): boolean {
  const { anchors, lookups } = dependencies;
  if (anchors && (anchors !== scope.anchors || dependencies.epoch !== epoch)) return false;
  for (const lookup of lookups) if (!lookupHolds(lookup, scope)) return false;
  return true;
}

function lookupHolds(lookup: Lookup, scope: Scope): boolean {
  if ('names' in lookup)
    return lookup.names === scope.names[lookup.kind] && lookup.knowsAllNames === scope.knowsAllNames;
  return scope.things[lookup.kind].get(lookup.name) === lookup.thing;
}
