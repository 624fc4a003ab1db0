import type { Acceptance } from '../rig/acceptance.ts';
import { clipped } from '../rig/fields.ts';
import { acceptanceExpired, saidOfExpired } from './acceptance-expired.ts';
import { acceptanceIdle, saidOfIdle } from './acceptance-idle.ts';
import { acceptedWords } from './acceptance-words.ts';
import { type Accepting, accepted, hasExpired } from './accepting.ts';
import type { CheckPage, RigView, SaidOfRig } from './check.ts';
import type { Finding } from './finding.ts';
import { findingOf, toldApart } from './judge.ts';
import type { ChannelSummary } from './roster.ts';

/**
 * The findings of no single channel, those accepted marked, and what is to be said of `accept` itself. A fold over
 * what is known of each channel already: it runs after every keystroke.
 *
 * @param findings of no single channel
 * @param rig its channels with their findings marked
 */
export function withAcceptances(
  findings: readonly Finding[],
  { environment, channels, roster }: RigView,
  accepting: Accepting,
): readonly Finding[] {
  if (accepting.acceptances.length === 0) return findings;
  const marked = accepted(findings, accepting);
  const met = new Set(marked.acceptances);
  for (const { result } of channels) if (result.acceptances) for (const one of result.acceptances) met.add(one);
  // What is accepted may be found once the files are read that this one uses.
  const isAllRead = environment.core.scope.knowsAllNames;
  const ranges = checksOnRanges(roster.ranged);
  const said: Finding[] = [];
  const add = (page: CheckPage, acceptance: Acceptance, one: SaidOfRig): void => {
    const about = clipped(acceptedWords(acceptance).replaceAll('`', ''));
    const finding = findingOf(page, { ...one, thing: 'accept', about }, environment.severities);
    if (finding) said.push(finding);
  };
  for (const acceptance of accepting.acceptances) {
    const { until, on, finding } = acceptance;
    if (acceptance.reason !== '' && met.has(acceptance) && until && hasExpired(acceptance, accepting)) {
      add(acceptanceExpired, acceptance, saidOfExpired(acceptance, until));
    } else if (acceptance.reason === '' || (!met.has(acceptance) && isAllRead)) {
      add(acceptanceIdle, acceptance, saidOfIdle(acceptance, on !== undefined && ranges.has(finding)));
    }
  }
  return [...marked.findings, ...toldApart(said)];
}

/** The checks that have something to say of a channel whose name has a brace range. */
function checksOnRanges(channels: readonly ChannelSummary[]): ReadonlySet<string> {
  const checks = new Set<string>();
  for (const { result } of channels) for (const { check } of result.findings) checks.add(check);
  return checks;
}
