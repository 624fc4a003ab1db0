import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { exactRate, neighbouringRates, reachableRates } from '../../server/src/chain/reachable.ts';
import type { Channel, Digitizer } from '../../server/src/rig/model.ts';
import { runs } from '../tools/runs.ts';
import { channelsOf } from './rig.ts';

function channelWith(digitizer: string, clock = 'frequency: 1 MHz', rate = '1 kHz'): Channel {
  const text = `rig: Test\nclocks: { c: { ${clock} } }\ndigitizers: { d: { ${digitizer} } }\nchannels:\n  one: { digitizer: d, rate: ${rate}, band: 1 Hz .. 10 Hz }\n`;
  return channelsOf(text)[0]!;
}

function digitizerWith(digitizer: string, clock?: string): Digitizer {
  return channelWith(digitizer, clock).digitizer!;
}

describe('the rates of a clock', () => {
  it('are its frequency over prescale and each divider', () => {
    const digitizer = digitizerWith('clock: c, prescale: 10', 'frequency: 1 MHz, divide: 1..5');
    expect(reachableRates(digitizer, 1, 1e9, 100)).toEqual([20_000, 25_000, 100_000 / 3, 50_000, 100_000]);
    expect(reachableRates(digitizer, 25_000, 50_000, 100)).toEqual([25_000, 100_000 / 3, 50_000]);
  });

  it('keep to the step of the dividers', () => {
    const digitizer = digitizerWith('clock: c', 'frequency: 1 MHz, divide: 4..11, step: 3');
    expect(reachableRates(digitizer, 1, 1e9, 100)).toEqual([100_000, 1e6 / 7, 250_000]);
  });

  it('keep to a list of dividers', () => {
    const digitizer = digitizerWith('clock: c', 'frequency: 1 MHz, divide: [8, 2, 64]');
    expect(reachableRates(digitizer, 1, 1e9, 100)).toEqual([15_625, 125_000, 500_000]);
    expect(neighbouringRates(digitizer, 200_000)).toEqual({ belowHz: 125_000, aboveHz: 500_000 });
  });

  it('end at the greatest rate of the digitizer', () => {
    const digitizer = digitizerWith('clock: c, max-rate: 300 kHz', 'frequency: 1 MHz, divide: 1..5');
    expect(reachableRates(digitizer, 1, 1e9, 100).at(-1)).toBe(250_000);
  });

  it('are cut at the end asked for', () => {
    const digitizer = digitizerWith('clock: c', 'frequency: 1 MHz, divide: 1..1000000');
    expect(reachableRates(digitizer, 1, 1e9, 3)).toEqual([1, 1e6 / 999_999, 1e6 / 999_998]);
    expect(reachableRates(digitizer, 1, 1e9, 3, 'high')).toEqual([1e6 / 3, 500_000, 1_000_000]);
  });

  it('leave one neighbour out past either end', () => {
    const digitizer = digitizerWith('clock: c', 'frequency: 1 MHz, divide: 2..10');
    expect(neighbouringRates(digitizer, 1)).toEqual({ belowHz: undefined, aboveHz: 100_000 });
    expect(neighbouringRates(digitizer, 1e6)).toEqual({ belowHz: 500_000, aboveHz: undefined });
    expect(neighbouringRates(digitizer, 260_000)).toEqual({ belowHz: 250_000, aboveHz: 1e6 / 3 });
  });
});

describe('listed rates', () => {
  it('are a list', () => {
    const digitizer = digitizerWith('rates: [10 kHz, 1 kHz, 2.5 kHz]');
    expect(reachableRates(digitizer, 2000, 20_000, 10)).toEqual([2500, 10_000]);
    expect(neighbouringRates(digitizer, 3000)).toEqual({ belowHz: 2500, aboveHz: 10_000 });
    expect(neighbouringRates(digitizer, 2500)).toEqual({ belowHz: 2500, aboveHz: 2500 });
  });

  it('or a range, in which every rate can be made', () => {
    const channel = channelWith('rates: 1 kHz .. 3 kHz', undefined, '2.345 kHz');
    expect(exactRate(channel.digitizer, channel.rateHz!)).toBe(2345);
    expect(reachableRates(channel.digitizer, 900, 2500, 10)).toEqual([1000, 1024, 1250, 1280, 1600, 2000, 2048, 2500]);
    expect(neighbouringRates(channel.digitizer, 4000)).toEqual({ belowHz: 3000, aboveHz: undefined });
    expect(neighbouringRates(channel.digitizer, 400)).toEqual({ belowHz: undefined, aboveHz: 1000 });
  });
});

describe('any rate', () => {
  it('counts where there is neither a clock nor a list, and round ones are proposed', () => {
    expect(reachableRates(undefined, 1000, 6000, 100)).toEqual([
      1000, 1024, 1250, 1280, 1600, 2000, 2048, 2500, 2560, 3200, 4000, 4096, 5000, 5120,
    ]);
    expect(reachableRates(undefined, 1000, 1e12, 2, 'high')).toEqual([819_200_000_000, 1e12]);
    expect(reachableRates(undefined, 1000, Number.POSITIVE_INFINITY, 10)).toEqual([]);
    expect(reachableRates(undefined, 0, 1000, 10)).toEqual([]);
    expect(reachableRates(undefined, 10, 1000, 0)).toEqual([]);
  });

  it('counts where a clock has no dividers', () => {
    const channel = channelWith('clock: c', 'frequency: 1 MHz', '1234.5 Hz');
    expect(exactRate(channel.digitizer, channel.rateHz!)).toBe(1234.5);
  });
});

describe('a written rate', () => {
  it.each([
    ['17.067 kHz', 13_107_200 / 768],
    ['17.07 kHz', 13_107_200 / 768],
    ['17.06 kHz', undefined],
    ['25600 Hz', 25_600],
    ['20 kHz', undefined],
  ])('of %s stands for what it is within half a unit of its last digit', (rate, exact) => {
    const channel = channelWith('clock: c, prescale: 256', 'frequency: 13.1072 MHz, divide: 1..128', rate);
    expect(exactRate(channel.digitizer, channel.rateHz!)).toBe(exact);
  });

  it('that a search has put another value for is that value, however it was written', () => {
    const channel = channelWith('clock: c, prescale: 256', 'frequency: 13.1072 MHz, divide: 1..128', '20 kHz');
    const moved = { ...channel.rateHz!, value: 13_107_200 / 768 };
    expect(exactRate(channel.digitizer, moved)).toBe(13_107_200 / 768);
    expect(exactRate(channel.digitizer, { ...moved, value: 17_070 })).toBeUndefined();
  });

  it('is found again from any divider', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 4096 }), fc.integer({ min: 1, max: 7 }), (divider, step) => {
        const low = ((divider - 1) % step) + 1;
        const channel = channelWith('clock: c', `frequency: 9.999 MHz, divide: ${low}..5000, step: ${step}`);
        const exact = 9_999_000 / divider;
        expect(exactRate(channel.digitizer, { ...channel.rateHz!, value: exact })).toBe(exact);
      }),
      { seed: 11, numRuns: runs(500) },
    );
  });
});
