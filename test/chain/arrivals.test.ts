import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { recordedAtHz } from '../../server/src/chain/arrivals.ts';
import { componentsOf, MOST_COMPONENTS } from '../../server/src/chain/components.ts';
import { runs } from '../tools/runs.ts';
import { arrival, arrivalsOfText, chainOfText, channelsOf } from './rig.ts';

function rig({ source, channel = '', digitizer = 'full-scale: ±1 V', filters = '' }: Record<string, string>): string {
  return `rig: Test
clocks: { c: { frequency: 1 MHz, tolerance: 100 ppm } }
digitizers: { d: { ${digitizer} } }
filters: { f: { response: butterworth, order: 4, cutoff: 400 Hz }${filters} }
sources: { s: { ${source} } }
channels:
  one:
    digitizer: d
    rate: 1000 Hz
    band: 10 Hz .. 300 Hz
${channel.replace(/^(?=.)/gm, '    ')}
`;
}

function shown(text: string): readonly string[] {
  return arrivalsOfText(text).map(
    ({ component, recordedLowHz, recordedHighHz, level }) =>
      `${component} ${recordedLowHz}..${recordedHighHz} ${level.toFixed(2)}`,
  );
}

describe('the fan example', () => {
  const arrivals = arrivalsOfText(
    readFileSync(new URL('../published/extract-fan.rig.yaml', import.meta.url), 'utf8').replace(/^ {2}tidy.*\n/m, ''),
  );

  it('has its carrier folded to 9.6 kHz, 27.96 dB below full scale less 36.12 dB of filter', () => {
    const carrier = arrival(arrivals, 'inverter', 'carrier');
    expect(carrier).toMatchObject({ trueLowHz: 16_000, trueHighHz: 16_000, recordedLowHz: 9600, recordedHighHz: 9600 });
    expect(carrier).toMatchObject({ folded: true, foldsAtStage: 1, mirrored: true, inBand: true, overLimit: true });
    expect(carrier.level).toBeCloseTo(20 * Math.log10(0.4 / 10) - 36.1246596, 6);
    expect(carrier.attenuationDb).toBeCloseTo(10 * Math.log10(1 + 2 ** 12), 9);
  });

  it('has the sidebands at 9.5, 9.55, 9.65 and 9.7 kHz', () => {
    const at = (label: string): number => arrival(arrivals, 'inverter', `sideband ${label}`).recordedLowHz;
    expect(['+2', '+1', '-1', '-2'].map(at)).toEqual([9500, 9550, 9650, 9700]);
  });

  it('has the blade pass where it is, the sensor lifting it', () => {
    const third = arrival(arrivals, 'blade-pass', 'harmonic 3');
    expect(third).toMatchObject({
      trueLowHz: 270,
      trueHighHz: 1350,
      recordedHighHz: 1350,
      folded: false,
      foldsAtStage: null,
    });
    const u = 1350 / 27_000;
    const liftDb = -10 * Math.log10((1 - u * u) ** 2 + (u / 30) ** 2);
    const fallDb = 6 * Math.log2(3);
    expect(third.level).toBeCloseTo(20 * Math.log10(0.2 / 10) - fallDb + liftDb, 6);
    expect(third.inBand).toBe(true);
    expect(third.overLimit).toBe(false);
  });
});

describe('components', () => {
  it('of a rotating source are multiples of order times speed', () => {
    const [one] = channelsOf(rig({ source: 'order: 3, speed: 600..1200 rpm, harmonics: 2, tolerance: 10 %' }));
    expect(componentsOf(one!.heard[0]!.source).map(({ label, lowHz, highHz }) => [label, lowHz, highHz])).toEqual([
      ['fundamental', 27, 66],
      ['harmonic 2', 54, 132],
    ]);
  });

  it('of a modulated source are carriers and their sidebands, below 0 Hz turned back', () => {
    const [one] = channelsOf(
      rig({ source: 'carrier: 100 Hz, modulation: 30..60 Hz, sidebands: 2, harmonics: 2, sidebands-fall: 6 dB' }),
    );
    expect(
      componentsOf(one!.heard[0]!.source).map(({ label, lowHz, highHz, belowDb }) => [label, lowHz, highHz, belowDb]),
    ).toEqual([
      ['carrier', 100, 100, 0],
      ['sideband -1', 40, 70, 6],
      ['sideband +1', 130, 160, 6],
      ['sideband -2', 0, 40, 12],
      ['sideband +2', 160, 220, 12],
      ['carrier x2', 200, 200, 0],
      ['carrier x2 sideband -1', 140, 170, 6],
      ['carrier x2 sideband +1', 230, 260, 6],
      ['carrier x2 sideband -2', 80, 140, 12],
      ['carrier x2 sideband +2', 260, 320, 12],
    ]);
  });

  it('are bounded: what is too much stands as one range at the highest of its levels', () => {
    const [one] = channelsOf(
      rig({ source: 'carrier: 1 MHz, modulation: 1 Hz, sidebands: 1000, harmonics: 1000, sidebands-fall: 1 dB' }),
    );
    const components = componentsOf(one!.heard[0]!.source);
    expect(components).toHaveLength(MOST_COMPONENTS);
    const last = components[components.length - 1]!;
    expect(last.label).toMatch(/ and more$/);
    expect(last.highHz).toBe(1e9 + 1000);
    expect(last.belowDb).toBe(0);
  });
});

