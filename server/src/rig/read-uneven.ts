import type { Interleave } from '../signal/interleave.ts';
import type { SlotPattern } from '../signal/pattern.ts';
import { type Field, itemsOf, placeOf, readFieldsOf, reportMissingKeys } from './fields.ts';
import type { Given } from './model.ts';
import { readValue } from './quantities.ts';
import type { Reader } from './reader.ts';
import { given, readNumber, readNumbers, reportValue, reportWrongKind } from './values.ts';

/** Reads `pattern`: of every so many slots, those that are kept. */
export function readPattern(reader: Reader, field: Field | undefined): Given<SlotPattern> | undefined {
  const fields = field && mapFields(reader, 'pattern', field);
  if (!field || !fields) return undefined;
  reportMissingKeys(reader, fields, ['of', 'take']);
  const slots = readNumber(reader, fields.byKey.get('of'))?.value;
  const taken = readTaken(reader, fields.byKey.get('take'), slots);
  return slots !== undefined && taken ? given(field, { slots, taken }) : undefined;
}

function readTaken(reader: Reader, field: Field | undefined, slots: number | undefined): readonly number[] | undefined {
  if (!field || field.node.kind === 'empty') return undefined;
  if (field.node.kind !== 'list' || field.kind.kind !== 'list') {
    reportWrongKind(reader, field);
    return undefined;
  }
  const numbers = readNumbers(reader, itemsOf(reader, field, field.node.items, field.kind.of));
  if (!numbers || slots === undefined) return undefined;
  const outside = numbers.find((slot) => slot >= slots);
  if (outside === undefined && numbers.length > 0) return [...new Set(numbers)].sort((a, b) => a - b);
  const message =
    outside === undefined
      ? '`take` keeps no slot, so nothing would be recorded.'
      : `\`take\` has slot ${outside}, but slots count from 0 to ${slots - 1}.`;
  reportValue(reader, field, 'out-of-range', placeOf(field.entry, field.node), message);
  return undefined;
}

/** Reads `interleave`: converters that take turns, and how far they differ. */
export function readInterleave(reader: Reader, field: Field | undefined): Given<Interleave> | undefined {
  const fields = field && mapFields(reader, 'interleave', field);
  if (!field || !fields) return undefined;
  reportMissingKeys(reader, fields, ['converters']);
  const converters = readNumber(reader, fields.byKey.get('converters'))?.value;
  const gainMismatch = readValue(reader, fields.byKey.get('gain-mismatch'))?.value ?? 0;
  const timingMismatchS = readValue(reader, fields.byKey.get('timing-mismatch'))?.value ?? 0;
  const offsetMismatch = readValue(reader, fields.byKey.get('offset-mismatch'))?.value ?? 0;
  return converters === undefined
    ? undefined
    : given(field, { converters, gainMismatch, timingMismatchS, offsetMismatch });
}

function mapFields(reader: Reader, context: 'pattern' | 'interleave', field: Field) {
  const { node } = field;
  if (node.kind === 'map') return readFieldsOf(reader, context, field, node);
  if (node.kind !== 'empty') reportWrongKind(reader, field);
  return undefined;
}
