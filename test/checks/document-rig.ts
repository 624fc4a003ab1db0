import type { Finding } from '../../server/src/checks/finding.ts';
import { findingsOf, underlined } from './judged.ts';

/** Keys of a channel of which nothing is said. */
export const OK = 'rate: 1 kHz, band: 1 Hz .. 10 Hz, undeclared: -90 dBFS';

/** A filter of which nothing is said. */
export const RC = '{ response: rc, order: 1, corner: 1 kHz }';

/** Who a finding is about, the check, and the text it stands under. */
export function line(finding: Finding): string {
  return `${finding.channel ?? finding.thing}: ${finding.check} \`${underlined(finding)}\``;
}

/** What is said of a rig with these sections, but that `x-...` is no section: such a key only holds anchors. */
export function lines(sections: string): readonly string[] {
  return findingsOf(`rig: R\n${sections}`)
    .filter(({ about }) => !about?.startsWith('x-'))
    .map(line);
}

/** The section of that name with these entries. */
export function channels(...entries: readonly string[]): string {
  return `channels:\n${entries.map((entry) => `  ${entry}\n`).join('')}`;
}
