import type { Acceptance } from '../rig/acceptance.ts';
import { coversChannel } from '../rig/name-matching.ts';
import type { ChannelResult } from './channel-result.ts';
import type { Finding } from './finding.ts';

/** The acceptances of a rig file on one day, ready to be asked. */
export interface Accepting {
  /** In document order. */
  readonly acceptances: readonly Acceptance[];
  /** As `2026-12-01`. */
  readonly today: string;
  readonly byCheck: ReadonlyMap<string, OfOneCheck>;
}

/** Most acceptances name one channel, and are found by its name; the others are tried one by one. */
interface OfOneCheck {
  readonly named: ReadonlyMap<string, readonly Acceptance[]>;
  readonly others: readonly Acceptance[];
}

const NONE: readonly Acceptance[] = [];

/** @param before of an earlier text, which is kept where nothing has changed; the answer is the same without */
export function acceptingOn(acceptances: readonly Acceptance[], today: string, before?: Accepting): Accepting {
  if (before?.acceptances === acceptances && before.today === today) return before;
  const byCheck = new Map<string, { readonly named: Map<string, Acceptance[]>; readonly others: Acceptance[] }>();
  for (const acceptance of acceptances) {
    const { finding, on } = acceptance;
    const ofCheck = byCheck.get(finding) ?? { named: new Map<string, Acceptance[]>(), others: [] };
    byCheck.set(finding, ofCheck);
    if (!on || on.parts) {
      ofCheck.others.push(acceptance);
      continue;
    }
    const named = ofCheck.named.get(on.text);
    if (named) named.push(acceptance);
    else ofCheck.named.set(on.text, [acceptance]);
  }
  return { acceptances, today, byCheck };
}

/** Every acceptance that is about a finding, whether or not it counts: those that name its channel alone first. */
export function acceptancesOf(finding: Finding, { byCheck }: Accepting): readonly Acceptance[] {
  const ofCheck = byCheck.get(finding.check);
  if (!ofCheck) return NONE;
  const { channel } = finding;
  const named = (channel === undefined ? undefined : ofCheck.named.get(channel)) ?? NONE;
  const others = ofCheck.others.filter(({ on }) => !on || (channel !== undefined && coversChannel(on, channel)));
  return [...named, ...others].filter(({ about }) => about === undefined || isAbout(finding, about));
}

/** What a finding of no channel is about is the thing itself: `filters/tidy`, or `tidy`. */
function isAbout({ about, channel, thing }: Finding, name: string): boolean {
  if (about === name) return true;
  return channel === undefined && thing !== undefined && (thing === name || thing.endsWith(`/${name}`));
}

/** Whether the last day of an acceptance has passed. */
export function hasExpired({ until }: Acceptance, { today }: Accepting): boolean {
  return until !== undefined && today > until.day;
}

/** The acceptance by which a finding is accepted, if it is: the first that counts. */
export function acceptanceOf(finding: Finding, accepting: Accepting): Acceptance | undefined {
  return counting(acceptancesOf(finding, accepting), accepting);
}

function counting(acceptances: readonly Acceptance[], accepting: Accepting): Acceptance | undefined {
  return acceptances.find((one) => one.reason !== '' && !hasExpired(one, accepting));
}

/** Findings of which some are accepted, and the acceptances that are about any of them. */
export interface Accepted {
  readonly findings: readonly Finding[];
  readonly acceptances: readonly Acceptance[];
}

/** Marks the findings that are accepted, and no others; the very same list where nothing of it changes. */
export function accepted(findings: readonly Finding[], accepting: Accepting): Accepted {
  const met = new Set<Acceptance>();
  let isChanged = false;
  const marked = findings.map((finding) => {
    const all = acceptancesOf(finding, accepting);
    for (const one of all) met.add(one);
    const now = withAcceptance(finding, counting(all, accepting));
    isChanged ||= now !== finding;
    return now;
  });
  return { findings: isChanged ? marked : findings, acceptances: met.size === 0 ? NONE : [...met] };
}

/** A channel's findings, those accepted marked; the very same result where nothing of it changes. */
export function acceptedResult(result: ChannelResult, accepting: Accepting): ChannelResult {
  if (result.findings.length === 0 || (accepting.byCheck.size === 0 && !result.acceptances)) return result;
  const { findings, acceptances } = accepted(result.findings, accepting);
  if (findings === result.findings && acceptances === NONE && !result.acceptances) return result;
  const { acceptances: _, ...rest } = result;
  return acceptances === NONE ? { ...rest, findings } : { ...rest, findings, acceptances };
}

function withAcceptance(finding: Finding, acceptance: Acceptance | undefined): Finding {
  if (finding.acceptance === acceptance) return finding;
  if (acceptance) return { ...finding, accepted: true, acceptance };
  const { accepted: _, acceptance: __, ...rest } = finding;
  return rest;
}