describe('levels', () => {
  it('fall with the harmonics, from the last that is given', () => {
    expect(shown(rig({ source: 'frequency: 20 Hz, harmonics: 4, level: [1 V, 0.1 V], falls: 6 dB/oct' }))).toEqual([
      'fundamental 20..20 0.00',
      'harmonic 2 40..40 -20.00',
      'harmonic 3 60..60 -23.51',
      'harmonic 4 80..80 -26.00',
    ]);
  });

  it('are what the channel says of its own, for the fundamental', () => {
    const source = 'frequency: 20 Hz, harmonics: 2, level: [1 V, 0.1 V], falls: 6 dB/oct';
    expect(shown(rig({ source, channel: 'hears: { s: 0.5 V }' }))).toEqual([
      'fundamental 20..20 -6.02',
      'harmonic 2 40..40 -12.02',
    ]);
  });

  it('of none are full scale, and known to be assumed', () => {
    const arrivals = arrivalsOfText(rig({ source: 'frequency: 20 Hz' }));
    expect(arrivals[0]).toMatchObject({ level: 0, levelKnown: false });
    const known = arrivalsOfText(rig({ source: 'frequency: 20 Hz, level: -3 dBFS' }));
    expect(known[0]).toMatchObject({ level: -3, levelKnown: true });
  });

  it('in the measured unit pass the sensor, unless they enter in the wiring', () => {
    const channel = 'measures: acceleration\nsensitivity: 100 mV/(m/s2)\nresonance: 200 Hz\nq: 10\n';
    const source = 'frequency: 200 Hz, level: 1 m/s2';
    // 0.1 V below 1 V, lifted by q.
    expect(shown(rig({ source, channel }))).toEqual(['fundamental 200..200 0.00']);
    expect(shown(rig({ source: `${source}, enters: wiring`, channel }))).toEqual(['fundamental 200..200 -20.00']);
    expect(shown(rig({ source: 'frequency: 200 Hz, level: 0.1 V', channel }))).toEqual(['fundamental 200..200 -20.00']);
  });

  it('in volts enter at the sensor of a channel that measures volts', () => {
    const channel = 'measures: voltage\nsensitivity: 10 mV/V\n';
    expect(shown(rig({ source: 'frequency: 200 Hz, level: 10 V', channel }))).toEqual(['fundamental 200..200 -20.00']);
    expect(shown(rig({ source: 'frequency: 200 Hz, level: 10 V, enters: wiring', channel }))).toEqual([
      'fundamental 200..200 20.00',
    ]);
  });

  it('are reckoned with the worst of a filter tolerance', () => {
    const plain = arrivalsOfText(rig({ source: 'frequency: 800 Hz, level: 1 V', channel: 'filter: f' }))[0]!;
    const filters = ', t: { response: butterworth, order: 4, cutoff: 400 Hz, tolerance: 10 % }';
    const loose = arrivalsOfText(rig({ source: 'frequency: 800 Hz, level: 1 V', channel: 'filter: t', filters }))[0]!;
    expect(plain.attenuationDb).toBeCloseTo(10 * Math.log10(1 + 2 ** 8), 9);
    expect(loose.attenuationDb).toBeCloseTo(10 * Math.log10(1 + (2 / 1.1) ** 8), 9);
  });
});

