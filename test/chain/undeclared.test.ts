import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bandResponseOf } from '../../server/src/chain/band-response.ts';
import { undeclaredFolds } from '../../server/src/chain/undeclared.ts';
import { runs } from '../tools/runs.ts';
import { analogueFilters, decimations, followed } from './random-path.ts';
import { chainOfText } from './rig.ts';

function rig(keys: readonly string[], digitizer = 'full-scale: ±1 V'): string {
  return `rig: Test\nclocks: { c: { frequency: 1 MHz } }\ndigitizers: { d: { ${digitizer} } }\nchannels:\n  one:\n    digitizer: d\n${keys.map((key) => `    ${key}\n`).join('')}`;
}

describe('what no source declares', () => {
  it('is worst where the band first folds, for a low-pass', () => {
    const chain = chainOfText(
      rig(['rate: 1000 Hz', 'band: 10 Hz .. 200 Hz', 'filter: { response: butterworth, order: 4, cutoff: 250 Hz }']),
    );
    const [fold] = undeclaredFolds(chain);
    expect(fold).toMatchObject({ stage: 1, undeclaredDb: 0, atHz: 800 });
    expect(fold!.attenuationDb).toBeCloseTo(10 * Math.log10(1 + 3.2 ** 8), 6);
    expect(fold!.level).toBeCloseTo(-10 * Math.log10(1 + 3.2 ** 8), 6);
  });

  it('is stated by the channel: a level', () => {
    const chain = chainOfText(rig(['rate: 1000 Hz', 'band: 10 Hz .. 200 Hz', 'undeclared: 10 mV']));
    expect(undeclaredFolds(chain)[0]).toMatchObject({ undeclaredDb: -40, level: -40, attenuationDb: 0 });
  });

  it('or by levels over frequency, straight in dB over log frequency between them', () => {
    const chain = chainOfText(
      rig([
        'rate: 1000 Hz',
        'band: 10 Hz .. 200 Hz',
        'undeclared: [[100 Hz, 0 dBFS], [1600 Hz, -40 dBFS]]',
        'filter: { response: rc, order: 1, corner: 100 Hz }',
      ]),
    );
    const [fold] = undeclaredFolds(chain);
    expect(fold!.atHz).toBe(800);
    expect(fold!.undeclaredDb).toBeCloseTo(-30, 9);
    expect(fold!.attenuationDb).toBeCloseTo(10 * Math.log10(1 + 64), 6);
  });

  it('passes the sensor where it is stated in the measured unit', () => {
    const keys = ['rate: 1000 Hz', 'band: 10 Hz .. 200 Hz', 'undeclared: 1 m/s2'];
    const sensor = ['measures: acceleration', 'sensitivity: 10 mV/(m/s2)', 'resonance: 900 Hz', 'q: 10'];
    expect(undeclaredFolds(chainOfText(rig([...keys, ...sensor])))[0]!.level).toBeCloseTo(-20, 1);
  });

  it('may come from far above, where a filter lets it through again', () => {
    const filter =
      'filter: { response: points, points: [[100 Hz, 0 dB], [700 Hz, 90 dB], [20 kHz, 90 dB], [21 kHz, 20 dB]] }';
    const [fold] = undeclaredFolds(chainOfText(rig(['rate: 1000 Hz', 'band: 10 Hz .. 200 Hz', filter])));
    expect(fold!.attenuationDb).toBeCloseTo(20, 6);
    expect(fold!.atHz).toBeGreaterThan(20_900);
  });

  it('is bounded from below beyond the zones that are looked at', () => {
    const filter =
      'filter: { response: points, points: [[100 Hz, 0 dB], [700 Hz, 90 dB], [60 MHz, 90 dB], [61 MHz, 20 dB]] }';
    const [fold] = undeclaredFolds(chainOfText(rig(['rate: 1000 Hz', 'band: 10 Hz .. 200 Hz', filter])));
    expect(fold!.attenuationDb).toBe(20);
  });

  it('is nothing where nothing folds at a stage', () => {
    const chain = chainOfText(rig(['rate: 1000 Hz', 'band: 490 Hz .. 495 Hz', 'then: [{ decimate: 10 }]']));
    // Above the Nyquist frequency of the last stage nothing of the band is recorded.
    expect(undeclaredFolds(chain)).toEqual([undefined, undefined]);
  });

  it('is told stage by stage', () => {
    const chain = chainOfText(
      rig([
        'rate: 1000 Hz',
        'band: 1 Hz .. 40 Hz',
        'filter: { response: butterworth, order: 8, cutoff: 300 Hz }',
        'then: [{ decimate: 5, filter: { response: butterworth, order: 6, cutoff: 0.06 fs } }]',
      ]),
    );
    const [first, second] = undeclaredFolds(chain);
    expect(first).toMatchObject({ stage: 1, atHz: 960 });
    expect(first!.attenuationDb).toBeCloseTo(10 * Math.log10(1 + 3.2 ** 16), 1);
    expect(second).toMatchObject({ stage: 2, atHz: 160 });
    const warped = Math.tan(Math.PI * 0.16) / Math.tan(Math.PI * 0.06);
    expect(second!.attenuationDb).toBeCloseTo(10 * Math.log10(1 + warped ** 12), 1);
  });

  it('never comes out lower than any frequency that is followed through the chain', () => {
    fc.assert(
      fc.property(
        analogueFilters,
        decimations,
        fc.integer({ min: 0, max: 15 }),
        fc.array(fc.integer({ min: 1, max: 6_000_000 }), { minLength: 200, maxLength: 200 }),
        (analogue, then, lowHz, milliHz) => {
          const chain = chainOfText(
            rig([
              'rate: 1000 Hz',
              `band: ${lowHz} Hz .. ${lowHz + 4} Hz`,
              `filter: [${analogue.join(', ')}]`,
              `then: [${then.join(', ')}]`,
            ]),
          );
          const folds = undeclaredFolds(chain);
          const reached = folds.map(() => Number.NEGATIVE_INFINITY);
          // Images of the band lie dense; each frequency is tried as it is and moved into the nearest of them.
          const last = chain.ratesHz[chain.ratesHz.length - 1]!;
          for (const milli of milliHz) {
            const inBand = chain.bandLowHz + ((milli % 1000) / 1000) * 4;
            const multiple = Math.round(milli / 1000 / last) * last;
            for (const hz of [milli / 1000, Math.abs(multiple - inBand), multiple + inBand]) {
              const left = followed(chain, hz);
              if (!left) continue;
              const fold = folds[left.stage - 1];
              expect(fold).toBeDefined();
              expect(left.level).toBeLessThanOrEqual(fold!.level + 1e-5);
              reached[left.stage - 1] = Math.max(reached[left.stage - 1]!, left.level);
            }
          }
          // And is come close to at the frequency that it names, where that is one of the band's.
          for (const fold of folds) {
            const left = fold && followed(chain, fold.atHz);
            if (left && left.stage === fold.stage) expect(left.level).toBeGreaterThan(fold.level - 0.1);
          }
        },
      ),
      { seed: 7, numRuns: runs(300) },
    );
  });

  it('does not hang or fail on chains beyond reason', () => {
    for (const keys of [
      ['rate: 1 MHz', 'band: 0 Hz .. 0.001 Hz', 'then: [{ decimate: 10000 }, { decimate: 10000 }]'],
      ['rate: 1 Hz', 'band: 1 GHz .. 2 GHz'],
      [
        'rate: 1 Hz',
        'band: 0.1 Hz .. 0.4 Hz',
        'filter: { response: elliptic, order: 50, ripple: 1 dB, stopband: 40 dB, pass-edge: 0.4 Hz }',
      ],
    ]) {
      const start = performance.now();
      for (const fold of undeclaredFolds(chainOfText(rig(keys)))) if (fold) expect(fold.level).not.toBeNaN();
      const took = performance.now() - start;
      expect(took).toBeLessThan(2000);
    }
  });
});

