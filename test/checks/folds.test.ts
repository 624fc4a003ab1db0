import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { findingsOf, found, names, only, underlined } from './judged.ts';

const fan = readFileSync(new URL('../published/extract-fan.rig.yaml', import.meta.url), 'utf8');

/** A rig of one channel at 1 kHz with a full scale of 1 V. */
function rig(channel: string, sources = '', more = ''): string {
  return `rig: Test
digitizers: { d: { full-scale: ±1 V } }
filters:
  steep: { response: elliptic, order: 8, ripple: 0.1 dB, stopband: 100 dB, pass-edge: 200 Hz }
  weak: { response: rc, order: 1, corner: 200 Hz }
  tidy: { response: kaiser, pass: 0.05 fs, stop: 0.15 fs, stopband: 90 dB }
sources: {${sources}}
${more}channels:
  one:
    digitizer: d
    rate: 1000 Hz
    band: 10 Hz .. 100 Hz
${channel.replace(/^(?=.)/gm, '    ')}
`;
}

/** Leaves out the names that a fixture does not use. */
function said(text: string): readonly string[] {
  return names(findingsOf(text)).filter((name) => name !== 'unused-name');
}

describe('the fan example', () => {
  const findings = findingsOf(fan);

  it('has one error, two warnings and one hint', () => {
    expect(findings.map(({ severity, check }) => `${severity} ${check}`)).toEqual([
      'hint unused-name',
      'error fold-in-band',
      'warning band-droop',
      'warning resonance-in-band',
    ]);
  });

  it('has the inverter recorded at 9.6 kHz at -64.08 dBFS', () => {
    const fold = only(fan, 'fold-in-band');
    expect(fold.figures).toEqual({ recordedHz: 9600, levelDbfs: expect.closeTo(-64.083, 3), limitDbfs: -80, stage: 1 });
    expect(fold).toMatchObject({ channel: 'bearing-drive-end', about: 'inverter', stage: 1 });
    expect(fold.excess).toBeCloseTo(15.917, 3);
    expect(underlined(fold)).toBe('25.6 kHz');
    expect(fold.related.map(underlined)).toEqual(['inverter', 'card']);
    expect(fold.message).toBe(
      '`inverter` will be recorded at 9.6 kHz, inside the band, though its carrier is at 16 kHz. There it is -64.08 dBFS, 15.9 dB over the fold limit of -80 dBFS. With it: sideband -1 at 9.65 kHz, sideband +1 at 9.55 kHz, sideband -2 at 9.7 kHz and sideband +2 at 9.5 kHz.',
    );
  });

  it('sags 11.9 dB and is lifted 1.28 dB at 10 kHz', () => {
    expect(only(fan, 'band-droop').figures).toMatchObject({ sagDb: expect.closeTo(11.918, 3), atHz: 10_000 });
    expect(underlined(only(fan, 'band-droop'))).toBe('card');
    expect(only(fan, 'resonance-in-band').figures).toMatchObject({ liftDb: expect.closeTo(1.2806, 3), atHz: 10_000 });
  });

  it('has a filter that nobody names', () => {
    expect(only(fan, 'unused-name')).toMatchObject({ thing: 'filters/tidy', channel: undefined });
  });
});

