import { describe, expect, it } from 'vitest';
import { found, only, underlined } from './judged.ts';

/** A channel at 2.56 kHz without anything else to say; a spectrum of 1000 lines has them 1 Hz apart. */
function rig(sources: string, spectrum: string, more = ''): string {
  return `rig: Test
digitizers: { d: { full-scale: ±10 V } }
sources:
${sources}channels:
  a:
    sensor: { measures: voltage }
    digitizer: d
    rate: 2560 Hz
    band: 10 Hz .. 1 kHz
    undeclared: -90 dBFS
    spectrum: ${spectrum}
${more}`;
}

const said = (sources: string, spectrum: string, more?: string) =>
  found(rig(sources, spectrum, more), 'lines-too-coarse');
const distance = (sources: string, spectrum = '{ record: 1 ms }') =>
  said(sources, spectrum).map(({ figures }) => figures['distanceHz']);

describe('lines-too-coarse', () => {
  // 6 dB bandwidths in lines, Harris 1978, table 1; from memory.
  it.each([
    ['rectangle', 1.21],
    ['hann', 2.0],
    ['hamming', 1.81],
  ])('asks of `separate` the 6 dB bandwidth of %s', (window, bins) => {
    const at = (hz: number) => said('', `{ lines: 1000, window: ${window}, separate: ${hz} Hz }`).length;
    expect([at(bins - 0.01), at(bins + 0.01)]).toEqual([1, 0]);
  });

  it('stands on the length of the record, and relates what it is too coarse for', () => {
    const finding = only(rig('', '{ lines: 1000, separate: 1.5 Hz }'), 'lines-too-coarse');
    expect(underlined(finding)).toBe('1000');
    expect(finding.about).toBe('separate');
    expect(finding.related.map(underlined)).toEqual(['1.5 Hz']);
    expect(finding.figures['resolutionHz']).toBeCloseTo(1, 12);
    expect(finding.figures['leastSeparationHz']).toBeCloseTo(2, 9);
  });

  it('stands on the name where the spectrum is inherited', () => {
    const text = rig('', '{ lines: 1000, separate: 1.5 Hz }')
      .replace('channels:\n', 'defaults: { spectrum: { lines: 1000, separate: 1.5 Hz } }\nchannels:\n')
      .replace(/ {4}spectrum: .*\n/, '');
    const finding = only(text, 'lines-too-coarse');
    expect(underlined(finding)).toBe('a');
    expect(finding.related.map(underlined)).toEqual(['1000', '1.5 Hz']);
  });

  it('compares the lines of wanted sources that stand still, neighbour with neighbour', () => {
    const tones = `  one: { frequency: 100 Hz, harmonics: 3, wanted: true }
  two: { frequency: 203 Hz, wanted: true }
  other: { frequency: 301 Hz }
`;
    const finding = only(rig(tones, '{ resolution: 1.6 Hz }'), 'lines-too-coarse');
    // 200 Hz and 203 Hz; 300 Hz and 301 Hz are nearer, but nobody wants the latter.
    expect(finding.figures).toMatchObject({ distanceHz: 3, leastSeparationHz: expect.closeTo(3.2, 6) });
    expect(finding.related.map(underlined)).toEqual(['one', 'two']);
    expect(said(tones, '{ resolution: 1.25 Hz }')).toEqual([]);
  });

  it('leaves out lines outside the band, lines that coincide, and sources that are not heard', () => {
    expect(distance('  one: { frequency: 4 Hz, harmonics: 3, wanted: true }\n')).toEqual([]);
    expect(distance('  one: { frequency: 4 Hz, harmonics: 4, wanted: true }\n')).toEqual([4]);
    expect(
      distance('  one: { frequency: 1 kHz, wanted: true }\n  two: { frequency: 1001 Hz, wanted: true }\n'),
    ).toEqual([]);
    const twice =
      '  one: { frequency: 100 Hz, harmonics: 2, wanted: true }\n  two: { frequency: 200 Hz, wanted: true }\n';
    expect(distance(twice)).toEqual([100]);
    expect(said(twice, '{ record: 1 ms }', '    hears: none\n')).toEqual([]);
    expect(said(twice, '{ record: 1 ms }', '    hears: [one]\n').map(({ figures }) => figures['distanceHz'])).toEqual([
      100,
    ]);
  });

  it('compares the orders of a shaft at the lowest speed at which both are in the band', () => {
    const shaft = (speed: string, order = 1) =>
      distance(`  shaft: { order: ${order}, speed: ${speed}, harmonics: 3, wanted: true }\n`);
    // 600 rpm is 10 Hz.
    expect(shaft('600..3000 rpm')).toEqual([10]);
    // At 300 rpm the first order is at 5 Hz, below the band; the second and third are there from 300 rpm on.
    expect(shaft('300..3000 rpm')).toEqual([5]);
    // At 60 rpm all are below it: the second order comes in at 5 turns a second.
    expect(shaft('60..3000 rpm')).toEqual([5]);
    expect(shaft('30000..60000 rpm', 2)).toEqual([]);
  });

  it('never takes the sweep of a range for two lines', () => {
    expect(distance('  sweep: { frequency: 100 Hz .. 300 Hz, wanted: true }\n')).toEqual([]);
    expect(distance('  order: { order: 9, speed: 600..3000 rpm, wanted: true }\n')).toEqual([]);
    const passing =
      '  sweep: { frequency: 100 Hz .. 300 Hz, wanted: true }\n  tone: { frequency: 200 Hz, wanted: true }\n';
    expect(distance(passing)).toEqual([]);
    const shafts =
      '  one: { order: 1, speed: 600..3000 rpm, wanted: true }\n  two: { order: 1.1, speed: 600..2900 rpm, wanted: true }\n';
    expect(distance(shafts)).toEqual([]);
  });

  it('compares the orders of sources that share a range of speed', () => {
    const gears = `  blade: { order: 9, speed: 600..1200 rpm, harmonics: 3, wanted: true }
  mesh: { order: 31, speed: 600..1200 rpm, wanted: true }
`;
    // Orders 27 and 31 at 10 turns a second.
    expect(distance(gears)).toEqual([40]);
  });

  it('compares a carrier that sweeps with its sidebands, which keep their distance', () => {
    const mesh = (keys: string) => distance(`  mesh: { ${keys}, wanted: true }\n`);
    expect(mesh('carrier: 300 Hz .. 600 Hz, modulation: 12 Hz')).toEqual([12]);
    expect(mesh('carrier: 300 Hz, modulation: 12 Hz .. 20 Hz')).toEqual([12]);
    expect(mesh('carrier: 300 Hz, modulation: 12 Hz, sidebands: 2')).toEqual([12]);
    expect(mesh('carrier: 2 kHz .. 3 kHz, modulation: 12 Hz')).toEqual([]);
    expect(mesh('carrier: 300 Hz .. 600 Hz, modulation: 12 Hz, sidebands: 0')).toEqual([]);
  });

  it('looks into a band that is folded on purpose', () => {
    // 2.1 .. 2.4 kHz at 2560 Hz is recorded upside down, from 160 to 460 Hz.
    const bandpass = (source: string) =>
      found(
        rig(`  s: { ${source}, wanted: true }\n`, '{ record: 1 ms }').replace(
          'band: 10 Hz .. 1 kHz',
          'sampling: bandpass\n    band: 2.1 kHz .. 2.4 kHz',
        ),
        'lines-too-coarse',
      ).map(({ figures }) => figures['distanceHz']);
    expect(bandpass('carrier: 2.2 kHz, modulation: 12 Hz')).toEqual([12]);
    expect(bandpass('carrier: 2.2 kHz .. 2.3 kHz, modulation: 12 Hz')).toEqual([12]);
    expect(bandpass('carrier: 200 Hz, modulation: 12 Hz')).toEqual([]);
  });

  it('counts orders where the record follows the shaft, whatever its speed', () => {
    // 2.56 x 25 = 64 samples of 64 a turn are one turn: lines one order apart, a Hann window asks for two.
    const orders = (order: number, lines: number) =>
      found(
        rig(
          `  one: { order: 4, speed: 600..3000 rpm, wanted: true }\n  two: { order: ${order}, speed: 600..3000 rpm, wanted: true }\n`,
          `{ lines: ${lines} }`,
          '    then: [{ per-turn: 64, speed: 600..3000 rpm }]\n',
        ).replace('10 Hz .. 1 kHz', '10 Hz .. 100 Hz'),
        'lines-too-coarse',
      ).length;
    expect([orders(5, 25), orders(6, 25), orders(5, 50)]).toEqual([1, 0, 0]);
  });

  it('counts lines at the rate of the last stage', () => {
    // 400 lines at 2560 Hz are 2.5 Hz apart, and at a quarter of that 0.625 Hz.
    const text = rig('', '{ lines: 400, separate: 4 Hz }').replace('10 Hz .. 1 kHz', '10 Hz .. 100 Hz');
    expect(only(text, 'lines-too-coarse').figures['resolutionHz']).toBeCloseTo(2.5, 12);
    expect(found(`${text}    then: [{ decimate: 4 }]\n`, 'lines-too-coarse')).toEqual([]);
  });
});

