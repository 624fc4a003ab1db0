import { describe, expect, it } from 'vitest';
import { locatedFindings } from '../../server/src/workbench/findings.ts';
import { EXTRACT_FAN } from '../tools/samples.ts';
import { evaluated } from './describe-findings.ts';

describe('the rig whose figures are worked out by hand', () => {
  const located = locatedFindings(evaluated(EXTRACT_FAN));
  const named = (check: string) => located.find(({ finding }) => finding.check === check)!;

  it('has these four findings and no other', () => {
    expect(located.map(({ finding }) => `${finding.severity} ${finding.check}`).sort()).toEqual([
      'error fold-in-band',
      'hint unused-name',
      'warning band-droop',
      'warning resonance-in-band',
    ]);
  });

  it('has the inverter fold to 9.6 kHz, 15.9 dB over the limit', () => {
    // By hand: 25.6 kHz - 16 kHz = 9.6 kHz; 20 log10(0.4 / 10) = -27.96 dBFS; 10 log10(1 + 2^12) = 36.12 dB.
    const { finding, range } = named('fold-in-band');
    expect(finding.figures.recordedHz).toBeCloseTo(9_600, 6);
    expect(finding.figures.levelDbfs).toBeCloseTo(-64.08, 2);
    expect(finding.figures.limitDbfs).toBe(-80);
    expect(finding.figures.stage).toBe(1);
    expect(finding.about).toBe('inverter');
    expect(range).toEqual({ start: { line: 24, character: 10 }, end: { line: 24, character: 18 } });
  });

  it('points each finding at the value to change, and relates what else matters', () => {
    const { snapshot } = evaluated(EXTRACT_FAN);
    const words = located.map(({ finding, range }) => [
      finding.check,
      snapshot.sliceText(snapshot.offsetAt(range.start), snapshot.offsetAt(range.end)),
    ]);
    expect(Object.fromEntries(words)).toMatchObject({ 'fold-in-band': '25.6 kHz', 'unused-name': 'tidy' });
    expect(named('fold-in-band').finding.related.length).toBeGreaterThan(0);
  });
});
