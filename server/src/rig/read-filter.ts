import { type Field, type Fields, innerPlace, itemsOf, placeOf, reportMissingKey } from './fields.ts';
import { checkShape } from './filter-checks.ts';
import { readDesignFrequency, readEdge, readPoints } from './filter-frequencies.ts';
import type { Filter, FilterResponse } from './model.ts';
import type { Place } from './place.ts';
import { readValue } from './quantities.ts';
import { type Reader, report } from './reader.ts';
import { alternative, readChoice, readNumber, readNumbers, reportValue } from './values.ts';
import { keyRow } from './vocabulary.ts';
import { RESPONSES, type ResponseRow } from './vocabulary-filters.ts';

const RESPONSES_BY_NAME: ReadonlyMap<string, ResponseRow> = new Map(RESPONSES.map((row) => [row.name, row]));
const COMMON_KEYS: readonly string[] = ['response', 'tolerance', 'passes', 'order'];

/** Reads the fields of a filter, whether it is named or written in place. */
export function readFilter(reader: Reader, fields: Fields, name: string, place: Place): Filter {
  const response = readResponseRow(reader, fields);
  const passes = readNumber(reader, fields.byKey.get('passes'))?.value;
  const order = readNumber(reader, fields.byKey.get('order'));
  const complete = response !== undefined && hasWhatItNeeds(reader, fields, response);
  if (response) reportForeignKeys(reader, fields, response);
  const read = response && readResponse(reader, fields, response, order?.value);
  return {
    kind: 'filter',
    name,
    place,
    response: complete && read && checkShape(reader, fields, read) ? read : undefined,
    order: response && uses(response, 'order') ? order : undefined,
    tolerance: readValue(reader, fields.byKey.get('tolerance'))?.value ?? 0,
    passes: passes === 2 ? 2 : 1,
  };
}

function readResponseRow(reader: Reader, fields: Fields): ResponseRow | undefined {
  const field = fields.byKey.get('response');
  if (!field) reportMissingKey(reader, fields, 'response', keyRow('filter', 'response')?.example);
  const choice = readChoice(reader, field);
  return choice && RESPONSES_BY_NAME.get(choice.value);
}

function hasWhatItNeeds(reader: Reader, fields: Fields, response: ResponseRow): boolean {
  let complete = true;
  for (const keys of response.needs) {
    if (keys.some((key) => fields.byKey.has(key))) continue;
    complete = false;
    const key = keys[keys.length - 1] === 'stopband' ? 'stopband' : keys[0]!;
    reportMissingKey(reader, fields, key, keyRow('filter', key)?.example);
  }
  return complete;
}

function uses(response: ResponseRow, key: string): boolean {
  return response.needs.some((keys) => keys.includes(key)) || response.also.includes(key);
}

/** A key of another response does nothing here, which whoever wrote it can't have meant. */
function reportForeignKeys(reader: Reader, fields: Fields, response: ResponseRow): void {
  for (const [key, field] of fields.byKey) {
    if (COMMON_KEYS.includes(key) ? key !== 'order' || uses(response, key) : uses(response, key)) continue;
    report(reader, {
      name: 'unknown-key',
      place: placeOf(field.entry, field.node),
      message: `\`${key}\` means nothing to the response \`${response.name}\`, so it is not read.`,
      about: field.path,
    });
  }
}

