import { describe, expect, it } from 'vitest';
import { findingsOf, found, names, only, underlined } from './judged.ts';

function rig(channel: string, digitizer = 'full-scale: ±10 V', sensor = 'sensitivity: 100 mV/(m/s2)'): string {
  return `rig: Test
digitizers: { d: { ${digitizer} } }
channels:
  one:
    digitizer: d
    rate: 1000 Hz
    band: 10 Hz .. 100 Hz
    undeclared: -90 dBFS
    measures: acceleration
    ${sensor}
${channel.replace(/^(?=.)/gm, '    ')}
`;
}

describe('clips', () => {
  it.each([
    ['100 m/s2', '±10 V', false],
    ['101 m/s2', '±10 V', true],
    ['-20 .. 101 m/s2', '±10 V', true],
    ['-101 .. 20 m/s2', '±10 V', true],
    ['50 m/s2', '0..5 V', false],
    ['51 m/s2', '0..5 V', true],
    ['-1 .. 20 m/s2', '0..5 V', true],
    ['10 V', '±10 V', false],
    ['10.1 V', '±10 V', true],
    ['-0.1 dBFS', '±10 V', false],
    ['0.1 dBFS', '±10 V', true],
  ])('of a peak of %s on %s is %s', (peak, fullScale, expected) => {
    expect(found(rig(`peak: ${peak}`, `full-scale: ${fullScale}`), 'clips').length > 0).toBe(expected);
  });

  it('reckons with gain', () => {
    expect(found(rig('peak: 51 m/s2\ngain: 2'), 'clips')).toHaveLength(1);
    expect(found(rig('peak: 49 m/s2\ngain: 2'), 'clips')).toEqual([]);
  });

  it('reckons with what the resonance lifts inside the band', () => {
    // 100 Hz of 200 Hz: 1 / (1 - 0.25) = 1.333.
    const sensor = 'sensitivity: 100 mV/(m/s2)\n    resonance: 200 Hz\n    q: 1000000';
    expect(found(rig('peak: 74 m/s2\nflatness: 6 dB', undefined, sensor), 'clips')).toEqual([]);
    expect(found(rig('peak: 76 m/s2\nflatness: 6 dB', undefined, sensor), 'clips')).toHaveLength(1);
  });

  it('tells the full scale and the range of the sensor apart', () => {
    const text = rig('peak: 120 m/s2', undefined, 'sensitivity: 100 mV/(m/s2)\n    range: 110 m/s2');
    expect(found(text, 'clips').map(({ about }) => about)).toEqual(['full-scale', 'range']);
    expect(found(text, 'clips').map(underlined)).toEqual(['120 m/s2', '120 m/s2']);
    expect(found(text, 'headroom-thin')).toEqual([]);
    expect(found(text.replace('120 m/s2', '-111 .. 20 m/s2'), 'clips').map(({ about }) => about)).toEqual([
      'full-scale',
      'range',
    ]);
  });

  it('says by how much', () => {
    const finding = found(rig('peak: 200 m/s2'), 'clips')[0]!;
    expect(finding.figures).toEqual({ peakV: 20, endV: 10 });
    expect(finding.message).toBe(
      'The signal will be cut off: `peak` puts 20 V on the input, which takes ±10 V, 6.02 dB less.',
    );
  });
});

describe('headroom-thin', () => {
  it('is said where less than 3 dB are left, or less than is wanted', () => {
    // 3 dB under 10 V is 7.079 V.
    expect(found(rig('peak: 70.7 m/s2'), 'headroom-thin')).toEqual([]);
    expect(only(rig('peak: 70.9 m/s2'), 'headroom-thin').figures).toMatchObject({ wantedDb: 3 });
    expect(found(rig('peak: 70.9 m/s2\nheadroom: 2 dB'), 'headroom-thin')).toEqual([]);
    expect(only(rig('peak: 50 m/s2\nheadroom: 12 dB'), 'headroom-thin').excess).toBeCloseTo(12 - 20 * Math.log10(2), 9);
  });

  it('counts the nearer end, and no end that is 0', () => {
    expect(only(rig('peak: -80 .. 10 m/s2'), 'headroom-thin').figures['headroomDb']).toBeCloseTo(
      20 * Math.log10(1.25),
      9,
    );
    expect(found(rig('peak: 0 .. 30 m/s2', 'full-scale: 0..5 V'), 'headroom-thin')).toEqual([]);
  });
});

describe('range-wasted', () => {
  it('proposes the smallest listed range that holds the peak with headroom', () => {
    const digitizer = 'full-scale: ±10 V, ranges: [±10 V, ±5 V, ±1 V, ±0.1 V]';
    const finding = only(rig('peak: 5 m/s2', digitizer), 'range-wasted');
    expect(finding).toMatchObject({ severity: 'hint', figures: { times: 10, lowV: -1, highV: 1 } });
    expect(finding.message).toContain('`full-scale: ±1 V`');
    expect(found(rig('peak: 20 m/s2', digitizer), 'range-wasted')).toEqual([]);
  });

  it('or a gain', () => {
    const digitizer = 'full-scale: ±10 V, gains: [1, 2, 5, 100]';
    const finding = only(rig('peak: 10 m/s2', digitizer), 'range-wasted');
    expect(finding.message).toContain('`gain: 5`');
    expect(underlined(finding)).toBe('d');
    expect(underlined(only(rig('peak: 10 m/s2\ngain: 1', digitizer), 'range-wasted'))).toBe('1');
    expect(found(rig('peak: 10 m/s2\ngain: 2', digitizer), 'range-wasted')).toEqual([]);
  });

  it('is not said without a list, or of a signal that clips', () => {
    expect(found(rig('peak: 1 m/s2'), 'range-wasted')).toEqual([]);
    expect(found(rig('peak: 200 m/s2', 'full-scale: ±10 V, ranges: [±10 V, ±1 V]'), 'range-wasted')).toEqual([]);
  });
});

