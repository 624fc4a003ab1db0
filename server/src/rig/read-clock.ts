import type { Field } from './fields.ts';
import { innerPlace, itemsOf, namePlace, readEntryFields, reportMissingKeys } from './fields.ts';
import type { Clock, Dividers } from './model.ts';
import { nameExists, readName } from './names.ts';
import { readValue } from './quantities.ts';
import type { Reader } from './reader.ts';
import type { ScalarNode } from './tree.ts';
import {
  alternative,
  given,
  quantityOf,
  readNumber,
  readNumbers,
  reportValue,
  reportWrongKind,
  withinBounds,
} from './values.ts';

/** Reads an entry of `clocks`. */
export function readClock(reader: Reader): Clock {
  const fields = readEntryFields(reader, 'clock');
  reportMissingKeys(reader, fields, ['frequency']);
  const field = (key: string): Field | undefined => fields.byKey.get(key);
  return {
    kind: 'clock',
    name: reader.entry.name,
    place: namePlace(reader.entry),
    frequencyHz: readValue(reader, field('frequency')),
    divide: readDividers(reader, field('divide'), readNumber(reader, field('step'))?.value ?? 1),
    tolerance: readValue(reader, field('tolerance'))?.value ?? 0,
    lockedTo: readLockedTo(reader, field('locked-to')),
  };
}

function readLockedTo(reader: Reader, field: Field | undefined): Clock['lockedTo'] {
  const name = field && readName(reader, field);
  if (!name || !field) return undefined;
  return nameExists(reader, name, 'clock') ? given(field, name.name) : undefined;
}

function readDividers(reader: Reader, field: Field | undefined, step: number): Dividers | undefined {
  if (!field) return undefined;
  if (field.node.kind === 'list') {
    const items = itemsOf(reader, field, field.node.items, alternative(alternative(field.kind, 'list').of, 'number'));
    const values = readNumbers(reader, items);
    return values && values.length > 0
      ? { kind: 'list', values: [...new Set(values)].sort((a, b) => a - b) }
      : undefined;
  }
  const quantity = quantityOf(reader, field);
  if (!quantity) return undefined;
  if (quantity.kind === 'scalar') {
    const only = readNumber(reader, field);
    return only && { kind: 'list', values: [only.value] };
  }
  if (quantity.kind === 'symmetric') {
    reportWrongKind(reader, field);
    return undefined;
  }
  return readDividerRange(reader, field, quantity.low.value, quantity.high.value, step, isBare(quantity));
}

function isBare({ low, high }: { readonly low: { dimension: string }; readonly high: { dimension: string } }): boolean {
  return low.dimension === 'number' && high.dimension === 'number';
}

function readDividerRange(
  reader: Reader,
  field: Field,
  low: number,
  high: number,
  step: number,
  bare: boolean,
): Dividers | undefined {
  const place = innerPlace(field.entry, field.node as ScalarNode);
  if (!bare) {
    reportValue(
      reader,
      field,
      'unit-mismatch',
      place,
      '`divide` takes whole numbers without a unit, such as `1..128`.',
    );
    return undefined;
  }
  if (!Number.isInteger(low) || !Number.isInteger(high)) {
    reportValue(reader, field, 'out-of-range', place, '`divide` takes whole numbers, such as `1..128`.');
    return undefined;
  }
  if (!withinBounds(reader, field, low, { low: 1 })) return undefined;
  if (low > high) {
    reportValue(reader, field, 'out-of-range', place, 'The range is upside down: its low end is above its high end.');
    return undefined;
  }
  return { kind: 'range', low, high, step };
}
