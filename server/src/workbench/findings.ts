import type { Finding, Severity } from '../checks/finding.ts';
import { SEVERITIES } from '../checks/finding.ts';
import type { PositionRange } from '../rig/place.ts';
import type { Evaluation } from './evaluation.ts';

/** A finding with its lines and characters in the text as it stands. */
export interface LocatedFinding {
  readonly finding: Finding;
  readonly range: PositionRange;
}

export type SeverityCounts = Readonly<Record<Severity, number>>;

/** Every finding of an evaluation, in no particular order. */
export function* allFindings(evaluation: Evaluation): Generator<Finding> {
  yield* evaluation.rigFindings;
  for (const channel of evaluation.channels) yield* channel.result.findings;
}

/** How many findings of each severity there are. */
export function countFindings(evaluation: Evaluation): SeverityCounts {
  const counts = { error: 0, warning: 0, hint: 0 };
  for (const finding of allFindings(evaluation)) counts[finding.severity]++;
  return counts;
}

/**
 * At most `most` findings with their ranges, ordered by position; where some have to be left out, hints go first,
 * then warnings.
 */
export function locatedFindings(evaluation: Evaluation, most = Number.POSITIVE_INFINITY): readonly LocatedFinding[] {
  const chosen: Finding[] = [];
  for (const severity of SEVERITIES) {
    if (chosen.length >= most) break;
    collect(evaluation, severity, most, chosen);
  }
  const located = chosen.map((finding) => ({ finding, range: evaluation.snapshot.rangeOf(finding.place) }));
  return located.sort(byPosition);
}

function collect(evaluation: Evaluation, severity: Severity, most: number, into: Finding[]): void {
  for (const finding of allFindings(evaluation)) {
    if (finding.severity !== severity) continue;
    if (into.length >= most) return;
    into.push(finding);
  }
}

function byPosition(a: LocatedFinding, b: LocatedFinding): number {
  return (
    a.range.start.line - b.range.start.line ||
    a.range.start.character - b.range.start.character ||
    SEVERITIES.indexOf(a.finding.severity) - SEVERITIES.indexOf(b.finding.severity) ||
    compare(a.finding.check, b.finding.check) ||
    compare(a.finding.about ?? '', b.finding.about ?? '') ||
    (a.finding.stage ?? 0) - (b.finding.stage ?? 0)
  );
}

function compare(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}
