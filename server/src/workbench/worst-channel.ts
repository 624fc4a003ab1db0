import type { Finding } from '../checks/finding.ts';
import { SEVERITIES } from '../checks/finding.ts';
import type { Evaluation, JudgedChannel } from './evaluation.ts';

/**
 * The channel with the gravest findings that has a chain to draw: most errors, then most warnings, then most hints,
 * then the smallest margin; the first of equals. What is accepted does not count.
 */
export function worstChannel(evaluation: Evaluation): JudgedChannel | undefined {
  let worst: JudgedChannel | undefined;
  for (const judged of evaluation.channels) {
    if (judged.result.chain && (!worst || compare(judged, worst) < 0)) worst = judged;
  }
  return worst;
}

function compare(a: JudgedChannel, b: JudgedChannel): number {
  for (const severity of SEVERITIES) {
    const difference = count(b.result.findings, severity) - count(a.result.findings, severity);
    if (difference !== 0) return difference;
  }
  return (a.result.chain?.margin ?? 0) - (b.result.chain?.margin ?? 0);
}

function count(findings: readonly Finding[], severity: Finding['severity']): number {
  return findings.reduce((sum, finding) => sum + (finding.severity === severity && !finding.accepted ? 1 : 0), 0);
}
