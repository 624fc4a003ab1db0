import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { generatedRig } from '../bench/rigs.ts';
import { editsOf, step } from '../tools/random-edits.ts';
import { runs } from '../tools/runs.ts';
import { EXTRACT_FAN, SAMPLES } from '../tools/samples.ts';
import { TODAY } from '../tools/today.ts';
import { describeFindings, evaluated, strictWorkbench } from './describe-findings.ts';
import { ACCEPTED, NOISE, RANGES, SPECTRA, TIMED } from './edited-rigs.ts';

const URI = 'file:///edited.rig.yaml';
const TEXTS = [
  ...SAMPLES.map(({ text }) => text),
  EXTRACT_FAN,
  TIMED,
  SPECTRA,
  NOISE,
  generatedRig(3, 'flow'),
  generatedRig(3, 'json'),
  RANGES,
  ACCEPTED,
];
const EDITS_A_RUN = 20;

describe('after edits', () => {
  it('the findings are those of a workbench that read the text from nothing', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...TEXTS),
        fc.array(step, { minLength: EDITS_A_RUN, maxLength: EDITS_A_RUN }),
        (text, steps) => {
          const workbench = strictWorkbench();
          workbench.setFile(URI, { text });
          workbench.evaluation(URI);
          for (const one of steps) {
            const snapshot = workbench.snapshot(URI)!;
            // As an editor sends them: from the end to the beginning, each a change of what the one before left.
            const changes = [...editsOf(snapshot.text(), one)]
              .sort((a, b) => b.start - a.start)
              .map((edit) => ({
                range: { start: snapshot.positionAt(edit.start), end: snapshot.positionAt(edit.end) },
                text: edit.text,
              }));
            workbench.editFile(URI, changes);
            const evaluation = workbench.evaluation(URI)!;
            expect(describeFindings(evaluation)).toEqual(describeFindings(evaluated(evaluation.snapshot.text())));
          }
        },
      ),
      { numRuns: runs(2_000 / EDITS_A_RUN), seed: 20261201 },
    );
  }, 600_000);

  it.each(SAMPLES)(
    'every prefix of $name is checked without a fault',
    ({ text }) => {
      const workbench = strictWorkbench();
      const stride = process.env.RATEWRIGHT_FULL === '1' ? 1 : 7;
      for (let length = 0; length <= text.length; length += stride) {
        workbench.setFile(URI, { text: text.slice(0, length) });
        expect(workbench.evaluation(URI)).toBeDefined();
      }
    },
    600_000,
  );

  it('an edit of what a group allows judges no channel again, one of a member that one alone', () => {
    const workbench = strictWorkbench();
    workbench.setFile(URI, { text: TIMED });
    const before = workbench.evaluation(URI)!;
    const skewOf = (evaluation: typeof before) => evaluation.rigFindings.filter(({ check }) => check === 'scan-skew');
    expect(skewOf(before)).toHaveLength(1);
    workbench.editFile(URI, [{ text: TIMED.replace('0.1 deg', '10 deg') }]);
    const allowed = workbench.evaluation(URI)!;
    expect(skewOf(allowed)).toEqual([]);
    expect(allowed.channels.map((channel, index) => channel === before.channels[index])).toEqual([true, true, true]);
    workbench.editFile(URI, [{ text: TIMED.replace('rate: 20 kHz', 'rate: 40 kHz') }]);
    const faster = workbench.evaluation(URI)!;
    expect(faster.channels.map((channel, index) => channel === before.channels[index])).toEqual([true, true, false]);
  });

  it('a change that comes while an evaluation is under way leaves the evaluation of the new text', () => {
    const workbench = strictWorkbench();
    workbench.setFile(URI, { text: EXTRACT_FAN });
    const steps = workbench.evaluating(URI);
    steps.next();
    workbench.editFile(URI, [{ text: EXTRACT_FAN.replace('rate: 25.6 kHz', 'rate: 51.2 kHz') }]);
    while (!steps.next().done);
    const findings = describeFindings(workbench.evaluation(URI)!);
    expect(findings).toEqual(describeFindings(evaluated(EXTRACT_FAN.replace('rate: 25.6 kHz', 'rate: 51.2 kHz'))));
  });

  it('files that are missing, too large or unknown are no more than that', () => {
    const workbench = strictWorkbench();
    workbench.setFile(URI, { text: EXTRACT_FAN });
    workbench.setFile(URI, 'missing');
    expect(workbench.evaluation(URI)).toBeUndefined();
    workbench.setFile(URI, { text: EXTRACT_FAN });
    workbench.setFile(URI, 'too-large');
    expect(workbench.evaluation(URI)).toBeUndefined();
    workbench.editFile('file:///unknown', [{ text: 'x' }]);
    expect(workbench.snapshot('file:///unknown')).toBeUndefined();
    workbench.forgetFile(URI);
    expect(workbench.remedies(URI, {} as never, () => false)).toEqual([]);
    expect(workbench.fixAll(URI, new Set(), () => false)).toBeUndefined();
  });

  it('a check that fails is reported once and costs only itself', async () => {
    const messages: string[] = [];
    const { Workbench } = await import('../../server/src/workbench/workbench.ts');
    const workbench = new Workbench(
      (message) => messages.push(message),
      () => TODAY,
    );
    workbench.setFile(URI, { text: EXTRACT_FAN });
    const evaluation = workbench.evaluation(URI)!;
    const [finding] = [...evaluation.channels[0]!.result.findings];
    // A finding that no remedy can understand stands for a remedy that fails.
    const broken = {
      ...finding!,
      get check(): string {
        throw new Error('broken on purpose');
      },
    };
    expect(workbench.remedies(URI, broken, () => false)).toEqual([]);
    expect(workbench.remedies(URI, broken, () => false)).toEqual([]);
    expect(messages).toHaveLength(1);
    expect(messages[0]).toContain('broken on purpose');
  });
});
