import { MOST_CONVERTERS, MOST_PATTERN_SLOTS } from './limits.ts';
import type { KeyRow, ThingKind, ValueKind } from './vocabulary-kinds.ts';
import {
  choice,
  either,
  FREQUENCY,
  integer,
  listOf,
  mapOf,
  NOT_NEGATIVE,
  nameOf,
  quantity,
  row,
  TEXT,
  TIME,
} from './vocabulary-kinds.ts';

const SEVERITY = choice({
  off: 'The check is not made.',
  hint: 'Worth knowing; nothing has to be done.',
  warning: 'The data may be spoilt.',
  error: 'The data will be spoilt, or cannot be taken as described.',
});

function section(of: ThingKind): ValueKind {
  return { kind: 'section', of, context: of === 'channel' ? 'channel' : of };
}

/** The keys at the top of a rig file, and those of `groups`, `run` and `accept`. */
export const RIG_ROWS: readonly KeyRow[] = [
  row('rig', 'rig', TEXT, 'Extract fan endurance, cell 2', 'The name of the rig, as reports print it.', {
    required: true,
  }),
  row(
    'rig',
    'uses',
    listOf(TEXT),
    '[common/sensors.rig.yaml]',
    'Other rig files, relative to this one, whose named things this one may name. A name of this file hides the same name of a used one.',
  ),
  row(
    'rig',
    'mains',
    either(quantity('frequency', 'Hz'), mapOf('mains')),
    '50 Hz',
    'The line frequency, as a source called `mains`: a frequency alone, or a map with the keys of a source.',
    { default: 'no mains source' },
  ),
  row(
    'rig',
    'clocks',
    section('clock'),
    '{ chassis: { frequency: 13.1072 MHz, divide: 1..128 } }',
    'The clocks that sample rates are divided from.',
  ),
  row(
    'rig',
    'digitizers',
    section('digitizer'),
    '{ front-end: { clock: chassis, prescale: 256, full-scale: ±10 V } }',
    'The converters: what they can sample, how fast and how finely.',
  ),
  row(
    'rig',
    'sensors',
    section('sensor'),
    '{ stud-mounted: { sensitivity: 100 mV/g, resonance: 27 kHz } }',
    'The sensors: what they measure, and how they turn it into volts.',
  ),
  row(
    'rig',
    'filters',
    section('filter'),
    '{ card: { response: butterworth, order: 6, cutoff: 8 kHz } }',
    'The filters, ahead of the converters or in digital steps after them.',
  ),
  row(
    'rig',
    'sources',
    section('source'),
    '{ inverter: { carrier: 16 kHz, modulation: 50 Hz, level: 40 mV } }',
    'What the sensors, or the wiring, will pick up, wanted or not.',
  ),
  row(
    'rig',
    'groups',
    section('group'),
    '{ tower: { within: 2 deg, up-to: 100 Hz } }',
    'Groups of channels whose phase is compared.',
  ),
  row(
    'rig',
    'defaults',
    mapOf('channel'),
    '{ digitizer: front-end, rate: 25.6 kHz }',
    'Keys that every channel has unless it says otherwise. A key of the channel replaces the one given here as a whole.',
  ),
  row(
    'rig',
    'channels',
    section('channel'),
    '{ bearing: { rate: 25.6 kHz, band: 10 Hz .. 10 kHz } }',
    'The channels, in the order in which they are scanned.',
  ),
  row('rig', 'run', mapOf('run'), '{ duration: 8 h, disk: 500 GB }', 'How long is recorded, and where the data goes.'),
  row(
    'rig',
    'accept',
    listOf(mapOf('acceptance')),
    '[{ finding: band-droop, on: tower-top, reason: corrected afterwards }]',
    'Findings that somebody has looked at and accepted. They are still listed in reports, marked as accepted.',
  ),
  row(
    'rig',
    'checks',
    { kind: 'map-of', keys: 'check', value: SEVERITY },
    '{ thin-margin: error }',
    'How severe each check is on this rig.',
    { default: "each check's own severity" },
  ),

  row(
    'group',
    'within',
    quantity(['angle', 'time'], 'deg'),
    '2 deg',
    'How far the phases of the group may differ: an angle, or a time.',
    { required: true },
  ),
  row('group', 'up-to', FREQUENCY, '2 kHz', 'The highest frequency at which the phase matters.', {
    required: true,
  }),

  row('run', 'duration', TIME, '8 h', 'How long is recorded; with `records`, how long the run lasts.'),
  row('run', 'records', integer({ low: 1 }), '200', 'The number of triggered records, each as long as `record` says.', {
    default: 'the whole duration is recorded',
  }),
  row('run', 'record', TIME, '4 s', 'The length of one triggered record.'),
  row('run', 'disk', quantity(['data', 'bits'], 'B'), '500 GB', 'The space there is for the data.'),
  row('run', 'link', quantity('data-rate', 'B/s'), '100 MB/s', 'How fast the data can be carried away.'),
  row('run', 'sample-size', quantity(['bits', 'data'], 'bit'), '32 bit', 'The space one sample takes.', {
    default: 'the bits of the converter, rounded up to 8, 16, 24 or 32',
  }),

  row('acceptance', 'finding', { kind: 'check-name' }, 'band-droop', 'The name of the check.', {
    required: true,
  }),
  row(
    'acceptance',
    'on',
    either(nameOf('channel'), TEXT),
    '"strain-{01..08}"',
    'The channels it is accepted on; brace ranges and `*` stand for several. A channel whose own name has a brace range has to be taken in as a whole.',
    { default: 'everywhere in the file' },
  ),
  row(
    'acceptance',
    'about',
    either(nameOf('source'), nameOf('digitizer'), TEXT),
    'inverter',
    'The source, or other name, that the finding is about.',
    { default: 'whatever it is about' },
  ),
  row('acceptance', 'reason', TEXT, 'corrected afterwards', 'Why it does no harm.', {
    required: true,
  }),
  row('acceptance', 'by', TEXT, 'test lead', 'Who accepted it.'),
  row('acceptance', 'until', { kind: 'date' }, '2027-03-31', 'The last day on which it counts.', {
    default: 'it counts for good',
  }),
];

/** The keys of a chopped-up or interleaved record's own small maps. */
export const PATTERN_ROWS: readonly KeyRow[] = [
  row(
    'pattern',
    'of',
    integer({ low: 1, high: MOST_PATTERN_SLOTS }),
    '10',
    'The number of sample slots in one turn of the pattern.',
    {
      required: true,
    },
  ),
  row('pattern', 'take', listOf(integer(NOT_NEGATIVE)), '[0, 1, 2, 3]', 'The slots that are kept, counted from 0.', {
    required: true,
  }),
  row(
    'interleave',
    'converters',
    integer({ low: 2, high: MOST_CONVERTERS }),
    '4',
    'The number of converters that take turns.',
    {
      required: true,
    },
  ),
  row(
    'interleave',
    'gain-mismatch',
    quantity('ratio', '%', { bounds: NOT_NEGATIVE }),
    '0.1 %',
    'How far their gains differ, rms about the mean.',
  ),
  row(
    'interleave',
    'timing-mismatch',
    quantity('time', 's', { bounds: NOT_NEGATIVE }),
    '2 ps',
    'How far their sampling instants differ, rms about the mean.',
  ),
  row(
    'interleave',
    'offset-mismatch',
    quantity('ratio', '%', { bounds: NOT_NEGATIVE }),
    '0.05 %',
    'How far their offsets differ, rms about the mean, of full scale.',
  ),
];
