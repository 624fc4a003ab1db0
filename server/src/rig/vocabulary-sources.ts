import { MOST_HARMONICS, MOST_SIDEBANDS } from './limits.ts';
import type { KeyRow } from './vocabulary-kinds.ts';
import {
  choice,
  either,
  FREQUENCY_OR_RANGE,
  integer,
  LEVEL,
  listOf,
  NOT_NEGATIVE,
  number,
  POSITIVE,
  quantity,
  RANGE_ONLY,
  row,
  SPEED,
  TOLERANCE,
  TRUTH,
} from './vocabulary-kinds.ts';

/** One kind of source, and the keys that make it one. */
export interface SourceTypeRow {
  readonly name: 'tone' | 'rotating' | 'modulated' | 'broadband';
  readonly doc: string;
  readonly needs: readonly string[];
  /** Keys of this kind of source alone, besides those it needs. */
  readonly also: readonly string[];
}

/** The kinds of source, told from one another by their keys. */
export const SOURCE_TYPES: readonly SourceTypeRow[] = [
  {
    name: 'modulated',
    doc: 'A carrier with sidebands.',
    needs: ['carrier', 'modulation'],
    also: ['sidebands', 'sidebands-fall'],
  },
  { name: 'rotating', doc: 'So many times per turn of a shaft.', needs: ['order', 'speed'], also: [] },
  { name: 'broadband', doc: 'Noise that fills a range.', needs: ['noise', 'spans'], also: [] },
  { name: 'tone', doc: 'One frequency, or one somewhere in a range.', needs: ['frequency'], also: [] },
];

const BOTH = ['source', 'mains'] as const;

/** The keys of a source; those of `mains` are among them. */
export const SOURCE_ROWS: readonly KeyRow[] = [
  row('source', 'frequency', FREQUENCY_OR_RANGE, '120 Hz', 'The frequency of a tone: one value, or a range.'),
  row('mains', 'frequency', FREQUENCY_OR_RANGE, '50 Hz', 'The line frequency.', { required: true }),
  row('source', 'order', number(POSITIVE), '9', 'How often per turn of the shaft, such as the number of blades.'),
  row('source', 'speed', SPEED, '600..3000 rpm', "The shaft's speed: one value, or a range."),
  row('source', 'carrier', FREQUENCY_OR_RANGE, '16 kHz', 'The frequency of the carrier.'),
  row('source', 'modulation', FREQUENCY_OR_RANGE, '50 Hz', 'The distance from the carrier to its first sidebands.'),
  row(
    'source',
    'sidebands',
    integer({ low: 0, high: MOST_SIDEBANDS, clamped: true }),
    '2',
    'The number of sidebands on each side.',
    {
      default: '1',
    },
  ),
  row(
    'source',
    'sidebands-fall',
    quantity('decibel', 'dB', { bounds: NOT_NEGATIVE }),
    '6 dB',
    'How much lower each pair of sidebands is than the one before.',
    { default: '0 dB' },
  ),
  row(
    'source',
    'noise',
    quantity('density', 'V/rtHz', { bounds: NOT_NEGATIVE }),
    '10 uV/rtHz',
    'The density of a broadband source, one-sided rms: in volts, or in the measured unit.',
  ),
  row(
    'source',
    'spans',
    quantity('frequency', 'Hz', { forms: RANGE_ONLY, bounds: NOT_NEGATIVE, width: true }),
    '10 Hz .. 40 kHz',
    'The range that a broadband source fills.',
  ),
  row(
    BOTH,
    'harmonics',
    integer({ low: 1, high: MOST_HARMONICS, clamped: true }),
    '10',
    'The highest multiple of the frequency.',
    {
      default: '1, the fundamental alone',
    },
  ),
  row(
    BOTH,
    'level',
    either(LEVEL, listOf(LEVEL)),
    '2 g',
    'The level of the fundamental as a peak (`rms` and `p-p` may follow), or a list with one level for each harmonic.',
    { default: 'taken as full scale' },
  ),
  row(
    BOTH,
    'falls',
    quantity('slope', 'dB/oct', { bounds: NOT_NEGATIVE }),
    '6 dB/oct',
    'How the harmonics fall, in dB for each doubling of the frequency.',
    { default: '0 dB/oct' },
  ),
  row('source', 'tolerance', TOLERANCE, '0.5 %', 'How far its frequency may be off, either way.', { default: '0 %' }),
  row('mains', 'tolerance', TOLERANCE, '0.5 %', 'How far the line frequency may be off, either way.', {
    default: '1 %',
  }),
  row(BOTH, 'wanted', TRUTH, 'true', 'Whether this is what the test is after.', { default: 'false' }),
  row(
    BOTH,
    'enters',
    choice({
      sensor: 'At the sensor, as part of what it measures.',
      wiring: 'In the wiring, after the sensor and ahead of the filters.',
    }),
    'wiring',
    'Where it gets into the signal.',
    { default: 'sensor for a level in the measured unit, wiring for volts, dBFS or no level' },
  ),
];