describe('band-droop', () => {
  it('counts what the flatness allows', () => {
    const rc = 'filter: { response: rc, order: 1, corner: 100 Hz }';
    expect(only(rig(rc), 'band-droop').figures).toMatchObject({ sagDb: expect.closeTo(3.0103, 4), flatnessDb: 1 });
    expect(found(rig(`${rc}\nflatness: 3.02 dB`), 'band-droop')).toEqual([]);
  });

  it('says where nothing is promised, and where the constant part does not pass', () => {
    const mask = 'filter: { response: mask, pass: 80 Hz, stop: 200 Hz, stopband: 90 dB }';
    expect(only(rig(mask), 'band-droop').message).toContain('is not promised by its filters');
    const coupled = rig('', 'full-scale: ±10 V, low-corner: 0.1 Hz').replace('10 Hz ..', '0 Hz ..');
    expect(only(coupled, 'band-droop').message).toContain('The constant part of the band will not be recorded');
    expect(underlined(only(coupled, 'band-droop'))).toBe('0 Hz .. 100 Hz');
  });

  it('leaves the sensor apart', () => {
    const sensor = 'sensitivity: 100 mV/(m/s2)\n    corner: 50 Hz';
    expect(names(findingsOf(rig('', undefined, sensor)))).toEqual([]);
  });

  it('stands at the band for a filter of the digitizer', () => {
    const text = rig('', 'full-scale: ±10 V, filter: { response: rc, order: 1, corner: 100 Hz }');
    expect(underlined(only(text, 'band-droop'))).toBe('10 Hz .. 100 Hz');
  });
});

describe('level-unplaced', () => {
  const unplaced = (text: string) =>
    found(text, 'level-unplaced').map(({ about, severity, thing }) => [about ?? thing, severity]);
  const withSource = (level: string, text: string): string =>
    text.replace('channels:', `sources: { s: { frequency: 50 Hz, level: ${level} } }\nchannels:`);

  it('is said where a full scale is missing, with everything that it keeps from being placed', () => {
    const text = withSource('1 V', rig('peak: 3 m/s2', 'bits: 16'));
    expect(unplaced(text)).toEqual([['full-scale', 'warning']]);
    expect(only(text, 'level-unplaced').message).toBe(
      "How high `s` and `peak` will stand against full scale can't be said, because `d` has no `full-scale`.",
    );
    expect(underlined(only(text, 'level-unplaced'))).toBe('d');
  });

  it('is not said where nothing needs one', () => {
    expect(unplaced(withSource('-20 dBFS', rig('', 'bits: 16')))).toEqual([]);
    expect(
      unplaced(
        withSource(
          '1 V',
          rig('fold-limit: 1 mV\nundeclared: 1 mV', 'bits: 16').replace('    undeclared: -90 dBFS\n', ''),
        ),
      ),
    ).toEqual([]);
  });

  it('is said where a sensitivity is missing', () => {
    const text = withSource('1 m/s2', rig('peak: 3 m/s2', undefined, 'note: none'));
    expect(unplaced(text)).toEqual([['sensitivity', 'warning']]);
  });

  it('is said of a source in another quantity that the channel names', () => {
    const text = withSource('1 kPa', rig('hears: [s]'));
    expect(unplaced(text)).toEqual([['s', 'warning']]);
    expect(underlined(only(text, 'level-unplaced'))).toBe('s');
  });

  it('counts the channels that leave a source out, once, as a hint at the source', () => {
    const text = withSource('1 kPa', rig('')).replace(
      /$/,
      '  two: { rate: 100 Hz, band: 1 Hz .. 9 Hz, undeclared: -90 dBFS, measures: strain }\n',
    );
    expect(unplaced(text)).toEqual([['sources/s', 'hint']]);
    const finding = only(text, 'level-unplaced');
    expect(finding.figures).toEqual({ channels: 2 });
    expect(finding.message).toBe(
      '2 channels do not hear `s`, because its level is in kPa, which those channels do not measure. A channel that hears it all the same has to name it in `hears`.',
    );
    expect(underlined(finding)).toBe('s');
  });

  it('says so of one channel in the singular', () => {
    const text = withSource('1 kPa', rig(''));
    expect(only(text, 'level-unplaced').message).toBe(
      '1 channel does not hear `s`, because its level is in kPa, which that channel does not measure. A channel that hears it all the same has to name it in `hears`.',
    );
  });

  it('is said of a fold limit that has no place', () => {
    const text = rig('fold-limit: 1 m/s2', undefined, 'note: none');
    expect(unplaced(text)).toEqual([['sensitivity', 'warning']]);
  });
});
