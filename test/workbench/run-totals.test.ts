import { describe, expect, it } from 'vitest';
import { outlineOf } from '../../server/src/editor/outline.ts';
import { summaryOf, totalsOf } from '../../server/src/report/findings-json.ts';
import { summaryText } from '../../server/src/report/findings-text.ts';
import { runTotals, totalsText } from '../../server/src/workbench/run-totals.ts';
import { evaluated } from './describe-findings.ts';

/** 10000 samples a second of 3 bytes and 1000 of 2 bytes: 32 kB a second; a third channel has no bits. */
function rig(run: string, more = ''): string {
  return `rig: R
${run}digitizers: { d: { bits: 24 }, e: { bits: 12 } }
channels:
  a: { digitizer: d, rate: 10 kHz, band: 1 Hz .. 10 Hz }
  b: { digitizer: e, rate: 1 kHz, band: 1 Hz .. 10 Hz }
${more}`;
}

const BARE = '  c: { rate: 1 kHz, band: 1 Hz .. 10 Hz }\n';
const totals = (text: string) => runTotals(evaluated(text));
const report = (text: string) => ({ path: 'r', channels: 2, findings: [], totals: totals(text) });

describe('what a run makes of data', () => {
  it('is known of a file with a run alone', () => {
    expect(totals(rig(''))).toBeUndefined();
    const known = { bytesPerSecond: 32_000, channels: 2, channelsLeftOut: 0 };
    expect(totals(rig('run: {}\n'))).toEqual({ ...known, bytes: undefined });
    expect(totals(rig('run: { duration: 1 h }\n'))).toEqual({ ...known, bytes: 115_200_000 });
    expect(totals(rig('run: { duration: 1 h, records: 10, record: 2 s }\n'))).toEqual({ ...known, bytes: 640_000 });
    expect(totals(rig('run: {}\n', BARE))).toMatchObject({ channels: 2, channelsLeftOut: 1 });
  });

  it('follows an edit of the run, and of a channel', () => {
    expect(totals(rig('run: { sample-size: 32 bit }\n'))?.bytesPerSecond).toBe(44_000);
    expect(totals(rig('run: {}\n').replace('1 kHz', '2 kHz'))?.bytesPerSecond).toBe(34_000);
  });

  it('is told in a few words', () => {
    expect(totalsText(totals(rig('run: { duration: 1 h }\n'))!)).toBe('32 kB/s, 115.2 MB in all');
    expect(totalsText(totals(rig('run: {}\n', BARE))!)).toBe(
      '32 kB/s, without 1 channel whose rate or bits are not known',
    );
  });

  it('stands with the first symbol of the outline', () => {
    const details = (text: string) => outlineOf(evaluated(text)).map(({ name, detail }) => [name, detail]);
    expect(details(rig('run: { duration: 1 h }\n'))[0]).toEqual(['rig', '32 kB/s, 115.2 MB in all']);
    expect(details(rig(''))[0]).toEqual(['rig', undefined]);
    expect(outlineOf(evaluated(''))).toEqual([]);
  });

  it('is summed over files in the summary, and is not there without a run', () => {
    const files = [report(rig('run: { duration: 1 h }\n')), report(rig('')), report(rig('run: {}\n'))];
    expect(summaryOf(files)).toMatchObject({ bytesPerSecond: 64_000, bytes: 115_200_000 });
    expect(Object.keys(summaryOf([report(rig(''))]))).not.toContain('bytesPerSecond');
    expect(Object.keys(summaryOf([report(rig('run: {}\n'))]))).not.toContain('bytes');
    const plain = (text: string): string => text;
    expect(summaryText(3, summaryOf(files), plain, totalsOf(files))).toMatch(
      /\.\nRecorded: 64 kB\/s, 115\.2 MB in all\.\n$/,
    );
    expect(summaryText(1, summaryOf([report(rig(''))]), plain, totalsOf([report(rig(''))]))).not.toContain('Recorded');
  });
});
