import { CHANNEL_TABLE } from './vocabulary-channels.ts';
import { FILTER_ROWS } from './vocabulary-filters.ts';
import type { ContextName, KeyRow } from './vocabulary-kinds.ts';
import { PATTERN_ROWS, RIG_ROWS } from './vocabulary-rig.ts';
import { SOURCE_ROWS } from './vocabulary-sources.ts';
import { THING_ROWS } from './vocabulary-things.ts';

/**
 * Every key of a rig file. Reading, completion, hover text, the JSON Schema, the grammar's list of keys and the
 * reference pages all come from this table; a new key is a new row.
 */
export const VOCABULARY: readonly KeyRow[] = [
  ...RIG_ROWS,
  ...CHANNEL_TABLE,
  ...THING_ROWS,
  ...FILTER_ROWS,
  ...SOURCE_ROWS,
  ...PATTERN_ROWS,
];

export type { ContextName, KeyRow, ValueKind } from './vocabulary-kinds.ts';

/** One context: what its maps are. */
export interface ContextRow {
  readonly name: ContextName;
  readonly title: string;
  readonly doc: string;
}

/** Every context, in the order in which a reference shows them. */
export const CONTEXTS: readonly ContextRow[] = [
  { name: 'rig', title: 'Rig file', doc: 'The keys at the top of a rig file.' },
  { name: 'channel', title: 'Channel', doc: 'One sensor, sampled and stored. `defaults` takes the same keys.' },
  { name: 'step', title: 'Step of `then`', doc: 'A digital step after the converter.' },
  { name: 'clock', title: 'Clock', doc: 'What sample rates are divided from.' },
  { name: 'digitizer', title: 'Digitizer', doc: 'A converter with its input.' },
  { name: 'interleave', title: '`interleave` of a digitizer', doc: 'Converters that take turns.' },
  { name: 'sensor', title: 'Sensor', doc: 'A channel may write these keys itself instead of naming a sensor.' },
  { name: 'filter', title: 'Filter', doc: 'Ahead of the converter a filter is analogue, in a step it is digital.' },
  { name: 'source', title: 'Source', doc: 'Something that the sensor, or the wiring, picks up.' },
  { name: 'mains', title: '`mains` as a map', doc: 'The line frequency, as a source called `mains`.' },
  { name: 'group', title: 'Group', doc: 'Channels whose phase is compared.' },
  { name: 'pattern', title: '`pattern` of a channel', doc: 'Sample slots that are kept.' },
  { name: 'pulses', title: '`pulses` of a channel', doc: 'A pulse train that is read for its edges.' },
  { name: 'spectrum', title: '`spectrum` of a channel', doc: 'How the record will be turned into a spectrum.' },
  { name: 'run', title: 'Run', doc: 'How long is recorded, and where the data goes.' },
  { name: 'acceptance', title: 'Item of `accept`', doc: 'A finding that somebody has looked at and accepted.' },
];

const ROWS_BY_CONTEXT: ReadonlyMap<ContextName, ReadonlyMap<string, KeyRow>> = new Map(
  CONTEXTS.map(({ name }) => [
    name,
    new Map(VOCABULARY.filter(({ contexts }) => contexts.includes(name)).map((row) => [row.key, row])),
  ]),
);

const KEYS_BY_CONTEXT: ReadonlyMap<ContextName, readonly KeyRow[]> = new Map(
  [...ROWS_BY_CONTEXT].map(([context, rows]) => [context, [...rows.values()]]),
);

/** The rows of a context, in the order in which its keys are usually written. */
export function keysOf(context: ContextName): readonly KeyRow[] {
  return KEYS_BY_CONTEXT.get(context) ?? [];
}

/** Contexts of which nothing is computed: what is said of the key that holds them goes for all of their own. */
export const UNCOMPUTED_CONTEXTS: ReadonlySet<ContextName> = new Set(
  CONTEXTS.map(({ name }) => name).filter((name) => keysOf(name).every((row) => !row.computed)),
);

/** The rows of a context by key. */
export function rowsOf(context: ContextName): ReadonlyMap<string, KeyRow> {
  return ROWS_BY_CONTEXT.get(context) as ReadonlyMap<string, KeyRow>;
}

/** The row of a key in a context; `undefined` for a key that is not of that context. */
export function keyRow(context: ContextName, key: string): KeyRow | undefined {
  return ROWS_BY_CONTEXT.get(context)?.get(key);
}
