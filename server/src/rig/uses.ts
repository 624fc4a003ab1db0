import { anchorTable } from './anchors.ts';
import type { Entry } from './entry.ts';
import { epochsOf } from './epochs.ts';
import { resolved } from './fields.ts';
import { readUsesItems } from './read-uses.ts';
import { type Scope, startReading } from './reader.ts';
import type { Snapshot } from './snapshot.ts';
import { byKind } from './used-things.ts';
import { keyRow } from './vocabulary.ts';

const USES = 'uses';
const NO_PATHS: readonly string[] = [];

/** Kept with an entry that says by itself what is used. */
const pathsOf = new WeakMap<Entry, readonly string[]>();

/** The entry `uses` of a text, the first of several. */
export function usesEntryOf(snapshot: Snapshot | undefined): Entry | undefined {
  return snapshot?.entries.find(({ section, key, name }) => section === undefined && key && name === USES);
}

/** The paths that a text's `uses` names, as they are written, each once. */
export function usedPaths(snapshot: Snapshot): readonly string[] {
  const entry = usesEntryOf(snapshot);
  if (!entry) return NO_PATHS;
  const known = pathsOf.get(entry);
  if (known) return known;
  const paths = readPaths(entry, snapshot.entries);
  if (entry.aliases.length === 0) pathsOf.set(entry, paths);
  return paths;
}

function readPaths(entry: Entry, entries: readonly Entry[]): readonly string[] {
  const row = keyRow('rig', USES);
  const { settingEntries, epochOf } = epochsOf(entries);
  const scope: Scope = {
    names: byKind(() => ({ names: [], set: new Set() })),
    things: byKind(() => new Map()),
    anchors: anchorTable(settingEntries, undefined),
    epochOf,
    knowsAllNames: false,
    sources: { sources: [], allHeard: new Map() },
    inPlace: new Map(),
  };
  const reader = startReading(entry, scope, epochOf(entry));
  const found = resolved(reader, entry.value, entry, undefined);
  if (!row || found?.node.kind !== 'list') return NO_PATHS;
  return readUsesItems(reader, { kind: row.value, row, path: row.key, ...found }).map(({ path }) => path);
}
