import type { KeyRow } from './vocabulary-kinds.ts';
import {
  choice,
  either,
  FILTERS,
  FREQUENCY,
  FULL_SCALE,
  integer,
  listOf,
  mapOf,
  measuredQuantity,
  NOT_NEGATIVE,
  nameOf,
  number,
  POSITIVE,
  quantity,
  RATE,
  row,
  TIME,
  TOLERANCE,
  TRUTH,
  VALUE_OR_RANGE,
} from './vocabulary-kinds.ts';

const SAMPLE_RATES = quantity(['rate', 'frequency'], 'Hz', { forms: VALUE_OR_RANGE });

/** What a sensor can measure. */
const MEASURED = choice({
  acceleration: 'Acceleration: g, m/s2.',
  velocity: 'Velocity: m/s, mm/s.',
  displacement: 'Displacement: m, mm, um.',
  strain: 'Strain: ue (microstrain).',
  pressure: 'Pressure: Pa, kPa, MPa, bar.',
  'sound-pressure': 'Sound pressure: Pa.',
  force: 'Force: N, kN.',
  torque: 'Torque: N.m.',
  temperature: 'Temperature: K, degC.',
  voltage: 'Voltage: V, mV, uV. The sensitivity is 1 V/V unless it says otherwise.',
  current: 'Current: A, mA.',
  speed: 'Speed of rotation: rpm.',
  other: 'Anything else, in the unit that the sensitivity names.',
});

const CLOCK_ROWS: readonly KeyRow[] = [
  row('clock', 'frequency', FREQUENCY, '13.1072 MHz', "The clock's own frequency.", { required: true }),
  row(
    'clock',
    'divide',
    either({ kind: 'number-range', bounds: { low: 1 } }, integer({ low: 1 }), listOf(integer({ low: 1 }))),
    '1..128',
    'The whole dividers that exist between the clock and a sample rate: a range or a list.',
    { default: 'any rate can be made' },
  ),
  row('clock', 'step', integer({ low: 1 }), '2', 'The step from one divider of the range to the next.', {
    default: '1',
  }),
  row('clock', 'tolerance', TOLERANCE, '25 ppm', 'How far the frequency may be off, either way.', { default: '0 ppm' }),
  row(
    'clock',
    'locked-to',
    nameOf('clock'),
    'chassis',
    'Another clock that this one is derived from, or kept in step with.',
    { default: 'it runs freely' },
  ),
];

