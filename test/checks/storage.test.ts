import { describe, expect, it } from 'vitest';
import { found, only, underlined } from './judged.ts';

function rig(run: string, channels: string): string {
  return `rig: Test
run: ${run}
digitizers:
  d: { bits: 24, full-scale: ±10 V }
  e: { bits: 12, full-scale: ±10 V }
  f: { full-scale: ±10 V }
defaults: { band: 1 Hz .. 10 Hz, undeclared: -90 dBFS }
channels:
${channels}`;
}

const TWO = '  a: { digitizer: d, rate: 10 kHz }\n  b: { digitizer: e, rate: 1 kHz }\n';

describe('disk-short', () => {
  it('adds up what each channel keeps, in whole bytes of the converter', () => {
    // By hand: 10000 x 3 + 1000 x 2 = 32 kB a second, 115.2 MB an hour.
    const finding = only(rig('{ duration: 1 h, disk: 115 MB }', TWO), 'disk-short');
    expect(finding.figures).toEqual({ bytes: 115.2e6, diskBytes: 115e6, bytesPerSecond: 32_000 });
    expect(underlined(finding)).toBe('115 MB');
    expect(finding.thing).toBe('run/disk');
    expect(finding.channel).toBeUndefined();
    expect(found(rig('{ duration: 1 h, disk: 115.2 MB }', TWO), 'disk-short')).toEqual([]);
  });

  it('takes the size that is said, packed where it is no whole byte', () => {
    const at = (size: string) =>
      only(rig(`{ duration: 1 s, disk: 1 B, sample-size: ${size} }`, TWO), 'disk-short').figures['bytes'];
    expect([at('32 bit'), at('4 B'), at('12 bit')]).toEqual([44_000, 44_000, 16_500]);
  });

  it('counts the kept samples at the rate of the last stage', () => {
    const steps = '  a: { digitizer: d, rate: 10 kHz, then: [{ decimate: 5 }, { decimate: 2 }] }\n';
    expect(only(rig('{ duration: 1 s, disk: 1 B }', steps), 'disk-short').figures['bytes']).toBe(3000);
    // A channel that lacks its band is not checked, and stored all the same.
    const bare = rig('{ duration: 1 s, disk: 1 B }', steps).replace('band: 1 Hz .. 10 Hz, ', '');
    expect(only(bare, 'disk-short').figures['bytes']).toBe(3000);
  });

  it('counts the slots that a pattern takes', () => {
    const burst = '  a: { digitizer: d, rate: 10 kHz, pattern: { of: 10, take: [0, 1, 2, 3] } }\n';
    expect(only(rig('{ duration: 1 s, disk: 1 B }', burst), 'disk-short').figures['bytes']).toBe(12_000);
  });

  it('counts triggered records by their whole samples, however long the run lasts', () => {
    // 200 records of 0.10005 s: 1000 samples of 3 bytes and 100 of 2 bytes each.
    const finding = only(rig('{ duration: 8 h, records: 200, record: 100.05 ms, disk: 600 kB }', TWO), 'disk-short');
    expect(finding.figures['bytes']).toBe(200 * (1000 * 3 + 100 * 2));
    expect(finding.message).toContain('after 187 of 200 records');
    expect(found(rig('{ records: 200, record: 100.05 ms, disk: 640 kB }', TWO), 'disk-short')).toEqual([]);
  });

  it('leaves out what has no size, and says how many are counted', () => {
    const three = `${TWO}  c: { digitizer: f, rate: 100 kHz }\n`;
    const finding = only(rig('{ duration: 1 s, disk: 1 kB }', three), 'disk-short');
    expect(finding.figures['bytes']).toBe(32_000);
    expect(finding.message).toContain('2 of 3 channels make 32 kB');
  });

  it('is not said where it is not known how much is recorded', () => {
    expect(found(rig('{ disk: 1 B }', TWO), 'disk-short')).toEqual([]);
    expect(found(rig('{ duration: 8 h }', TWO), 'disk-short')).toEqual([]);
  });
});

describe('link-short', () => {
  it('compares what arises each second', () => {
    const finding = only(rig('{ link: 31.9 kB/s }', TWO), 'link-short');
    expect(finding.figures).toEqual({
      neededBytesPerSecond: 32_000,
      linkBytesPerSecond: 31_900,
      bytesPerSecond: 32_000,
    });
    expect(underlined(finding)).toBe('31.9 kB/s');
    expect(found(rig('{ link: 32 kB/s }', TWO), 'link-short')).toEqual([]);
    expect(found(rig('{ link: 256000 bit/s }', TWO), 'link-short')).toEqual([]);
    expect(found(rig('{ link: 255999 bit/s }', TWO), 'link-short')).toHaveLength(1);
  });

  it('lets triggered records wait, as long as the run lasts', () => {
    // 200 records of 1 s, 6.4 MB: 640 B a second over 10000 s.
    const over = (link: string, run = '') =>
      found(rig(`{ records: 200, record: 1 s, link: ${link}${run} }`, TWO), 'link-short').map(
        ({ figures }) => figures['neededBytesPerSecond'],
      );
    expect(over('639 B/s', ', duration: 10000 s')).toEqual([640]);
    expect(over('640 B/s', ', duration: 10000 s')).toEqual([]);
    expect(over('1 B/s')).toEqual([]);
  });
});
