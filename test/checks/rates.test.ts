import { describe, expect, it } from 'vitest';
import { found, only, underlined } from './judged.ts';

const CLOCK = 'clocks:\n  c: { frequency: 13.1072 MHz, divide: 1..128 }\n';

function rig(channels: string, digitizer = 'clock: c, prescale: 256'): string {
  return `rig: Test\n${CLOCK}digitizers: { d: { ${digitizer} } }\ndefaults: { digitizer: d, band: 1 Hz .. 10 Hz, undeclared: -90 dBFS }\nchannels:\n${channels}`;
}

describe('rate-unreachable', () => {
  it('names the two nearest rates, exactly', () => {
    const finding = only(rig('  a: { rate: 20 kHz }\n'), 'rate-unreachable');
    expect(finding.figures).toEqual({ rateHz: 20_000, belowHz: 51_200 / 3, aboveHz: 25_600 });
    expect(finding.message).toContain('The nearest it can: 17.06667 kHz and 25.6 kHz.');
    expect(underlined(finding)).toBe('20 kHz');
    expect(finding.related.map(underlined)).toEqual(['13.1072 MHz']);
  });

  it('names one past either end', () => {
    expect(only(rig('  a: { rate: 60 kHz }\n'), 'rate-unreachable').figures).toEqual({
      rateHz: 60_000,
      belowHz: 51_200,
    });
    expect(only(rig('  a: { rate: 100 Hz }\n'), 'rate-unreachable').figures).toEqual({ rateHz: 100, aboveHz: 400 });
  });

  it('is not said within half a unit of the last digit, or where any rate goes', () => {
    expect(found(rig('  a: { rate: 17.07 kHz }\n'), 'rate-unreachable')).toEqual([]);
    expect(found(rig('  a: { rate: 20 kHz }\n', 'bits: 16'), 'rate-unreachable')).toEqual([]);
  });

  it('reads a list of rates', () => {
    const finding = only(rig('  a: { rate: 3 kHz }\n', 'rates: [1 kHz, 2 kHz, 5 kHz]'), 'rate-unreachable');
    expect(finding.figures).toEqual({ rateHz: 3000, belowHz: 2000, aboveHz: 5000 });
    expect(underlined(finding.related[0]!)).toContain('1 kHz');
  });

  it('stands on the name where the rate is inherited, and relates it', () => {
    const text = rig('  a: { note: none }\n').replace('digitizer: d,', 'digitizer: d, rate: 20 kHz,');
    const finding = only(text, 'rate-unreachable');
    expect(underlined(finding)).toBe('a');
    expect(underlined(finding.related[0]!)).toContain('20 kHz');
  });
});

describe('rates-conflict', () => {
  const conflicts = (together: string, channels: string) =>
    found(rig(channels, `together: ${together}`), 'rates-conflict').map(({ channel, about, figures }) => [
      channel,
      about,
      figures['otherRateHz'],
    ]);

  it('holds all to the rate that most have, where all must be the same', () => {
    expect(conflicts('same', '  a: { rate: 5 kHz }\n  b: { rate: 2 kHz }\n  c: { rate: 2 kHz }\n')).toEqual([
      ['a', 'd', 2000],
    ]);
    expect(conflicts('same', '  a: { rate: 5 kHz }\n  b: { rate: 2 kHz }\n')).toEqual([['b', 'd', 5000]]);
  });

  it('holds all to whole fractions of the fastest', () => {
    expect(conflicts('sub-multiples', '  a: { rate: 6 kHz }\n  b: { rate: 2 kHz }\n  c: { rate: 4 kHz }\n')).toEqual([
      ['c', 'd', 6000],
    ]);
  });

  it('allows for the way in which rates are written', () => {
    expect(conflicts('sub-multiples', '  a: { rate: 10 kHz }\n  b: { rate: 3333.3 Hz }\n')).toEqual([]);
  });

  it('says nothing where rates are free, or of channels without a digitizer', () => {
    expect(conflicts('free', '  a: { rate: 6 kHz }\n  b: { rate: 4 kHz }\n')).toEqual([]);
    expect(
      found(
        rig('  a: { rate: 6 kHz }\n  b: { rate: 4 kHz }\n', 'together: same').replace('digitizer: d, ', ''),
        'rates-conflict',
      ),
    ).toEqual([]);
  });

  it('stands at the rate, and relates the other one', () => {
    const [finding] = found(rig('  a: { rate: 6 kHz }\n  b: { rate: 4 kHz }\n', 'together: same'), 'rates-conflict');
    expect(underlined(finding!)).toBe('4 kHz');
    expect(finding!.related.map(underlined)).toEqual(['same', '6 kHz']);
  });
});