describe('record-too-long', () => {
  const long = (run: string, spectrum: string) => found(`${rig('', spectrum)}run: ${run}\n`, 'record-too-long');

  it('adds the averages up, less what they share', () => {
    // By hand: 16 records of 1 s, each starting 0.5 s after the one before, take 8.5 s.
    const spectrum = '{ record: 1 s, overlap: 50 %, averages: 16 }';
    const finding = only(`${rig('', spectrum)}run: { duration: 8.4 s }\n`, 'record-too-long');
    expect(finding.figures).toEqual({ totalS: 8.5, recordedS: 8.4 });
    expect(underlined(finding)).toBe('16');
    expect(finding.related.map(underlined)).toEqual(['8.4 s']);
    expect(long('{ duration: 8.5 s }', spectrum)).toEqual([]);
  });

  it('stands on the length where even one record is too long', () => {
    const [finding] = long('{ duration: 0.9 s }', '{ record: 1 s, averages: 16 }');
    expect(underlined(finding!)).toBe('1 s');
    const [single] = long('{ duration: 0.9 s }', '{ lines: 1000 }');
    expect(underlined(single!)).toBe('1000');
    expect(single!.message).toBe('A record of 1 s will not fit in the 900 ms that are recorded.');
  });

  it('asks triggered records to hold a record each, and the averages together', () => {
    const of = (records: number, recordS: number, spectrum: string) =>
      long(`{ records: ${records}, record: ${recordS} s, duration: 8 h }`, spectrum).length;
    expect(of(10, 1, '{ record: 1 s, averages: 10 }')).toBe(0);
    expect(of(10, 0.9, '{ record: 1 s }')).toBe(1);
    // Three of 1 s in each of 3.5 s: thirty. With half of each shared, six in each: sixty.
    expect([of(10, 3.5, '{ record: 1 s, averages: 30 }'), of(10, 3.5, '{ record: 1 s, averages: 31 }')]).toEqual([
      0, 1,
    ]);
    const shared = (averages: number) => of(10, 3.5, `{ record: 1 s, overlap: 50 %, averages: ${averages} }`);
    expect([shared(60), shared(61)]).toEqual([0, 1]);
  });

  it('is not said where nothing is known of how long is recorded', () => {
    expect(long('{ disk: 1 GB }', '{ record: 1000 h, averages: 100 }')).toEqual([]);
    expect(found(rig('', '{ record: 1000 h }'), 'record-too-long')).toEqual([]);
  });
});

