import { describe, expect, it } from 'vitest';
import { WINDOW_CHOICE_NAMES } from '../../server/src/rig/window-choices.ts';
import { WINDOW_NAMES } from '../../server/src/signal/windows.ts';
import { channelRig, expectOneProblem, readRig, saidOf, textAt } from './fixture.ts';

const spectrumIn = (text: string) => readRig(text).readings[0]!.channel.spectrum;
const spectrum = (map: string) => spectrumIn(channelRig(`spectrum: ${map}`));
const run = (map: string) => readRig(`rig: R\nrun: ${map}\n`).environment.run;

describe('the spectrum of a channel', () => {
  it('has the length that one of three keys gives it, in base units', () => {
    expect(spectrum('{ lines: 800 }')?.value.length.value).toEqual({ by: 'lines', lines: 800 });
    expect(spectrum('{ resolution: 1.25 Hz }')?.value.length.value).toEqual({ by: 'resolution', resolutionHz: 1.25 });
    expect(spectrum('{ record: 800 ms }')?.value.length.value).toEqual({ by: 'record', recordS: 0.8 });
  });

  it('has what else is written, and nothing that is not', () => {
    const all = spectrum('{ lines: 800, window: flat-top, overlap: 50 %, averages: 16, separate: 4 Hz }')!.value;
    expect(all.window?.value).toBe('flat-top');
    expect(all.overlap?.value).toBe(0.5);
    expect(all.averages?.value).toBe(16);
    expect(all.separateHz?.value).toBe(4);
    expect(spectrum('{ lines: 800 }')?.value).toMatchObject({
      window: undefined,
      overlap: undefined,
      averages: undefined,
      separateHz: undefined,
    });
  });

  it('needs exactly one length', () => {
    expectOneProblem(channelRig('spectrum: ⟦{⟧ window: hann }'), 'wrong-kind');
    expectOneProblem(channelRig('spectrum: { lines: 800, record: ⟦0.8 s⟧ }'), 'wrong-kind');
    const three = channelRig('spectrum: { record: 1 s, resolution: 1 Hz, lines: 800 }');
    expect(saidOf(readRig(three))).toEqual(['wrong-kind: 1 Hz', 'wrong-kind: 1 s']);
    for (const text of ['{ window: hann }', '{ lines: 800, record: 0.8 s }']) expect(spectrum(text)).toBeUndefined();
  });

  it('is none where what stands there can not be read', () => {
    expectOneProblem(channelRig('spectrum: ⟦[800]⟧'), 'wrong-kind');
    expectOneProblem(channelRig('spectrum: { lines: ⟦0⟧ }'), 'out-of-range');
    expectOneProblem(channelRig('spectrum: { lines: 800, overlap: ⟦100 %⟧ }'), 'out-of-range');
    expectOneProblem(channelRig('spectrum: { lines: 800, averages: ⟦0.5⟧ }'), 'out-of-range');
    const nearest = { kind: 'replace', text: 'hann' } as const;
    expectOneProblem(channelRig('spectrum: { lines: 800, window: ⟦han⟧ }'), 'wrong-kind', nearest);
    for (const keys of [
      'lines: 0',
      'lines: 800, overlap: 100 %',
      'lines: 800, averages: 0.5',
      'lines: 800, window: han',
    ])
      expect(spectrum(`{ ${keys} }`)).toBeUndefined();
    expect(spectrum('{ lines: 800, separate: 4 kg }')?.value.separateHz).toBeUndefined();
  });

  it('comes from the defaults whole, one object for all, and keeps where each value stands', () => {
    const rig = readRig(
      'rig: R\ndefaults: { rate: 1 kHz, band: 1 Hz .. 100 Hz, spectrum: { lines: 800, window: blackman } }\nchannels:\n  a: {}\n  b: {}\n  c: { spectrum: { record: 2 s } }\n',
    );
    const [a, b, c] = rig.readings.map(({ channel }) => channel.spectrum!);
    expect(b!.value).toBe(a!.value);
    expect(a!.inherited?.from).toBe('defaults');
    expect(a!.value.length.inherited?.from).toBe('defaults');
    expect(textAt(a!.value.length.place)).toBe('800');
    expect(c!.value).toMatchObject({ length: { value: { by: 'record', recordS: 2 } }, window: undefined });
    expect(c!.inherited).toBeUndefined();
  });

  it('is said to be wrong once where many inherit it', () => {
    const text =
      'rig: R\ndefaults: { rate: 1 kHz, band: 1..9 Hz, spectrum: { window: hann } }\nchannels:\n  a: {}\n  b: {}\n';
    expect(saidOf(readRig(text))).toEqual(['wrong-kind: {']);
  });

  it('offers windows that can be computed', () => {
    for (const name of WINDOW_CHOICE_NAMES) {
      expect(WINDOW_NAMES).toContain(name);
      expect(spectrum(`{ lines: 800, window: ${name} }`)?.value.window?.value).toBe(name);
    }
  });
});

describe('resolve', () => {
  const resolve = (text: string) => readRig(channelRig(text)).readings[0]!.channel.resolve?.value;

  it('is a level in the measured unit, in volts or in dBFS', () => {
    expect(resolve('sensitivity: 100 mV/g\nresolve: 0.01 g')).toMatchObject({ kind: 'measured', unit: 'g' });
    expect(resolve('resolve: 1 mV')).toEqual({ kind: 'volts', peakV: 0.001 });
    expect(resolve('resolve: -90 dBFS')).toEqual({ kind: 'dbfs', dbfs: -90 });
    expectOneProblem(channelRig('resolve: ⟦0 mV⟧'), 'out-of-range');
  });
});

describe('the run', () => {
  it('is in base units, sizes in bits or bytes as they are written', () => {
    const all = run('{ duration: 8 h, records: 200, record: 4 s, disk: 500 GB, link: 80 bit/s, sample-size: 4 B }')!;
    expect(all.durationS?.value).toBe(28_800);
    expect(all.records?.value).toBe(200);
    expect(all.recordS?.value).toBe(4);
    expect(all.diskBytes?.value).toBe(500e9);
    expect(all.linkBytesPerSecond?.value).toBe(10);
    expect(all.sampleBits?.value).toBe(32);
    const bits = run('{ disk: 800 bit, sample-size: 12 bit }')!;
    expect([bits.diskBytes?.value, bits.sampleBits?.value]).toEqual([100, 12]);
  });

  it('reads a bare number in the unit that is due, and says so', () => {
    const rig = readRig('rig: R\nrun: { disk: 500, sample-size: 24 }\n');
    expect(saidOf(rig)).toEqual(['unit-missing: 500', 'unit-missing: 24']);
    expect(rig.environment.run).toMatchObject({ diskBytes: { value: 500 }, sampleBits: { value: 24 } });
  });

  it('needs both the number and the length of triggered records', () => {
    expectOneProblem('rig: R\nrun: ⟦{⟧ records: 200 }\n', 'missing-key', { kind: 'add-key', key: 'record' });
    expectOneProblem('rig: R\nrun: ⟦{⟧ record: 4 s }\n', 'missing-key', { kind: 'add-key', key: 'records' });
  });

  it('is none where there is none, and empty where there is nothing in it', () => {
    expect(readRig('rig: R\n').environment.run).toBeUndefined();
    expect(readRig('rig: R\nrun: 8 h\n').environment.run).toBeUndefined();
    expect(run('{}')).toMatchObject({ durationS: undefined, diskBytes: undefined });
    expectOneProblem('rig: R\nrun: ⟦8 h⟧\n', 'wrong-kind');
  });
});
