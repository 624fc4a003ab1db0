import { describe, expect, it } from 'vitest';
import { LAST, listOf, MOST_WORK, OK, read, rig, rigWith, told } from './bad-input.ts';
import { findingLines, strictWorkbench } from './describe-findings.ts';

const PLAIN = rigWith('');
const NOTHING_MORE: readonly string[] = [];

describe('text that is hardly YAML', () => {
  it.each([
    ['a tab that indents', `rig: R\nchannels:\n  a:\n\t  rate: 1 kHz\n${LAST}`, 'syntax'],
    ['a key that stands twice', rigWith('rate: 2 kHz'), 'duplicate-name rate'],
    ['an alias inside what it stands for', rigWith('filter: *a').replace('a: {', 'a: &a {'), 'wrong-kind *a'],
    ['a map that merges itself', rigWith('<<: *a').replace('a: {', 'a: &a {'), 'wrong-kind *a'],
    [
      'aliases ahead of their anchors',
      rigWith('note: *later', '').concat('  z: &later { gain: 1 }\n'),
      'unknown-name *later',
    ],
    ['a second document', `${PLAIN}---\nrig: S\n`, 'syntax ---'],
    ['a key that is a list', rigWith('[a, b]: 3'), 'syntax [a, b]'],
  ])('%s', (_, text, expected) => {
    expect(told(text)).toContain(expected);
  });

  it.each([
    ['tabs between values', PLAIN.replaceAll(', ', ',\t')],
    ['lines that end with CR LF', PLAIN.replaceAll('\n', '\r\n')],
    ['a byte order mark', `\ufeff${PLAIN}`],
    ['half a surrogate pair', rigWith('note: \ud800')],
    ['a NUL in a note', rigWith('note: "\0"')],
    ['a version that is not known', `%YAML 9.9\n---\n${PLAIN}`],
    ['a tag that is not known', rigWith('note: !!js/function "x"')],
  ])('%s: nothing is said of it', (_, text) => {
    expect(told(text)).toEqual(NOTHING_MORE);
  });

  it.each([
    ['empty', '', 'missing-key'],
    ['null', 'null', 'missing-key null'],
    ['a list', '[]', 'missing-key []'],
    ['lines that end with CR alone', PLAIN.replaceAll('\n', '\r'), 'syntax R'],
    ['UTF-16', [...PLAIN].join('\0'), 'syntax r\0i\0g\0:\0 \0R\0'],
  ])('a text that is no rig file at all: %s', (_, text, expected) => {
    expect(findingLines(text).length).toBeGreaterThan(0);
    expect(read(text).lines).toContain(expected);
  });
});

describe('text that would grow', () => {
  const DEEP = 100_000;
  const BIG = 10_000_000;
  const bomb = Array.from(
    { length: 12 },
    (_, index) => `x-${index + 1}: &x${index + 1} ${listOf(10, () => `*x${index}`)}\n`,
  );
  const merges = Array.from(
    { length: 20 },
    (_, index) => `x-${index + 1}: &x${index + 1} { <<: [*x${index}, *x${index}], k${index}: 1 }\n`,
  );

  it.each([
    ['10 to the power of 12 aliases', rigWith('filter: *x12', `x-0: &x0 [a]\n${bomb.join('')}`), 'wrong-kind [*x10'],
    ['2 to the power of 20 merges', rigWith('<<: *x20', `x-0: &x0 { k: 1 }\n${merges.join('')}`), 'too-much a'],
    ['lists in lists', rigWith(`filter: ${'['.repeat(DEEP)}${']'.repeat(DEEP)}`), 'too-much ['],
    ['maps in maps', rigWith(`filter: ${'{ a: '.repeat(DEEP)}${'}'.repeat(DEEP)}`), 'too-much {'],
    ['lists that never close', rigWith(`filter: ${'['.repeat(DEEP)}`), 'syntax ['],
    [
      'a staircase of keys',
      `rig: R\nchannels:\n  a:\n${listOf(2000, (at) => `${' '.repeat(4 + at)}k:`)
        .slice(1, -1)
        .replaceAll(', ', '\n')}\n${LAST}`,
      'too-much k',
    ],
    ['a note of 10 MB', `${PLAIN}  z: { ${OK}, note: "${'x'.repeat(BIG)}" }\n`, 'too-much'],
    [
      '10 MB of channels',
      `${PLAIN}${Array.from({ length: 140_000 }, (_, at) => `  c${at}: { ${OK} }\n`).join('')}`,
      'too-much c19998',
    ],
  ])('%s', (_, text, expected) => {
    expect(told(text).some((line) => line.startsWith(expected))).toBe(true);
  });

  it.each([
    ['letters', 'x'],
    ['brackets', '['],
    ['line ends', '\n'],
    ['comments', '# x\n'],
  ])('10 MB of nothing but %s', (_, character) => {
    const { lines, work } = read(character.repeat(BIG / character.length));
    expect(lines.filter((line) => line.startsWith('too-much'))).toHaveLength(1);
    expect(work).toBeLessThan(MOST_WORK);
  });

  it.each([
    [
      'a source of a million lines',
      rigWith(
        'full-scale: ±1 V',
        'sources: { s: { carrier: 9..99 kHz, modulation: 1..5 Hz, sidebands: 1000, harmonics: 1000, level: 1 V } }\n',
      ),
    ],
    [
      '300,000 taps',
      rigWith(`then: [{ filter: { response: fir, taps: ${listOf(300_000, (at) => `${at % 7}`)} }, decimate: 2 }]`),
    ],
    [
      'a half-band filter of 200,001 taps',
      rigWith(`then: [{ filter: { response: half-band, taps: ${listOf(200_001, () => '1')} }, decimate: 2 }]`),
    ],
    [
      '100,000 points',
      rigWith(`filter: { response: points, points: ${listOf(100_000, (at) => `[${at + 1} Hz, ${at % 9} dB]`)} }`),
    ],
    [
      '100,000 slots, half of them kept',
      rigWith(`pattern: { of: 100000, take: ${listOf(50_000, (at) => `${(at * 7919) % 100_000}`)} }`),
    ],
    ['20,000 steps', rigWith(`then: ${listOf(20_000, () => '{ decimate: 2 }')}`)],
    ['5,000 filters', rigWith(`filter: ${listOf(5000, () => '{ response: rc, order: 50, corner: 1 kHz }')}`)],
    [
      '100,000 rates',
      rigWith(
        'digitizer: d',
        `digitizers: { d: { together: sub-multiples, rates: ${listOf(100_000, (at) => `${at + 5000} Hz`)} } }\n`,
      ),
    ],
    [
      'a kaiser filter that is all edge',
      rigWith(
        'then: [{ decimate: 2, filter: { response: kaiser, pass: 0.2 fs, stop: 0.2000000001 fs, stopband: 300 dB } }]',
      ),
    ],
    [
      'the highest order there is',
      rigWith('filter: { response: elliptic, order: 50, ripple: 1e-30 dB, stopband: 1e30 dB, cutoff: 100 Hz }'),
    ],
  ])('%s', (_, text) => {
    told(text);
  });
});

