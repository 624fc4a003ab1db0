import type { Dimension } from './dimension.ts';
import { looksLikeUnit } from './unit-word.ts';
import { powerOfTen } from './written-number.ts';

/** A unit: of the table, made of table units (a density, a sensitivity), or a channel's own. */
export interface Unit {
  /** As the table spells it: `kHz`, `uV/rtHz`, `mV/g`. */
  readonly symbol: string;
  readonly dimension: Dimension;
  /** Base units in one of this unit: 10^tens x times / over. Logarithmic units are their own base. */
  readonly factor: number;
  /** The power of ten in the factor, kept apart so that decimal numbers convert without a second rounding. */
  readonly tens: number;
  readonly times: number;
  readonly over: number;
  /** True where a number in it is always read as a difference (degC). */
  readonly difference: boolean;
  /** What stands before the `/` of a density or a sensitivity. */
  readonly of?: Unit;
  /** What stands behind the `/` of a sensitivity; a channel's own unit has the dimension `other`. */
  readonly per?: Unit;
}

/** Metres per second squared in one g. Exact; 3rd CGPM 1901, ISO 80000-3. */
export const STANDARD_GRAVITY = 9.80665;
const DEGREES_PER_HALF_TURN = 180;
const LONGEST_UNIT = 32;

interface Scale {
  readonly tens?: number;
  readonly times?: number;
  readonly over?: number;
  readonly difference?: boolean;
}

function unit(symbol: string, dimension: Dimension, scale: Scale = {}, parts: Pick<Unit, 'of' | 'per'> = {}): Unit {
  const { tens = 0, times = 1, over = 1, difference = false } = scale;
  return { symbol, dimension, factor: (powerOfTen(tens) * times) / over, tens, times, over, difference, ...parts };
}

/** Units of one dimension that differ by powers of ten: `[symbol, power of ten]`. */
function decimal(dimension: Dimension, ...units: readonly (readonly [string, number])[]): readonly Unit[] {
  return units.map(([symbol, tens]) => unit(symbol, dimension, { tens }));
}

/**
 * Every unit that has a meaning of its own, in the order in which completion shows them. Prefixes are decimal, in
 * front of bytes too (1 kB = 1000 B). Factors: SI Brochure, 9th edition (2019), tables 4, 7 and 8.
 *
 * `mg` and `ug` are thousandths and millionths of g, the acceleration: nothing here is weighed. `kg` is left out,
 * because it would be taken for the kilogram.
 */
const TABLE: readonly Unit[] = [
  ...decimal('frequency', ['Hz', 0], ['kHz', 3], ['MHz', 6], ['GHz', 9]),
  ...decimal('rate', ['S/s', 0], ['kS/s', 3], ['MS/s', 6], ['GS/s', 9]),
  unit('rpm', 'rotation', { over: 60 }),
  ...decimal('time', ['s', 0], ['ms', -3], ['us', -6], ['ns', -9], ['ps', -12]),
  unit('min', 'time', { times: 60 }),
  unit('h', 'time', { times: 3600 }),
  ...decimal('voltage', ['V', 0], ['mV', -3], ['uV', -6]),
  ...decimal('current', ['A', 0], ['mA', -3]),
  unit('ohm', 'resistance'),
  unit('g', 'acceleration', { times: STANDARD_GRAVITY }),
  unit('m/s2', 'acceleration'),
  unit('mg', 'acceleration', { tens: -3, times: STANDARD_GRAVITY }),
  unit('ug', 'acceleration', { tens: -6, times: STANDARD_GRAVITY }),
  ...decimal('velocity', ['m/s', 0], ['mm/s', -3]),
  ...decimal('displacement', ['m', 0], ['mm', -3], ['um', -6]),
  ...decimal('pressure', ['Pa', 0], ['kPa', 3], ['MPa', 6], ['bar', 5]),
  ...decimal('force', ['N', 0], ['kN', 3]),
  unit('N.m', 'torque'),
  unit('ue', 'strain', { tens: -6 }),
  unit('K', 'temperature'),
  unit('degC', 'temperature', { difference: true }),
  unit('deg', 'angle'),
  unit('rad', 'angle', { times: DEGREES_PER_HALF_TURN, over: Math.PI }),
  unit('dBFS', 'dbfs'),
  unit('dB', 'decibel'),
  unit('dB/oct', 'slope'),
  unit('%', 'ratio', { tens: -2 }),
  unit('ppm', 'ratio', { tens: -6 }),
  unit('bit', 'bits'),
  ...decimal('data', ['B', 0], ['kB', 3], ['MB', 6], ['GB', 9], ['TB', 12]),
  ...decimal('data-rate', ['B/s', 0], ['kB/s', 3], ['MB/s', 6], ['GB/s', 9], ['TB/s', 12]),
  unit('bit/s', 'data-rate', { over: 8 }),
  unit('fs', 'of-rate'),
];

const BY_SYMBOL: ReadonlyMap<string, Unit> = new Map(TABLE.map((entry) => [entry.symbol, entry]));

