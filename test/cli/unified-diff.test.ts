import { execFileSync } from 'node:child_process';
import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { unifiedDiff } from '../../server/src/cli/unified-diff.ts';
import type { TextEdit } from '../../server/src/rig/text-edit.ts';
import { applyTextEdits } from '../../server/src/rig/text-edit.ts';
import { runs } from '../tools/runs.ts';
import { folderOf } from './ran.ts';

const line = fc.stringMatching(/^[ab \t\r\u00e9-]{0,3}$/);
const text = fc.tuple(fc.array(line, { maxLength: 40 }), fc.boolean()).map(([lines, isEnded]) => {
  const joined = lines.join('\n');
  return isEnded && joined !== '' ? `${joined}\n` : joined;
});
const edit = fc.record({
  at: fc.double({ min: 0, max: 1, noNaN: true }),
  length: fc.nat({ max: 12 }),
  text: fc.stringMatching(/^[ab\n]{0,4}$/),
});

/** Edits that fit the text. */
function placed(within: string, parts: readonly { at: number; length: number; text: string }[]): readonly TextEdit[] {
  return parts.map(({ at, length, text: put }) => {
    const start = Math.floor(at * within.length);
    return { start, end: Math.min(within.length, start + length), text: put };
  });
}

/** What the tool `patch` makes of a text by a diff. */
function patched(folder: string, before: string, diff: string): string {
  writeFileSync(join(folder, 'a'), before);
  writeFileSync(join(folder, 'diff'), diff);
  // Every line of context has to be there, at the very line that the hunk names.
  const said = execFileSync('patch', ['-p0', '--binary', '--fuzz=0', '-i', 'diff'], { cwd: folder, encoding: 'utf8' });
  expect(said).not.toContain('offset');
  return readFileSync(join(folder, 'a'), 'utf8');
}

describe('a unified diff', () => {
  it('is what patch makes the edited text of, whatever the edits', () => {
    const folder = folderOf({});
    fc.assert(
      fc.property(text, fc.array(edit, { maxLength: 6 }), fc.constantFrom('', '\ufeff'), (before, parts, mark) => {
        const edits = placed(before, parts);
        const after = applyTextEdits(before, edits);
        const diff = unifiedDiff('a', before, edits, mark);
        if (before === after) expect(diff.split('\n').length).toBeLessThanOrEqual(3);
        // Patch takes a file away that nothing is left of.
        else if (mark + after !== '') expect(patched(folder, mark + before, diff)).toBe(mark + after);
      }),
      { numRuns: runs(500), seed: 20261202 },
    );
  });

  it('has three lines of context, and one hunk for changes whose contexts touch', () => {
    const before = Array.from({ length: 30 }, (_, index) => `line ${index + 1}\n`).join('');
    const changing = (...numbers: readonly number[]): string => {
      const edits = numbers.map((number) => {
        const start = before.indexOf(`line ${number}\n`);
        return { start, end: start + 4, text: 'LINE' };
      });
      return unifiedDiff('a', before, edits, '');
    };
    expect(changing(10, 17).match(/^@@.*@@$/gm)).toEqual(['@@ -7,14 +7,14 @@']);
    expect(changing(10, 18).match(/^@@.*@@$/gm)).toEqual(['@@ -7,7 +7,7 @@', '@@ -15,7 +15,7 @@']);
    expect(changing(1, 30).match(/^@@.*@@$/gm)).toEqual(['@@ -1,4 +1,4 @@', '@@ -27,4 +27,4 @@']);
  });

  it('counts lines that come and go into the hunks after them', () => {
    const before = 'a\nb\nc\n'.repeat(10);
    const edits = [
      { start: 0, end: 0, text: 'new\n' },
      { start: 42, end: 46, text: '' },
    ];
    expect(unifiedDiff('a', before, edits, '').match(/^@@.*@@$/gm)).toEqual(['@@ -1,3 +1,4 @@', '@@ -19,8 +20,6 @@']);
  });

  it('takes no longer than in proportion where every block of a large rig changes', () => {
    const block = 'name:\n  rate: 1 Hz\n  band: 2 Hz\n  note: x\n';
    const before = block.repeat(20_000);
    const edits = Array.from({ length: 20_000 }, (_, index) => {
      const start = index * block.length + block.indexOf('1 Hz');
      return { start, end: start + 1, text: '9' };
    });
    const started = performance.now();
    const diff = unifiedDiff('a', before, edits, '');
    expect(diff.match(/^\+ {2}rate: 9 Hz$/gm)).toHaveLength(20_000);
    // Comparing line by line takes minutes here; this takes a tenth of a second.
    expect(performance.now() - started).toBeLessThan(5_000);
  });
});