describe('the band', () => {
  it('sags by all filters together, each at the worst of its tolerance', () => {
    const chain = chainOfText(
      rig([
        'rate: 10 kHz',
        'band: 1 Hz .. 100 Hz',
        'filter: [{ response: rc, order: 1, corner: 200 Hz, tolerance: 10 % }, { response: butterworth, order: 2, cutoff: 150 Hz }]',
      ]),
    );
    const { sagDb, sagAtHz } = bandResponseOf(chain);
    expect(sagAtHz).toBe(100);
    expect(sagDb).toBeCloseTo(10 * Math.log10(1 + (100 / 180) ** 2) + 10 * Math.log10(1 + (100 / 150) ** 4), 6);
  });

  it('is lifted by the resonance: at it, or at the top of the band below it', () => {
    const at = (band: string) =>
      bandResponseOf(
        chainOfText(rig(['rate: 10 kHz', `band: ${band}`, 'measures: acceleration', 'resonance: 500 Hz', 'q: 20'])),
      );
    expect(at('1 Hz .. 250 Hz').liftDb).toBeCloseTo(-10 * Math.log10(0.75 ** 2 + 0.025 ** 2), 9);
    expect(at('1 Hz .. 250 Hz').liftAtHz).toBe(250);
    expect(at('1 Hz .. 900 Hz').liftDb).toBeCloseTo(20 * Math.log10(20), 1);
    expect(at('1 Hz .. 900 Hz').liftAtHz).toBe(500);
    expect(at('1500 Hz .. 1900 Hz').liftDb).toBeLessThan(0);
  });

  it('sags without end where nothing is promised, or nothing passes', () => {
    const mask = 'filter: { response: mask, pass: 80 Hz, stop: 200 Hz, stopband: 60 dB }';
    expect(bandResponseOf(chainOfText(rig(['rate: 1 kHz', 'band: 1 Hz .. 100 Hz', mask]))).sagDb).toBe(Infinity);
    expect(bandResponseOf(chainOfText(rig(['rate: 1 kHz', 'band: 1 Hz .. 80 Hz', mask]))).sagDb).toBe(0);
    const coupled = rig(['rate: 1 kHz', 'band: 0 Hz .. 100 Hz'], 'full-scale: ±1 V, low-corner: 0.5 Hz');
    expect(bandResponseOf(chainOfText(coupled))).toMatchObject({ sagDb: Infinity, sagAtHz: 0 });
  });
});
