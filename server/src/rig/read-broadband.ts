import { type Field, type Fields, placeOf } from './fields.ts';
import type { BroadbandSource, Given, Level } from './model.ts';
import type { Place } from './place.ts';
import { readFrequencyRange } from './quantities.ts';
import { readNoise } from './read-noise.ts';
import type { Reader } from './reader.ts';
import { reportValue } from './values.ts';

/** What is said of a source that has lines; noise has none. */
const KEYS_OF_LINES = ['harmonics', 'level', 'falls', 'tolerance', 'wanted', 'enters'] as const;

/** Reads the fields of a broadband source. Where it enters is for the unit of its density to say. */
export function readBroadband(
  reader: Reader,
  { byKey }: Fields,
  name: string,
  place: Place,
): BroadbandSource | undefined {
  for (const key of KEYS_OF_LINES) {
    const field = byKey.get(key);
    if (field) reportOfLines(reader, field);
  }
  const density = readNoise(reader, byKey.get('noise'));
  const spans = readFrequencyRange(reader, byKey.get('spans'));
  if (!density || !spans) return undefined;
  return {
    kind: 'source',
    type: 'broadband',
    name,
    place,
    spans,
    levels: [density.noise],
    enters: density.noise.value.kind === 'measured' ? 'sensor' : 'wiring',
    entersSaid: false,
    harmonics: 1,
    fallsDbPerOctave: 0,
    tolerance: 0,
    wanted: false,
  };
}

function reportOfLines(reader: Reader, field: Field): void {
  const message = `\`${field.row.key}\` is not read: \`noise\` makes this a broadband source, which \`noise\` and \`spans\` describe.`;
  reportValue(reader, field, 'wrong-kind', placeOf(field.entry, field.node), message);
}

/** Says that a level of a channel's own does not apply to noise. */
export function reportLevelOfNoise(reader: Reader, field: Field, name: string, level: Given<Level>): void {
  const message = `The level is not read: \`${name}\` is broadband, and its \`noise\` says how strong it is. Write \`none\` where this channel does not hear it.`;
  reportValue(reader, field, 'wrong-kind', level.place, message);
}
