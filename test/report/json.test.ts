import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { findingsJson, summaryOf } from '../../server/src/report/findings-json.ts';
import { reported } from '../../server/src/report/number.ts';
import { locatedFindings } from '../../server/src/workbench/findings.ts';
import { runs } from '../tools/runs.ts';
import { EXTRACT_FAN, SAMPLES } from '../tools/samples.ts';
import { evaluated } from '../workbench/describe-findings.ts';

function report(path: string, text: string) {
  const evaluation = evaluated(text);
  return { path, channels: evaluation.channels.length, findings: locatedFindings(evaluation) };
}

describe('numbers', () => {
  it('are printed to twelve significant digits', () => {
    expect(reported(0.1 + 0.2)).toBe(0.3);
    expect(reported(25_600)).toBe(25_600);
    expect(reported(-64.08123456789012)).toBe(-64.0812345679);
    expect(reported(1e-30)).toBe(1e-30);
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        expect(Math.abs(reported(value) - value)).toBeLessThanOrEqual(Math.abs(value) * 5e-12);
        expect(reported(reported(value))).toBe(reported(value));
      }),
      { numRuns: runs(500), seed: 20261205 },
    );
  });
});

describe('the report of findings in JSON', () => {
  it('counts over files, and counts what is listed', () => {
    const files = [report('fan', EXTRACT_FAN), report('empty', 'rig: R\nchannels: {}\n')];
    expect(summaryOf(files)).toMatchObject({ error: 1, warning: 2, hint: 1, accepted: 0, channels: 1 });
    expect(summaryOf([])).toEqual({ error: 0, warning: 0, hint: 0, accepted: 0, channels: 0 });
  });

  it.each(SAMPLES)('is valid, in order and the same to the byte: $name', ({ text }) => {
    const json = findingsJson([report('a', text)]);
    expect(findingsJson([report('a', text)])).toBe(json);
    expect(json.endsWith('}\n')).toBe(true);
    const { files } = JSON.parse(json) as {
      files: { findings: { range: { start: { line: number; character: number } }; figures: object }[] }[];
    };
    const starts = files[0]!.findings.map(({ range }) => range.start.line * 1e6 + range.start.character);
    expect(starts).toEqual([...starts].sort((a, b) => a - b));
    for (const { figures } of files[0]!.findings) {
      for (const value of Object.values(figures) as unknown[]) {
        expect(['number', 'string', 'boolean']).toContain(typeof value);
        if (typeof value === 'number') expect(reported(value)).toBe(value);
      }
    }
  });

  it('has remedies only where they were searched for', () => {
    const [finding] = report('a', EXTRACT_FAN).findings;
    const remedy = {
      name: 'n',
      kind: 'text',
      title: 't',
      preferred: true,
      edits: [{ start: 0, end: 0, text: '' }],
    } as const;
    const parse = (findings: Parameters<typeof findingsJson>[0][number]['findings']) =>
      (JSON.parse(findingsJson([{ path: 'a', channels: 1, findings }])) as { files: { findings: object[] }[] })
        .files[0]!.findings[0];
    expect(parse([finding!])).not.toHaveProperty('remedies');
    expect(parse([{ ...finding!, remedies: [] }])).toHaveProperty('remedies', []);
    expect(parse([{ ...finding!, remedies: [remedy] }])).toHaveProperty('remedies', [
      { name: 'n', kind: 'text', title: 't', preferred: true },
    ]);
  });
});
