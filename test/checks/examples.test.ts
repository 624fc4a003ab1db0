import { describe, expect, it } from 'vitest';
import { identityOf } from '../../server/src/checks/finding.ts';
import { ALL_CHECKS, CHECK_NAMES } from '../../server/src/checks/list.ts';
import { findingsOf, found, names } from './judged.ts';

/** As long as every key is computed, nothing can show that one is not. */
const SHOWN = ALL_CHECKS.filter(({ name }) => name !== 'not-computed');

/** What a document check's example can't do without: a finding of its own that leaves nothing else to say. */
describe.each(SHOWN)('$name', (check) => {
  it('is found in the example that shows it, with its usual severity', () => {
    const findings = found(check.shows, check.name);
    expect(findings.map(({ severity }) => severity)).toContain(check.severity);
  });

  it('is not found in the example that just does not', () => {
    expect(names(found(check.clean, check.name))).toEqual([]);
  });

  it('can be turned off and can be made graver or milder', () => {
    expect(found(`${check.shows}checks: { ${check.name}: off }\n`, check.name)).toEqual([]);
    for (const severity of ['hint', 'warning', 'error'] as const) {
      const findings = found(`${check.shows}checks: { ${check.name}: ${severity} }\n`, check.name);
      expect(new Set(findings.map((finding) => finding.severity))).toEqual(new Set([severity]));
    }
  });

  it('says what it has to say in plain sentences', () => {
    expect(check.finds).toMatch(/^[A-Z`].*\.$/);
    expect(check.why.length).toBeGreaterThan(60);
    expect(check.sources.length).toBeGreaterThan(0);
    for (const { message } of found(check.shows, check.name)) expect(message).toMatch(/^[^!]*[.`]$/);
  });

  it('has findings that can be told apart', () => {
    const identities = findingsOf(check.shows).map(identityOf);
    expect(new Set(identities).size).toBe(identities.length);
  });
});

describe('the list of checks', () => {
  it('has each name once', () => {
    expect(new Set(CHECK_NAMES).size).toBe(CHECK_NAMES.length);
  });
});
