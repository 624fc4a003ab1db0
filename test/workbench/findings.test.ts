import { describe, expect, it } from 'vitest';
import { MOST_SYNTAX_FINDINGS } from '../../server/src/rig/limits.ts';
import { allFindings } from '../../server/src/workbench/findings.ts';
import { evaluated, findingLines } from './describe-findings.ts';

describe('the findings of a text that is no rig file', () => {
  const text = `rig: R\n${'y\n'.repeat(1000)}channels:\n  a: { rate: 1 kHz, band: 0 Hz .. 2 kHz }\n`;
  const findings = allFindings(evaluated(text));

  it('tell the first syntax slips, and how many there are', () => {
    expect(findings.filter(({ check }) => check === 'syntax')).toHaveLength(MOST_SYNTAX_FINDINGS);
    const summary = findings.filter(({ check, about }) => check === 'too-much' && about === 'syntax');
    expect(summary).toHaveLength(1);
    expect(summary[0]!.message).toBe("1000 places of this file can't be read as YAML; the first 200 are told.");
  });

  it('do not silence the rest', () => {
    expect(findings.map(({ check }) => check)).toContain('band-over-nyquist');
  });
});

it('a byte order mark ahead of the first key is no part of it', () => {
  expect(findingLines('\ufeffrig: R\nchannels:\n  a: { rate: 1 kHz, band: 0 Hz .. 2 kHz }\n')).toEqual(
    findingLines('rig: R\nchannels:\n  a: { rate: 1 kHz, band: 0 Hz .. 2 kHz }\n'),
  );
});