const DIGITIZER_ROWS: readonly KeyRow[] = [
  row('digitizer', 'clock', nameOf('clock'), 'chassis', 'The clock that its sample rates are divided from.', {
    default: 'with neither `clock` nor `rates`, every rate can be made',
  }),
  row(
    'digitizer',
    'prescale',
    number(POSITIVE),
    '256',
    'A fixed factor besides the divider: a rate is the frequency over prescale times divider.',
    { default: '1' },
  ),
  row(
    'digitizer',
    'rates',
    either(SAMPLE_RATES, listOf(RATE)),
    '[10.24 kHz, 25.6 kHz, 51.2 kHz]',
    'The sample rates that exist, instead of a clock: a list, or a range in which every rate exists.',
    { default: 'what the clock can make' },
  ),
  row(
    'digitizer',
    'max-rate',
    RATE,
    '204.8 kHz',
    'The highest sample rate; for a scanned digitizer, of all its channels together.',
    { default: 'no limit' },
  ),
  row(
    'digitizer',
    'together',
    choice({
      free: 'Every channel has a rate of its own.',
      same: 'All channels run at one rate.',
      'sub-multiples': 'Every rate is the fastest one divided by a whole number.',
    }),
    'sub-multiples',
    'Which rates one chassis can run at once.',
    { default: 'free' },
  ),
  row(
    'digitizer',
    'sampling',
    choice({
      simultaneous: 'All channels are sampled at the same instant.',
      scanned: 'One converter takes the channels in turn, in the order in which they stand in the file.',
    }),
    'simultaneous',
    'Whether the channels are sampled at once or in turn.',
    { default: 'simultaneous' },
  ),
  row('digitizer', 'scan-interval', TIME, '2.5 us', "The time from one channel's conversion to the next one's.", {
    default: 'spread evenly over the sample period',
  }),
  row('digitizer', 'settling', TIME, '400 ns', 'The time constant of the input after the switch has moved on.'),
  row('digitizer', 'bits', integer({ low: 1, high: 64 }), '24', 'The number of bits of the converter.'),
  row(
    'digitizer',
    'full-scale',
    FULL_SCALE,
    '±10 V',
    'The two ends of what the converter can take, in volts at its own input.',
    { default: 'levels have no full scale to compare with' },
  ),
  row('digitizer', 'gain', number(POSITIVE), '10', 'The gain ahead of the converter.', { default: '1' }),
  row('digitizer', 'ranges', listOf(FULL_SCALE), '[±10 V, ±1 V]', 'The full scales that can be chosen.'),
  row('digitizer', 'gains', listOf(number(POSITIVE)), '[1, 10, 100]', 'The gains that can be chosen.'),
  row('digitizer', 'low-corner', FREQUENCY, '0.5 Hz', 'The corner of its AC coupling, a first-order high-pass.', {
    default: 'coupled down to 0 Hz',
  }),
  row(
    'digitizer',
    'noise',
    quantity(['voltage', 'density'], 'V', { bounds: NOT_NEGATIVE }),
    '10 uV/rtHz',
    'The noise of its input as it stands in the record, white up to half the rate: rms, or a density.',
    { default: 'no noise but that of its steps' },
  ),
  row(
    'digitizer',
    'jitter',
    quantity('time', 's', { bounds: NOT_NEGATIVE }),
    '50 ps',
    'How uncertain the instant of sampling is, rms.',
    { default: 'sampled at the instant that is meant' },
  ),
  row('digitizer', 'filter', FILTERS, 'card', 'The filters that are built into its input and always in the path.', {
    default: 'none',
  }),
  row(
    'digitizer',
    'modulator',
    quantity('of-rate', 'fs', { bounds: { low: 1 } }),
    '64 fs',
    'The internal rate of an oversampling converter, as a multiple of the sample rate. The input is sampled there.',
    { default: 'the input is sampled at the sample rate' },
  ),
  row(
    'digitizer',
    'decimation-filter',
    nameOf('filter', 'filter'),
    'sinc',
    'The digital filter between the modulator and the sample rate.',
  ),
  row(
    'digitizer',
    'delay-compensated',
    TRUTH,
    'true',
    'Whether the delay of digital filters is taken out of the time stamps.',
    { default: 'false' },
  ),
  row(
    'digitizer',
    'interleave',
    mapOf('interleave'),
    '{ converters: 4, gain-mismatch: 0.1 % }',
    'Several converters that take turns, and how far they differ.',
  ),
];

const SENSOR = ['sensor', 'channel'] as const;

const SENSOR_ROWS: readonly KeyRow[] = [
  row(SENSOR, 'measures', MEASURED, 'acceleration', 'What the sensor measures.', {
    default: 'what the unit of the sensitivity says',
  }),
  row(
    SENSOR,
    'sensitivity',
    quantity('sensitivity', 'V'),
    '100 mV/g',
    'The volts it gives for one unit of what it measures.',
    { default: '1 V/V for a voltage' },
  ),
  row(
    SENSOR,
    'rated',
    quantity(['sensitivity', 'ratio'], 'mV/V'),
    '2 mV/V',
    "A bridge's output at its full range, for each volt of excitation. The sensitivity is rated times excitation over range.",
  ),
  row(SENSOR, 'excitation', quantity('voltage', 'V'), '10 V', 'The voltage that a bridge is fed with.'),
  row(
    SENSOR,
    'range',
    measuredQuantity([], { forms: ['value', 'range', 'symmetric'] }),
    '50 g',
    'The largest value that the sensor can measure.',
  ),
  row(SENSOR, 'resonance', FREQUENCY, '27 kHz', 'The frequency of its mounted resonance, of the second order.', {
    default: 'no resonance',
  }),
  row(SENSOR, 'q', number(POSITIVE), '30', 'How sharp the resonance is.', { default: '30' }),
  row(SENSOR, 'corner', FREQUENCY, '12 kHz', 'Where it is 3.01 dB down, falling with the first order.', {
    default: 'no roll-off',
  }),
  row(
    SENSOR,
    'low-corner',
    FREQUENCY,
    '0.5 Hz',
    'Where it is 3.01 dB down towards 0 Hz, with the first order: sensor power, or AC coupling.',
    { default: 'it works down to 0 Hz' },
  ),
  row(
    SENSOR,
    'noise',
    quantity('density', 'V/rtHz', { bounds: NOT_NEGATIVE }),
    '10 uV/rtHz',
    'The density of its own noise, one-sided rms: in volts, or in the measured unit.',
    { default: 'no noise' },
  ),
];

/** The keys of clocks, digitizers and sensors. */
export const THING_ROWS: readonly KeyRow[] = [...CLOCK_ROWS, ...DIGITIZER_ROWS, ...SENSOR_ROWS];
