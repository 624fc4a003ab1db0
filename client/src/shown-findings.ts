import type { FindingsShown } from './settings.ts';

/** The editor's numbers for severities: the smaller, the graver. */
const ERROR = 0;
const WARNING = 1;
const HINT = 3;

const LEAST_GRAVE = { all: HINT, warnings: WARNING, errors: ERROR } as const;

/** Those of the findings that the setting asks to see, in the order they came. */
export function shownFindings<T extends { readonly severity: number }>(
  findings: readonly T[],
  shown: FindingsShown,
): readonly T[] {
  return findings.filter((finding) => finding.severity <= LEAST_GRAVE[shown]);
}
