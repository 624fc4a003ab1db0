import type { Finding } from '../../server/src/checks/finding.ts';
import { identityOf } from '../../server/src/checks/finding.ts';
import type { Remedy } from '../../server/src/remedies/remedy.ts';
import { applyTextEdits } from '../../server/src/rig/text-edit.ts';
import type { Evaluation } from '../../server/src/workbench/evaluation.ts';
import { allFindings } from '../../server/src/workbench/findings.ts';
import { evaluated, strictWorkbench } from '../workbench/describe-findings.ts';

const URI = 'file:///remedied.rig.yaml';

/** A finding of a text with everything that is offered for it. */
export interface Offer {
  readonly finding: Finding;
  readonly remedies: readonly Remedy[];
}

/** Everything that is offered for a text, finding by finding. */
export function offersFor(text: string): { readonly evaluation: Evaluation; readonly offers: readonly Offer[] } {
  const workbench = strictWorkbench();
  workbench.setFile(URI, { text });
  const evaluation = workbench.evaluation(URI)!;
  const offers = allFindings(evaluation).map((finding) => ({
    finding,
    remedies: workbench.remedies(URI, finding, () => false),
  }));
  return { evaluation, offers };
}

/** What is offered for the findings of one check, in the order in which it is offered. */
export function offered(text: string, check: string): readonly Remedy[] {
  return offersFor(text)
    .offers.filter(({ finding }) => finding.check === check)
    .flatMap(({ remedies }) => remedies);
}

/** The text after a remedy. */
export function afterwards(text: string, { edits }: Remedy): string {
  return applyTextEdits(text, edits);
}

/** The identities of findings in a text, with how grave each is. */
export function identities(text: string): ReadonlyMap<string, Finding> {
  return new Map(allFindings(evaluated(text)).map((finding) => [identityOf(finding), finding]));
}
