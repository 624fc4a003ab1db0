import { type Field, type Fields, itemsOf, placeOf, readFieldsOf, reportMissingKeys } from './fields.ts';
import { nameExists } from './names.ts';
import { readEnds } from './quantities.ts';
import type { Reader } from './reader.ts';
import { readChoice, readNumber, readTruth, reportWrongKind, scalarOf } from './values.ts';
import { keysOf } from './vocabulary.ts';
import type { ValueKind } from './vocabulary-kinds.ts';

/** Checks the values of keys that are known but not computed: a slip in them is told all the same. */
export function checkUncomputed(reader: Reader, fields: Fields): void {
  for (const field of fields.byKey.values()) if (!field.row.computed) checkValue(reader, field);
}

/** Checks a map of which nothing is computed. */
export function checkFields(reader: Reader, fields: Fields): void {
  const required = keysOf(fields.context).filter((row) => row.required);
  reportMissingKeys(
    reader,
    fields,
    required.map(({ key }) => key),
  );
  for (const field of fields.byKey.values()) checkValue(reader, field);
}

/** Checks a value against its kind, and makes nothing of it. */
export function checkValue(reader: Reader, field: Field): void {
  const kind = fittingKind(field.kind, field);
  if (field.node.kind === 'empty') return;
  if (!kind) {
    reportWrongKind(reader, field);
    return;
  }
  checkAs(reader, { ...field, kind });
}

/** Of several kinds, the one that a node of this shape is to be read as. */
function fittingKind(kind: ValueKind, field: Field): ValueKind | undefined {
  const kinds = kind.kind === 'alternatives' ? kind.of : [kind];
  return kinds.find((one) => takes(one, field));
}

function takes(kind: ValueKind, { node }: Field): boolean {
  switch (kind.kind) {
    case 'list':
    case 'tuple':
      return node.kind === 'list';
    case 'map':
    case 'map-of':
    case 'section':
      return node.kind === 'map';
    case 'name':
      return node.kind === 'scalar' || (node.kind === 'map' && kind.inPlace !== undefined);
    default:
      return node.kind === 'scalar';
  }
}

function checkAs(reader: Reader, field: Field): void {
  const { kind, node } = field;
  switch (kind.kind) {
    case 'quantity':
      readEnds(reader, field);
      return;
    case 'number':
      readNumber(reader, field);
      return;
    case 'choice':
      readChoice(reader, field);
      return;
    case 'truth':
      readTruth(reader, field);
      return;
    case 'name': {
      const scalar = scalarOf(reader, field);
      if (scalar && kind.of !== 'channel')
        nameExists(reader, { name: scalar.text, place: placeOf(field.entry, scalar) }, kind.of);
      return;
    }
    case 'list':
      if (node.kind === 'list')
        for (const item of itemsOf(reader, field, node.items, kind.of)) checkValue(reader, item);
      return;
    case 'map':
      if (node.kind === 'map') checkFields(reader, readFieldsOf(reader, kind.context, field, node));
      return;
    default:
      return;
  }
}
