import { MOST_FILTER_ORDER } from './limits.ts';
import type { KeyRow } from './vocabulary-kinds.ts';
import {
  choice,
  integer,
  listOf,
  NOT_NEGATIVE,
  number,
  quantity,
  row,
  TIME,
  TOLERANCE,
  VALUE_OR_RANGE,
} from './vocabulary-kinds.ts';

/** One filter response: what it is, and what it needs. */
export interface ResponseRow {
  readonly name: string;
  readonly doc: string;
  /** True for a response that exists only in numbers, after the converter. */
  readonly digital: boolean;
  /** Keys it needs; of each inner list, one. */
  readonly needs: readonly (readonly string[])[];
  /** Keys it may have besides `response`, `tolerance`, `passes` and those it needs. */
  readonly also: readonly string[];
}

function response(
  name: string,
  doc: string,
  needs: readonly (readonly string[])[],
  also: readonly string[] = [],
): ResponseRow {
  return { name, doc, digital: false, needs, also };
}

function digitalResponse(
  name: string,
  doc: string,
  needs: readonly (readonly string[])[],
  also: readonly string[] = [],
): ResponseRow {
  return { name, doc, digital: true, needs, also };
}

/** Every response, in the order in which they are shown. */
export const RESPONSES: readonly ResponseRow[] = [
  response('butterworth', 'As flat as can be in the pass band.', [['order'], ['cutoff']], ['shape']),
  response('bessel', 'The flattest delay; a gentle roll-off.', [['order'], ['cutoff']], ['shape']),
  response(
    'chebyshev',
    'Ripple in the pass band, a steeper roll-off.',
    [['order'], ['ripple'], ['cutoff', 'pass-edge']],
    ['shape'],
  ),
  response(
    'inverse-chebyshev',
    'A flat pass band, ripple in the stop band.',
    [['order'], ['stopband'], ['cutoff', 'stop-edge']],
    ['shape'],
  ),
  response(
    'elliptic',
    'Ripple in both bands, the steepest roll-off.',
    [['order'], ['ripple'], ['stopband'], ['cutoff', 'pass-edge']],
    ['shape'],
  ),
  response('rc', 'Identical buffered single poles.', [['order'], ['corner', 'cutoff']], ['shape']),
  response(
    'mask',
    "A data sheet's promise: a pass band, a stop band, and nothing promised between them.",
    [['pass'], ['stop'], ['stopband']],
    ['ripple'],
  ),
  response('points', 'A measured or published curve of attenuation.', [['points']]),
  response('aperture', "An integrating converter's averaging over a time.", [['time']]),
  digitalResponse('fir', 'A list of taps. Digital.', [['taps']]),
  digitalResponse('kaiser', 'A windowed-sinc design. Digital.', [['pass'], ['stop'], ['stopband']]),
  digitalResponse('half-band', 'A low-pass for halving the rate. Digital.', [
    ['taps', 'pass'],
    ['taps', 'stopband'],
  ]),
  digitalResponse('moving-average', 'The mean of the last samples. Digital.', [['length']]),
  digitalResponse(
    'cic',
    "Integrators and combs around a rate change, the step's `decimate`. Digital.",
    [['order']],
    ['delay'],
  ),
];

const RESPONSE = choice(Object.fromEntries(RESPONSES.map(({ name, doc }) => [name, doc])));
const AT = quantity(['frequency', 'of-rate'], 'Hz');
const EDGE = quantity(['frequency', 'of-rate'], 'Hz', { forms: VALUE_OR_RANGE, width: true });
const DECIBELS_ABOVE_ZERO = quantity('decibel', 'dB');

/** The keys of a filter. */
export const FILTER_ROWS: readonly KeyRow[] = [
  row('filter', 'response', RESPONSE, 'butterworth', 'What kind of filter it is.', { required: true }),
  row(
    'filter',
    'order',
    integer({ low: 1, high: MOST_FILTER_ORDER }),
    '6',
    'The number of its poles, or of its stages.',
  ),
  row(
    'filter',
    'shape',
    choice({
      'low-pass': 'Lets low frequencies through.',
      'high-pass': 'Lets high frequencies through.',
      'band-pass': 'Lets a range through: `cutoff`, `pass-edge` and `stop-edge` are then ranges.',
    }),
    'low-pass',
    'Which side of the corner it lets through.',
    { default: 'low-pass' },
  ),
  row(
    'filter',
    'cutoff',
    EDGE,
    '8 kHz',
    'Where one pass through it is 3.0103 dB down. `0.2 fs` is a fraction of the rate.',
  ),
  row('filter', 'pass-edge', EDGE, '7 kHz', 'Where the response last is within its ripple.'),
  row('filter', 'stop-edge', EDGE, '14 kHz', 'Where the response first reaches its stop-band attenuation.'),
  row('filter', 'corner', EDGE, '1.6 kHz', 'Where each single pole is 3.0103 dB down.'),
  row(
    'filter',
    'ripple',
    quantity('decibel', 'dB', { bounds: NOT_NEGATIVE }),
    '0.1 dB',
    'How far the pass band undulates.',
    { default: '0 dB, for a mask' },
  ),
  row('filter', 'stopband', DECIBELS_ABOVE_ZERO, '80 dB', 'The least attenuation in the stop band.'),
  row('filter', 'pass', AT, '0.2 fs', 'Where the pass band ends.'),
  row('filter', 'stop', AT, '0.3 fs', 'Where the stop band begins.'),
  row(
    'filter',
    'points',
    listOf({
      kind: 'tuple',
      of: [quantity(['frequency', 'of-rate'], 'Hz'), quantity('decibel', 'dB', { bounds: {} })],
    }),
    '[[1 kHz, 0.1 dB], [10 kHz, 3 dB], [20 kHz, 40 dB]]',
    'Pairs of frequency and attenuation, frequencies ascending; straight lines in dB over log frequency between them.',
  ),
  row('filter', 'time', TIME, '20 ms', 'How long the converter integrates.'),
  row('filter', 'taps', listOf(number({})), '[0.25, 0.5, 0.25]', 'The coefficients, in order.'),
  row('filter', 'length', integer({ low: 1, high: 1_000_000 }), '8', 'The number of samples that are averaged.'),
  row('filter', 'delay', integer({ low: 1, high: 64 }), '1', 'The delay of each comb, in samples of the slower side.', {
    default: '1',
  }),
  row(
    'filter',
    'tolerance',
    TOLERANCE,
    '5 %',
    'How far its frequencies may be off, either way. Every verdict takes the worst of the whole interval.',
    { default: '0 %' },
  ),
  row(
    'filter',
    'passes',
    integer({ low: 1, high: 2 }),
    '2',
    'Twice: a digital filter runs forward and backward; its attenuation doubles and its phase cancels.',
    { default: '1' },
  ),
];
