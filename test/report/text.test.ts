import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Finding } from '../../server/src/checks/finding.ts';
import type { ReportedFinding } from '../../server/src/report/findings-json.ts';
import { findingsText, summaryText } from '../../server/src/report/findings-text.ts';
import { COLOURED, PLAIN } from '../../server/src/report/paint.ts';
import { printable, printableLines } from '../../server/src/report/printable.ts';
import { locatedFindings } from '../../server/src/workbench/findings.ts';
import { runs } from '../tools/runs.ts';
import { EXTRACT_FAN } from '../tools/samples.ts';
import { evaluated } from '../workbench/describe-findings.ts';

const FINDING: Finding = locatedFindings(evaluated(EXTRACT_FAN))[0]!.finding;
const RANGE = { start: { line: 4, character: 2 }, end: { line: 4, character: 8 } };

function text(finding: Partial<Finding>, remedies?: ReportedFinding['remedies']): string {
  const reported: ReportedFinding = {
    finding: { ...FINDING, thing: undefined, ...finding },
    range: RANGE,
    ...(remedies ? { remedies } : {}),
  };
  return findingsText({ path: 'a.rig.yaml', channels: 1, findings: [reported] }, PLAIN);
}

describe('a finding as text', () => {
  it('counts lines and characters from 1, and names the channel or the thing where there is one', () => {
    const message = 'Something.';
    const check = 'fold-in-band';
    expect(text({ message, check, severity: 'error' })).toBe('a.rig.yaml:5:3  error  fold-in-band\n    Something.\n\n');
    expect(text({ message, check, severity: 'hint', channel: 'x' })).toMatch(
      /^a\.rig\.yaml:5:3 {2}hint {2}fold-in-band {2}\(x\)\n/,
    );
    expect(text({ message, check, thing: 'filters/f' })).toMatch(/ {2}\(filters\/f\)\n/);
    expect(text({ message, check, thing: '' })).toMatch(/ {2}fold-in-band\n/);
  });

  it('breaks messages at blanks into lines of 100 characters, and loses no word', () => {
    fc.assert(
      fc.property(fc.array(fc.stringMatching(/^[a-z`.,]{1,30}$/), { minLength: 1, maxLength: 60 }), (words) => {
        const lines = text({ message: words.join(' ') })
          .trimEnd()
          .split('\n')
          .slice(1);
        expect(lines.flatMap((line) => line.trim().split(' '))).toEqual(words);
        for (const line of lines) expect(line.length).toBeLessThanOrEqual(100);
        // As few lines as will do: no line could take the first word of the next.
        for (const [index, line] of lines.slice(0, -1).entries()) {
          expect(line.length + 1 + lines[index + 1]!.trim().split(' ')[0]!.length).toBeGreaterThan(100);
        }
      }),
      { numRuns: runs(500), seed: 20261203 },
    );
  });

  it('gives a word that is longer than a line a line of its own', () => {
    const long = 'x'.repeat(150);
    expect(
      text({ message: `a ${long} b` })
        .split('\n')
        .slice(1, 4),
    ).toEqual(['    a', `    ${long}`, '    b']);
  });

  it('lists remedies with a star for the preferred one, their further lines set in', () => {
    const remedy = { name: 'sample-faster', kind: 'setting', edits: [] } as const;
    const lines = text({ message: 'Something.' }, [
      { ...remedy, title: 'First', preferred: true },
      { ...remedy, title: 'word '.repeat(30).trim(), preferred: false },
    ]).split('\n');
    expect(lines.slice(2, 4)).toEqual(['    * First', `    - ${'word '.repeat(18).trim()}`]);
    expect(lines[4]).toBe(`      ${'word '.repeat(12).trim()}`);
  });
});

describe('the summary', () => {
  it.each([
    [0, 0, { error: 0, warning: 0, hint: 0 }, '0 channels in 0 files checked: no errors, no warnings, no hints.\n'],
    [1, 1, { error: 1, warning: 1, hint: 1 }, '1 channel in 1 file checked: 1 error, 1 warning, 1 hint.\n'],
    [2, 3, { error: 4, warning: 5, hint: 6 }, '3 channels in 2 files checked: 4 errors, 5 warnings, 6 hints.\n'],
  ])('of %i files and %i channels', (files, channels, counts, expected) => {
    expect(summaryText(files, { ...counts, accepted: 0, channels }, PLAIN)).toBe(expected);
  });

  it('colours what there is and leaves the rest alone', () => {
    expect(summaryText(1, { error: 1, warning: 0, hint: 2, accepted: 0, channels: 1 }, COLOURED)).toBe(
      '1 channel in 1 file checked: \u001b[31m1 error\u001b[39m, no warnings, \u001b[36m2 hints\u001b[39m.\n',
    );
  });
});

describe('paint', () => {
  it('sets and takes back exactly what it set: ECMA-48, 8.3.117, SGR', () => {
    // 31, 33 and 36 set red, yellow and cyan, 39 the default colour; 1 is bold, 2 faint, 22 neither of them.
    expect(COLOURED('x', 'error')).toBe('\u001b[31mx\u001b[39m');
    expect(COLOURED('x', 'warning')).toBe('\u001b[33mx\u001b[39m');
    expect(COLOURED('x', 'hint')).toBe('\u001b[36mx\u001b[39m');
    expect(COLOURED('x', 'quiet')).toBe('\u001b[2mx\u001b[22m');
    expect(COLOURED('x', 'strong')).toBe('\u001b[1mx\u001b[22m');
    expect(PLAIN('x', 'error')).toBe('x');
  });
});

describe('text out of a rig file', () => {
  it('is shown as JSON would write it where a terminal would obey it', () => {
    expect(printable('a\u001b[31mb\u0007\u009b\n\t')).toBe('a\\u001b[31mb\\u0007\\u009b\\u000a\\u0009');
    // UAX #9: the explicit formatting characters turn the direction of what follows.
    expect(printable('\u202eabc\u2066')).toBe('\\u202eabc\\u2066');
    expect(printable('°µΩ√ 🎚 ±')).toBe('°µΩ√ 🎚 ±');
    expect(printableLines('a\r\nb\u001b\n')).toBe('a\\u000d\nb\\u001b\n');
  });

  it('is given back by a reader of JSON', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary' }), (any) => {
        const quoted = printable(any.replaceAll('\\', '').replaceAll('"', ''));
        expect(JSON.parse(`"${quoted}"`)).toBe(any.replaceAll('\\', '').replaceAll('"', ''));
        expect(quoted).not.toMatch(/\p{Cc}/u);
      }),
      { numRuns: runs(500), seed: 20261204 },
    );
  });
});
