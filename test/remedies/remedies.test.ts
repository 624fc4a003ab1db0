import { describe, expect, it } from 'vitest';
import { EXTRACT_FAN } from '../tools/samples.ts';
import { findingLines } from '../workbench/describe-findings.ts';
import { afterwards, offered } from './offered.ts';

/** The one remedy of a name that is offered for a check. */
function only(text: string, check: string, name: string) {
  const remedy = offered(text, check).find((one) => one.name === name);
  expect(remedy, `${name} for ${check}`).toBeDefined();
  return remedy!;
}

/** A channel in a rig whose hum folds into the band; nothing else is loud enough to be spoken of. */
function rig(channel: string, more = ''): string {
  return `rig: R
digitizers:
  d: { bits: 16, full-scale: ±10 V, rates: [10 kHz, 20 kHz, 25 kHz, 40 kHz, 50 kHz], ranges: [±10 V, ±1 V] }
filters:
  card: { response: butterworth, order: 4, cutoff: 6 kHz }
sources:
  hum: { frequency: 17 kHz, level: 1 V }
${more.includes('defaults:') ? more : `${more}defaults:\n`}  undeclared: -90 dBFS
channels:
${channel}`;
}

const BLOCK = `  a:
    measures: voltage
    digitizer: d
    rate: 20 kHz      # as wired
    filter: card
    band: 10 Hz .. 4 kHz
`;

describe('settings', () => {
  it('sample faster at the lowest reachable rate at which the finding is gone', () => {
    const remedy = only(rig(BLOCK), 'fold-in-band', 'sample-faster');
    expect(remedy.title).toMatch(/^Sample at 25 kHz: hum arrives at 8 kHz, outside the band/);
    expect(remedy.kind).toBe('setting');
    expect(remedy.preferred).toBe(true);
    expect(afterwards(rig(BLOCK), remedy)).toBe(rig(BLOCK).replace('rate: 20 kHz ', 'rate: 25 kHz '));
  });

  it('write a rate as the file writes rates: quotes, flow style and JSON kept', () => {
    const quoted = rig(BLOCK.replace('20 kHz ', "'20 kHz' "));
    expect(afterwards(quoted, only(quoted, 'fold-in-band', 'sample-faster'))).toContain("rate: '25 kHz' ");
    const flow = rig('  a: { measures: voltage, digitizer: d, rate: 20kHz, filter: card, band: 10 Hz .. 4 kHz }\n');
    expect(afterwards(flow, only(flow, 'fold-in-band', 'sample-faster'))).toContain('rate: 25kHz,');
  });

  it('write the key into a channel that inherits it, and offer the origin for all besides', () => {
    const text = rig(
      '  a: { measures: voltage, filter: card, band: 10 Hz .. 4 kHz }\n  b: { measures: voltage, filter: card, band: 10 Hz .. 4 kHz }\n',
      'defaults:\n  digitizer: d\n  rate: 20 kHz\n',
    );
    const remedies = offered(text, 'fold-in-band');
    const own = remedies.find(({ name }) => name === 'sample-faster')!;
    expect(afterwards(text, own)).toContain(
      '  a: { measures: voltage, filter: card, band: 10 Hz .. 4 kHz, rate: 25 kHz }',
    );
    const all = remedies.find(({ title }) => title.includes('for all 2 channels'))!;
    expect(all.preferred).toBe(false);
    expect(afterwards(text, all)).toContain('defaults:\n  digitizer: d\n  rate: 25 kHz\n');
  });

  it('merge into a channel that is an alias', () => {
    const text = rig(
      '  a: &same { measures: voltage, digitizer: d, rate: 50 kHz, filter: card, band: 10 Hz .. 4 kHz, peak: 9 V }\n  b: *same\n',
    );
    const remedies = offered(text.replace('rate: 50 kHz', 'rate: 20 kHz'), 'fold-in-band');
    const onAlias = remedies.map((one) => afterwards(text.replace('rate: 50 kHz', 'rate: 20 kHz'), one));
    expect(onAlias.some((after) => after.includes('  b: { <<: *same, rate: 25 kHz }'))).toBe(true);
  });

  it('filter a bare decimation, or decimate less', () => {
    const text = rig(
      BLOCK.replace('rate: 20 kHz', 'rate: 50 kHz').replace('4 kHz\n', '1 kHz\n    then:\n      - decimate: 16\n'),
    ).replace('-90 dBFS', '-50 dBFS');
    const remedies = offered(text, 'step-without-filter');
    expect(remedies.map(({ name }) => name)).toContain('filter-the-step');
    expect(afterwards(text, remedies.find(({ name }) => name === 'filter-the-step')!)).toMatch(
      /- decimate: 16\n {8}filter: \{ response: kaiser, pass: [\d.]+ fs, stop: [\d.]+ fs, stopband: \d+ dB \}/,
    );
  });

  it('sample at the lowest rate that a practice asks for, or decimate less', () => {
    const text = rig(BLOCK.replace('rate: 20 kHz', 'rate: 25 kHz').concat('    follows: shock-peaks\n'));
    expect(afterwards(text, only(text, 'practice-unmet', 'sample-faster'))).toContain('rate: 40 kHz ');
    const step = text.replace('rate: 25 kHz', 'rate: 50 kHz').concat('    then: [{ decimate: 3, filter: tidy }]\n');
    const tidy = 'filters:\n  tidy: { response: kaiser, pass: 0.08 fs, stop: 0.12 fs, stopband: 90 dB }\n';
    const narrow = step.replace('filters:\n', tidy).replace('4 kHz\n', '2 kHz\n');
    expect(afterwards(narrow, only(narrow, 'practice-unmet', 'decimate-less'))).toContain('decimate: 2,');
  });

  it('choose a range that is listed', () => {
    const text = rig(BLOCK.replace('rate: 20 kHz', 'rate: 50 kHz').concat('    peak: 0.5 V\n'));
    const remedy = only(text, 'range-wasted', 'choose-range');
    expect(afterwards(text, remedy)).toContain('    peak: 0.5 V\n    full-scale: ±1 V\n');
  });
});

