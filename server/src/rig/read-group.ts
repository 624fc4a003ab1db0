import { type Field, namePlace, readEntryFields, reportMissingKeys } from './fields.ts';
import type { Given, Group, PhaseLimit } from './model.ts';
import { nameExists, readName } from './names.ts';
import { readEnds, readValue } from './quantities.ts';
import type { Reader } from './reader.ts';
import { given } from './values.ts';

/** Reads an entry of `groups`. */
export function readGroup(reader: Reader): Group {
  const fields = readEntryFields(reader, 'group');
  reportMissingKeys(reader, fields, ['within', 'up-to']);
  return {
    kind: 'group',
    name: reader.entry.name,
    place: namePlace(reader.entry),
    within: readWithin(reader, fields.byKey.get('within')),
    upToHz: readValue(reader, fields.byKey.get('up-to')),
  };
}

/** The group that a channel names; `undefined` where there is none of that name, which is then said. */
export function readGroupName(reader: Reader, field: Field | undefined): Given<string> | undefined {
  const name = field && readName(reader, field);
  if (!name || !field) return undefined;
  return nameExists(reader, name, 'group') ? given(field, name.name) : undefined;
}

function readWithin(reader: Reader, field: Field | undefined): Given<PhaseLimit> | undefined {
  if (!field) return undefined;
  const ends = readEnds(reader, field);
  if (!ends) return undefined;
  const { highValue, written } = ends;
  const isTime = ends.high.dimension === 'time';
  return given(field, isTime ? { kind: 'time', seconds: highValue } : { kind: 'angle', degrees: highValue }, written);
}
