import { describe, expect, it } from 'vitest';
import { PRACTICES } from '../../server/src/practices/practices.ts';
import { found, only, underlined } from './judged.ts';

/** What is missed, as `practice requirement`. */
const missed = (text: string): readonly (string | undefined)[] =>
  found(text, 'practice-unmet').map(({ about }) => about);

interface Draft {
  readonly follows?: string;
  readonly rate?: string;
  readonly band?: string;
  /** Further lines of the channel. */
  readonly more?: string;
  /** Sections besides. */
  readonly besides?: string;
}

function rig({ follows, rate = '10 kHz', band = '0.1 Hz .. 1 kHz', more = '', besides = '' }: Draft): string {
  const keys = [`rate: ${rate}`, `band: ${band}`, ...more.split('\n').filter(Boolean)];
  const lines = follows === undefined ? keys : [`follows: ${follows}`, ...keys];
  return `rig: R\n${besides}channels:\n  a:\n${lines.map((line) => `    ${line}\n`).join('')}`;
}

/**
 * SAE J211-1 (2014) and ISO 6487 (2015), from memory. The flat range reaches from 0.1 Hz to the frequency of the class
 * F_H, where the response may be 1 dB down; at the cut-off F_N it may be 4 dB down; samples are taken at ten times the
 * class or faster.
 */
const IMPACT_CLASSES = [
  { class: 60, cutoff: 100, rate: 600 },
  { class: 180, cutoff: 300, rate: 1800 },
  { class: 600, cutoff: 1000, rate: 6000 },
  { class: 1000, cutoff: 1650, rate: 10_000 },
] as const;

describe.each(IMPACT_CLASSES)('impact-class-$class', ({ class: classHz, cutoff, rate }) => {
  const follows = `impact-class-${classHz}`;
  const draft = { follows, rate: `${rate} Hz`, band: `0.1 Hz .. ${classHz} Hz` };

  it('is met at ten times the class, and not just below', () => {
    expect(missed(rig(draft))).toEqual([]);
    const below = rate - 1;
    const finding = only(rig({ ...draft, rate: `${below} Hz` }), 'practice-unmet');
    expect([finding.about, underlined(finding)]).toEqual([`${follows} rate`, `${below} Hz`]);
    expect(finding.figures).toMatchObject({ rateHz: below, leastHz: rate });
    expect(finding.severity).toBe('warning');
  });

  it('is met by a band up to the class, and not by a narrower one', () => {
    const finding = only(rig({ ...draft, band: `0.1 Hz .. ${classHz - 1} Hz` }), 'practice-unmet');
    expect([finding.about, underlined(finding)]).toEqual([`${follows} band`, `0.1 Hz .. ${classHz - 1} Hz`]);
    // Nothing is asked of the band's bottom.
    expect(missed(rig({ ...draft, band: `5 Hz .. ${classHz} Hz` }))).toEqual([]);
  });

  // One pole is 10 lg (1 + (f / corner)^2) down: 1 dB at f = 0.508847 corner, and there 4 dB are far off at the cut-off.
  it.each([
    [1.9653, []],
    [1.9651, ['flat']],
  ])('is met by one pole whose corner is %f times the class: misses %j', (times, names) => {
    const filter = `filter: { response: rc, order: 1, corner: ${(times * classHz).toFixed(6)} Hz }`;
    expect(missed(rig({ ...draft, more: filter }))).toEqual(names.map((name) => `${follows} ${name}`));
  });

  // Butterworth, order 6: 10 lg (1 + (f / cutoff)^12) = 4 dB at f = 1.511886^(1/12) cutoff = 1.035047 cutoff.
  it.each([
    [1.035, []],
    [1.0351, ['cut-off']],
  ])('is met by a steep filter whose corner is the cut-off over %f: misses %j', (over, names) => {
    const filter = `filter: { response: butterworth, order: 6, cutoff: ${(cutoff / over).toFixed(6)} Hz }`;
    expect(missed(rig({ ...draft, more: filter }))).toEqual(names.map((name) => `${follows} ${name}`));
  });

  // One pole of AC coupling is 1 dB down at 0.1 Hz when its corner is at 0.508847 x 0.1 Hz.
  it.each([
    ['50.8 mHz', []],
    ['51 mHz', ['flat']],
  ])('is met by a coupling with its corner at %s: misses %j', (corner, names) => {
    const hz = Number.parseFloat(corner) / 1000;
    const besides = `digitizers:\n  input: { rates: 100 Hz .. 1 MHz, low-corner: ${hz} Hz }\n`;
    const text = rig({ ...draft, more: 'digitizer: input', besides });
    expect(missed(text)).toEqual(names.map((name) => `${follows} ${name}`));
    if (names.length > 0) {
      const { place, related } = only(text, 'practice-unmet');
      expect([underlined({ place }), ...related.map((one) => underlined(one))]).toEqual(['input', `${hz} Hz`, follows]);
    }
  });

  // The digital filter of the same standard's appendix, from memory: two poles forward and backward, each pass with
  // its corner at 2.0775 times the class. Both passes take 2 x 10 lg (1 + 2.0775^-4) = 0.455 dB off at the class.
  it("is met by the standard's own digital filter", () => {
    const filter = `{ response: butterworth, order: 2, cutoff: ${2.0775 * classHz} Hz, passes: 2 }`;
    expect(missed(rig({ ...draft, rate: `${100 * classHz} Hz`, more: `then: [{ filter: ${filter} }]` }))).toEqual([]);
  });

  it('is judged by the rate at which the record is kept', () => {
    const steps = (factor: number) => ({ ...draft, rate: `${2 * rate} Hz`, more: `then: [{ decimate: ${factor} }]` });
    expect(missed(rig(steps(2)))).toEqual([]);
    const finding = only(rig(steps(3)), 'practice-unmet');
    expect([finding.about, underlined(finding)]).toEqual([`${follows} rate`, '3']);
  });
});

