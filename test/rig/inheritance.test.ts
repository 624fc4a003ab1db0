import { describe, expect, it } from 'vitest';
import type { Channel } from '../../server/src/rig/model.ts';
import { expectOneProblem, readRig, saidOf, textAt } from './fixture.ts';

function channels(text: string): Readonly<Record<string, Channel>> {
  const rig = readRig(`rig: R\n${text}`);
  expect(saidOf(rig)).toEqual([]);
  return Object.fromEntries(rig.readings.map(({ channel }) => [channel.name, channel]));
}

describe('defaults', () => {
  const DEFAULTS = 'defaults: { rate: 1 kHz, band: 1 Hz .. 100 Hz, flatness: 2 dB }\n';

  it('give what a channel does not say itself, and tell where it comes from', () => {
    const { a } = channels(`${DEFAULTS}channels:\n  a: { rate: 2 kHz }\n`);
    expect(a).toMatchObject({ complete: true, rateHz: { value: 2000 }, flatnessDb: { value: 2 } });
    expect(a?.rateHz?.inherited).toBeUndefined();
    expect(a?.flatnessDb?.inherited?.from).toBe('defaults');
    expect(textAt(a!.flatnessDb!.place)).toBe('2 dB');
  });

  it('are replaced whole by a key of the channel', () => {
    const { a } = channels(
      `defaults: { hears: { x: 1 V, y: none } }\nsources:\n  x: { frequency: 1 Hz }\n  y: { frequency: 2 Hz }\nchannels:\n  a: { rate: 1 kHz, band: 1..2 Hz, hears: { x: 2 V } }\n`,
    );
    expect(a?.heard.map(({ source }) => source.name)).toEqual(['x', 'y']);
  });

  it('may stand behind the channels', () => {
    const { a } = channels(`channels:\n  a:\n${DEFAULTS}`);
    expect(a?.complete).toBe(true);
  });

  it('describe a sensor in a way that a channel may describe in the other', () => {
    const SENSORS = 'sensors:\n  stud: { sensitivity: 100 mV/g }\n';
    const named = channels(
      `${SENSORS}defaults: { sensitivity: 1 V/N }\nchannels:\n  a: { rate: 1 kHz, band: 1..2 Hz, sensor: stud }\n`,
    );
    expect(named.a?.sensor?.unit).toBe('g');
    const described = channels(
      `${SENSORS}defaults: { sensor: stud }\nchannels:\n  a: { rate: 1 kHz, band: 1..2 Hz, sensitivity: 1 V/N }\n`,
    );
    expect(described.a?.sensor?.unit).toBe('N');
  });

  it('have their slips told once, however many inherit them', () => {
    expectOneProblem(
      'rig: R\ndefaults:\n  rate: 1 kHz\n  band: 1..2 Hz\n  flatness: ⟦-1 dB⟧\nchannels:\n  a:\n  b:\n  c: { rate: 2 kHz }\n',
      'out-of-range',
    );
  });

  it('share a filter written in place among all who inherit it', () => {
    const { a, b } = channels(
      'defaults: { filter: { response: rc, order: 1, corner: 1 kHz }, rate: 1 kHz, band: 1..2 Hz }\nchannels:\n  a:\n  b:\n',
    );
    expect(a?.filters[0]?.filter).toBeDefined();
    expect(a?.filters[0]?.filter).toBe(b?.filters[0]?.filter);
  });

  it('in another quantity than a channel measures are told at the channel', () => {
    const text =
      'rig: R\ndefaults: { peak: 40 g, rate: 1 kHz, band: 1..2 Hz }\nchannels:\n  fine: { sensitivity: 1 V/g }\n  ⟦other⟧: { sensitivity: 1 V/Pa }\n';
    const { related } = expectOneProblem(text, 'unit-mismatch');
    expect(related.map(({ place }) => textAt(place))).toEqual(['40 g']);
  });
});

