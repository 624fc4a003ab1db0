import { describe, expect, it } from 'vitest';
import { COLOURED, PLAIN } from '../../server/src/report/paint.ts';
import { ratesText } from '../../server/src/report/rates-text.ts';
import type { RateVerdict } from '../../server/src/workbench/rates.ts';
import { EXTRACT_FAN } from '../tools/samples.ts';
import { evaluated } from '../workbench/describe-findings.ts';

const JUDGED = evaluated(EXTRACT_FAN).channels[0]!;

const RATES: readonly RateVerdict[] = [
  { rateHz: 800, text: '800 Hz', isToday: false, margin: 0, errors: 2, warnings: 1, worst: ['clips', 'fold-in-band'] },
  { rateHz: 25_600, text: '25.6 kHz', isToday: true, margin: 1.28, errors: 0, warnings: 1, worst: ['thin-margin'] },
  { rateHz: 204_800, text: '204.8 kHz', isToday: false, margin: 10.24, errors: 0, warnings: 0, worst: [] },
];

describe('the table of rates', () => {
  it('lines up what is to be compared, and marks the present rate', () => {
    expect(ratesText(JUDGED, RATES, PLAIN).split('\n')).toEqual([
      'bearing-drive-end',
      '',
      '       rate  margin  verdict',
      '     800 Hz    0.00  clips, fold-in-band',
      '>  25.6 kHz    1.28  thin-margin',
      '  204.8 kHz   10.24  clean',
      '',
    ]);
  });

  it('is no narrower than its heads', () => {
    expect(ratesText(JUDGED, [{ ...RATES[1]!, rateHz: 1 }], PLAIN).split('\n')[3]).toBe('> 1 Hz    1.28  thin-margin');
  });

  it('colours each verdict by the gravest finding', () => {
    const lines = ratesText(JUDGED, RATES, COLOURED).split('\n');
    expect(lines[3]).toContain('\u001b[31mclips, fold-in-band\u001b[39m');
    expect(lines[4]).toContain('\u001b[33mthin-margin\u001b[39m');
    expect(lines[5]).toContain('\u001b[1mclean\u001b[22m');
  });
});