describe('a band that is folded on purpose', () => {
  it('is offered a rate that keeps it whole, the right way up first', () => {
    const text = `rig: R
clocks: { c: { frequency: 160 MHz, divide: 1..64 } }
digitizers: { d: { clock: c, full-scale: ±1 V, bits: 14 } }
filters: { image: { response: elliptic, order: 10, ripple: 0.1 dB, stopband: 80 dB, shape: band-pass, pass-edge: 19.9 MHz .. 25.1 MHz } }
channels:
  a: { digitizer: d, rate: 22.8571 MHz, sampling: bandpass, filter: image, band: 20 MHz .. 25 MHz }
`;
    // Of 160 MHz, 26.67 MHz (upside down) is nearer than 17.78 MHz: 16.67 .. 20 MHz and 25 .. 40 MHz keep the band whole.
    const titles = offered(text, 'bandpass-straddles').map(({ title }) => title);
    expect(titles[0]).toMatch(
      /^Sample at 17.778 MHz: the band is recorded at 2.2222 MHz .. 7.2222 MHz \(data x0.778\)/,
    );
    expect(titles[1]).toMatch(/^Sample at 26.667 MHz: the band is recorded at 1.6667 MHz .. 6.6667 MHz, upside down/);
  });
});

describe('what changes the rig, the test or what is known', () => {
  it('begins its title accordingly, is never preferred, and comes after the settings', () => {
    const remedies = offered(EXTRACT_FAN, 'fold-in-band');
    const kinds = remedies.map(({ kind }) => kind);
    expect(kinds).toEqual(
      [...kinds].sort(
        (a, b) =>
          ['text', 'setting', 'hardware', 'requirement', 'claim'].indexOf(a) -
          ['text', 'setting', 'hardware', 'requirement', 'claim'].indexOf(b),
      ),
    );
    const begins = { hardware: 'If the rig is changed:', requirement: 'If the test allows:', claim: 'If it is known:' };
    for (const { name, kind, title, preferred } of remedies) {
      if (kind === 'text' || kind === 'setting') continue;
      expect(title.startsWith(name === 'accept' ? 'Accept:' : begins[kind]), title).toBe(true);
      expect(preferred).toBe(false);
    }
  });

  it('writes a new filter where others share the one there is', () => {
    const text = rig(BLOCK + BLOCK.replace('  a:', '  b:').replace('rate: 20 kHz', 'rate: 50 kHz'));
    const remedy = only(text, 'fold-in-band', 'steeper-filter');
    const after = afterwards(text, remedy);
    expect(after).toContain('  card: { response: butterworth, order: 4, cutoff: 6 kHz }');
    expect(findingLines(after).filter((line) => line.startsWith('fold-in-band'))).toEqual([]);
  });

  it('adds a filter that fits where there is none', () => {
    const text = rig(BLOCK.replace('filter: card', 'filter: none'));
    const remedy = only(text, 'fold-in-band', 'add-filter');
    expect(remedy.title).toMatch(/^If the rig is changed: /);
    expect(findingLines(afterwards(text, remedy)).filter((line) => line.startsWith('fold-in-band'))).toEqual([]);
  });

  it('narrows the band to the widest that is clean', () => {
    const remedy = only(rig(BLOCK), 'fold-in-band', 'narrow-band');
    expect(remedy.title).toMatch(/^If the test allows: /);
    const high = /band: 10 Hz \.\. ([\d.]+) kHz/.exec(afterwards(rig(BLOCK), remedy));
    expect(Number(high?.[1])).toBeGreaterThan(2.5);
    expect(Number(high?.[1])).toBeLessThan(3);
  });

  it('states a level for a person to confirm', () => {
    const text = rig(BLOCK).replace(', level: 1 V', '');
    const remedy = only(text, 'fold-unlevelled', 'state-level');
    expect(remedy.kind).toBe('claim');
    expect(afterwards(text, remedy)).toMatch(/hum: \{ frequency: 17 kHz, level: -?[\d.]+ dBFS \}/);
  });
});