describe('anchors, aliases and merge keys', () => {
  it('work across entries, a key of its own outweighing a merged one', () => {
    const { b } = channels('channels:\n  a: &a { rate: 1 kHz, band: 1..2 Hz, gain: 3 }\n  b: { gain: 5, <<: *a }\n');
    expect(b).toMatchObject({ gain: { value: 5 }, rateHz: { value: 1000, inherited: { from: 'merge' } } });
    expect(textAt(b!.rateHz!.inherited!.place)).toBe('1 kHz');
  });

  it('take of several merged maps the first that has a key', () => {
    const { c } = channels(
      'channels:\n  a: &a { rate: 1 kHz, band: 1..2 Hz }\n  b: &b { rate: 2 kHz, band: 3..4 Hz, gain: 2 }\n  c: { <<: [*b, *a] }\n',
    );
    expect(c).toMatchObject({ rateHz: { value: 2000 }, gain: { value: 2 } });
  });

  it('follow merges of merges', () => {
    const { c } = channels(
      'channels:\n  a: &a { rate: 1 kHz, band: 1..2 Hz }\n  b: &b { <<: *a, gain: 2 }\n  c: { <<: *b }\n',
    );
    expect(c).toMatchObject({ rateHz: { value: 1000 }, gain: { value: 2 } });
  });

  it('make a channel of another one', () => {
    const { b } = channels('channels:\n  a: &a { rate: 1 kHz, band: 1..2 Hz }\n  b: *a\n');
    expect(b).toMatchObject({ name: 'b', complete: true, rateHz: { inherited: { from: 'alias' } } });
  });

  it('stand for single values, the latest anchor of a name before the alias', () => {
    const { a, b } = channels(
      'clocks:\n  x: { frequency: &f 1 kHz }\n  y: { frequency: &f 2 kHz }\nchannels:\n  a: { rate: *f, band: 1..2 Hz }\n  b: { rate: &f 3 kHz, band: 1..2 Hz, corner: *f }\n',
    );
    expect([a?.rateHz?.value, b?.sensor?.cornerHz?.value]).toEqual([2000, 3000]);
    expect(a?.rateHz?.inherited?.from).toBe('alias');
  });

  it('have slips in inherited text told once, at their origin', () => {
    expectOneProblem(
      'rig: R\nchannels:\n  a: &a { rate: 1 kHz, band: 1..2 Hz, gain: ⟦-1⟧ }\n  b: *a\n  c: { <<: *a }\n',
      'out-of-range',
    );
  });

  it('do not mention twice what is inherited', () => {
    const rig = readRig(
      'rig: R\nsensors:\n  s: { sensitivity: 1 V/g }\nchannels:\n  a: &a { rate: 1 kHz, band: 1..2 Hz, sensor: s }\n  b: *a\n',
    );
    expect(rig.readings.map(({ mentions }) => mentions.length)).toEqual([1, 0]);
    expect(rig.readings[1]!.channel.sensor).toBe(rig.environment.sensors.get('s'));
  });

  it.each([
    [
      'an anchor further down',
      'a: { rate: ⟦*f⟧, band: 1..2 Hz }\n  b: { rate: &f 1 kHz, band: 1..2 Hz }',
      'unknown-name',
    ],
    ['an anchor that nobody sets', 'a: { <<: ⟦*g⟧, rate: 1 kHz, band: 1..2 Hz }', 'unknown-name'],
    ['a channel that is nowhere', 'a: ⟦*g⟧', 'unknown-name'],
    ['itself', 'a: &a { <<: ⟦*a⟧, rate: 1 kHz, band: 1..2 Hz }', 'wrong-kind'],
    ['itself as a value', 'a: &a { rate: 1 kHz, band: 1..2 Hz, filter: ⟦*a⟧ }', 'wrong-kind'],
    ['a value where maps merge', 'a: { rate: &r 1 kHz, band: 1..2 Hz, <<: ⟦*r⟧ }', 'wrong-kind'],
    ['a list in a list of merges', 'a: { rate: 1 kHz, band: 1..2 Hz, <<: [⟦[]⟧] }', 'wrong-kind'],
  ])('that lead to %s are told of', (_, entries, name) => {
    expectOneProblem(`rig: R\nchannels:\n  ${entries}\n`, name);
  });

  it('suggest the nearest anchor', () => {
    const text = 'rig: R\nchannels:\n  a: { rate: &rate 1 kHz, band: 1..2 Hz }\n  b: { rate: ⟦*rte⟧, band: 1..2 Hz }\n';
    expectOneProblem(text, 'unknown-name', { kind: 'replace', text: '*rate' });
  });

  it('that multiply without bound are cut, and the rest is read', () => {
    const levels = Array.from({ length: 20 }, (_, level) => {
      const below =
        level === 0
          ? 'rate: 1 kHz'
          : `<<: [${Array(10)
              .fill(`*l${level - 1}`)
              .join(', ')}]`;
      return `  l${level}: &l${level} { ${below}, band: 1..2 Hz }\n`;
    });
    const rig = readRig(`rig: R\nchannels:\n${levels.join('')}  z: { rate: 2 kHz, band: 1..2 Hz }\n`);
    expect(rig.problems.some(({ problem }) => problem.name === 'too-much')).toBe(true);
    expect(rig.readings.at(-1)!.channel.complete).toBe(true);
  });

  it('may form a chain of any length', () => {
    const links = Array.from({ length: 9_000 }, (_, link) => {
      const merge = link === 0 ? 'rate: 1 kHz' : `<<: *k${link - 1}`;
      return `  k${link}: &k${link} { ${merge}, band: 1..2 Hz }\n`;
    });
    const rig = readRig(`rig: R\nchannels:\n${links.join('')}  last: *k8999\n`);
    expect(saidOf(rig)).toEqual([]);
    expect(rig.readings.at(-1)!.channel.rateHz?.value).toBe(1000);
  });

  it('work in checks, in mains and at the head of nothing else', () => {
    const rig = readRig('rig: R\nmains: &m 50 Hz\nchecks: { <<: { thin-margin: off } }\nclocks: *m\n');
    expect(rig.environment.severities.get('thin-margin')).toBe('off');
    expect(saidOf(rig)).toEqual(['wrong-kind: clocks']);
  });
});

