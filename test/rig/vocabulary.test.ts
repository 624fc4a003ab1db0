import { describe, expect, it } from 'vitest';
import { CONTEXTS, keyRow, keysOf, UNCOMPUTED_CONTEXTS, VOCABULARY } from '../../server/src/rig/vocabulary.ts';
import type { ContextName, KeyRow, ValueKind } from '../../server/src/rig/vocabulary-kinds.ts';
import { readRig, saidOf } from './fixture.ts';

/** Every key of the rig file's description, by context. */
const KEYS: Readonly<Record<ContextName, string>> = {
  rig: 'rig uses mains clocks digitizers sensors filters sources groups defaults channels follows run accept checks',
  clock: 'frequency divide step tolerance locked-to',
  digitizer:
    'clock prescale rates max-rate together sampling scan-interval settling bits full-scale gain ranges gains low-corner noise jitter filter modulator decimation-filter delay-compensated interleave',
  sensor: 'measures sensitivity rated excitation range resonance q corner low-corner noise',
  filter:
    'response order shape cutoff pass-edge stop-edge corner ripple stopband pass stop points time taps length delay tolerance passes',
  source:
    'frequency order speed carrier modulation sidebands sidebands-fall noise spans harmonics level falls tolerance wanted enters',
  mains: 'frequency harmonics level falls tolerance wanted enters',
  group: 'within up-to',
  channel:
    'sensor digitizer rate gain full-scale filter then band fold-limit undeclared flatness sampling hears peak headroom resolve follows group pattern pulses spectrum note measures sensitivity rated excitation range resonance q corner low-corner noise',
  step: 'decimate filter per-turn speed',
  pattern: 'of take',
  pulses: 'per-turn speed duty',
  spectrum: 'lines resolution record window overlap averages separate',
  interleave: 'converters gain-mismatch timing-mismatch offset-mismatch',
  run: 'duration records record disk link sample-size',
  acceptance: 'finding on about reason by until',
};

const NOT_COMPUTED: Readonly<Partial<Record<ContextName, string>>> = {};

/** What the examples of the table name. */
const NAMED = `clocks:
  chassis: { frequency: 13.1072 MHz }
digitizers:
  front-end: { full-scale: ±10 V }
sensors:
  stud-mounted: { sensitivity: 100 mV/g }
filters:
  card: { response: butterworth, order: 6, cutoff: 8 kHz }
  tidy: { response: kaiser, pass: 0.2 fs, stop: 0.3 fs, stopband: 90 dB }
  sinc: { response: moving-average, length: 64 }
groups:
  tower: { within: 2 deg, up-to: 100 Hz }
`;

const G = 'sensitivity: 100 mV/g, ';

/** Keys that a map must have besides the one that is tried, so that nothing else is said. */
function besides(context: ContextName, key: string): string {
  if (context === 'filter') return FILTER_FRAMES.get(key) ?? '';
  if (context === 'source') return SOURCE_FRAMES.get(key) ?? 'frequency: 120 Hz, ';
  if (context === 'channel') {
    const measured = ['peak', 'fold-limit', 'undeclared', 'resolve'].includes(key) ? G : '';
    const bridge = key === 'rated' ? 'excitation: 10 V, range: 500 N, ' : '';
    const band = key === 'band' ? '' : 'band: 1 Hz .. 100 Hz, ';
    return `${key === 'rate' ? '' : 'rate: 1 kHz, '}${band}${measured}${bridge}`;
  }
  if (context === 'sensor') return key === 'rated' ? 'excitation: 10 V, range: 500 N, ' : '';
  if (context === 'spectrum') return ['lines', 'resolution', 'record'].includes(key) ? '' : 'lines: 800, ';
  if (context === 'run') return RUN_FRAMES.get(key) ?? '';
  if (context === 'step') return key === 'speed' ? 'per-turn: 64, ' : key === 'per-turn' ? 'speed: 600 rpm, ' : '';
  const others = keysOf(context).filter((row) => row.required && row.key !== key);
  return others.map((row) => `${row.key}: ${row.example}, `).join('');
}

const FILTER_FRAMES: ReadonlyMap<string, string> = new Map([
  ['response', 'order: 2, cutoff: 1 kHz, '],
  ['order', 'response: butterworth, cutoff: 1 kHz, '],
  ['shape', 'response: butterworth, order: 2, cutoff: 1 kHz, '],
  ['cutoff', 'response: butterworth, order: 2, '],
  ['pass-edge', 'response: chebyshev, order: 2, ripple: 0.5 dB, '],
  ['stop-edge', 'response: inverse-chebyshev, order: 2, stopband: 40 dB, '],
  ['corner', 'response: rc, order: 2, '],
  ['ripple', 'response: chebyshev, order: 2, cutoff: 1 kHz, '],
  ['stopband', 'response: kaiser, pass: 0.2 fs, stop: 0.3 fs, '],
  ['pass', 'response: kaiser, stopband: 60 dB, stop: 0.3 fs, '],
  ['stop', 'response: kaiser, stopband: 60 dB, pass: 0.2 fs, '],
  ['points', 'response: points, '],
  ['time', 'response: aperture, '],
  ['taps', 'response: fir, '],
  ['length', 'response: moving-average, '],
  ['delay', 'response: cic, order: 3, '],
  ['tolerance', 'response: rc, order: 1, corner: 1 kHz, '],
  ['passes', 'response: fir, taps: [1, 1], '],
]);

