import { type Field, readFieldsOf, reportMissingKeys } from './fields.ts';
import type { Given, Run } from './model.ts';
import { readValue } from './quantities.ts';
import type { Reader } from './reader.ts';
import type { MapNode } from './tree.ts';
import { given, readNumber } from './values.ts';

const BITS_PER_BYTE = 8;

/** Reads the map behind the top-level key `run`. Triggered records need both their number and their length. */
export function readRun(reader: Reader, field: Field, node: MapNode): Run {
  const fields = readFieldsOf(reader, 'run', field, node);
  const of = (key: string): Field | undefined => fields.byKey.get(key);
  if (of('records')) reportMissingKeys(reader, fields, ['record']);
  if (of('record')) reportMissingKeys(reader, fields, ['records']);
  return {
    durationS: readValue(reader, of('duration')),
    records: readNumber(reader, of('records')),
    recordS: readValue(reader, of('record')),
    diskBytes: readAmount(reader, of('disk'), 'bytes'),
    linkBytesPerSecond: readValue(reader, of('link')),
    sampleBits: readAmount(reader, of('sample-size'), 'bits'),
  };
}

/** An amount of data, which may be written in bits or in bytes. */
function readAmount(reader: Reader, field: Field | undefined, as: 'bits' | 'bytes'): Given<number> | undefined {
  const amount = readValue(reader, field);
  if (!amount || !field) return undefined;
  const { written } = amount;
  const dimension = written?.kind === 'scalar' ? written.dimension : 'number';
  if (dimension === 'data' && as === 'bits') return given(field, amount.value * BITS_PER_BYTE, written);
  if (dimension === 'bits' && as === 'bytes') return given(field, amount.value / BITS_PER_BYTE, written);
  return amount;
}