/**
 * IEC 61000-4-7 (2002, with amendment 1 of 2008), from memory: a record of 10 periods of a 50 Hz supply or of 12 of a
 * 60 Hz one, both 200 ms, with the rectangular window. IEC 61000-3-2 (2018), from memory: limits up to the 40th
 * harmonic. IEC 61000-4-30 (2015), from memory: measured up to the 50th.
 */
describe.each([
  { order: 40, supply: 50, top: 2000 },
  { order: 40, supply: 60, top: 2400 },
  { order: 50, supply: 50, top: 2500 },
  { order: 50, supply: 60, top: 3000 },
])('supply-harmonics-$order on $supply Hz', ({ order, supply, top }) => {
  const follows = `supply-harmonics-${order}`;
  const draft = {
    follows,
    rate: '12.8 kHz',
    band: `10 Hz .. ${top} Hz`,
    more: 'spectrum: { record: 200 ms, window: rectangle }',
    besides: `mains: ${supply} Hz\n`,
  };

  it('is met by a band that ends at the harmonic, and not by a narrower one', () => {
    expect(missed(rig(draft))).toEqual([]);
    const finding = only(rig({ ...draft, band: `10 Hz .. ${top - 1} Hz` }), 'practice-unmet');
    expect([finding.about, underlined(finding)]).toEqual([`${follows} order`, `10 Hz .. ${top - 1} Hz`]);
    expect(finding.figures).toMatchObject({ order, supplyHz: supply, dueHighHz: top });
  });

  it.each(['200 ms', '0.2 s'])('is met by a record of %s', (record) => {
    expect(missed(rig({ ...draft, more: `spectrum: { record: ${record}, window: rectangle }` }))).toEqual([]);
  });

  // 12.8 kHz x 200 ms are 2560 samples: 2.56 x 1000 lines, 5 Hz apart.
  it.each(['lines: 1000', 'resolution: 5 Hz'])('is met by %s', (length) => {
    expect(missed(rig({ ...draft, more: `spectrum: { ${length}, window: rectangle }` }))).toEqual([]);
  });

  it.each(['record: 199.9 ms', 'record: 400 ms', 'lines: 800', 'resolution: 4 Hz'])('is not met by %s', (length) => {
    const finding = only(rig({ ...draft, more: `spectrum: { ${length}, window: rectangle }` }), 'practice-unmet');
    expect([finding.about, underlined(finding)]).toEqual([`${follows} record`, length.split(': ')[1]]);
    expect(finding.figures.dueS).toBeCloseTo(0.2, 12);
  });

  it('takes the whole number of samples nearest to the record', () => {
    // 200 ms at 10.001 kHz are 2000.2 samples.
    expect(missed(rig({ ...draft, rate: '10.001 kHz' }))).toEqual([]);
  });

  it('is not met by another window, said or not', () => {
    const spectrum = (rest: string) => rig({ ...draft, more: `spectrum: { record: 200 ms${rest} }` });
    const said = only(spectrum(', window: hann'), 'practice-unmet');
    expect([said.about, underlined(said)]).toEqual([`${follows} window`, 'hann']);
    const usual = only(spectrum(''), 'practice-unmet');
    expect([usual.about, underlined(usual)]).toEqual([`${follows} window`, '{ record: 200 ms }']);
  });

  it('wants it said how long the records are', () => {
    const finding = only(rig({ ...draft, more: '' }), 'practice-unmet');
    expect([finding.about, underlined(finding)]).toEqual([`${follows} record`, follows]);
  });
});

