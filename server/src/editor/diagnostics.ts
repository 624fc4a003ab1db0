import type { Diagnostic } from 'vscode-languageserver-types';
import { DiagnosticSeverity, DiagnosticTag } from 'vscode-languageserver-types';
import { acceptanceWords } from '../checks/acceptance-words.ts';
import type { Finding } from '../checks/finding.ts';
import { MOST_FINDINGS_SENT } from '../rig/limits.ts';
import type { Evaluation } from '../workbench/evaluation.ts';
import type { LocatedFinding } from '../workbench/findings.ts';
import { allFindings, gravestFindings, located } from '../workbench/findings.ts';
import { protocolSeverity } from './convert.ts';
import type { ReferenceLinks } from './reference-links.ts';

/**
 * A file's findings as the protocol shows them, at most {@link MOST_FINDINGS_SENT}, errors first; where some are left
 * out, the last one says how many.
 */
export function diagnosticsOf(uri: string, evaluation: Evaluation, links: ReferenceLinks): Diagnostic[] {
  const all = allFindings(evaluation);
  const allFit = all.length <= MOST_FINDINGS_SENT;
  const sent = gravestFindings(evaluation, all, allFit ? MOST_FINDINGS_SENT : MOST_FINDINGS_SENT - 1);
  const diagnostics = sent.map((located) => diagnosticOf(uri, located, evaluation, links));
  if (allFit) return diagnostics;
  return [
    ...diagnostics,
    {
      range: { start: { line: 0, character: 0 }, end: { line: 0, character: 0 } },
      severity: DiagnosticSeverity.Information,
      source: 'ratewright',
      message: `${all.length - sent.length} more findings are not shown here. \`ratewright check\` lists all ${all.length}.`,
    },
  ];
}

function diagnosticOf(
  uri: string,
  { finding, range }: LocatedFinding,
  evaluation: Evaluation,
  links: ReferenceLinks,
): Diagnostic {
  const related = finding.related.flatMap(({ place, message }) => {
    const found = located(evaluation, place);
    return found ? [{ location: { uri: found.uri ?? uri, range: found.range }, message }] : [];
  });
  const unused = finding.check === UNUSED && !finding.accepted;
  const href = links.check(finding.check);
  return {
    range,
    severity: shownSeverity(finding),
    source: 'ratewright',
    code: finding.check,
    ...(href === undefined ? {} : { codeDescription: { href } }),
    message: finding.acceptance ? `${finding.message}\n${acceptanceWords(finding.acceptance)}` : finding.message,
    ...(unused ? { tags: [DiagnosticTag.Unnecessary] } : {}),
    ...(related.length === 0 ? {} : { relatedInformation: related }),
  };
}

const UNUSED = 'unused-name';

/** What is accepted is shown faintly where it stands, and so is a name nobody uses, unless somebody made it graver. */
function shownSeverity({ check, severity, accepted }: Finding): DiagnosticSeverity {
  if (accepted || (check === UNUSED && severity === 'hint')) return DiagnosticSeverity.Hint;
  return protocolSeverity(severity);
}
