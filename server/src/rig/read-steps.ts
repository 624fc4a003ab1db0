import {
  type Field,
  type Fields,
  itemsOf,
  placeOf,
  readFieldsOf,
  reportMissingKey,
  reportMissingKeys,
} from './fields.ts';
import { readFilterUses } from './filter-uses.ts';
import type { FilterUse, Step } from './model.ts';
import { readFrequencyRange } from './quantities.ts';
import type { Reader } from './reader.ts';
import { checkUncomputed } from './uncomputed.ts';
import { readNumber, reportValue, reportWrongKind } from './values.ts';
import { keyRow } from './vocabulary.ts';

/** The digital steps of a channel, in order. */
export function readSteps(reader: Reader, field: Field | undefined): readonly Step[] {
  if (!field || field.node.kind === 'empty') return [];
  if (field.node.kind !== 'list') {
    reportWrongKind(reader, field);
    return [];
  }
  const steps: Step[] = [];
  for (const item of itemsOf(reader, field, field.node.items, field.kind)) {
    if (item.node.kind !== 'map') {
      reportWrongKind(reader, item);
      continue;
    }
    const fields = readFieldsOf(reader, 'step', item, item.node);
    checkUncomputed(reader, fields);
    const step = readStep(reader, fields, item);
    if (step) steps.push(step);
  }
  return steps;
}

function readStep(reader: Reader, fields: Fields, item: Field): Step | undefined {
  const place = placeOf(item.entry, item.node);
  const filterField = fields.byKey.get('filter');
  const filters = readFilterUses(reader, filterField, 'digital');
  const decimate = fields.byKey.get('decimate');
  if (decimate) {
    const factor = readNumber(reader, decimate);
    return factor && { kind: 'decimate', factor, filters, place };
  }
  const perTurn = fields.byKey.get('per-turn');
  if (perTurn) {
    const count = readNumber(reader, perTurn);
    reportMissingKeys(reader, fields, ['speed']);
    const speed = readFrequencyRange(reader, fields.byKey.get('speed'));
    return count && speed && { kind: 'per-turn', perTurn: count, speed, filters, place };
  }
  if (!filterField) {
    reportMissingKey(reader, fields, 'decimate', keyRow('step', 'decimate')?.example);
    return undefined;
  }
  return { kind: 'filter', filters: filters.map((use) => withoutRateChange(reader, filterField, use)), place };
}

/** A CIC filter is built around a rate change, so it can't stand in a step without one. */
function withoutRateChange(reader: Reader, field: Field, use: FilterUse): FilterUse {
  if (use.filter?.response?.response !== 'cic') return use;
  const message = 'A `cic` filter is built around a change of rate: its step needs `decimate`.';
  reportValue(reader, field, 'wrong-kind', use.place, message);
  return { ...use, filter: undefined };
}