describe('fold-in-band', () => {
  it('is one finding for a source and stage, the highest line speaking', () => {
    const text = rig('filter: steep', 's: { frequency: 950 Hz, harmonics: 2, level: [-110 dBFS, -50 dBFS] }').replace(
      'pass-edge: 200 Hz',
      'pass-edge: 3 kHz',
    );
    const fold = only(text, 'fold-in-band');
    // The second harmonic, 1900 Hz, is recorded at 100 Hz.
    expect(fold.figures).toMatchObject({ recordedHz: 100, stage: 1 });
    expect(fold.message).toContain('its harmonic 2 is at 1.9 kHz');
    expect(fold.message).not.toContain('With it');
  });

  it('is one for each stage at which a source folds', () => {
    const text = rig('then: [{ decimate: 4 }]', 's: { frequency: 310 Hz, harmonics: 3, level: -20 dBFS }');
    // 310 Hz folds at the second stage to 60 Hz; 620 Hz and 930 Hz at the first, to 380 and 70 Hz, and on to 120 and 70 Hz.
    expect(
      found(text, 'fold-in-band').map(({ about, stage, figures }) => [about, stage, figures['recordedHz']]),
    ).toEqual([
      ['s', 1, 70],
      ['s', 2, 60],
    ]);
    expect(found(text, 'fold-in-band').map(underlined)).toEqual(['1000 Hz', '4']);
    expect(found(text, 'fold-in-band')[1]!.message).toContain('It folds where every 4th sample is kept (250 Hz).');
  });

  it('is not said of what is native, off the band, or under the limit', () => {
    for (const source of [
      'frequency: 50 Hz, level: 1 V',
      'frequency: 800 Hz, level: 1 V',
      'frequency: 950 Hz, level: 0.001 V',
    ]) {
      expect(found(rig('', `s: { ${source} }`), 'fold-in-band')).toEqual([]);
    }
    expect(found(rig('', 's: { frequency: 950 Hz, level: 0.00101 V }'), 'fold-in-band')).toHaveLength(1);
  });

  it('stands on the name of a channel that inherits its rate, and relates where that comes from', () => {
    const text = rig('filter: steep', 's: { frequency: 950 Hz, level: 1 V }', 'defaults:\n  rate: 1000 Hz\n')
      .replace('    rate: 1000 Hz\n', '')
      .replace('stopband: 100 dB', 'stopband: 20 dB');
    const fold = only(text, 'fold-in-band');
    expect(underlined(fold)).toBe('one');
    expect(underlined(fold.related[0]!)).toMatch(/1000 Hz/);
  });

  it('keeps quiet where a filter on the way is not known', () => {
    const text = rig('filter: unknown', 's: { frequency: 950 Hz, level: 1 V }');
    expect(said(text)).toEqual(['unknown-name unknown']);
  });

  it('is told in volts, or in the measured unit, where there is no full scale', () => {
    const source = 's: { frequency: 950 Hz, level: 20 mV }';
    const volts = only(rig('fold-limit: 10 mV', source).replace('full-scale: ±1 V', 'bits: 16'), 'fold-in-band');
    expect(volts.figures).toEqual({
      recordedHz: 50,
      levelDbVolt: expect.closeTo(-33.979, 3),
      limitDbVolt: -40,
      stage: 1,
    });
    expect(volts.message).toContain('There it is 20 mV, 6.02 dB over the fold limit of 10 mV.');
    const measured = only(
      rig('fold-limit: 1 g\nmeasures: acceleration', 's: { frequency: 950 Hz, level: 2 g, enters: wiring }').replace(
        'full-scale: ±1 V',
        'bits: 16',
      ),
      'fold-in-band',
    );
    expect(Object.keys(measured.figures)).toEqual(['recordedHz', 'levelDbMeasured', 'limitDbMeasured', 'stage']);
    expect(measured.excess).toBeCloseTo(20 * Math.log10(2), 9);
  });
});

describe('fold-unlevelled', () => {
  it('says what was assumed', () => {
    const none = only(rig('', 's: { frequency: 950 Hz }'), 'fold-unlevelled');
    expect(none).toMatchObject({ severity: 'warning', about: 's', stage: 1 });
    expect(none.message).toContain('There it would be 0 dBFS, 60 dB over the fold limit of -60 dBFS.');
    expect(none.message).toContain('It has no level, so full scale is assumed.');
    const unplaced = only(
      rig('hears: [s]\nmeasures: strain\nsensitivity: 1 mV/ue', 's: { frequency: 950 Hz, level: 1 g }'),
      'fold-unlevelled',
    );
    expect(unplaced.message).toContain("Its level can't be placed on this channel");
  });

  it('is not said of a source whose level is known', () => {
    expect(found(rig('', 's: { frequency: 950 Hz, level: 1 V }'), 'fold-unlevelled')).toEqual([]);
  });
});

