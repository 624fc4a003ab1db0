import { clipped, type Field, innerPlace, itemsOf, placeOf, readFieldsOf } from './fields.ts';
import { sharedInPlace } from './in-place.ts';
import type { Filter, FilterUse } from './model.ts';
import { findThing } from './names.ts';
import type { Place } from './place.ts';
import { isDigitalOnly, readFilter } from './read-filter.ts';
import type { Reader } from './reader.ts';
import type { MapNode } from './tree.ts';
import { reportValue, reportWrongKind } from './values.ts';

/** Whether a filter stands ahead of the converter, or in a digital step after it. */
export type FilterPlace = 'analogue' | 'digital';

/** The filters of a field: one name, one written in place, or a list of either. */
export function readFilterUses(reader: Reader, field: Field | undefined, where: FilterPlace): readonly FilterUse[] {
  if (!field || field.node.kind === 'empty') return [];
  if (field.node.kind !== 'list') return [readFilterUse(reader, field, where)];
  return itemsOf(reader, field, field.node.items, field.kind).map((item) => readFilterUse(reader, item, where));
}

/** One filter: its name, or the filter itself. */
export function readFilterUse(reader: Reader, field: Field, where: FilterPlace): FilterUse {
  const { node, entry, inherited } = field;
  const place = node.kind === 'scalar' ? innerPlace(entry, node) : placeOf(entry, node);
  const filter = readUsedFilter(reader, field);
  const fitting = filter && fits(reader, field, place, filter, where) ? filter : undefined;
  return inherited ? { place, filter: fitting, inherited } : { place, filter: fitting };
}

function readUsedFilter(reader: Reader, field: Field): Filter | undefined {
  const { node } = field;
  if (node.kind === 'scalar') return findThing(reader, field, node, 'filter');
  if (node.kind === 'map') return sharedInPlace(reader, field, node, 'filter', readInPlace);
  if (node.kind !== 'empty') reportWrongKind(reader, field);
  return undefined;
}

function readInPlace(reader: Reader, field: Field, node: MapNode): Filter {
  return readFilter(reader, readFieldsOf(reader, 'filter', field, node), '', placeOf(field.entry, node));
}

function fits(reader: Reader, field: Field, place: Place, filter: Filter, where: FilterPlace): boolean {
  if (where === 'digital') return true;
  const name = filter.name === '' ? 'This filter' : `\`${clipped(filter.name)}\``;
  if (isDigitalOnly(filter)) {
    const message = `${name} exists only in numbers (\`${filter.response?.response}\`), but ahead of the converter a filter is analogue.`;
    reportValue(reader, field, 'wrong-kind', place, message);
    return false;
  }
  if (filter.passes === 2) {
    const message = `${name} runs forward and backward (\`passes: 2\`), which an analogue filter ahead of the converter can't.`;
    reportValue(reader, field, 'wrong-kind', place, message);
    return false;
  }
  return true;
}