describe('names like those of the language that reads them, and worse', () => {
  const LONG = 'x'.repeat(100_000);

  it.each(['__proto__', 'constructor', 'toString', 'hasOwnProperty', '🦄', '\u202eאבג', LONG])('%.20s', (name) => {
    const shown = name === LONG ? `${name.slice(0, 60)}...` : name;
    const sections = [
      `clocks: { ${name}: { frequency: 1 MHz } }`,
      `digitizers: { ${name}: { clock: ${name}, full-scale: ±1 V } }`,
      `sensors: { ${name}: { measures: voltage } }`,
      `filters: { ${name}: { response: rc, order: 1, corner: 1 kHz } }`,
      `sources: { ${name}: { frequency: 995 Hz, level: 1 V } }\n`,
    ].join('\n');
    const named = `digitizer: ${name}, sensor: ${name}, filter: ${name}, hears: { ${name}: 1 V }`;
    expect(told(rigWith(named, sections))).toEqual(['fold-in-band 1 kHz']);
    const unknown = told(
      rigWith(`digitizer: ${name}, sensor: ${name}, filter: ${name}, hears: [${name}], follows: ${name}`),
    );
    expect(unknown).toEqual(Array.from({ length: 5 }, () => `unknown-name ${shown}`));
    if (name !== LONG) {
      expect(told(rigWith(`${name}: 1`))).toEqual([`unknown-key ${name}`]);
      expect(told(rigWith('', `checks: { ${name}: off }\n`))).toEqual([`unknown-name ${name}`]);
    }
    expect(told(rigWith(`filter: { response: ${name}, order: 1 }`))).toContain(`wrong-kind ${shown}`);
    expect(told(rigWith(`note: *${name}`))).toEqual([`unknown-name *${shown}`.replace(/(\*x{59})x\.\.\./, '$1...')]);
    expect(told(rigWith('<<: *m', `x-m: &m { ? ${name} : 1 }\n`))).toContain(`unknown-key ${shown}`);
  });
});

describe('`uses`', () => {
  it.each(['this.rig.yaml', './this.rig.yaml', '../x/this.rig.yaml'])('of the file itself: %s', (path) => {
    const workbench = strictWorkbench();
    workbench.setFile('file:///x/this.rig.yaml', { text: rigWith('', `uses: [${path}]\n`) });
    const said = workbench.evaluation('file:///x/this.rig.yaml')!.rigFindings;
    expect(said.map(({ check, message }) => `${check} ${message}`)).toContainEqual(
      expect.stringContaining('is this file itself.'),
    );
    expect(workbench.filesWanted()).toEqual([]);
  });

  it.each(['.', '..', '/', 'sub/', 'http://x/y', '%00', '%zz', 'a/'.repeat(50_000)])(
    'of what can not be read: %.20s',
    (path) => {
      expect(told(rigWith('', `uses: ["${path}"]\n`))).toEqual(NOTHING_MORE);
    },
  );

  it('of more files than there may be', () => {
    expect(told(rigWith('', `uses: ${listOf(3000, (at) => `b${at}.rig.yaml`)}\n`))).toEqual([
      'too-much b1000.rig.yaml',
    ]);
  });

  it.each(['{}', 'x.rig.yaml', '3'])('of no list: %s', (value) => {
    expect(told(rigWith('', `uses: ${value}\n`))).toEqual([`wrong-kind ${value}`]);
  });

  it('of nothing', () => {
    expect(told(rigWith('', 'uses: []\n'))).toEqual(NOTHING_MORE);
    expect(told(rig(OK, 'uses: [""]\n'))).toEqual(NOTHING_MORE);
  });
});
