import { describe, expect, it } from 'vitest';
import { channels, line, lines, OK, RC } from './document-rig.ts';
import { found, underlined } from './judged.ts';

describe('names that nobody uses', () => {
  const SECTIONS = `clocks: { c: { frequency: 1 MHz } }
digitizers: { d: { full-scale: ±1 V } }
sensors: { s: { measures: acceleration } }
filters: { f: ${RC} }
sources: { o: { frequency: 2 Hz, level: -99 dBFS } }
groups: { g: { within: 1 deg, up-to: 1 kHz } }
`;
  const unused = (sections: string): readonly string[] =>
    found(`rig: R\n${sections}`, 'unused-name').map(({ thing }) => `${thing}`);

  it('are told of every kind, at the name', () => {
    const text = SECTIONS + channels(`a: { ${OK}, hears: none }`);
    expect(unused(text)).toEqual(['clocks/c', 'digitizers/d', 'sensors/s', 'filters/f', 'groups/g', 'sources/o']);
    expect(found(`rig: R\n${text}`, 'unused-name').map(underlined)).toEqual(['c', 'd', 's', 'f', 'g', 'o']);
  });

  const CLOCKED = SECTIONS.replace('±1 V }', '±1 V, clock: c }');
  const NAMES = 'digitizer: d, sensor: s, filter: f, group: g';

  it.each([
    ['channels', channels(`a: { ${OK}, ${NAMES} }`)],
    ['`defaults`', `defaults: { ${OK}, ${NAMES} }\n${channels('a:')}`],
    [
      '`defaults` that every channel overrides',
      `defaults: { ${OK}, ${NAMES} }\n${channels('a: { filter: none, measures: voltage }')}`,
    ],
    ['a channel that is an alias', `x-base: &base { ${OK}, ${NAMES} }\n${channels('a: *base')}`],
    ['a merged map', `x-base: &base { ${NAMES} }\n${channels(`a: { ${OK}, <<: *base }`)}`],
    [
      'one of several merged maps',
      `x-base: &base { ${NAMES} }\n${channels(`a: &a { ${OK} }`, 'b: { <<: [*a, *base] }')}`,
    ],
    [
      'a map merged by a merged map',
      `x-base: &base { ${NAMES} }\nx-more: &more { <<: *base }\n${channels(`a: { ${OK}, <<: *more }`)}`,
    ],
    ['`defaults` that merge a map', `x-base: &base { ${NAMES} }\ndefaults: { ${OK}, <<: *base }\n${channels('a:')}`],
    [
      'aliases of single values',
      `x-names: { d: &d d, s: &s s, f: &f f, g: &g g }\n${channels(`a: { ${OK}, digitizer: *d, sensor: *s, filter: [*f], group: *g }`)}`,
    ],
    ['digital steps', channels(`a: { ${OK}, then: [{ filter: f }], digitizer: d, sensor: s, group: g }`)],
  ])('are not those that %s name', (_, rest) => {
    expect(unused(CLOCKED + rest)).toEqual([]);
  });

  it('are not those that things name, even by text that they merge', () => {
    const merged = `x-base: &base { clock: c, filter: f }\ndigitizers: { e: { full-scale: ±1 V, <<: *base } }\n`;
    const text = SECTIONS.replace('digitizers: { d: { full-scale: ±1 V } }\n', merged);
    expect(unused(text + channels(`a: { ${OK}, digitizer: e, sensor: s, group: g }`))).toEqual([]);
    expect(unused(text + channels(`a: { ${OK}, sensor: s, group: g }`))).toEqual(['digitizers/e']);
    const locked = `clocks:\n  c: { frequency: 1 MHz, locked-to: r }\n  r: { frequency: 10 MHz }\ndigitizers: { d: { clock: c } }\n`;
    expect(unused(locked + channels(`a: { ${OK}, digitizer: d }`))).toEqual([]);
  });

  it('are those that a thing names only itself', () => {
    expect(unused(`clocks: { c: { frequency: 1 MHz, locked-to: c } }\n${channels(`a: { ${OK} }`)}`)).toEqual([
      'clocks/c',
    ]);
  });

  it('are those that only an entry names that is not read', () => {
    const text = `filters: { f: ${RC}, g: ${RC} }\n${channels(`a: { ${OK}, filter: f }`, `a: { ${OK}, filter: g }`)}`;
    expect(unused(text)).toEqual(['filters/g']);
  });

  it('are sources that every channel leaves out, by whatever way', () => {
    const sources = 'mains: 50 Hz\nsources: { o: { frequency: 2 Hz, level: -99 dBFS } }\n';
    const out = 'hears: { o: none, mains: none }';
    expect(unused(sources + channels(`a: { ${OK}, ${out} }`, `b: { ${OK}, hears: none }`))).toEqual([
      'mains',
      'sources/o',
    ]);
    expect(unused(sources + channels(`a: { ${OK}, ${out} }`, `b: { ${OK} }`))).toEqual([]);
    expect(unused(sources + channels(`a: { ${OK}, ${out} }`, `b: { ${OK}, hears: [o] }`))).toEqual(['mains']);
  });

  it('are not sources that a channel leaves out for their quantity, which is told of them', () => {
    const text = `sources: { o: { frequency: 2 Hz, level: 1 g } }\n${channels(`a: { ${OK}, measures: strain }`)}`;
    expect(lines(text)).toEqual(['sources/o: level-unplaced `o`']);
  });

  it('are told of no file without channels: others may name what it holds', () => {
    expect(unused(SECTIONS)).toEqual([]);
    expect(unused(`${SECTIONS}channels:\n`)).toEqual([]);
  });
});

