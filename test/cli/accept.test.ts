import { describe, expect, it } from 'vitest';
import { ran } from './ran.ts';
import { FOLDS, MISSPELLED } from './rigs.ts';

const ACCEPTED = `${FOLDS}accept:
  - { finding: fold-in-band, on: a, reason: the hum is taken out afterwards, by: the test lead, until: 2027-03-31 }
`;

describe('what is accepted', () => {
  it('is told with who, until when and why, counted apart, and fails nothing', async () => {
    const { code, stdout } = await ran(['check', 'a.rig.yaml'], { 'a.rig.yaml': ACCEPTED });
    expect(code).toBe(0);
    expect(stdout).toMatch(/^a\.rig\.yaml:12:11 {2}accepted error {2}fold-in-band {2}\(a\)\n/);
    expect(stdout).toContain('\n    Accepted by the test lead until 2027-03-31: the hum is taken out afterwards\n');
    expect(stdout).toContain('1 channel in 1 file checked: no errors, no warnings, no hints, 1 accepted.\n');
    for (const from of ['warning', 'hint'])
      expect((await ran(['check', '--fail-on', from], { 'a.rig.yaml': ACCEPTED })).code).toBe(0);
    expect((await ran(['check'], { 'a.rig.yaml': FOLDS })).code).toBe(1);
  });

  it('is marked in JSON', async () => {
    const { stdout } = await ran(['check', '--format', 'json'], { 'a.rig.yaml': ACCEPTED });
    const { files, summary } = JSON.parse(stdout);
    expect(files[0].findings).toHaveLength(1);
    expect(files[0].findings[0]).toMatchObject({
      name: 'fold-in-band',
      severity: 'error',
      accepted: true,
      acceptance: { reason: 'the hum is taken out afterwards', by: 'the test lead', until: '2027-03-31' },
    });
    expect(summary).toEqual({ error: 0, warning: 0, hint: 0, accepted: 1, channels: 1 });
  });

  it('fails again after its last day, and that is said', async () => {
    const late = ACCEPTED.replace('2027-03-31', '2026-11-30');
    const { code, stdout } = await ran(['check'], { 'a.rig.yaml': late });
    expect(code).toBe(1);
    expect(stdout).toContain('  warning  acceptance-expired  (accept)\n');
    expect(stdout).toContain('1 error, 1 warning, no hints.\n');
  });

  it('is left alone by fix, which goes by what is left besides', async () => {
    const { code, files } = await ran(['fix'], { 'a.rig.yaml': ACCEPTED });
    expect([code, files['a.rig.yaml']]).toEqual([0, ACCEPTED]);
    const misspelled = `${MISSPELLED}accept: [{ finding: fold-in-band, reason: known }]\n`;
    const some = await ran(['fix'], { 'a.rig.yaml': misspelled });
    expect([some.code, some.files['a.rig.yaml']]).toEqual([0, misspelled.replace('flatnes:', 'flatness:')]);
    expect((await ran(['fix', '--allow', 'claim'], { 'a.rig.yaml': FOLDS })).code).toBe(2);
  });

  it('counts the channels of a brace range', async () => {
    const { stdout } = await ran(['check'], { 'a.rig.yaml': FOLDS.replace('  a:\n', '  a-{01..64}:\n') });
    expect(stdout).toContain('64 channels in 1 file checked: 1 error,');
    expect(stdout.replace(/\s+/g, ' ').match(/\(64 channels\)/g)).toHaveLength(1);
    const map = await ran(['map', 'a.rig.yaml', 'a-07'], {
      'a.rig.yaml': FOLDS.replace('  a:\n', '  a-{01..64}:\n'),
    });
    expect(map.code).toBe(0);
  });
});