describe('window-leaks', () => {
  const tone = (level: string) => `  tone: { frequency: 500 Hz, level: ${level} }\n`;
  const leaks = (level: string, spectrum: string, more = '') => found(rig(tone(level), spectrum, more), 'window-leaks');

  it('follows the rectangle, whose side lobes are under 1 / (pi offset)', () => {
    // Full scale, and a limit of -40 dBFS: 1 / (pi d) is a hundredth 31.8 lines away. Oppenheim and Schafer: the
    // transform of a rectangle.
    const [finding] = leaks('10 V', '{ lines: 400, window: rectangle }', '    fold-limit: -40 dBFS\n');
    expect(finding!.figures['reachHz']).toBeGreaterThan(31.7 * 2.5);
    // The copies at multiples of the rate add pi / 2 of that at most, and a bound has a little to spare.
    expect(finding!.figures['reachHz']).toBeLessThan(31.9 * 2.5 * 1.05 * (Math.PI / 2));
    expect(finding!.about).toBe('tone');
    expect(underlined(finding!)).toBe('rectangle');
  });

  it('is not said of what stands beside the line itself, which no window spares', () => {
    expect(leaks('1 V', '{ lines: 800, window: hann }')).toEqual([]);
    expect(leaks('10 V', '{ lines: 800, window: hann }', '    fold-limit: -80 dBFS\n')).toEqual([]);
    expect(leaks('10 V', '{ lines: 800, window: rectangle }', '    fold-limit: -80 dBFS\n')).toHaveLength(1);
    expect(leaks('1 mV', '{ lines: 800, window: rectangle }', '    fold-limit: -80 dBFS\n')).toEqual([]);
  });

  it('asks for `resolve` where that is lower than the fold limit', () => {
    const wide = '{ lines: 1600, window: rectangle }';
    expect(leaks('10 V', wide, '    fold-limit: -40 dBFS\n')).toEqual([]);
    const [finding] = leaks('10 V', wide, '    fold-limit: -40 dBFS\n    resolve: 1 mV\n');
    expect(finding!.figures['limitDbfs']).toBeCloseTo(-80, 9);
    expect(finding!.related.map(underlined)).toEqual(['tone', '1 mV']);
    expect(leaks('10 V', wide, '    fold-limit: -40 dBFS\n    resolve: 1 V\n')).toEqual([]);
  });

  it('is not said of a level that is not known, or of a record with too few samples to bound', () => {
    const silent = rig('  tone: { frequency: 500 Hz }\n', '{ lines: 100, window: rectangle }');
    expect(found(silent, 'window-leaks')).toEqual([]);
    const limit = '    fold-limit: -80 dBFS\n';
    // 2.56 x 25 is 64 samples.
    expect(leaks('10 V', '{ lines: 25, window: rectangle }', limit)).toHaveLength(1);
    expect(leaks('10 V', '{ lines: 24, window: rectangle }', limit)).toEqual([]);
  });
});