describe('a practice that is counted by the supply', () => {
  const follows = 'supply-harmonics-40';
  const draft = { follows, rate: '12.8 kHz', band: '10 Hz .. 1 kHz' };
  const spectrum = 'spectrum: { record: 100 ms, window: rectangle }';

  it('asks for no harmonic where nothing is said of the supply', () => {
    expect(missed(rig({ ...draft, more: spectrum }))).toEqual([`${follows} record`]);
  });

  it('asks for no record on a supply that it does not know', () => {
    expect(missed(rig({ ...draft, more: spectrum, besides: 'mains: 16.7 Hz\n' }))).toEqual([]);
  });

  it('counts by a supply that the channel does not hear', () => {
    const text = rig({ ...draft, more: `${spectrum}\nhears: none`, besides: 'mains: 50 Hz\n' });
    expect(missed(text)).toEqual([`${follows} order`, `${follows} record`]);
  });
});

/**
 * ISO 20816-1 (2016), from memory: the rms velocity from 10 Hz to 1 kHz. ISO 8041-1 (2017), from memory: the nominal
 * ranges, 0.5 Hz to 80 Hz for the whole body, 8 Hz to 1 kHz for the hand and the arm.
 */
describe.each([
  { follows: 'machine-vibration', low: 10, high: 1000 },
  { follows: 'whole-body-vibration', low: 0.5, high: 80 },
  { follows: 'hand-arm-vibration', low: 8, high: 1000 },
])('$follows', ({ follows, low, high }) => {
  it.each([
    [1, 1, true],
    [0.5, 2, true],
    [1.01, 1, false],
    [1, 0.99, false],
  ])('covers its range when the ends are %f and %f of it: %s', (lowTimes, highTimes, isMet) => {
    const band = `${low * lowTimes} Hz .. ${high * highTimes} Hz`;
    const text = rig({ follows, rate: '25.6 kHz', band });
    expect(missed(text)).toEqual(isMet ? [] : [`${follows} band`]);
    if (!isMet) {
      expect(underlined(only(text, 'practice-unmet'))).toBe(band);
      expect(only(text, 'practice-unmet').figures).toMatchObject({ dueLowHz: low, dueHighHz: high });
    }
  });
});

/** Common practice, no source: 2.56 times the band for spectra; ten times for peaks, whose reason is arithmetic. */
describe.each([
  { follows: 'spectrum-work', met: '25.6 kHz', unmet: '25.5 kHz', least: 2.56 },
  { follows: 'shock-peaks', met: '100 kHz', unmet: '99 kHz', least: 10 },
])('$follows', ({ follows, met, unmet, least }) => {
  it('is met at its multiple of the top of the band, and not just below', () => {
    const draft = { follows, band: '10 Hz .. 10 kHz' };
    expect(missed(rig({ ...draft, rate: met }))).toEqual([]);
    const finding = only(rig({ ...draft, rate: unmet }), 'practice-unmet');
    expect([finding.about, underlined(finding)]).toEqual([`${follows} margin`, unmet]);
    expect(finding.figures.leastRateOverBand).toBe(least);
    expect(finding.figures.leastHz).toBeCloseTo(least * 10_000, 6);
  });
});

/** Common practice, no source; the 80 dB stand in the name. */
describe('spectrum-work-80-db', () => {
  const draft = { follows: 'spectrum-work-80-db', rate: '25.6 kHz', band: '10 Hz .. 5 kHz' };
  const card = (cutoff: string) => `filter: { response: butterworth, order: 8, cutoff: ${cutoff} }`;

  it('is met by a filter that is 80 dB down at the first fold, and not by a higher one', () => {
    // 25.6 - 5 = 20.6 kHz; 10 lg (1 + (20.6 / cutoff)^16) = 80 dB at cutoff = 20.6 kHz / 10^0.5 = 6.5143 kHz.
    expect(missed(rig({ ...draft, more: card('6.514 kHz') }))).toEqual([]);
    const text = rig({ ...draft, more: card('6.53 kHz') });
    const finding = only(text, 'practice-unmet');
    expect(finding.about).toBe('spectrum-work-80-db fold');
    expect(underlined(finding)).toBe('{ response: butterworth, order: 8, cutoff: 6.53 kHz }');
    // 160 lg (20.6 / 6.53) = 79.83 dB.
    expect(finding.figures.attenuationDb).toBeCloseTo(79.83, 2);
    expect(finding.figures.atHz).toBeCloseTo(20_600, 6);
  });

  it('looks at every stage, and stands at the rate where there is no filter', () => {
    expect(underlined(only(rig(draft), 'practice-unmet'))).toBe('25.6 kHz');
    const steps = { ...draft, rate: '51.2 kHz', more: `${card('6.514 kHz')}\nthen: [{ decimate: 2 }]` };
    expect(missed(rig(steps))).toEqual([]);
    const loose = { ...draft, rate: '204.8 kHz', more: `${card('12 kHz')}\nthen: [{ decimate: 8 }]` };
    expect(underlined(only(rig(loose), 'practice-unmet'))).toBe('8');
  });

  it('says nothing of the rate of a modulator, which is far above the band', () => {
    const besides =
      'filters:\n  inside: { response: kaiser, pass: 0.4 fs, stop: 0.6 fs, stopband: 100 dB }\ndigitizers:\n  delta: { rates: 1 kHz .. 1 MHz, modulator: 64 fs, decimation-filter: inside }\n';
    expect(missed(rig({ ...draft, more: 'digitizer: delta', besides }))).toEqual([]);
  });

  it('says nothing where a filter was not understood', () => {
    expect(missed(rig({ ...draft, more: 'filter: nobody' }))).toEqual([]);
  });
});