describe('ranges', () => {
  it('are split where they fold, and keep which true frequencies each piece came from', () => {
    const arrivals = arrivalsOfText(rig({ source: 'frequency: 400 .. 1100 Hz, level: 1 V' }));
    expect(
      arrivals.map((one) => [one.trueLowHz, one.trueHighHz, one.recordedLowHz, one.recordedHighHz, one.mirrored]),
    ).toEqual([
      [400, 500, 400, 500, false],
      [500, 1000, 0, 500, true],
      [1000, 1100, 0, 100, false],
    ]);
    expect(arrivals.map(({ inBand, overLimit }) => [inBand, overLimit])).toEqual([
      [false, false],
      [true, true],
      [true, true],
    ]);
  });

  it('have the level of the part that lands in the band, where some does', () => {
    // 650 to 950 Hz is recorded at 350 to 50 Hz; of it, 700 Hz upward is in the band.
    const text = rig({ source: 'frequency: 650 .. 950 Hz, level: 1 V', channel: 'filter: f' });
    const [piece] = arrivalsOfText(text);
    expect(piece!.atHz).toBeCloseTo(700, 9);
    expect(piece!.level).toBeCloseTo(-10 * Math.log10(1 + 1.75 ** 8), 6);
    expect(recordedAtHz(piece!, chainOfText(text))).toBeCloseTo(300, 9);
  });

  it('have the highest of all where none lands in the band', () => {
    const [piece] = arrivalsOfText(rig({ source: 'frequency: 650 .. 690 Hz, level: 1 V', channel: 'filter: f' }));
    expect(piece!.inBand).toBe(false);
    expect(piece!.atHz).toBe(650);
  });

  it('of very many pieces are one arrival for each stage at which they first fold', () => {
    const arrivals = arrivalsOfText(rig({ source: 'frequency: 1 Hz .. 10 GHz, level: 1 V' }));
    expect(arrivals).toHaveLength(2);
    expect(arrivals.at(-1)).toMatchObject({ recordedLowHz: 0, recordedHighHz: 500, trueHighHz: 1e10, overLimit: true });
  });
});

describe('decimation', () => {
  const filters = ', m: { response: moving-average, length: 5 }';

  it('folds again at the new rate, and names the stage', () => {
    const source = 'frequency: 210 Hz, level: 1 V';
    const [one] = arrivalsOfText(rig({ source, channel: 'then: [{ decimate: 5 }]' }));
    expect(one).toMatchObject({ recordedLowHz: 10, foldsAtStage: 2, mirrored: false, folded: true, level: 0 });
  });

  it('keeps the first stage at which it folded, and whether the whole turns the axis', () => {
    const source = 'frequency: 790 Hz, level: 1 V';
    const [one] = arrivalsOfText(rig({ source, channel: 'then: [{ decimate: 5, filter: m }]', filters }));
    // 790 Hz is 210 Hz at 1000 Hz, mirrored, and 10 Hz at 200 Hz.
    expect(one).toMatchObject({ recordedLowHz: 10, foldsAtStage: 1, mirrored: true });
    const x = (Math.PI * 210) / 1000;
    expect(one!.attenuationDb).toBeCloseTo(-20 * Math.log10(Math.abs(Math.sin(5 * x) / (5 * Math.sin(x)))), 9);
  });

  // Common practice: a cosine of 1 Hz at 100 samples per second, kept every 5th, has images at 1, 19, 21, 39, ... Hz.
  it('of 100 samples per second to every 5th brings 19, 21, 39, 41, 59, 61, 79, 81 and 99 Hz to 1 Hz', () => {
    for (const hz of [1, 19, 21, 39, 41, 59, 61, 79, 81, 99]) {
      const text = rig({ source: `frequency: ${hz} Hz, level: 1 V` })
        .replace('rate: 1000 Hz', 'rate: 100 Hz\n    then: [{ decimate: 5 }]')
        .replace('10 Hz .. 300 Hz', '0.5 Hz .. 8 Hz');
      const [one] = arrivalsOfText(text);
      expect(one).toMatchObject({ inBand: true, folded: hz !== 1 });
      expect(one!.recordedLowHz).toBeCloseTo(1, 9);
    }
  });

  it('brings constants to 0 Hz from 0, 20, 40, 60 and 80 Hz', () => {
    for (const hz of [20, 40, 60, 80]) {
      const text = rig({ source: `frequency: ${hz} Hz, level: 1 V` }).replace(
        'rate: 1000 Hz',
        'rate: 100 Hz\n    then: [{ decimate: 5 }]',
      );
      expect(arrivalsOfText(text)[0]!.recordedLowHz).toBe(0);
    }
  });
});

