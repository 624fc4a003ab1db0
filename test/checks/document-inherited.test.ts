import { describe, expect, it } from 'vitest';
import { channels, line, lines, OK } from './document-rig.ts';
import { found } from './judged.ts';

describe('a slip in text that others inherit is told once', () => {
  it('by the channel that it stands in, where a channel is what they inherit', () => {
    const text = channels(`a: &a { ${OK}, gain: -1, rati: 3 }`, 'b: *a', 'c: { <<: *a }', 'd: { <<: [*a], gain: 2 }');
    expect(lines(text)).toEqual(['a: out-of-range `-1`', 'a: unknown-key `rati`']);
  });

  it('by the channels that make it a slip, where it depends on them', () => {
    const a = `a: &a { ${OK}, sensitivity: 1 V/g, peak: 3 g }`;
    const text = channels(a, 'b: { <<: *a, sensitivity: 1 V/Pa }', 'c: { <<: *a, sensitivity: 1 V/N }');
    expect(found(`rig: R\n${text}`, 'unit-mismatch').map(line)).toEqual([
      'b: unit-mismatch `b`',
      'c: unit-mismatch `c`',
    ]);
  });

  it('by `defaults`, whether they are inherited as such or merged by name', () => {
    const text = `defaults: &usual { ${OK}, flatness: 1 s }\n${channels('a:', 'b: { <<: *usual }', 'c: *usual')}`;
    expect(lines(text)).toEqual(['defaults: unit-mismatch `s`']);
  });

  it('each slip of the filters that `defaults` hold', () => {
    const text = `defaults: { ${OK}, filter: [{ response: rc }, { response: rc, order: 0 }] }\n${channels('a:', 'b:')}`;
    const missing = found(`rig: R\n${text}`, 'missing-key');
    expect(missing.map(({ about }) => about)).toEqual(['filter[1].corner', 'filter[1].order', 'filter[2].corner']);
    expect(lines(text).filter((said) => !said.includes('missing-key'))).toEqual(['defaults: out-of-range `0`']);
  });

  it('by text that is no channel and that only channels read', () => {
    const base = `x-base: &base { ${OK}, gain: -1, rati: 3 }\n`;
    const told = ['x-base: out-of-range `-1`', 'x-base: unknown-key `rati`'];
    expect(lines(base + channels('a: { <<: *base }', 'b: *base'))).toEqual(told);
  });

  it('by text that is no thing and that only things read', () => {
    const base =
      'x-base: &base { response: rc, order: 0, corner: 5, ordr: 2 }\nfilters:\n  f: *base\n  g: { <<: *base }\n';
    const told = ['x-base: out-of-range `0`', 'x-base: unit-missing `5`', 'x-base: unknown-key `ordr`'];
    expect(lines(base + channels(`a: { ${OK}, filter: [f, g] }`))).toEqual(told);
    expect(lines(base + channels(`a: { ${OK}, filter: [f, g] }`, `b: { ${OK}, filter: *base }`))).toEqual(told);
  });

  it('by a thing that others merge', () => {
    const text = `filters:\n  f: &f { response: rc, order: 99, corner: 1 kHz }\n  g: { <<: *f, corner: 2 kHz }\n`;
    expect(lines(text + channels(`a: { ${OK}, filter: [f, g] }`))).toEqual(['filters/f: out-of-range `99`']);
  });

  it('by a channel that is not read itself, because its name is taken', () => {
    const text = channels(`a: { ${OK} }`, `a: &a { ${OK}, gain: -1 }`, 'b: *a', 'c: *a');
    expect(lines(text)).toEqual(['channels/a: duplicate-name `a`', 'channels/a: out-of-range `-1`']);
  });

  it('as two slips where two texts have the same', () => {
    const text = channels(`a: &a { ${OK}, gain: -1 }`, `b: &b { ${OK}, gain: -1 }`, 'c: *a', 'd: *b');
    expect(lines(text)).toEqual(['a: out-of-range `-1`', 'b: out-of-range `-1`']);
  });

  it('and an alias that leads nowhere by the map that has it', () => {
    const text = channels(`a: &a { ${OK}, <<: *gone }`, 'b: *a');
    expect(lines(text)).toEqual(['a: unknown-name `*gone`']);
  });
});