describe('what is said of a practice', () => {
  it('tells the number, what is asked for, whose word it is, and that it is from memory', () => {
    const finding = only(rig({ follows: 'impact-class-1000', rate: '8 kHz' }), 'practice-unmet');
    expect(finding.message).toBe(
      "The channel will be recorded at 8 kHz; `impact-class-1000` asks for a rate of at least 10 kHz. The figure is that of SAE J211-1 (2014) and ISO 6487 (2015), from memory. The standard's own text decides.",
    );
    expect(finding.related.map(({ message }) => message)).toEqual(['`impact-class-1000` is followed because of this.']);
  });

  it('is said of every practice of a list once, and of none where none is followed', () => {
    const draft = { rate: '8 kHz' };
    const list = '[impact-class-1000, shock-peaks, impact-class-1000]';
    expect(missed(rig({ ...draft, follows: list }))).toEqual(['impact-class-1000 rate', 'shock-peaks margin']);
    expect(missed(rig(draft))).toEqual([]);
    expect(missed(rig({ ...draft, follows: 'none' }))).toEqual([]);
  });

  it('is tested here for every row of the table', () => {
    const tested = [
      ...IMPACT_CLASSES.map((one) => `impact-class-${one.class}`),
      ...['supply-harmonics-40', 'supply-harmonics-50', 'machine-vibration', 'whole-body-vibration'],
      ...['hand-arm-vibration', 'spectrum-work', 'spectrum-work-80-db', 'shock-peaks'],
    ];
    expect(PRACTICES.map(({ name }) => name)).toEqual(tested);
  });
});

describe('a band that is folded on purpose', () => {
  it('has no margin and no pass band to keep', () => {
    const more = 'sampling: bandpass\nfilter: { response: butterworth, order: 2, cutoff: 100 Hz }';
    const draft = { rate: '10 kHz', band: '11 kHz .. 12 kHz', more };
    expect(missed(rig({ ...draft, follows: '[shock-peaks, impact-class-1000]' }))).toEqual([]);
    expect(missed(rig({ ...draft, rate: '9 kHz', band: '10 kHz .. 11 kHz', follows: 'impact-class-1000' }))).toEqual([
      'impact-class-1000 rate',
    ]);
  });
});

describe('a practice that a channel takes over', () => {
  const besides = (lines: string) => rig({ rate: '8 kHz', besides: lines });

  it('from `defaults` or from the top of the file is said at the value, with the place that it comes from', () => {
    for (const lines of ['defaults: { follows: shock-peaks }\n', 'follows: shock-peaks\n']) {
      const finding = only(besides(lines), 'practice-unmet');
      expect([finding.about, underlined(finding)]).toEqual(['shock-peaks margin', '8 kHz']);
      expect(finding.related.map((one) => underlined(one))).toEqual(['shock-peaks']);
    }
  });

  it('goes before that of the top of the file, and a channel of its own goes before both', () => {
    const lines = 'follows: shock-peaks\ndefaults: { follows: impact-class-1000 }\n';
    expect(missed(besides(lines))).toEqual(['impact-class-1000 rate']);
    expect(missed(rig({ rate: '8 kHz', besides: lines, follows: 'none' }))).toEqual([]);
    expect(missed(rig({ rate: '8 kHz', besides: lines, follows: '[shock-peaks]' }))).toEqual(['shock-peaks margin']);
  });

  it('has an unknown name told once, where it stands', () => {
    for (const lines of ['defaults: { follows: shock-peak }\n', 'follows: [shock-peak]\n']) {
      const text = `${besides(lines)}  b: { rate: 8 kHz, band: 1 Hz .. 1 kHz }\n`;
      const finding = only(text, 'unknown-name');
      expect([underlined(finding), finding.cure]).toEqual(['shock-peak', { kind: 'replace', text: 'shock-peaks' }]);
    }
  });
});
