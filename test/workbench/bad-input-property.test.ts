import fc from 'fast-check';
import { expect, it } from 'vitest';
import { ALL_CHECKS } from '../../server/src/checks/list.ts';
import { runs } from '../tools/runs.ts';
import { SAMPLES } from '../tools/samples.ts';
import { faultsOf } from './bad-input.ts';
import { evaluated } from './describe-findings.ts';

const RIGS = [...SAMPLES.map(({ text }) => text), ...ALL_CHECKS.flatMap(({ shows, clean }) => [shows, clean])];

const NUMBERS = [
  '1e400',
  '-1e400',
  '-0',
  '0',
  '-1',
  '0.5',
  '1.5',
  '1e9',
  '1e12',
  '1e15',
  '1e-300',
  '1e300',
  '1e-320',
  '.nan',
  '.inf',
  '-.inf',
  'NaN',
  'Infinity',
  '9007199254740993',
];
const UNITS = ['', ' Hz', ' GHz', ' rpm', ' s', ' V', ' g', ' %', ' dB', ' dBFS', ' fs', ' B', ' bit', ' furlong'];
const RANGES = [
  '10 kHz .. 1 kHz',
  '0..0 rpm',
  '1e-300..1e300',
  '1e-300 Hz .. 1e300 Hz',
  '1e-45..1e45 rpm',
  '±0 V',
  '±1e300 V',
  '1..1000000000',
];
const OTHERS = [
  '__proto__',
  'constructor',
  'toString',
  '"🦄"',
  '"\u202eאב"',
  '"\t"',
  'x'.repeat(1000),
  '{}',
  '[]',
  '[0]',
  '[-1]',
  '[[[[[[[[]]]]]]]]',
  'null',
  '~',
  'true',
  'undefined',
  '*x',
  '&x 3',
  '!!binary aaaa',
  'none',
  'all',
  'bandpass',
  '',
];

const nasty = fc.oneof(
  fc.tuple(fc.constantFrom(...NUMBERS), fc.constantFrom(...UNITS)).map(([number, unit]) => number + unit),
  fc.constantFrom(...RANGES, ...OTHERS),
);

/** Where the values of a text stand: behind a colon, a comma, a dash or a bracket, up to the next of these. */
function valuesOf(text: string): readonly { readonly start: number; readonly end: number }[] {
  return [...text.matchAll(/(?<=(?:: |\[|, |- ))[^\s,[\]{}#&*][^,[\]{}\n#:]*(?=[,\]}\n]| [}#])/g)].map(
    ({ index, 0: value }) => ({
      start: index,
      end: index + value.trimEnd().length,
    }),
  );
}

const spoilt = fc.tuple(fc.constantFrom(...RIGS), fc.nat(), nasty).map(([text, at, value]) => {
  const places = valuesOf(text);
  const { start, end } = places[at % places.length]!;
  return text.slice(0, start) + value + text.slice(end);
});

it('every rig has values to spoil', () => {
  for (const text of RIGS) expect(valuesOf(text).length).toBeGreaterThan(0);
});

it('whatever one value is, nothing is thrown, and what is said is plain and stands in the text', () => {
  fc.assert(
    fc.property(spoilt, (text) => {
      expect(faultsOf(evaluated(text), text)).toEqual([]);
    }),
    { numRuns: runs(300) },
  );
});
