import { withAcceptances } from '../../server/src/checks/acceptance-findings.ts';
import { acceptedResult, acceptingOn } from '../../server/src/checks/accepting.ts';
import type { Guard } from '../../server/src/checks/channel-result.ts';
import type { Finding } from '../../server/src/checks/finding.ts';
import { judgeChannel, judgingRig } from '../../server/src/checks/judge.ts';
import { CHECK_NAMES } from '../../server/src/checks/list.ts';
import { partOf } from '../../server/src/checks/roster.ts';
import { readChannel } from '../../server/src/rig/channel-reading.ts';
import { readEnvironment } from '../../server/src/rig/environment.ts';
import { readSnapshot } from '../../server/src/rig/snapshot.ts';
import { TODAY } from '../tools/today.ts';

/** In the tests a check that throws fails the test. */
export const NO_GUARD: Guard = (_name, run) => run();

/** Every finding of a rig file's text, those of the rig first, then channel by channel. */
export function findingsOf(text: string): readonly Finding[] {
  const environment = readEnvironment(readSnapshot(text), CHECK_NAMES);
  const accepting = acceptingOn(environment.acceptances, TODAY);
  const channels = environment.channelEntries.map((entry) => {
    const reading = readChannel(entry, environment);
    const result = acceptedResult(judgeChannel(reading, environment.severities, NO_GUARD), accepting);
    return { reading, result, part: partOf(reading, result) };
  });
  const found = finished(judgingRig(environment, channels, NO_GUARD));
  return [
    ...withAcceptances(found.findings, { environment, channels, roster: found.roster }, accepting),
    ...channels.flatMap(({ result }) => result.findings),
  ];
}

/** What a computation in steps comes to. */
export function finished<T>(steps: Generator<unknown, T>): T {
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
  }
}

/** The findings of one check. */
export function found(text: string, check: string): readonly Finding[] {
  return findingsOf(text).filter((finding) => finding.check === check);
}

/** The one finding of a check. */
export function only(text: string, check: string): Finding {
  const findings = found(text, check);
  if (findings.length !== 1) throw new Error(`${check} is said ${findings.length} times, not once.`);
  return findings[0]!;
}

/** The text that a finding stands under. */
export function underlined(finding: Pick<Finding, 'place'>): string {
  const { entry, start, end } = finding.place;
  return entry.text.slice(start, end);
}

/** `check` or `check about`, for comparing whole lists. */
export function names(findings: readonly Finding[]): readonly string[] {
  return findings.map(({ check, about }) => (about === undefined ? check : `${check} ${about}`));
}
