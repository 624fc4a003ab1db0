import type { Scalar } from '../quantity/quantity.ts';
import { type Field, type Fields, innerPlace, itemsOf, placeOf } from './fields.ts';
import type { FilterFrequencies, FilterFrequency, Given } from './model.ts';
import { type Ends, readEnds, readValue } from './quantities.ts';
import type { Reader } from './reader.ts';
import type { ScalarNode } from './tree.ts';
import { alternative, given, reportValue, reportWrongKind } from './values.ts';

type Shape = 'low-pass' | 'high-pass' | 'band-pass';

/** The edge of a filter with poles: the first of the keys that is there decides which point of the curve it is. */
export function readEdge<At extends string>(
  reader: Reader,
  fields: Fields,
  shape: Shape,
  ats: readonly At[],
): (Given<FilterFrequencies> & { readonly at: At }) | undefined {
  const present = ats.filter((key) => fields.byKey.has(key));
  const at = present[0];
  const field = at && fields.byKey.get(at);
  if (!field) return undefined;
  for (const other of present.slice(1)) reportSecondEdge(reader, fields.byKey.get(other)!, at);
  const ends = readEnds(reader, field);
  if (!ends || !fitsShape(reader, field, ends, shape)) return undefined;
  const value = { low: filterFrequency(ends.low), high: filterFrequency(ends.high) };
  return { ...given(field, value, ends.written), at };
}

function reportSecondEdge(reader: Reader, field: Field, first: string): void {
  const message = `\`${field.row.key}\` is not read, because \`${first}\` already says where the edge is.`;
  reportValue(reader, field, 'wrong-kind', placeOf(field.entry, field.node), message);
}

function fitsShape(reader: Reader, field: Field, ends: Ends, shape: Shape): boolean {
  const isRange = ends.written.kind === 'range';
  const place = innerPlace(field.entry, field.node as ScalarNode);
  const { key } = field.row;
  if (isRange !== (shape === 'band-pass')) {
    const message = isRange
      ? `A ${shape} filter has one \`${key}\`, not a range.`
      : `A band-pass filter's \`${key}\` is a range, such as \`1 kHz .. 4 kHz\`.`;
    reportValue(reader, field, 'wrong-kind', place, message);
    return false;
  }
  if (isRange && ends.low.dimension !== ends.high.dimension) {
    reportValue(reader, field, 'unit-mismatch', place, 'Both ends must be frequencies, or both fractions of the rate.');
    return false;
  }
  return true;
}

/** A frequency at which a filter is specified, or a fraction of the rate. */
export function readDesignFrequency(reader: Reader, field: Field | undefined): Given<FilterFrequency> | undefined {
  const ends = field && readEnds(reader, field);
  return ends && field && given(field, filterFrequency(ends.high), ends.written);
}

function filterFrequency(scalar: Scalar): FilterFrequency {
  if (scalar.dimension === 'of-rate') return { kind: 'of-rate', fraction: scalar.value };
  return { kind: 'hz', hz: scalar.value };
}

/** The number to compare filter frequencies of one kind by. */
export function magnitudeOf(frequency: FilterFrequency): number {
  return frequency.kind === 'hz' ? frequency.hz : frequency.fraction;
}

interface AttenuationPoint {
  readonly at: FilterFrequency;
  readonly attenuationDb: number;
}

/** Pairs of frequency and attenuation, frequencies ascending and all of one kind. */
export function readPoints(reader: Reader, field: Field | undefined): readonly AttenuationPoint[] | undefined {
  if (!field || field.node.kind === 'empty') return undefined;
  if (field.node.kind !== 'list' || field.node.items.length === 0) {
    reportWrongKind(reader, field);
    return undefined;
  }
  const { of } = alternative(field.kind, 'list');
  const pairs = itemsOf(reader, field, field.node.items, of);
  const points: AttenuationPoint[] = [];
  let complete = pairs.length === field.node.items.length;
  for (const pair of pairs) {
    const point = readPoint(reader, pair);
    if (point && isNext(reader, pair, points.at(-1), point)) points.push(point);
    else complete = false;
  }
  return complete ? points : undefined;
}

function readPoint(reader: Reader, pair: Field): AttenuationPoint | undefined {
  const kinds = alternative(pair.kind, 'tuple').of;
  if (pair.node.kind !== 'list' || pair.node.items.length !== kinds.length) {
    const message = `Each of the \`${pair.row.key}\` is a pair, such as \`[1 kHz, 0.1 dB]\`.`;
    reportValue(reader, pair, 'wrong-kind', placeOf(pair.entry, pair.node), message);
    return undefined;
  }
  const [first, second] = itemsOf(reader, pair, pair.node.items, kinds[0]!);
  const at = readDesignFrequency(reader, first);
  const attenuationDb = second && readValue(reader, { ...second, kind: kinds[1]! })?.value;
  return at && attenuationDb !== undefined ? { at: at.value, attenuationDb } : undefined;
}

function isNext(reader: Reader, pair: Field, before: AttenuationPoint | undefined, point: AttenuationPoint): boolean {
  if (!before) return true;
  const place = placeOf(pair.entry, pair.node);
  if (before.at.kind !== point.at.kind) {
    reportValue(
      reader,
      pair,
      'unit-mismatch',
      place,
      'The points must all be frequencies, or all fractions of the rate.',
    );
    return false;
  }
  if (magnitudeOf(before.at) < magnitudeOf(point.at)) return true;
  reportValue(reader, pair, 'out-of-range', place, 'The frequency of each point must be above that of the one before.');
  return false;
}
