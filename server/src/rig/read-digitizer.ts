import { type Field, itemsOf, namePlace, readEntryFields } from './fields.ts';
import { readFilterUse, readFilterUses } from './filter-uses.ts';
import type { Digitizer, FullScale, Given, ListedRates } from './model.ts';
import { findThing } from './names.ts';
import { readEnds, readFullScale, readValue } from './quantities.ts';
import { readInputNoise, readRmsTime } from './read-noise.ts';
import { readInterleave } from './read-uneven.ts';
import type { Reader } from './reader.ts';
import { checkUncomputed } from './uncomputed.ts';
import {
  alternative,
  given,
  readChoice,
  readNumber,
  readNumbers,
  readTruth,
  reportWrongKind,
  scalarOf,
} from './values.ts';

/** Reads an entry of `digitizers`. Clocks and filters must have been read. */
export function readDigitizer(reader: Reader): Digitizer {
  const fields = readEntryFields(reader, 'digitizer');
  const field = (key: string): Field | undefined => fields.byKey.get(key);
  const place = namePlace(reader.entry);
  const decimation = field('decimation-filter');
  checkUncomputed(reader, fields);
  return {
    kind: 'digitizer',
    name: reader.entry.name,
    place,
    clock: readClockUse(reader, field('clock')),
    prescale: readNumber(reader, field('prescale'))?.value ?? 1,
    rates: readRates(reader, field('rates')),
    maxRateHz: readValue(reader, field('max-rate')),
    together: readChoice<'free' | 'same' | 'sub-multiples'>(reader, field('together')) ?? { value: 'free', place },
    sampling: readChoice<'simultaneous' | 'scanned'>(reader, field('sampling')),
    scanIntervalS: readValue(reader, field('scan-interval')),
    settlingS: readValue(reader, field('settling')),
    bits: readNumber(reader, field('bits')),
    noise: readInputNoise(reader, field('noise')),
    jitterS: readRmsTime(reader, field('jitter')),
    fullScale: readFullScale(reader, field('full-scale')),
    gain: readNumber(reader, field('gain')),
    ranges: readRanges(reader, field('ranges')),
    gains: readGains(reader, field('gains')),
    lowCornerHz: readValue(reader, field('low-corner')),
    filters: readFilterUses(reader, field('filter'), 'analogue'),
    modulatorMultiple: readValue(reader, field('modulator')),
    interleave: readInterleave(reader, field('interleave')),
    decimationFilter: decimation && hasValue(decimation) ? readFilterUse(reader, decimation, 'digital') : undefined,
    delayCompensated: readTruth(reader, field('delay-compensated'))?.value ?? false,
  };
}

function hasValue(field: Field): boolean {
  return field.node.kind !== 'empty';
}

function readClockUse(reader: Reader, field: Field | undefined): Digitizer['clock'] {
  const node = field && scalarOf(reader, field);
  if (!node || !field) return undefined;
  return { ...given(field, node.text), thing: findThing(reader, field, node, 'clock') };
}

function readRates(reader: Reader, field: Field | undefined): Given<ListedRates> | undefined {
  if (!field || field.node.kind === 'empty') return undefined;
  if (field.node.kind !== 'list') {
    const ends = readEnds(reader, field);
    if (!ends) return undefined;
    const { lowValue: lowHz, highValue: highHz } = ends;
    const rates: ListedRates =
      ends.written.kind === 'scalar' ? { kind: 'list', ratesHz: [highHz] } : { kind: 'range', lowHz, highHz };
    return given(field, rates, ends.written);
  }
  const rates = listItems(reader, field).map((item) => readValue(reader, item)?.value);
  const ratesHz = [...new Set(rates.filter((rate) => rate !== undefined))].sort((a, b) => a - b);
  return ratesHz.length === 0 ? undefined : given(field, { kind: 'list', ratesHz });
}

function readRanges(reader: Reader, field: Field | undefined): Given<readonly FullScale[]> | undefined {
  if (!isList(reader, field)) return undefined;
  const ranges = listItems(reader, field).flatMap((item) => readFullScale(reader, item)?.value ?? []);
  return ranges.length === 0 ? undefined : given(field, ranges);
}

function readGains(reader: Reader, field: Field | undefined): Given<readonly number[]> | undefined {
  if (!isList(reader, field)) return undefined;
  const gains = readNumbers(reader, listItems(reader, field));
  return gains && gains.length > 0 ? given(field, gains) : undefined;
}

function isList(reader: Reader, field: Field | undefined): field is Field {
  if (!field || field.node.kind === 'empty') return false;
  if (field.node.kind === 'list') return true;
  reportWrongKind(reader, field);
  return false;
}

function listItems(reader: Reader, field: Field): readonly Field[] {
  if (field.node.kind !== 'list') return [];
  return itemsOf(reader, field, field.node.items, alternative(field.kind, 'list').of);
}