describe('the tolerance of the clock', () => {
  it('widens where an arrival may be recorded by what it was folded about', () => {
    const digitizer = 'full-scale: ±1 V, clock: c';
    const at = (hz: number) => arrivalsOfText(rig({ source: `frequency: ${hz} Hz, level: 1 V`, digitizer }))[0]!;
    expect(at(200).recordedSlackHz).toBe(0);
    expect(at(699.95).recordedSlackHz).toBeCloseTo(0.1, 9);
    // Recorded at 300.05 Hz, which 100 ppm of 1000 Hz may bring into a band up to 300 Hz.
    expect(at(699.95)).toMatchObject({ inBand: true, overLimit: true });
    expect(at(699.85).inBand).toBe(false);
    expect(at(2301).recordedSlackHz).toBeCloseTo(0.2, 9);
  });

  it('counts at every stage alike', () => {
    const digitizer = 'full-scale: ±1 V, clock: c';
    const source = 'frequency: 790 Hz, level: 1 V';
    const [one] = arrivalsOfText(rig({ source, digitizer, channel: 'then: [{ decimate: 5 }]' }));
    // 790 Hz and 10 Hz are folded about 800 Hz, four times the last rate.
    expect(one!.recordedSlackHz).toBeCloseTo(0.08, 9);
  });
});

describe('sharing', () => {
  const filter = '{ response: elliptic, order: 5, ripple: 0.3 dB, stopband: 55 dB, pass-edge: 200 Hz }';

  it('of what channels have in common changes no answer', () => {
    fc.assert(
      fc.property(
        fc.record({
          bands: fc.array(fc.tuple(fc.integer({ min: 0, max: 200 }), fc.integer({ min: 201, max: 480 })), {
            minLength: 1,
            maxLength: 40,
          }),
          limit: fc.integer({ min: -90, max: -30 }),
          source: fc.constantFrom(
            'frequency: 300 .. 900 Hz, harmonics: 3, level: 0.3 V, falls: 6 dB/oct',
            'carrier: 1.3 kHz, modulation: 20 .. 90 Hz, sidebands: 3, level: 1 m/s2',
            'frequency: 650 Hz, tolerance: 5 %, harmonics: 5',
          ),
          sensitivity: fc.integer({ min: 1, max: 500 }),
        }),
        ({ bands, limit, source, sensitivity }) => {
          const channels = (text: string): string =>
            bands
              .map(
                ([low, high], index) =>
                  `  c${index}: { digitizer: d, rate: 1000 Hz, band: ${low} Hz .. ${high} Hz, filter: ${text}, fold-limit: ${limit} dBFS, measures: acceleration, sensitivity: ${sensitivity} mV/(m/s2), resonance: 900 Hz }\n`,
              )
              .join('');
          const head = rig({ source, filters: `, e: ${filter}` }).split('channels:')[0]!;
          const named = `${head}channels:\n${channels('e')}`;
          const inPlace = `${head}channels:\n${channels(filter)}`;
          const seen = (text: string) => channelsOf(text).map((_, index) => shown(only(text, index)));
          expect(seen(named)).toEqual(seen(inPlace));
        },
      ),
      { seed: 5, numRuns: Math.min(runs(60), 60) },
    );
  });
});

/** The same rig with its `index`-th channel alone. */
function only(text: string, index: number): string {
  const [head, channels] = text.split('channels:\n');
  return `${head}channels:\n${channels!.split('\n')[index]!}\n`;
}

describe('a chain on its own scale', () => {
  it('compares volts with volts where there is no full scale', () => {
    const text = rig({
      source: 'frequency: 700 Hz, level: 20 mV',
      digitizer: 'bits: 16',
      channel: 'fold-limit: 10 mV',
    });
    expect(chainOfText(text).levelUnit).toBe('db-volt');
    const [one] = arrivalsOfText(text);
    expect(one!.level).toBeCloseTo(20 * Math.log10(0.02), 9);
    expect(one).toMatchObject({ levelKnown: true, overLimit: true });
  });

  it('takes a source that it has no place for at full scale', () => {
    const text = rig({ source: 'frequency: 700 Hz, level: 20 mV', digitizer: 'bits: 16' });
    expect(arrivalsOfText(text)[0]).toMatchObject({ level: 0, levelKnown: false, overLimit: true });
  });
});
