import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { identityOf, SEVERITIES } from '../../server/src/checks/finding.ts';
import { readSnapshot } from '../../server/src/rig/snapshot.ts';
import { applyTextEdits } from '../../server/src/rig/text-edit.ts';
import { allFindings } from '../../server/src/workbench/findings.ts';
import { runs } from '../tools/runs.ts';
import { SAMPLES } from '../tools/samples.ts';
import { strictWorkbench } from '../workbench/describe-findings.ts';
import { faultyRig } from './faulty-rigs.ts';
import { afterwards, identities, offersFor } from './offered.ts';

const WORSE = 1e-6;

describe('every remedy that is offered for a faulty rig', () => {
  it('takes its finding away, brings no error or warning, makes nothing worse, and touches nothing else', () => {
    let tried = 0;
    fc.assert(
      fc.property(faultyRig, (text) => {
        const before = identities(text);
        const { evaluation, offers } = offersFor(text);
        const syntaxBefore = syntaxOf(text);
        for (const { finding, remedies } of offers) {
          expect(remedies.filter(({ preferred }) => preferred).length).toBeLessThanOrEqual(1);
          for (const remedy of remedies) {
            tried++;
            const after = afterwards(text, remedy);
            const found = identities(after);
            if (remedy.kind !== 'claim')
              expect(found.has(identityOf(finding)), `${remedy.title}\n${after}`).toBe(false);
            for (const [identity, now] of found) {
              const old = before.get(identity);
              if (!old) expect(now.severity, `${remedy.title} brings ${now.message}\n${after}`).toBe('hint');
              else {
                expect(now.excess).toBeLessThanOrEqual(old.excess + WORSE * Math.max(1, Math.abs(old.excess)));
                expect(SEVERITIES.indexOf(now.severity)).toBeGreaterThanOrEqual(SEVERITIES.indexOf(old.severity));
              }
            }
            expect(syntaxOf(after)).toBe(syntaxBefore);
            expect(commentsOf(after)).toEqual(commentsOf(text));
            expect(outsideOf(remedy.edits, text, after)).toBe(true);
          }
        }
        expect(evaluation.snapshot.text()).toBe(text);
      }),
      { numRuns: runs(500), seed: 20261201 },
    );
    expect(tried).toBeGreaterThan(50);
  }, 900_000);
});

describe('fixing everything', () => {
  it('leaves fewer findings and none that was not there, whatever the rig', () => {
    fc.assert(
      fc.property(faultyRig, (text) => {
        const { after, applied } = fixed(text);
        const before = identities(text);
        const found = identities(after);
        if (applied === 0) expect(after).toBe(text);
        else expect(found.size).toBeLessThan(before.size);
        for (const [identity, now] of found) {
          if (!before.has(identity)) expect(now.severity).toBe('hint');
        }
      }),
      { numRuns: runs(100), seed: 5 },
    );
  }, 900_000);

  it.each(SAMPLES)('leaves no error of $name that has a remedy of the text or of a setting', ({ text }) => {
    const { after } = fixed(text);
    for (const { finding, remedies } of offersFor(after).offers) {
      if (finding.severity !== 'error') continue;
      expect(remedies.filter(({ preferred }) => preferred).map(({ title }) => title)).toEqual([]);
    }
  });

  it('never claims anything, and changes hardware only when asked to', () => {
    for (const { text } of SAMPLES) {
      expect(fixed(text).kinds.every((kind) => kind === 'text' || kind === 'setting')).toBe(true);
      expect(fixed(text, ['text', 'setting', 'hardware', 'claim']).kinds).not.toContain('claim');
    }
  });
});

function fixed(text: string, kinds: readonly ('text' | 'setting' | 'hardware' | 'claim')[] = ['text', 'setting']) {
  const workbench = strictWorkbench();
  workbench.setFile('file:///f', { text });
  const result = workbench.fixAll('file:///f', new Set(kinds), () => false)!;
  const after = applyTextEdits(text, result.edits);
  expect(allFindings(workbench.evaluation('file:///f')!).length).toBeGreaterThanOrEqual(0);
  return { after, applied: result.applied.length, kinds: result.applied.map(({ kind }) => kind) };
}

function syntaxOf(text: string): number {
  return readSnapshot(text).entries.reduce(
    (sum, { problems }) => sum + problems.filter(({ name }) => name === 'syntax').length,
    0,
  );
}

function commentsOf(text: string): readonly string[] {
  return [...text.matchAll(/#.*$/gm)].map(([comment]) => comment.trim());
}

/** Whether everything outside the edits is the same byte for byte. */
function outsideOf(
  edits: readonly { readonly start: number; readonly end: number; readonly text: string }[],
  text: string,
  after: string,
): boolean {
  const ordered = [...edits].sort((a, b) => a.start - b.start);
  let rest = after;
  let at = 0;
  for (const { start, end, text: by } of ordered) {
    const kept = text.slice(at, start);
    if (!rest.startsWith(kept + by)) return false;
    rest = rest.slice(kept.length + by.length);
    at = end;
  }
  return rest === text.slice(at);
}