describe('much of a bad thing', () => {
  it('keeps a suggestion for a misspelled name among thousands, in short time', () => {
    const sensors = Array.from({ length: 5_000 }, (_, index) => `  gauge-${index}: { sensitivity: 1 V/N }\n`);
    const channels = Array.from(
      { length: 5_000 },
      (_, index) => `  c${index}: { rate: 1 kHz, band: 1..2 Hz, sensor: guage-${index} }\n`,
    );
    const started = performance.now();
    const rig = readRig(`rig: R\nsensors:\n${sensors.join('')}channels:\n${channels.join('')}`);
    const named = rig.problems.filter(({ problem }) => problem.name === 'unknown-name');
    expect(named).toHaveLength(5_000);
    expect(named[4_321]!.problem.cure).toEqual({ kind: 'replace', text: 'gauge-4321' });
    expect(performance.now() - started).toBeLessThan(20_000);
  });

  it('stops saying more of one channel than anybody would read', () => {
    const keys = Array.from({ length: 5_000 }, (_, index) => `    key-${index}: 1\n`).join('');
    const rig = readRig(`rig: R\nchannels:\n  a:\n${keys}  b: { rate: 1 kHz, band: 1..2 Hz }\n`);
    expect(rig.readings[0]!.problems.length).toBeLessThanOrEqual(102);
    expect(rig.readings[1]!.channel.complete).toBe(true);
  });

  it('keeps merged maps to a size', () => {
    const keys = Array.from({ length: 3_000 }, (_, index) => `k${index}: 1`).join(', ');
    const many = Array.from({ length: 300 }, (_, index) => `  c${index}: { <<: *a, rate: 1 kHz, band: 1..2 Hz }\n`);
    const rig = readRig(`rig: R\nchannels:\n  a: &a { ${keys} }\n${many.join('')}`);
    expect(rig.problems.some(({ problem }) => problem.name === 'too-much')).toBe(true);
    expect(rig.readings.at(-1)!.channel.complete).toBe(true);
  });
});
