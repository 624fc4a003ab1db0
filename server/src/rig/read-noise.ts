import type { Scalar } from '../quantity/quantity.ts';
import { findUnit, type Unit, unitsOf } from '../quantity/unit.ts';
import { peakOfRms } from '../signal/levels.ts';
import { type Field, innerPlace } from './fields.ts';
import { measuredOf } from './levels.ts';
import type { Given, InputNoise, NoiseLevel } from './model.ts';
import { readEnds } from './quantities.ts';
import type { Reader } from './reader.ts';
import type { ScalarNode } from './tree.ts';
import { given, reportValue } from './values.ts';

/** A density of noise, and the unit that its numerator is in. */
export interface ReadNoise {
  readonly noise: Given<NoiseLevel>;
  readonly of: Unit;
}

/** A density of noise, in volts or in what a sensor measures. */
export function readNoise(reader: Reader, field: Field | undefined): ReadNoise | undefined {
  const rms = readRms(reader, field);
  if (!field || !rms) return undefined;
  const of = rms.scalar.unit?.of ?? VOLT;
  const peak = peakOfRms(rms.scalar.value);
  const noise: NoiseLevel =
    of.dimension === 'voltage'
      ? { kind: 'volts', peakV: peak }
      : { kind: 'measured', peak, measured: measuredOf(of.dimension), unit: usualSymbol(of) };
  return { noise: given(field, noise, rms.scalar), of };
}

/** The noise of a digitizer's input, in volts: rms, or a density. */
export function readInputNoise(reader: Reader, field: Field | undefined): Given<InputNoise> | undefined {
  const rms = readRms(reader, field);
  if (!field || !rms) return undefined;
  const { scalar } = rms;
  const of = scalar.unit?.of;
  if (of && of.dimension !== 'voltage') {
    const message = `\`${field.row.key}\` is in ${scalar.unit?.symbol}, but a digitizer's input takes volts; write it like \`${field.row.example}\`.`;
    reportValue(reader, field, 'unit-mismatch', innerPlace(field.entry, field.node as ScalarNode), message);
    return undefined;
  }
  const noise: InputNoise = of
    ? { kind: 'density', voltsPerRootHz: scalar.value }
    : { kind: 'rms', rmsV: scalar.value };
  return given(field, noise, scalar);
}

/** A time that is an rms, in s. */
export function readRmsTime(reader: Reader, field: Field | undefined): Given<number> | undefined {
  const rms = readRms(reader, field);
  return field && rms && given(field, rms.scalar.value, rms.scalar);
}

const VOLT = findUnit('V') as Unit;

/** One value of which nothing but the rms is told: `rms` may stand behind it, another word may not. */
function readRms(reader: Reader, field: Field | undefined): { readonly scalar: Scalar } | undefined {
  const ends = field && readEnds(reader, field);
  if (!field || !ends) return undefined;
  const { amplitude } = ends.high;
  if (amplitude === undefined || amplitude === 'rms') return { scalar: ends.high };
  const message = `\`${field.row.key}\` is an rms value, and ${amplitude} does not tell the rms of noise.`;
  reportValue(reader, field, 'wrong-kind', innerPlace(field.entry, field.node as ScalarNode), message);
  return undefined;
}

/** What a level may be in: of nV, ng or ne, which only densities have, the usual unit. */
function usualSymbol({ symbol, dimension }: Unit): string {
  if (dimension === 'other' || findUnit(symbol)) return symbol;
  return unitsOf(dimension)[0]?.symbol ?? symbol;
}