function readResponse(
  reader: Reader,
  fields: Fields,
  row: ResponseRow,
  order: number | undefined,
): FilterResponse | undefined {
  const { byKey } = fields;
  switch (row.name) {
    case 'butterworth':
    case 'bessel':
    case 'chebyshev':
    case 'inverse-chebyshev':
    case 'elliptic':
      return readPoleResponse(reader, fields, row.name, row, order);
    case 'rc': {
      const shape = readShape(reader, fields);
      const edge = readEdge(reader, fields, shape, ['corner', 'cutoff']);
      return order && edge ? { response: 'rc', order, shape, edge } : undefined;
    }
    case 'mask':
    case 'kaiser': {
      const pass = readDesignFrequency(reader, byKey.get('pass'));
      const stop = readDesignFrequency(reader, byKey.get('stop'));
      const stopbandDb = readValue(reader, byKey.get('stopband'))?.value;
      const rippleDb = row.name === 'mask' ? readDecibels(reader, byKey.get('ripple')) : 0;
      if (!pass || !stop || stopbandDb === undefined || rippleDb === undefined) return undefined;
      if (row.name === 'mask') return { response: 'mask', pass, stop, stopbandDb, rippleDb };
      return { response: 'kaiser', pass, stop, stopbandDb };
    }
    case 'points': {
      const points = readPoints(reader, byKey.get('points'));
      return points && { response: 'points', points };
    }
    case 'aperture': {
      const timeS = readValue(reader, byKey.get('time'));
      return timeS && { response: 'aperture', timeS };
    }
    case 'fir': {
      const taps = readTaps(reader, byKey.get('taps'));
      return taps && { response: 'fir', taps };
    }
    case 'half-band':
      return readHalfBand(reader, fields);
    case 'moving-average': {
      const length = readNumber(reader, byKey.get('length'))?.value;
      return length === undefined ? undefined : { response: 'moving-average', length };
    }
    default: {
      const delay = byKey.has('delay') ? readNumber(reader, byKey.get('delay'))?.value : 1;
      return order === undefined || delay === undefined ? undefined : { response: 'cic', order, delay };
    }
  }
}

type PoleName = 'butterworth' | 'bessel' | 'chebyshev' | 'inverse-chebyshev' | 'elliptic';

function readPoleResponse(
  reader: Reader,
  fields: Fields,
  response: PoleName,
  row: ResponseRow,
  order: number | undefined,
): FilterResponse | undefined {
  const shape = readShape(reader, fields);
  const ats = (['cutoff', 'pass-edge', 'stop-edge'] as const).filter((key) => uses(row, key));
  const edge = readEdge(reader, fields, shape, ats);
  const rippleDb = uses(row, 'ripple') ? readValue(reader, fields.byKey.get('ripple'))?.value : 0;
  const stopbandDb = uses(row, 'stopband') ? readValue(reader, fields.byKey.get('stopband'))?.value : 0;
  if (!order || !edge || rippleDb === undefined || stopbandDb === undefined) return undefined;
  return { response, order, shape, edge, rippleDb, stopbandDb };
}

function readShape(reader: Reader, fields: Fields): 'low-pass' | 'high-pass' | 'band-pass' {
  return readChoice<'low-pass' | 'high-pass' | 'band-pass'>(reader, fields.byKey.get('shape'))?.value ?? 'low-pass';
}

/** dB that may be left out; `undefined` where they are there and can't be read. */
function readDecibels(reader: Reader, field: Field | undefined): number | undefined {
  return field ? readValue(reader, field)?.value : 0;
}

function readHalfBand(reader: Reader, fields: Fields): FilterResponse | undefined {
  const { byKey } = fields;
  if (byKey.has('taps')) {
    const taps = readTaps(reader, byKey.get('taps'));
    return taps && { response: 'half-band', taps };
  }
  const pass = readDesignFrequency(reader, byKey.get('pass'));
  const stopbandDb = readValue(reader, byKey.get('stopband'))?.value;
  return pass && stopbandDb !== undefined ? { response: 'half-band', pass, stopbandDb } : undefined;
}

function readTaps(reader: Reader, field: Field | undefined): readonly number[] | undefined {
  if (!field || field.node.kind === 'empty') return undefined;
  const { node } = field;
  if (node.kind !== 'list') {
    const message = `\`taps\` is a list of numbers, such as \`${field.row.example}\`.`;
    reportValue(
      reader,
      field,
      'wrong-kind',
      node.kind === 'scalar' ? innerPlace(field.entry, node) : placeOf(field.entry, node),
      message,
    );
    return undefined;
  }
  const taps = readNumbers(reader, itemsOf(reader, field, node.items, alternative(field.kind, 'list').of));
  if (!taps) return undefined;
  if (taps.some((tap) => tap !== 0)) return taps;
  reportValue(reader, field, 'out-of-range', placeOf(field.entry, node), 'These taps let nothing through.');
  return undefined;
}

/** True for a filter that exists only in numbers, after the converter. */
export function isDigitalOnly(filter: Filter): boolean {
  return filter.response !== undefined && (RESPONSES_BY_NAME.get(filter.response.response)?.digital ?? false);
}
