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
  return after.every(mayStandBeside(finding, before));
}

/** The same rule, for one finding after the other: true for one that may be there afterwards. */
export function mayStandBeside(finding: Finding, before: readonly Finding[]): (after: Finding) => boolean {
  return mayStandWithout(finding, noWorseThan(before));
}

/** The same, where it is known already what is no worse. */
export function mayStandWithout(finding: Finding, isNoWorse: (after: Finding) => boolean): (after: Finding) => boolean {
  const identity = identityOf(finding);
  return (after) => identityOf(after) !== identity && isNoWorse(after);
}

/**
 * The rule of proof for what a person has yet to fill in, which is all of it but the finding that it is for: one that
 * stays is no worse, and what comes is no more than a hint.
 */
export function noWorseThan(before: readonly Finding[]): (after: Finding) => boolean {
  const known = new Map<string, Finding>();
  for (const finding of before) {
    const identity = identityOf(finding);
    const other = known.get(identity);
    if (!other || isWorse(finding, other)) known.set(identity, finding);
  }
  return (after) => {
    const old = known.get(identityOf(after));
    return old ? !isWorse(after, old) : after.severity === 'hint';
  };
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