describe('what is said of the filtering', () => {
  it('is no-filter where nothing stands before the converter', () => {
    expect(said(rig(''))).toEqual(['no-filter']);
    expect(underlined(only(rig('filter: none'), 'no-filter'))).toBe('none');
    expect(underlined(only(rig(''), 'no-filter'))).toBe('1000 Hz');
    // AC coupling keeps out nothing that folds.
    expect(said(rig('').replace('full-scale: ±1 V', 'full-scale: ±1 V, low-corner: 0.1 Hz'))).toEqual(['no-filter']);
  });

  it('is filter-short where the filter takes too little off', () => {
    const short = only(rig('filter: weak\nflatness: 2 dB'), 'filter-short');
    expect(short.figures).toMatchObject({ atHz: 900, attenuationDb: expect.closeTo(10 * Math.log10(1 + 4.5 ** 2), 6) });
    expect(underlined(short)).toBe('weak');
  });

  it('is thin-margin instead where the margin at that stage is under 1.28', () => {
    const text = rig('filter: weak\nflatness: 20 dB').replace('.. 100 Hz', '.. 400 Hz');
    expect(said(text)).toEqual(['thin-margin']);
    expect(only(text, 'thin-margin').figures).toMatchObject({ margin: 1.25, usualMargin: 1.28 });
  });

  it('is filter-short at a margin of 1.28 exactly', () => {
    const text = rig('filter: weak\nflatness: 20 dB').replace('.. 100 Hz', '.. 390.625 Hz');
    expect(said(text)).toEqual(['filter-short']);
  });

  it('is nothing where the filter is enough, or what is undeclared is known to be little', () => {
    expect(said(rig('filter: steep'))).toEqual([]);
    expect(said(rig('undeclared: -60 dBFS'))).toEqual([]);
    expect(said(rig('filter: weak\nflatness: 2 dB\nundeclared: -50 dBFS'))).toEqual([]);
  });

  it('is nothing where a declared source folds into the band, which says it better', () => {
    expect(said(rig('', 's: { frequency: 950 Hz, level: 1 V }'))).toEqual(['fold-in-band s']);
    expect(said(rig('filter: weak\nflatness: 2 dB', 's: { frequency: 950 Hz, level: 1 V }'))).toEqual([
      'fold-in-band s',
    ]);
  });

  it('is at most no-filter where the band does not fit below the Nyquist frequency', () => {
    expect(said(rig('filter: weak\nflatness: 20 dB').replace('.. 100 Hz', '.. 500 Hz'))).toEqual(['band-over-nyquist']);
  });

  describe('with a modulator', () => {
    const modulator =
      'full-scale: ±1 V, modulator: 64 fs, decimation-filter: { response: kaiser, pass: 0.3 fs, stop: 0.6 fs, stopband: 90 dB }';

    it('is a hint at its own stage until it is stated what is undeclared', () => {
      const text = rig('').replace('full-scale: ±1 V', modulator);
      expect(only(text, 'filter-short')).toMatchObject({ severity: 'hint', stage: 1 });
      expect(only(text, 'filter-short').message).toContain('It folds at the modulator (64 kHz).');
      expect(found(text, 'no-filter')).toEqual([]);
      const stated = rig('undeclared: -20 dBFS').replace('full-scale: ±1 V', modulator);
      expect(only(stated, 'filter-short')).toMatchObject({ severity: 'warning', stage: 1 });
      expect(said(rig('undeclared: -70 dBFS').replace('full-scale: ±1 V', modulator))).toEqual([]);
    });

    it('is a warning where its decimation lets something through', () => {
      const text = rig('').replace('full-scale: ±1 V', modulator.replace('stopband: 90 dB', 'stopband: 40 dB'));
      expect(only(text, 'filter-short')).toMatchObject({ severity: 'warning', stage: 2 });
      expect(underlined(only(text, 'filter-short'))).toBe('1000 Hz');
    });
  });
});