describe('fold-hides', () => {
  const hides = (folded: string, spectrum = '{ resolution: 2 Hz }') =>
    found(rig(`  tone: { frequency: 500 Hz, level: 1 V, wanted: true }\n  hum: ${folded}\n`, spectrum), 'fold-hides');

  it('is said within one line of a wanted one, and not farther away', () => {
    // 2560 - 2058 = 502, 2560 - 2057.9 = 502.1.
    const [finding] = hides('{ frequency: 2058 Hz, level: 0.1 V }');
    expect(finding!.figures).toMatchObject({ recordedHz: 502, wantedHz: 500, resolutionHz: 2, stage: 1 });
    expect(finding!.about).toBe('hum');
    expect(underlined(finding!)).toBe('2560 Hz');
    expect(finding!.related.map(underlined)).toEqual(['hum', 'tone']);
    expect(hides('{ frequency: 2057.9 Hz, level: 0.1 V }')).toEqual([]);
    expect(hides('{ frequency: 2062.1 Hz, level: 0.1 V }')).toEqual([]);
  });

  it('asks for a level that changes what is read', () => {
    const quiet = (level: string) => hides(`{ frequency: 2060 Hz, level: ${level} }`).length;
    // The fold limit is 0.1 % of 10 V, 10 mV; a tenth of 1 V is more, so that it decides nothing here.
    expect([quiet('11 mV'), quiet('9 mV')]).toEqual([1, 0]);
    const low = (level: string) =>
      found(
        rig(
          `  tone: { frequency: 500 Hz, level: 50 mV, wanted: true }\n  hum: { frequency: 2060 Hz, level: ${level} }\n`,
          '{ resolution: 2 Hz }',
        ),
        'fold-hides',
      ).length;
    // Under the limit, and a tenth of the wanted line, 20 dB below it.
    expect([low('5.01 mV'), low('4.99 mV')]).toEqual([1, 0]);
    expect(hides('{ frequency: 2060 Hz }')[0]!.message).toContain('full scale is assumed');
  });

  it('is said of what folds and stands still only, and of nothing without a spectrum', () => {
    expect(hides('{ frequency: 501 Hz, level: 1 V }')).toEqual([]);
    expect(hides('{ frequency: 2000 Hz .. 2100 Hz, level: 1 V }')).toEqual([]);
    const text = rig(
      '  tone: { frequency: 500 Hz, level: 1 V, wanted: true }\n  hum: { frequency: 2060 Hz, level: 1 V }\n',
      '{ lines: 100 }',
    );
    expect(found(text.replace(/ {4}spectrum.*\n/, ''), 'fold-hides')).toEqual([]);
    expect(found(text.replace(', wanted: true', ''), 'fold-hides')).toEqual([]);
  });

  it('tells a source that folds onto its own lines', () => {
    // The fourth harmonic of 512 Hz is at 2048 Hz, recorded at 512 Hz.
    const own = rig('  tone: { frequency: 512 Hz, harmonics: 4, level: 1 V, wanted: true }\n', '{ resolution: 2 Hz }');
    expect(only(own, 'fold-hides').figures).toMatchObject({ recordedHz: 512, wantedHz: 512 });
  });
});

