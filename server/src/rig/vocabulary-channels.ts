import type { KeyRow } from './vocabulary-kinds.ts';
import {
  choice,
  either,
  FILTERS,
  FREQUENCY,
  FULL_SCALE,
  integer,
  LEVEL,
  listOf,
  mapOf,
  measuredQuantity,
  NOT_NEGATIVE,
  nameOf,
  number,
  POSITIVE,
  PRACTICE,
  quantity,
  RANGE_ONLY,
  RATE,
  row,
  SPEED,
  TEXT,
  TIME,
} from './vocabulary-kinds.ts';
import { WINDOW_CHOICES } from './window-choices.ts';

const NONE = choice({ none: 'None.' });

const CHANNEL_ROWS: readonly KeyRow[] = [
  row(
    'channel',
    'sensor',
    nameOf('sensor', 'sensor'),
    'stud-mounted',
    'The sensor: its name, or one written in place. Its keys may also stand in the channel itself.',
  ),
  row('channel', 'digitizer', nameOf('digitizer'), 'front-end', 'The digitizer that samples this channel.', {
    default: 'rates are not checked against a clock, and levels have no full scale',
  }),
  row('channel', 'rate', RATE, '25.6 kHz', 'The sample rate of the converter, for this channel.', { required: true }),
  row('channel', 'gain', number(POSITIVE), '10', "This channel's gain ahead of the converter.", {
    default: "the digitizer's",
  }),
  row('channel', 'full-scale', FULL_SCALE, '±1 V', "This channel's full scale, in volts at the converter.", {
    default: "the digitizer's",
  }),
  row(
    'channel',
    'filter',
    either(NONE, FILTERS),
    'card',
    "The analogue filters ahead of the digitizer's own, in order: a name, a list, one written in place, or `none`.",
    { default: "none besides the digitizer's" },
  ),
  row(
    'channel',
    'then',
    listOf(mapOf('step')),
    '[{ decimate: 5, filter: tidy }]',
    'The digital steps after the converter, in order.',
    { default: 'none' },
  ),
  row(
    'channel',
    'band',
    quantity('frequency', 'Hz', { forms: RANGE_ONLY, bounds: NOT_NEGATIVE, width: true }),
    '10 Hz .. 10 kHz',
    'The range that will be used afterwards, in true frequency.',
    { required: true },
  ),
  row(
    'channel',
    'fold-limit',
    measuredQuantity(['dbfs', 'ratio', 'voltage']),
    '-80 dBFS',
    'The most that may fold into the band: in dBFS, in per cent of full scale, or in the measured unit.',
    { default: '0.1 %' },
  ),
  row(
    'channel',
    'undeclared',
    either(LEVEL, listOf({ kind: 'tuple', of: [FREQUENCY, LEVEL] })),
    '-40 dBFS',
    'A bound on what no source declares: one level, or pairs of frequency and level.',
    { default: 'full scale' },
  ),
  row('channel', 'flatness', quantity('decibel', 'dB'), '1 dB', 'The most that the response may sag inside the band.', {
    default: '1 dB',
  }),
  row(
    'channel',
    'sampling',
    choice({
      baseband: 'The band lies below the Nyquist frequency.',
      bandpass: 'The band is folded on purpose.',
    }),
    'baseband',
    'Whether the band is sampled as it is, or folded on purpose.',
    { default: 'baseband' },
  ),
  row(
    'channel',
    'hears',
    either(
      choice({ all: 'Every source whose level this channel can place.', none: 'No source.' }),
      listOf(nameOf('source')),
      { kind: 'map-of', keys: 'source', value: either(NONE, LEVEL) },
    ),
    'all',
    'The sources that reach this channel: `all`, `none`, a list that takes the place of all, or a map that sets levels of some and leaves the rest.',
    { default: 'all' },
  ),
  row(
    'channel',
    'peak',
    measuredQuantity(['voltage', 'dbfs'], { forms: ['value', 'range', 'symmetric'] }),
    '40 g',
    'The largest value expected, never rms: one value, or a range.',
  ),
  row(
    'channel',
    'headroom',
    quantity('decibel', 'dB', { bounds: NOT_NEGATIVE }),
    '3 dB',
    'The distance wanted from `peak` to full scale.',
    { default: '3 dB' },
  ),
  row(
    'channel',
    'resolve',
    measuredQuantity(['voltage', 'dbfs'], { bounds: {} }),
    '0.01 g',
    'The smallest step that must be seen, as the level of a sinusoid.',
    { default: 'nothing is said of steps and noise' },
  ),
  row(
    ['channel', 'rig'],
    'follows',
    either(NONE, PRACTICE, listOf(PRACTICE)),
    'impact-class-1000',
    'The practices that it has to meet, by their names in the table of practices: one, a list, or `none`. At the top of the file, what every channel follows that says nothing else and has nothing else from `defaults`.',
    { default: 'none' },
  ),
  row('channel', 'group', nameOf('group'), 'tower', 'The group whose phases are compared.'),
  row(
    'channel',
    'pattern',
    mapOf('pattern'),
    '{ of: 10, take: [0, 1, 2, 3] }',
    'Of every so many sample slots, only some are kept.',
    { default: 'all are kept' },
  ),
  row(
    'channel',
    'pulses',
    mapOf('pulses'),
    '{ per-turn: 60, speed: 600..3000 rpm, duty: 50 % }',
    'A pulse train that is read for its edges; what is said of folding and filters does not apply to it.',
  ),
  row(
    'channel',
    'spectrum',
    mapOf('spectrum'),
    '{ lines: 800, window: hann }',
    'How the record will be turned into a spectrum: one of `lines`, `resolution` and `record`, and what else it takes.',
  ),
  row('channel', 'note', TEXT, 'above the coupling', 'Free text.'),
];