/**
 * What a density may have in its numerator besides the table's units: noise is small, so p, n, u and m may stand
 * before each of these (`ug/rtHz`, `nV/rtHz`, `ne/rtHz`).
 */
const NOISE_NUMERATORS: ReadonlyMap<string, Unit> = new Map(
  ['V', 'A', 'g', 'm', 'm/s', 'm/s2', 'Pa', 'N', 'N.m', 'K', 'rad', 'e'].flatMap((symbol) => {
    const base = symbol === 'e' ? unit('e', 'strain') : BY_SYMBOL.get(symbol)!;
    return (['p', 'n', 'u', 'm'] as const).map((prefix) => {
      const tens = { p: -12, n: -9, u: -6, m: -3 }[prefix];
      return [`${prefix}${symbol}`, unit(`${prefix}${symbol}`, base.dimension, { ...base, tens: base.tens + tens })];
    });
  }),
);

/** What has no noise density: logarithms, fractions of a rate, and stored data. */
const WITHOUT_DENSITY: ReadonlySet<Dimension> = new Set([
  'dbfs',
  'decibel',
  'slope',
  'of-rate',
  'bits',
  'data',
  'data-rate',
]);

/** `µ` (U+00B5) and `μ` (U+03BC) are `u`, and `√Hz` is `rtHz`. */
function normalised(text: string): string {
  if (!/[\u00B5\u03BC\u221A]/.test(text)) return text;
  return text.replace(/[\u00B5\u03BC]/g, 'u').replace('\u221AHz', 'rtHz');
}

/** The table's unit of this spelling (`µs` is `us`); densities and sensitivities are not in the table. */
export function tableUnit(text: string): Unit | undefined {
  return BY_SYMBOL.get(text) ?? BY_SYMBOL.get(normalised(text));
}

/** A unit that is a channel's own: its numbers are kept as written. */
export function ownUnit(symbol: string): Unit {
  return unit(symbol, 'other');
}

/**
 * The unit that a text names, case as SI has it: of the table, a density (`uV/rtHz`, `µV/√Hz`), or a sensitivity
 * (`mV/g`, `mV/(mm/s)`, `mV/lux`). The numerator of a density and the denominator of a sensitivity may be own units.
 * A unit in the table wins, so `mm/s` is a velocity. `undefined` for every other text.
 */
export function findUnit(text: string): Unit | undefined {
  const found = BY_SYMBOL.get(text);
  if (found || text.length > LONGEST_UNIT) return found;
  const plain = normalised(text);
  return BY_SYMBOL.get(plain) ?? densityUnit(plain) ?? sensitivityUnit(plain);
}

function densityUnit(text: string): Unit | undefined {
  if (!text.endsWith('/rtHz')) return undefined;
  const word = withoutBrackets(text.slice(0, -'/rtHz'.length));
  const of = BY_SYMBOL.get(word) ?? NOISE_NUMERATORS.get(word) ?? (looksLikeUnit(word) ? ownUnit(word) : undefined);
  if (!of || WITHOUT_DENSITY.has(of.dimension)) return undefined;
  return unit(`${of.symbol}/rtHz`, 'density', of, { of });
}

function sensitivityUnit(text: string): Unit | undefined {
  const slash = text.indexOf('/');
  const of = slash > 0 ? BY_SYMBOL.get(text.slice(0, slash)) : undefined;
  if (of?.dimension !== 'voltage') return undefined;
  const word = withoutBrackets(text.slice(slash + 1));
  const per = BY_SYMBOL.get(word) ?? (looksLikeUnit(word) ? ownUnit(word) : undefined);
  if (!per) return undefined;
  const scale = { tens: of.tens - per.tens, times: of.times * per.over, over: of.over * per.times };
  const symbol = per.symbol.includes('/') ? `${of.symbol}/(${per.symbol})` : `${of.symbol}/${per.symbol}`;
  return unit(symbol, 'sensitivity', scale, { of, per });
}

/** `(mm/s)` is `mm/s`. */
export function withoutBrackets(text: string): string {
  return text.startsWith('(') && text.endsWith(')') ? text.slice(1, -1) : text;
}

/** What completion offers where the units are made of others. */
const USUAL: Partial<Record<Dimension, readonly Unit[]>> = {
  density: ['uV/rtHz', 'nV/rtHz', 'ug/rtHz'].map((symbol) => densityUnit(symbol)!),
  sensitivity: ['mV/g', 'mV/(m/s2)', 'mV/(mm/s)', 'mV/Pa', 'mV/N', 'mV/V', 'uV/K', 'uV/ue'].map(
    (symbol) => sensitivityUnit(symbol)!,
  ),
};

const BY_DIMENSION: ReadonlyMap<Dimension, readonly Unit[]> = new Map(
  TABLE.map(({ dimension }) => [dimension, TABLE.filter((entry) => entry.dimension === dimension)]),
);

/** The units of a dimension, the usual one first; empty for `number` and `other`. */
export function unitsOf(dimension: Dimension): readonly Unit[] {
  return USUAL[dimension] ?? BY_DIMENSION.get(dimension) ?? [];
}

/** The whole table. */
export function allUnits(): readonly Unit[] {
  return TABLE;
}