describe('on-nyquist with a spectrum', () => {
  const near = (hz: number, spectrum: string, tolerance = '') =>
    found(rig(`  hum: { frequency: ${hz} Hz, level: 1 V${tolerance} }\n`, spectrum), 'on-nyquist');

  it('reaches as far as one line', () => {
    // 2560 Hz is the rate: recorded at the distance from it, below the band and next to a point outside it.
    const text = (hz: number) =>
      rig(`  hum: { frequency: ${hz} Hz, level: 1 V }\n`, '{ resolution: 2 Hz }').replace('10 Hz ..', '0 Hz ..');
    expect(found(text(2562), 'on-nyquist')).toHaveLength(1);
    expect(found(text(2562), 'on-nyquist')[0]!.message).toContain('within one line (2 Hz) of a multiple');
    expect(found(text(2562.1), 'on-nyquist')).toEqual([]);
    expect(found(text(2562).replace(/ {4}spectrum.*\n/, ''), 'on-nyquist')).toEqual([]);
    expect(found(text(2560), 'on-nyquist')[0]!.message).toContain('may stand on a multiple');
  });

  it('says nothing of points outside the band, or of a tolerance that is near one whatever the rate', () => {
    expect(near(2561, '{ resolution: 2 Hz }')).toEqual([]);
    const wide = rig('  hum: { frequency: 25601 Hz, level: 1 V, tolerance: 5 % }\n', '{ resolution: 2 Hz }');
    expect(found(wide.replace('10 Hz ..', '0 Hz ..'), 'on-nyquist')).toEqual([]);
  });
});