const RUN_FRAMES: ReadonlyMap<string, string> = new Map([
  ['records', 'record: 4 s, '],
  ['record', 'records: 200, '],
]);

const SOURCE_FRAMES: ReadonlyMap<string, string> = new Map([
  ['frequency', ''],
  ['order', 'speed: 600 rpm, '],
  ['speed', 'order: 9, '],
  ['carrier', 'modulation: 50 Hz, '],
  ['modulation', 'carrier: 16 kHz, '],
  ['sidebands', 'carrier: 16 kHz, modulation: 50 Hz, '],
  ['sidebands-fall', 'carrier: 16 kHz, modulation: 50 Hz, '],
  ['noise', 'spans: 10 Hz .. 1 kHz, '],
  ['spans', 'noise: 10 uV/rtHz, '],
]);

/** What is named, but for one section. */
function without(section: string): string {
  return NAMED.replace(new RegExp(`^${section}:\\n( .*\\n)*`, 'm'), '');
}

/** A rig file in which a section has one more entry. */
function rigWithSection(section: string, entry: string): string {
  const known = NAMED.includes(`${section}:\n`) ? NAMED : `${NAMED}${section}:\n`;
  return `rig: R\n${known.replace(`${section}:\n`, `${section}:\n${entry}`)}`;
}

/** A rig file with one key of one context, set to one value. */
function rigWith(context: ContextName, key: string, value: string): string {
  const map = `{ ${besides(context, key)}${key}: ${value} }`;
  const channel = (keys: string): string =>
    rigWithSection('channels', `  a: { rate: 1 kHz, band: 1 Hz .. 100 Hz, ${keys} }\n`);
  switch (context) {
    case 'rig':
      return key === 'rig' ? `rig: ${value}\n` : `rig: R\n${without(key)}${key}: ${value}\n`;
    case 'channel':
      return rigWithSection('channels', `  a: ${map}\n`);
    case 'step':
      return channel(`then: [${map}]`);
    case 'pattern':
    case 'pulses':
    case 'spectrum':
      return channel(`${context}: ${map}`);
    case 'interleave':
      return rigWithSection('digitizers', `  y: { interleave: ${map} }\n`);
    case 'acceptance':
      return `rig: R\n${NAMED}accept: [${map}]\nchannels:\n  strain-{01..08}: { rate: 1 kHz, band: 1 Hz .. 100 Hz }\n`;
    case 'mains':
    case 'run':
      return `rig: R\n${context}: ${map}\n`;
    default:
      return rigWithSection(`${context}s`, `  x: ${map}\n`);
  }
}

/** What is said besides `not-computed`. */
function complaints(text: string): readonly string[] {
  return saidOf(readRig(text)).filter((said) => !said.startsWith('not-computed'));
}

/** A value that can't stand behind a key of this kind, whatever else could. */
function badValue(kind: ValueKind): string {
  return kind.kind === 'text' || kind.kind === 'date' || kind.kind === 'check-name' ? '{ a: 1 }' : '[[[?]]]';
}

const rows: readonly (readonly [ContextName, KeyRow])[] = CONTEXTS.flatMap(({ name }) =>
  keysOf(name).map((row) => [name, row] as const),
);
const named = rows.map(([context, row]) => [context, row.key, row] as const);

describe('the vocabulary', () => {
  it.each(Object.entries(KEYS))('knows every key of the context %s and no other', (context, keys) => {
    const known = keysOf(context as ContextName).map(({ key }) => key);
    expect([...known].sort()).toEqual(keys.split(' ').sort());
  });

  it('says which keys are not computed', () => {
    for (const { name } of CONTEXTS) {
      const not = keysOf(name).filter(({ computed }) => !computed);
      expect([name, not.map(({ key }) => key).sort()]).toEqual([
        name,
        (NOT_COMPUTED[name] ?? '').split(' ').filter(Boolean).sort(),
      ]);
    }
  });

  it('explains every key in a sentence', () => {
    for (const { doc } of VOCABULARY) expect(doc).toMatch(/^[A-Z].*\.$/);
  });

  it('shows how every key is written, a section with an entry of its own', () => {
    for (const { key, value, example } of VOCABULARY) {
      expect([key, example]).toEqual([key, example.trim()]);
      expect([key, example]).not.toEqual([key, '']);
      if (value.kind === 'section') expect(example).toMatch(/^\{ [\w-]+: \{ .+ \} \}$/);
    }
  });

  it('has no row for what is no key', () => {
    expect(keyRow('channel', '__proto__')).toBeUndefined();
    expect(keyRow('channel', 'constructor')).toBeUndefined();
  });

  it.each(named)('reads the example of %s.%s', (context, key, row) => {
    expect(complaints(rigWith(context, key, row.example))).toEqual([]);
  });

  it.each(named)('complains of a senseless %s.%s', (context, key, row) => {
    expect(complaints(rigWith(context, key, badValue(row.value)))).not.toEqual([]);
  });

  it.each(named.filter(([name, , row]) => !row.computed && !UNCOMPUTED_CONTEXTS.has(name)))(
    'says that %s.%s is not computed',
    (context, key, row) => {
      const said = saidOf(readRig(rigWith(context, key, row.example)));
      expect(said).toContain(`not-computed: ${key}`);
    },
  );
});
