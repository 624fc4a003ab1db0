import { describe, expect, it } from 'vitest';
import { parseDocument } from 'yaml';
import { channels, line, lines, OK } from './document-rig.ts';
import { findingsOf } from './judged.ts';

describe('more than is read', () => {
  const AFTER = `b: { ${OK}, rati: 1 }`;

  it.each([
    ['1,001 harmonics', `sources: { s: { frequency: 1 mHz, harmonics: 1001 } }\n${channels(AFTER)}`, 'harmonics'],
    [
      '1,001 sidebands',
      `sources: { s: { carrier: 9 Hz, modulation: 1 Hz, sidebands: 1001 } }\n${channels(AFTER)}`,
      'sidebands',
    ],
    ['70 lists in one another', channels(`a: { ${OK}, filter: ${'['.repeat(70)}${']'.repeat(70)} }`, AFTER), undefined],
    [
      '10,001 aliases',
      `x-f: &f { response: rc, order: 1, corner: 1 kHz }\n${channels(`a: { ${OK}, filter: [${'*f, '.repeat(10_001)}] }`, AFTER)}`,
      'aliases',
    ],
  ])('is told once, and what can be read is: %s', (_, text, about) => {
    const said = findingsOf(`rig: R\n${text}`);
    expect(said.filter(({ check }) => check === 'too-much').map((finding) => finding.about)).toEqual([about]);
    expect(said.map(line)).toContain('b: unknown-key `rati`');
  });

  it('is told of channel 20,001, and those before it are checked', () => {
    const many = Array.from({ length: 20_001 }, (_, index) => `c${index}: { gain: 1 }`);
    const said = findingsOf(`rig: R\n${channels(...many)}`);
    expect(said.filter(({ check }) => check === 'too-much').map(line)).toEqual(['channels/c20000: too-much `c20000`']);
    expect(said.filter(({ check }) => check === 'missing-key')).toHaveLength(2 * 20_000);
  });

  it('is told of what stands past 4 Mi characters, and whole channels before that are checked', () => {
    const filler = `x: { ${OK} }${`\n# ${'x'.repeat(61)}`.repeat(65_536)}`;
    const said = findingsOf(`rig: R\n${channels(AFTER, filler, `c: { ${OK}, rati: 1 }`)}`);
    expect(said.map(({ check }) => check)).toEqual(['too-much', 'unknown-key']);
    expect(said[1]!.channel).toBe('b');
  });

  it('costs nobody else what it inherits', () => {
    const text = `x-f: &f { response: rc, order: 1, corner: 1 GHz }\n${channels(`a: { ${OK}, filter: [${'*f, '.repeat(20_000)}] }`, `b: { ${OK}, filter: *f }`)}`;
    expect(lines(text)).toEqual(['a: too-much `*f`']);
  });
});

describe('text that is no YAML', () => {
  const BROKEN: readonly (readonly [string, string])[] = [
    ['a quote that never closes', `a: { ${OK}, note: "x }`],
    ['a bracket that never closes', `a: { ${OK}`],
    ['a bracket of the other kind', `a: { ${OK} ]`],
  ];

  it.each(BROKEN)('is told once, of the channel, and costs no other: %s', (_, entry) => {
    const said = findingsOf(`rig: R\n${channels(entry, `b: { ${OK}, rati: 1 }`)}`);
    expect(said.filter(({ check }) => check === 'syntax').map(({ channel }) => channel)).toEqual(['a']);
    expect(said.map(line)).toContain('b: unknown-key `rati`');
  });

  // The library `yaml` (YAML 1.2) as the outside judge of what can be read. It takes mapping keys that stand twice for
  // an error, as YAML 1.2.2, 3.2.1.3, does (number from memory).
  it.each<readonly [string, string]>([
    ...BROKEN,
    ['a channel as it should be', `a: { ${OK} }`],
    ['a block of keys', `a:\n    rate: 1 kHz\n    band: 1..2 Hz\n    undeclared: -90 dBFS`],
    ['a key that stands twice', `a: { ${OK}, note: x, note: y }`],
    [
      'a folded text',
      `a:\n    rate: 1 kHz\n    band: 1..2 Hz\n    undeclared: -90 dBFS\n    note: >-\n      some\n      text`,
    ],
    ['an anchor and its alias', `a: &a { ${OK} }\n  b: *a`],
  ])('is what a YAML library can not read either: %s', (_, entry) => {
    const text = `rig: R\n${channels(entry)}`;
    const unreadable = findingsOf(text).some(({ check }) => check === 'syntax' || check === 'duplicate-name');
    expect(unreadable).toBe(parseDocument(text).errors.length > 0);
  });
});
