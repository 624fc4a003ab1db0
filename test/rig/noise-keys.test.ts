import { describe, expect, it } from 'vitest';
import type { Digitizer, Sensor, Source } from '../../server/src/rig/model.ts';
import { channelRig, expectOneProblem, readRig, saidOf, thingRig } from './fixture.ts';

function things(section: string, keys: string, rest = '') {
  const rig = readRig(thingRig(section, keys, rest));
  expect(saidOf(rig)).toEqual([]);
  return rig.environment;
}

const sensor = (keys: string): Sensor => things('sensors', keys).sensors.get('x')!;
const digitizer = (keys: string): Digitizer => things('digitizers', keys).digitizers.get('x')!;
const source = (keys: string): Source => things('sources', keys).sources.get('x')!;

describe("a digitizer's noise", () => {
  it('is an rms or a density, in volts', () => {
    expect(digitizer('noise: 20 uV').noise?.value).toEqual({ kind: 'rms', rmsV: 20e-6 });
    expect(digitizer('noise: 20 uV rms').noise?.value).toEqual({ kind: 'rms', rmsV: 20e-6 });
    expect(digitizer('noise: 50 nV/√Hz').noise?.value).toEqual({ kind: 'density', voltsPerRootHz: 50e-9 });
    expect(digitizer('bits: 24').noise).toBeUndefined();
  });

  it('has a jitter that is an rms', () => {
    expect(digitizer('jitter: 50 ps').jitterS?.value).toBeCloseTo(50e-12, 20);
    expect(digitizer('jitter: 50 ps rms').jitterS?.value).toBeCloseTo(50e-12, 20);
    expect(digitizer('bits: 24').jitterS).toBeUndefined();
  });

  it.each([
    ['in g', 'noise: ⟦10 ug/rtHz⟧', 'unit-mismatch'],
    ['that is a time', 'noise: 10 ⟦ps⟧', 'unit-mismatch'],
    ['that is a peak', 'noise: ⟦10 uV peak⟧', 'wrong-kind'],
    ['below nothing', 'noise: ⟦-1 uV⟧', 'out-of-range'],
    ['of an instant, peak to peak', 'jitter: ⟦10 ps p-p⟧', 'wrong-kind'],
    ['of an instant, in volts', 'jitter: 10 ⟦uV⟧', 'unit-mismatch'],
    ['without a unit', 'noise: ⟦0.001⟧', 'unit-missing'],
  ])('is told of one %s', (_, keys, name) => {
    expectOneProblem(thingRig('digitizers', keys), name);
  });
});

describe("a sensor's noise", () => {
  it('is a density in volts or in what it measures, as the level of a sinusoid with the rms of 1 Hz', () => {
    const volts = sensor('sensitivity: 100 mV/g\nnoise: 10 uV/rtHz').noise?.value;
    expect(volts).toEqual({ kind: 'volts', peakV: Math.SQRT2 * 10e-6 });
    const inG = sensor('sensitivity: 100 mV/g\nnoise: 5 ug/rtHz').noise?.value;
    expect(inG).toMatchObject({ kind: 'measured', measured: 'acceleration' });
    // 1 g is 9.80665 m/s2.
    expect(inG?.kind === 'measured' && inG.peak).toBeCloseTo(Math.SQRT2 * 5e-6 * 9.80665, 12);
    expect(sensor('sensitivity: 2 mV/lux\nnoise: 3 lux/rtHz').noise?.value).toMatchObject({ unit: 'lux' });
  });

  it('is in a unit that a level may have, though only densities have ng and ne', () => {
    expect(sensor('sensitivity: 1 V/g\nnoise: 300 ng/rtHz').noise?.value).toMatchObject({ unit: 'g' });
    expect(sensor('sensitivity: 1 mV/ue\nnoise: 4 ne/rtHz').noise?.value).toMatchObject({ unit: 'ue' });
  });

  it.each([
    ['in what it does not measure', thingRig('sensors', 'sensitivity: 100 mV/g\nnoise: ⟦5 ue/rtHz⟧'), 'unit-mismatch'],
    ['that is no density', thingRig('sensors', 'noise: 5 ⟦uV⟧'), 'unit-mismatch'],
    ['that is a peak', thingRig('sensors', 'noise: ⟦5 uV/rtHz peak⟧'), 'wrong-kind'],
  ])('is told of one %s', (_, text, name) => {
    expectOneProblem(text, name);
  });

  it('may stand in the channel', () => {
    const rig = readRig(channelRig('sensitivity: 100 mV/g\nnoise: 5 ug/rtHz'));
    expect(saidOf(rig)).toEqual([]);
    expect(rig.readings[0]!.channel.sensor?.noise?.value.kind).toBe('measured');
  });
});