describe('names and keys that stand twice', () => {
  it('are told at the second, which is not read', () => {
    const text = `${channels(`a: { ${OK} }`, `a: { ${OK}, rati: 1 }`)}filters:\n  f: ${RC}\n  f: { response: none }\n`;
    const told = found(`rig: R\n${text}`, 'duplicate-name');
    expect(told.map(line)).toEqual(['channels/a: duplicate-name `a`', 'filters/f: duplicate-name `f`']);
    expect(told[1]!.message).toBe('There already is a filter `f`; this one is not read.');
    expect(told[1]!.related.map(({ place }) => underlined({ place }))).toEqual(['f']);
    expect(lines(text)).toHaveLength(3);
  });

  it('are the same name in two sections of one kind, and no more in sections of two', () => {
    const text = `clocks: { x: { frequency: 1 MHz } }\ndigitizers: { x: { clock: x } }\n${channels(`x: { ${OK}, digitizer: x }`)}`;
    expect(lines(text)).toEqual([]);
    expect(lines(`clocks: { x: { frequency: 2 MHz } }\n${text}`)).toEqual([
      'clocks: duplicate-name `clocks`',
      'clocks/x: duplicate-name `x`',
    ]);
  });

  it('lose nothing where a section begins again', () => {
    const text = `filters: { f: ${RC} }\n${channels(`a: { ${OK}, filter: [f, g] }`)}filters: { g: ${RC} }\n${channels(`b: { ${OK}, rati: 1 }`)}`;
    expect(lines(text)).toEqual([
      'channels: duplicate-name `channels`',
      'filters: duplicate-name `filters`',
      'b: unknown-key `rati`',
    ]);
    const [message] = found(`rig: R\n${text}`, 'duplicate-name').map((finding) => finding.message);
    expect(message).toBe('There already is a section `channels`; what stands beneath both is read.');
  });

  it('are `mains` and a source of that name', () => {
    const text = `mains: 50 Hz\nsources: { mains: { frequency: 60 Hz } }\n${channels(`a: { ${OK} }`)}`;
    expect(found(`rig: R\n${text}`, 'duplicate-name').map(line)).toEqual(['sources/mains: duplicate-name `mains`']);
  });

  it('are keys of a channel, of the rig, and of a map in a channel', () => {
    const text = `rig: S\n${channels(`a: { ${OK}, note: x, note: y }`, `b: { ${OK}, filter: { response: rc, order: 1, order: 2, corner: 1 Hz } }`)}`;
    expect(found(`rig: R\n${text}`, 'duplicate-name').map(line)).toEqual([
      'rig: duplicate-name `rig`',
      'a: duplicate-name `note`',
      'b: duplicate-name `order`',
    ]);
    expect(found(`rig: R\n${text}`, 'duplicate-name')[1]!.message).toBe(
      '`note` is given twice here; the first one counts.',
    );
  });

  it('are not keys that merged maps have too', () => {
    expect(lines(channels(`a: &a { ${OK}, gain: 2 }`, 'b: { gain: 3, <<: *a }', 'c: { <<: [*a, *a] }'))).toEqual([]);
  });
});