describe('step-without-filter', () => {
  it('is said of a step that keeps every so-manyth sample as it is', () => {
    const text = rig('filter: steep\nthen: [{ decimate: 4 }]').replace('.. 100 Hz', '.. 60 Hz');
    expect(said(text)).toEqual(['step-without-filter']);
    const finding = only(text, 'step-without-filter');
    expect(finding).toMatchObject({ stage: 2 });
    // 190 to 200 Hz, which the filter passes, is recorded at 60 to 50 Hz.
    expect(finding.figures['atHz']).toBeGreaterThanOrEqual(190);
    expect(finding.figures['atHz']).toBeLessThanOrEqual(200);
    expect(finding.figures['levelDbfs']).toBeCloseTo(0, 3);
    expect(underlined(finding)).toBe('4');
  });

  it('names the declared source that comes through highest', () => {
    const text = rig(
      'filter: steep\nundeclared: -70 dBFS\nthen: [{ decimate: 4 }]',
      's: { frequency: 200 Hz, level: 0.1 V }',
    ).replace('.. 100 Hz', '.. 60 Hz');
    expect(said(text)).toEqual(['fold-in-band s', 'step-without-filter']);
    expect(only(text, 'step-without-filter').message).toContain('Of `s` at 200 Hz');
  });

  it('is not said where a filter stands ahead of the step, or nothing is there to fold', () => {
    const band = (text: string): string => text.replace('.. 100 Hz', '.. 40 Hz');
    expect(said(band(rig('filter: steep\nthen: [{ decimate: 4, filter: tidy }]')))).toEqual([]);
    expect(said(band(rig('filter: steep\nthen: [{ filter: tidy }, { decimate: 4 }]')))).toEqual([]);
    expect(said(band(rig('undeclared: -60 dBFS\nthen: [{ decimate: 4 }]')))).toEqual([]);
  });

  it('leaves a filter that is too weak to filter-short', () => {
    const text = rig('filter: steep\nflatness: 3 dB\nthen: [{ decimate: 4, filter: weak }]').replace(
      '.. 100 Hz',
      '.. 60 Hz',
    );
    expect(only(text, 'filter-short')).toMatchObject({ stage: 2 });
    expect(underlined(only(text, 'filter-short'))).toBe('weak');
  });
});

describe('on-nyquist', () => {
  it('is said of a source that may stand on a multiple of half the rate, with the band there', () => {
    const text = rig('', 's: { frequency: 999 Hz, tolerance: 0.2 %, level: 1 V }').replace('10 Hz ..', '0 Hz ..');
    expect(only(text, 'on-nyquist')).toMatchObject({ severity: 'warning', about: 's', stage: 1 });
    expect(only(text, 'on-nyquist').figures).toMatchObject({ trueHz: 999, levelDbfs: 0 });
  });

  it('is not said a tolerance away from it, of what sweeps past, under the limit, or off the band', () => {
    const wide = (text: string): string => text.replace('10 Hz ..', '0 Hz ..');
    expect(found(wide(rig('', 's: { frequency: 997 Hz, tolerance: 0.2 %, level: 1 V }')), 'on-nyquist')).toEqual([]);
    expect(found(wide(rig('', 's: { frequency: 900 .. 1100 Hz, level: 1 V }')), 'on-nyquist')).toEqual([]);
    expect(found(wide(rig('', 's: { frequency: 1000 Hz, level: -60 dBFS }')), 'on-nyquist')).toEqual([]);
    expect(found(rig('', 's: { frequency: 1000 Hz, level: 1 V }'), 'on-nyquist')).toEqual([]);
    expect(found(wide(rig('', 's: { frequency: 1500 Hz, level: 1 V }')), 'on-nyquist')).toEqual([]);
  });

  it('is said at the stage where it is, though it is recorded elsewhere in the end', () => {
    // 125 Hz is the Nyquist frequency of the second stage, and folds to 0 Hz at the third.
    const text = rig(
      'undeclared: -90 dBFS\nthen: [{ decimate: 4 }, { decimate: 2 }]',
      's: { frequency: 125 Hz, level: 1 V }',
    ).replace('10 Hz .. 100 Hz', '0 Hz .. 50 Hz');
    expect(found(text, 'on-nyquist').map(({ stage }) => stage)).toEqual([2]);
    expect(underlined(only(text, 'on-nyquist'))).toBe('4');
  });

  it('counts the tolerance of the clock', () => {
    const source = 's: { frequency: 1000.05 Hz, level: 1 V }';
    const clocked = (ppm: number): string =>
      rig('', source, `clocks: { c: { frequency: 1 MHz, tolerance: ${ppm} ppm } }\n`)
        .replace('full-scale: ±1 V', 'full-scale: ±1 V, clock: c')
        .replace('10 Hz ..', '0 Hz ..');
    expect(found(clocked(40), 'on-nyquist')).toEqual([]);
    expect(found(clocked(60), 'on-nyquist')).toHaveLength(1);
  });
});
