import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { KnownChannel } from '../../server/src/rig/channel-reading.ts';
import { readChannel, stillHolds } from '../../server/src/rig/channel-reading.ts';
import type { Environment } from '../../server/src/rig/environment.ts';
import { readEnvironment } from '../../server/src/rig/environment.ts';
import { type NameUses, NO_USES, nameUses } from '../../server/src/rig/name-uses.ts';
import { rigProblems } from '../../server/src/rig/rig-problems.ts';
import type { Snapshot, TextEdit } from '../../server/src/rig/snapshot.ts';
import { editSnapshot, readSnapshot } from '../../server/src/rig/snapshot.ts';
import { applyTextEdits } from '../../server/src/rig/text-edit.ts';
import { unusedNames } from '../../server/src/rig/unused-names.ts';
import { runs } from '../tools/runs.ts';
import { CHECK_NAMES } from './fixture.ts';
import { RIGS } from './snapshot-rigs.ts';

/** A rig in which as much as possible hangs on something else. */
const TANGLED_RIG = `rig: Tangle
follows: &follows [supply-harmonics-40, shock-peaks, shock-peaks]
mains: { frequency: 50 Hz, level: 5 mV }
clocks:
  slow: &clock { frequency: 1 MHz, locked-to: fast }
  fast: { <<: *clock, frequency: 10 MHz, divide: 1..100 }
filters:
  low: &low { response: butterworth, order: &order 4, cutoff: 2 kHz }
  lower: { <<: *low, cutoff: 1 kHz }
  tidy: { response: kaiser, pass: 0.2 fs, stop: 0.3 fs, stopband: 60 dB }
digitizers:
  box: { clock: fast, full-scale: ±10 V, filter: [low, { response: rc, order: *order, corner: 9 kHz }] }
sensors:
  stud: { measures: acceleration, sensitivity: 100 mV/g }
  gauge: { measures: strain, rated: 2 mV/V, excitation: 10 V, range: 1000 ue }
sources:
  fan: { order: 9, speed: 600..3000 rpm, level: 2 g }
  hum: { frequency: 100 Hz, level: 3 ue }
  drive: { carrier: 8 kHz, modulation: 50 Hz, level: 20 mV }
defaults: &usual
  digitizer: box
  filter: [{ response: rc, order: 1, corner: 5 kHz }, low]
  flatness: 0.5 dB
  fold-limit: 40
  hears: { drive: 10 mV }
  spectrum: &lines { lines: 800, window: hann, separate: 4 }
run: { duration: 1 h, records: 9, record: 4 s, sample-size: 4 B }
channels:
  one: &one
    sensor: stud
    rate: &rate 10 kHz
    band: 10 Hz .. 1 kHz
    peak: 40 g
    spectrum: { <<: *lines, averages: 16 }
  two: { <<: *one, sensor: gauge, peak: 300 ue, hears: all }
  three: *one
  four:
    <<: [*one, *usual]
    rate: *rate
    then: [{ decimate: 5, filter: tidy }, { filter: *low }]
    hears: [fan, hum, humm]
    follows: [supply-harmonics-50, shock-peek]
  five: &rate
    rate: *rate
    sensor: stodd
    filter: none
    band: 10 Hz .. 100 hz
  six: { <<: *rate, note: six }
  seven: { sensitivity: 41 uV/K, rate: 10, band: 0..1 Hz, fold-limit: 0.1 K, undeclared: [[1 kHz, 2 K]] }
checks:
  fold-in-band: warning
  thin-margine: off
`;

/** Pieces that change what things are called, what they mean, and what hangs on what. */
const PIECES = [
  'a',
  'x: ',
  ' Hz',
  '0',
  '-',
  '&one ',
  '*one',
  '&rate ',
  '*rate',
  '<<: *low, ',
  'low',
  'stud',
  'hears: none\n',
  'uses: [other.rig.yaml]\n',
  '\nsources:\n  fan2: { frequency: 1 kHz }\n',
  '\nfilters:\n  low: { response: rc, order: 1, corner: 1 kHz }\n',
  '\nmains: 60 Hz\n',
  '  two: { rate: 1 kHz, band: 1..2 Hz }\n',
  '    sensor: gauge\n',
  '    decimate: 0\n',
  '"',
  '}',
  '{',
  ', ',
  '\n',
  '__proto__: 1\n',
];

type Step = readonly [kind: number, a: number, b: number, piece: number];

const step: fc.Arbitrary<Step> = fc.tuple(
  fc.nat({ max: 6 }),
  fc.nat({ max: 1_000_000 }),
  fc.nat({ max: 1_000_000 }),
  fc.nat({ max: PIECES.length - 1 }),
);

