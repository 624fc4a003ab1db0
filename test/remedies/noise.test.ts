import { describe, expect, it } from 'vitest';
import { found } from '../checks/judged.ts';
import { afterwards, offered } from './offered.ts';

/** What is offered for a check, by name. */
function titles(text: string, check: string): Record<string, string> {
  return Object.fromEntries(offered(text, check).map(({ name, title }) => [name, title]));
}

/** The text after the one remedy of a name. */
function curedBy(text: string, check: string, name: string): string {
  const remedy = offered(text, check).find((one) => one.name === name);
  expect(remedy, `${name} for ${check}`).toBeDefined();
  return afterwards(text, remedy!);
}

function rig(channel: string, digitizer = ''): string {
  return `rig: R
digitizers:
  d: { full-scale: ±10 V, rates: [20 kHz, 25 kHz, 50 kHz, 100 kHz], ranges: [±10 V, ±5 V, ±1 V, ±0.1 V]${digitizer} }
filters:
  card: { response: butterworth, order: 2, cutoff: 6 kHz }
sources:
  hiss: { noise: 100 uV/rtHz, spans: 10 Hz .. 45 kHz }
defaults: { undeclared: -120 dBFS, flatness: 3 dB, fold-limit: -70 dBFS }
channels:
  a:
    measures: voltage
    digitizer: d
    rate: 20 kHz
    band: 10 Hz .. 4 kHz
${channel.replace(/^(?=.)/gm, '    ')}
`;
}

describe('noise that folds', () => {
  // Unfiltered, 16 .. 24 kHz and 36 .. 44 kHz fold: 100 uV/rtHz over 16 kHz is 12.6 mV rms, -54.9 dBFS.
  const bare = rig('');

  it('is left above the band by a rate that is twice as high as it reaches', () => {
    // At 50 kS/s, 46 .. 54 kHz would fold, and it ends at 45 kHz.
    expect(titles(bare, 'noise-folds')['sample-faster']).toMatch(
      /^Sample at 50 kHz: -\S+ dBFS of noise fold into the band \(data x2\.5\)$/,
    );
    const cured = curedBy(bare, 'noise-folds', 'sample-faster');
    expect(cured).toContain('rate: 50 kHz');
    expect(found(cured, 'noise-folds')).toEqual([]);
  });

  it('is filtered, by a filter that is added or made steeper', () => {
    const added = curedBy(bare, 'noise-folds', 'add-filter');
    expect(added).toMatch(/filter: \{ response: butterworth, order: \d/);
    const filtered = rig('filter: card').replace('fold-limit: -70', 'fold-limit: -90');
    const steeper = curedBy(filtered, 'noise-folds', 'steeper-filter');
    expect(steeper).toMatch(/card: \{ response: butterworth, order: [3-9], /);
    for (const text of [added, steeper]) expect(found(text, 'noise-folds')).toEqual([]);
  });

  it('at a step is filtered there, or the step made smaller', () => {
    // 2 mV over 10 kHz at 20 kS/s, kept every 8th: seven eighths of it fold, -71 dBFS.
    const text = rig('then: [{ decimate: 8 }]\nhears: none', ', noise: 2 mV')
      .replace('4 kHz\n', '500 Hz\n')
      .replace('fold-limit: -70', 'fold-limit: -80');
    const offers = titles(text, 'noise-folds');
    expect(Object.keys(offers)).toEqual(expect.arrayContaining(['filter-the-step', 'decimate-less']));
    expect(found(curedBy(text, 'noise-folds', 'filter-the-step'), 'noise-folds')).toEqual([]);
  });
});

describe('a step that is too coarse', () => {
  it('is made finer by the least sensitive range that is fine enough', () => {
    // 20 V / 4096 = 4.88 mV; ±5 V has 2.44 mV.
    const text = rig('resolve: 3 mV\npeak: 50 mV\nhears: none', ', bits: 12');
    expect(titles(text, 'step-too-coarse')['choose-range']).toBe('Use the ±5 V range: full scale x0.5');
    expect(found(curedBy(text, 'step-too-coarse', 'choose-range'), 'step-too-coarse')).toEqual([]);
  });

  it('is not made finer by a range that is too small, or that may be', () => {
    const text = (peak: string) => rig(`resolve: 1 mV\n${peak}\nhears: none`, ', bits: 12');
    expect(titles(text('peak: 0.5 V'), 'step-too-coarse')['choose-range']).toBe('Use the ±1 V range: full scale x0.1');
    expect(titles(text('peak: 5 V'), 'step-too-coarse')).not.toHaveProperty('choose-range');
    expect(titles(text(''), 'step-too-coarse')).not.toHaveProperty('choose-range');
  });

  it('is made finer by a gain as well', () => {
    const text = rig('resolve: 3 mV\npeak: 50 mV\nhears: none', ', bits: 12, gains: [1, 2, 10]');
    expect(offered(text, 'step-too-coarse').map(({ title }) => title)).toContain('Use a gain of 2: full scale x0.5');
  });

  it('where it is noise is helped by a higher rate, which spreads the noise of the input', () => {
    // 1 mV rms over 10 kHz: 0.63 mV in 4 kHz, as a sinusoid of 0.89 mV; at 50 kS/s 0.4 mV, 0.57 mV.
    const text = rig('resolve: 0.6 mV\nhears: none', ', noise: 1 mV');
    expect(titles(text, 'step-too-coarse')['sample-faster']).toMatch(
      /^Sample at 50 kHz: the noise in the band is -84\.9\d? dBFS/,
    );
  });
});

describe('jitter', () => {
  it('is spread by a higher rate, or matters less in a narrower band', () => {
    // 2 pi 4 kHz 10 ns of 7 V: -75.1 dBFS, less 10 log10(10 / 4) = 3.98 dB.
    const text = rig('peak: 7 V\nhears: none', ', jitter: 10 ns').replace('fold-limit: -70', 'fold-limit: -81');
    const offers = titles(text, 'jitter-limited');
    expect(offers['sample-faster']).toMatch(/^Sample at 50 kHz: the noise in the band is -83\.\d+ dBFS/);
    expect(offers['narrow-band']).toMatch(/^If the test allows: use the band only up to 3\.\d+ kHz/);
  });
});