describe('a broadband source', () => {
  it('has a density and a range, and enters where its unit says', () => {
    const hiss = source('noise: 10 uV/rtHz\nspans: 10 Hz .. 40 kHz');
    expect(hiss).toMatchObject({ type: 'broadband', enters: 'wiring', spans: { value: { lowHz: 10, highHz: 40e3 } } });
    expect(hiss.levels.map(({ value }) => value)).toEqual([{ kind: 'volts', peakV: Math.SQRT2 * 10e-6 }]);
    expect(source('noise: 10 ug/rtHz\nspans: 10 Hz .. 40 kHz').enters).toBe('sensor');
  });

  it.each([
    ['half of what it needs', 'rig: R\nsources:\n  ⟦x⟧: { noise: 1 uV/rtHz }\n', 'missing-key'],
    ['the other half', 'rig: R\nsources:\n  ⟦x⟧: { spans: 1..2 Hz }\n', 'missing-key'],
    ['a level besides', thingRig('sources', 'noise: 1 uV/rtHz\nspans: 1..2 Hz\nlevel: ⟦2 g⟧'), 'wrong-kind'],
    ['a way in besides', thingRig('sources', 'noise: 1 uV/rtHz\nspans: 1..2 Hz\nenters: ⟦sensor⟧'), 'wrong-kind'],
    ['harmonics', thingRig('sources', 'noise: 1 uV/rtHz\nspans: 1..2 Hz\nharmonics: ⟦3⟧'), 'wrong-kind'],
    ['a frequency', thingRig('sources', 'noise: 1 uV/rtHz\nspans: 1..2 Hz\nfrequency: ⟦3 Hz⟧'), 'wrong-kind'],
    ['a density that is none', thingRig('sources', 'noise: 1 ⟦g⟧\nspans: 1..2 Hz'), 'unit-mismatch'],
    ['a range of no width', thingRig('sources', 'noise: 1 uV/rtHz\nspans: ⟦2..2 Hz⟧'), 'out-of-range'],
  ])('is told of %s', (_, text, name) => {
    expectOneProblem(text, name);
  });

  const SOURCES = 'sources:\n  hiss: { noise: 1 ug/rtHz, spans: 1..9 Hz }\n';
  const names = (keys: string, rest = SOURCES) => {
    const { channel } = readRig(channelRig(keys, rest)).readings[0]!;
    return [channel.heard.map(({ source: { name } }) => name), channel.unheard.map(({ name }) => name)];
  };

  it('is heard by a channel that measures it, and by one that names it', () => {
    expect(names('sensitivity: 100 mV/g')).toEqual([['hiss'], []]);
    expect(names('sensitivity: 100 mV/Pa')).toEqual([[], ['hiss']]);
    expect(names('sensitivity: 100 mV/Pa\nhears: [hiss]')).toEqual([['hiss'], []]);
    expect(names('sensitivity: 100 mV/g\nhears: { hiss: none }')).toEqual([[], []]);
    expect(names('sensitivity: 100 mV/Pa', SOURCES.replace('ug', 'uV'))).toEqual([['hiss'], []]);
  });

  it("takes no level of a channel's own, which is said", () => {
    const text = channelRig('sensitivity: 100 mV/g\nhears: { hiss: ⟦2 g⟧ }', SOURCES);
    expect(expectOneProblem(text, 'wrong-kind').problem.message).toBe(
      'The level is not read: `hiss` is broadband, and its `noise` says how strong it is. Write `none` where this channel does not hear it.',
    );
    const { heard } = readRig(text.replace(/[⟦⟧]/g, '')).readings[0]!.channel;
    expect(heard.map(({ level }) => level)).toEqual([undefined]);
  });
});