function editsOf(text: string, [kind, a, b, piece]: Step): readonly TextEdit[] {
  const at = a % (text.length + 1);
  const starts = [0, ...[...text.matchAll(/\n/g)].map(({ index }) => index + 1)];
  const from = a % starts.length;
  const lineStart = starts[from]!;
  const lineEnd = starts[Math.min(from + 1 + (b % 2), starts.length - 1)]!;
  const other = starts[b % starts.length]!;
  switch (kind) {
    case 0:
      return [{ start: at, end: at, text: PIECES[piece]! }];
    case 1:
      return [{ start: at, end: Math.min(text.length, at + 1 + (b % 3)), text: '' }];
    case 2:
      return [{ start: lineStart, end: lineStart, text: PIECES[piece]! }];
    case 3:
      return [{ start: lineStart, end: Math.max(lineStart, lineEnd), text: '' }];
    case 4:
      return [{ start: other, end: other, text: text.slice(lineStart, Math.max(lineStart, lineEnd)) }];
    case 5: {
      const taken = text.slice(lineStart, Math.max(lineStart, lineEnd));
      if (taken === '' || (other > lineStart && other < lineEnd)) return [];
      return [
        { start: lineStart, end: lineStart + taken.length, text: '' },
        { start: other, end: other, text: taken },
      ];
    }
    default:
      return [{ start: at, end: Math.min(text.length, at + 1), text: String.fromCharCode(97 + (b % 26)) }];
  }
}

interface State {
  readonly snapshot: Snapshot;
  readonly environment: Environment;
  readonly channels: readonly KnownChannel[];
  readonly uses: NameUses;
}

/** What follows an edit: readings are kept where they still hold, as an editor keeps them. */
function following(snapshot: Snapshot, before: State | undefined): State {
  const environment = readEnvironment(snapshot, CHECK_NAMES, before?.environment);
  const kept = new Map(before?.channels.map((channel) => [channel.reading.entry, channel]));
  const channels = environment.channelEntries.map((entry) => {
    const channel = kept.get(entry);
    const holds = channel && stillHolds(channel.reading, environment);
    return holds ? channel : { reading: readChannel(entry, environment) };
  });
  return { snapshot, environment, channels, uses: nameUses(channels, before?.uses ?? NO_USES) };
}

/** Everything that was read, free of object identity and of what only serves to keep readings. */
function described({ snapshot, environment, channels, uses }: State): unknown {
  const plain = (value: unknown): unknown => {
    if (value instanceof Map) return [...value].map(([key, one]) => [key, plain(one)]);
    if (Array.isArray(value)) return value.map(plain);
    if (typeof value !== 'object' || value === null) return value;
    if ('section' in value && 'aliases' in value) return snapshot.startOf(value as never);
    return Object.fromEntries(Object.entries(value).map(([key, one]) => [key, plain(one)]));
  };
  const { core: _, epochOf: __, ...rest } = environment;
  return {
    environment: plain(rest),
    readings: channels.map(({ reading: { dependencies: ___, ...reading } }) => plain(reading)),
    problems: plain([...rigProblems(environment, channels), ...unusedNames(environment, uses)]),
  };
}

const TEXTS = [['tangled', TANGLED_RIG, 400], ...RIGS.map(([name, text]) => [name, text, 25] as const)] as const;

describe('reading after edits', () => {
  it.each(TEXTS)('equals reading from nothing (%s)', (_, rig, full) => {
    fc.assert(
      fc.property(fc.array(step, { minLength: 1, maxLength: 10 }), (steps) => {
        let text = rig;
        let state = following(readSnapshot(text), undefined);
        for (const one of steps) {
          const edits = editsOf(text, one);
          text = applyTextEdits(text, edits);
          state = following(editSnapshot(state.snapshot, edits), state);
          const fresh = following(readSnapshot(text), undefined);
          expect(described(state)).toEqual(described(fresh));
        }
      }),
      { seed: 20_261_201, numRuns: runs(full) },
    );
  });

  it('keeps every object that an edit has not touched', () => {
    const before = following(readSnapshot(TANGLED_RIG), undefined);
    const at = TANGLED_RIG.indexOf('0.2 fs');
    const after = following(editSnapshot(before.snapshot, [{ start: at, end: at + 3, text: '0.1' }]), before);
    expect(after.environment.clocks.get('fast')).toBe(before.environment.clocks.get('fast'));
    expect(after.environment.digitizers.get('box')).toBe(before.environment.digitizers.get('box'));
    expect(after.environment.severities).toBe(before.environment.severities);
    expect(after.environment.filters.get('tidy')).not.toBe(before.environment.filters.get('tidy'));
    const kept = after.channels.map((channel, index) => channel === before.channels[index]);
    expect(kept).toEqual([true, true, true, false, true, true, true]);
  });

  it('keeps the environment itself where only a channel has changed', () => {
    const before = following(readSnapshot(TANGLED_RIG), undefined);
    const at = TANGLED_RIG.indexOf('note: six');
    const after = following(editSnapshot(before.snapshot, [{ start: at, end: at + 4, text: 'peak' }]), before);
    expect(after.environment.core).toBe(before.environment.core);
    const kept = after.channels.map((channel, index) => channel === before.channels[index]);
    expect(kept).toEqual([true, true, true, true, true, false, true]);
  });
});

describe('reading unfinished text', () => {
  it.each(TEXTS)('never throws, whatever is there of it (%s)', (_, rig) => {
    const stride = Math.ceil(rig.length / (8 * runs(1_000)));
    for (let length = 0; length <= rig.length; length += stride) {
      const state = following(readSnapshot(rig.slice(0, length)), undefined);
      expect(rigProblems(state.environment, state.channels)).toBeInstanceOf(Array);
    }
  });
});