describe('corrections of the text', () => {
  it.each([
    ['unknown-key', 'correct-spelling', '    bnad: 10 Hz .. 4 kHz\n', '    band: 10 Hz .. 4 kHz\n'],
    ['unknown-name', 'correct-spelling', '    filter: crad\n', '    filter: card\n'],
    ['unit-missing', 'write-unit', '    rate: 50000\n', '    rate: 50000 Hz\n'],
  ])('%s is cured by %s', (check, name, wrong, right) => {
    const good = BLOCK.replace('    rate: 20 kHz      # as wired\n', '    rate: 50 kHz\n');
    const key = right.split(':')[0]!;
    const text = rig(good.replace(new RegExp(`${key}:.*\n`), wrong));
    const remedy = only(text, check, name);
    expect(remedy.kind).toBe('text');
    expect(remedy.preferred).toBe(true);
    expect(afterwards(text, remedy)).toContain(right);
  });

  it('a missing key is written where it belongs', () => {
    const text = rig(BLOCK.replace('20 kHz', '50 kHz').replace('    band: 10 Hz .. 4 kHz\n', ''));
    const remedy = only(text, 'missing-key', 'add-missing-key');
    expect(afterwards(text, remedy)).toContain('    filter: card\n    band: ');
  });
});

describe('rates of a scan', () => {
  const scan = (digitizer: string, channels: string, defaults = '') => `rig: R
digitizers:
  d: { full-scale: ±10 V, rates: [1 kHz, 2 kHz, 5 kHz, 10 kHz, 20 kHz], sampling: scanned, ${digitizer} }
groups:
  g: { within: 1 deg, up-to: 40 Hz }
defaults: { digitizer: d, band: 1 Hz .. 100 Hz, undeclared: -90 dBFS${defaults} }
channels:
${channels}`;
  const titles = (text: string, check: string) =>
    offered(text, check)
      .filter(({ name }) => name !== 'accept')
      .map(({ title }) => title);
  const OWN = '  a: { rate: 10 kHz }\n  b: { rate: 2 kHz }\n  c: { rate: 2 kHz }\n';
  const INHERITED = '  a: {}\n  b: {}\n  c: {}\n';

  it('that are too much together fall at the fastest channel, or at all that share one', () => {
    const own = scan('max-rate: 9.5 kHz', OWN);
    const remedy = only(own, 'rate-over-converter', 'sample-elsewhere');
    expect(remedy.title).toBe('Sample at 5 kHz: the scan fits the converter (data x0.5)');
    expect(afterwards(own, remedy)).toContain('  a: { rate: 5 kHz }');
    // 3 x 10 kHz: one of them can't fall far enough for 20 kHz, all of them can to 5 kHz each.
    const inherited = scan('max-rate: 20 kHz', INHERITED, ', rate: 10 kHz');
    expect(titles(inherited, 'rate-over-converter')).toEqual([
      'Sample at 5 kHz for all 3 channels: the scan fits the converter (data x0.5)',
    ]);
  });

  it('that leave no time to settle fall', () => {
    // 0.1 % are 6.9 time constants: three channels at 5 kHz have 66.7 us each, 6.67 of 10 us; at 2 kHz 16.7.
    const inherited = scan('settling: 10 us', INHERITED, ', rate: 5 kHz');
    expect(titles(inherited, 'settling-short')).toEqual([
      'Sample at 2 kHz for all 3 channels: the input has time to settle (data x0.4)',
    ]);
    const own = scan('settling: 10 us', OWN.replace('10 kHz', '5 kHz'));
    expect(findingLines(own).some((line) => line.startsWith('settling-short'))).toBe(true);
  });

  it('that are too slow for a group rise', () => {
    // Two thirds of the sample period at 40 Hz: 1.92 degrees at 5 kHz, 0.96 at 10 kHz.
    const text = scan('bits: 16', INHERITED, ', rate: 5 kHz, group: g');
    expect(titles(text, 'scan-skew')).toContain(
      'Sample at 10 kHz for all 3 channels: the group is sampled close enough together (data x2)',
    );
  });

  it('cure nothing where the interval is given', () => {
    expect(titles(scan('scan-interval: 1 us, settling: 1 us', INHERITED, ', rate: 5 kHz'), 'settling-short')).toEqual(
      [],
    );
    expect(titles(scan('scan-interval: 60 us', INHERITED, ', rate: 5 kHz, group: g'), 'scan-skew')).toEqual([]);
  });
});