describe('band-over-nyquist', () => {
  it('is said at the first stage whose record ends below the band', () => {
    const text = rig(
      '  a: { rate: 1 kHz, band: 1 Hz .. 90 Hz, then: [{ decimate: 2, filter: { response: moving-average, length: 2 } }, { decimate: 4, filter: { response: moving-average, length: 4 } }, { decimate: 2 }] }\n',
      'bits: 16',
    );
    const finding = only(text, 'band-over-nyquist');
    expect(finding).toMatchObject({ stage: 3, figures: { bandHighHz: 90, nyquistHz: 62.5, stage: 3 } });
    expect(underlined(finding)).toBe('4');
    expect(finding.message).toContain('where every 4th sample is kept (125 Hz)');
  });
});

describe('a digital filter at or beyond half of its rate', () => {
  it.each([
    ['{ response: butterworth, order: 2, cutoff: 500 Hz }', 1],
    ['{ response: butterworth, order: 2, cutoff: 499 Hz }', 0],
    ['{ response: butterworth, order: 2, cutoff: 0.5 fs }', 1],
    ['{ response: kaiser, pass: 100 Hz, stop: 500 Hz, stopband: 60 dB }', 0],
    ['{ response: kaiser, pass: 100 Hz, stop: 501 Hz, stopband: 60 dB }', 1],
    ['{ response: half-band, pass: 250 Hz, stopband: 60 dB }', 1],
    ['{ response: half-band, pass: 240 Hz, stopband: 60 dB }', 0],
  ])('is out of range: %s', (filter, count) => {
    const text = `rig: Test\nfilters: { f: ${filter} }\nchannels:\n  a: { rate: 1000 Hz, band: 1 Hz .. 10 Hz, undeclared: -90 dBFS, flatness: 90 dB, then: [{ decimate: 2, filter: f }] }\n`;
    const findings = found(text, 'out-of-range');
    expect(findings).toHaveLength(count);
    if (count > 0) {
      expect(findings[0]).toMatchObject({ severity: 'error', channel: 'a', about: 'f', stage: 2 });
      expect(underlined(findings[0]!)).toBe('f');
    }
  });

  it('is said of a decimation filter at the rate of the channel', () => {
    const text =
      'rig: Test\ndigitizers: { d: { modulator: 4 fs, decimation-filter: { response: butterworth, order: 2, cutoff: 2 fs } } }\nchannels:\n  a: { digitizer: d, rate: 1000 Hz, band: 1 Hz .. 10 Hz, undeclared: -90 dBFS }\n';
    expect(underlined(only(text, 'out-of-range'))).toBe('1000 Hz');
  });

  it('is said of a filter behind the last decimation', () => {
    const text =
      'rig: Test\nchannels:\n  a: { rate: 1000 Hz, band: 1 Hz .. 10 Hz, undeclared: -90 dBFS, then: [{ filter: { response: butterworth, order: 2, cutoff: 600 Hz } }] }\n';
    expect(only(text, 'out-of-range')).toMatchObject({ about: 'filter', stage: 2 });
  });
});
