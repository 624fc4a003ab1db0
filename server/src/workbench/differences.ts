import type { Finding } from '../checks/finding.ts';
import type { Recheck } from '../remedies/remedy.ts';
import type { Evaluation } from './evaluation.ts';

/**
 * The findings that differ between two evaluations of which the second grew out of the first: those of every channel
 * that is not the very same object in both, and those of the rig.
 */
export function differences(before: Evaluation, after: Evaluation): Recheck {
  const kept = new Set<object>();
  const earlier = before.channels;
  const later = after.channels;
  let head = 0;
  while (head < earlier.length && head < later.length && earlier[head] === later[head]) head++;
  let tail = 0;
  const most = Math.min(earlier.length, later.length) - head;
  while (tail < most && earlier[earlier.length - 1 - tail] === later[later.length - 1 - tail]) tail++;
  const changedBefore = earlier.slice(head, earlier.length - tail);
  const changedAfter = later.slice(head, later.length - tail);
  for (const channel of changedBefore) kept.add(channel);
  const findingsBefore: Finding[] = [...before.rigFindings];
  const findingsAfter: Finding[] = [...after.rigFindings];
  const unchanged = new Set<object>();
  for (const channel of changedAfter) {
    if (kept.has(channel)) unchanged.add(channel);
    else findingsAfter.push(...channel.result.findings);
  }
  for (const channel of changedBefore) {
    if (!unchanged.has(channel)) findingsBefore.push(...channel.result.findings);
  }
  return { before: findingsBefore, after: findingsAfter };
}