const STEP_ROWS: readonly KeyRow[] = [
  row('step', 'decimate', integer({ low: 1, high: 10_000_000 }), '5', 'Keeps one sample of so many.'),
  row('step', 'filter', FILTERS, 'tidy', 'The digital filters of this step, ahead of its decimation.', {
    default: 'none',
  }),
  row(
    'step',
    'per-turn',
    integer({ low: 1 }),
    '64',
    'Resamples to so many samples for each turn of a shaft. In its filters `fs` is the rate that it leaves, so that they are in orders.',
  ),
  row(
    'step',
    'speed',
    SPEED,
    '600..3000 rpm',
    "The shaft's speed. A rotating source of the same speed is taken to turn with it.",
  ),
];

const PULSES_ROWS: readonly KeyRow[] = [
  row('pulses', 'per-turn', integer({ low: 1 }), '60', 'The number of pulses in one turn.', {
    required: true,
  }),
  row('pulses', 'speed', SPEED, '600..3000 rpm', "The shaft's speed.", { required: true }),
  row(
    'pulses',
    'duty',
    quantity('ratio', '%', { bounds: { low: 0, lowExcluded: true, high: 1, highExcluded: true } }),
    '50 %',
    'The part of each period during which the pulse is high.',
    { default: '50 %' },
  ),
];

const SPECTRUM_ROWS: readonly KeyRow[] = [
  row('spectrum', 'lines', integer({ low: 1 }), '800', 'The number of lines of the spectrum that are shown.'),
  row('spectrum', 'resolution', FREQUENCY, '1.25 Hz', 'The distance from one line to the next.'),
  row('spectrum', 'record', TIME, '0.8 s', 'The length of the record behind one spectrum.'),
  row('spectrum', 'window', choice(WINDOW_CHOICES), 'hann', 'The window that the record is weighted with.', {
    default: 'hann',
  }),
  row(
    'spectrum',
    'overlap',
    quantity('ratio', '%', { bounds: { low: 0, high: 1, highExcluded: true } }),
    '50 %',
    'How far one record reaches into the next.',
    { default: '0 %' },
  ),
  row('spectrum', 'averages', integer({ low: 1 }), '16', 'The number of spectra that are averaged.', { default: '1' }),
  row('spectrum', 'separate', FREQUENCY, '4 Hz', 'Two tones this far apart have to be told from one another.'),
];

/** The keys of a channel and of the small maps in it; the keys of a sensor are a channel's too. */
export const CHANNEL_TABLE: readonly KeyRow[] = [...CHANNEL_ROWS, ...STEP_ROWS, ...PULSES_ROWS, ...SPECTRUM_ROWS];
