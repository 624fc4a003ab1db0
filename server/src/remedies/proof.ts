import type { Finding, Severity } from '../checks/finding.ts';
import { identityOf } from '../checks/finding.ts';
import type { Recheck } from './remedy.ts';

const GRAVITY: Readonly<Record<Severity, number>> = { error: 2, warning: 1, hint: 0 };

/** A finding has grown worse when its excess has grown by more than rounding. */
const SLACK = 1e-9;

/**
 * The rule of proof: the finding's identity is gone, no error or warning of a new identity has come, and no finding
 * that stays has grown worse or more severe.
 */
export function isProved(finding: Finding, { before, after }: Recheck): boolean {
  const identity = identityOf(finding);
  return !after.some((one) => identityOf(one) === identity) && nothingWorse(before, after);
}

/** The rule of proof for what a person has yet to fill in: its finding may stay, and nothing else may come. */
export function isHarmless({ before, after }: Recheck): boolean {
  return nothingWorse(before, after);
}

function nothingWorse(before: readonly Finding[], after: readonly Finding[]): boolean {
  if (after.length === 0) return true;
  const known = new Map<string, Finding>();
  for (const finding of before) {
    const identity = identityOf(finding);
    const other = known.get(identity);
    if (!other || isWorse(finding, other)) known.set(identity, finding);
  }
  return after.every((finding) => {
    const old = known.get(identityOf(finding));
    return old ? !isWorse(finding, old) : finding.severity === 'hint';
  });
}

/** True where `finding` is more severe than `old`, or as severe and further past its limit. */
export function isWorse(finding: Finding, old: Finding): boolean {
  if (finding.severity !== old.severity) return GRAVITY[finding.severity] > GRAVITY[old.severity];
  return finding.excess > old.excess + SLACK * Math.max(1, Math.abs(old.excess));
}

/** True where nothing at all has come, hints included: what edits without being asked twice keeps to. */
export function bringsNothing({ before, after }: Recheck): boolean {
  const known = new Set(before.map(identityOf));
  return after.every((finding) => known.has(identityOf(finding)));
}
