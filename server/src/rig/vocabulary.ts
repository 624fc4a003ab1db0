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

/** Every context, in the order in which a reference shows them, with a sentence of what it is. */
export const CONTEXTS: ReadonlyMap<ContextName, string> = new Map<ContextName, string>([
  ['rig', 'The top of a rig file.'],
  ['channel', 'A channel: one sensor, sampled and stored. `defaults` takes the same keys.'],
  ['step', 'A digital step after the converter, in `then`.'],
  ['clock', 'A clock that sample rates are divided from.'],
  ['digitizer', 'A converter with its input.'],
  ['interleave', 'Converters that take turns, in a digitizer.'],
  ['sensor', 'A sensor. A channel may write these keys itself instead of naming one.'],
  ['filter', 'A filter, ahead of the converter or in a digital step.'],
  ['source', 'Something that the sensor, or the wiring, picks up.'],
  ['mains', 'The line frequency, written as a map.'],
  ['group', 'Channels whose phase is compared.'],
  ['pattern', 'Sample slots that are kept, in a channel.'],
  ['pulses', 'A pulse train, in a channel.'],
  ['spectrum', 'How a channel is turned into a spectrum.'],
  ['run', 'How long is recorded, and where the data goes.'],
  ['acceptance', 'A finding that somebody has looked at and accepted.'],
]);

const ROWS_BY_CONTEXT: ReadonlyMap<ContextName, ReadonlyMap<string, KeyRow>> = new Map(
  [...CONTEXTS.keys()].map((context) => [
    context,
    new Map(VOCABULARY.filter(({ contexts }) => contexts.includes(context)).map((row) => [row.key, row])),
  ]),
);

const KEYS_BY_CONTEXT: ReadonlyMap<ContextName, readonly KeyRow[]> = new Map(
  [...ROWS_BY_CONTEXT].map(([context, rows]) => [context, [...rows.values()]]),
);

/** The rows of a context, in the order in which its keys are usually written. */
export function keysOf(context: ContextName): readonly KeyRow[] {
  return KEYS_BY_CONTEXT.get(context) ?? [];
}

/** The rows of a context by key. */
export function rowsOf(context: ContextName): ReadonlyMap<string, KeyRow> {
  return ROWS_BY_CONTEXT.get(context) as ReadonlyMap<string, KeyRow>;
}

/** The row of a key in a context; `undefined` for a key that is not of that context. */
export function keyRow(context: ContextName, key: string): KeyRow | undefined {
  return ROWS_BY_CONTEXT.get(context)?.get(key);
}
