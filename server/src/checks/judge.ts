import type { Chain } from '../chain/model.ts';
import type { ChannelReading } from '../rig/channel-reading.ts';
import type { Environment } from '../rig/environment.ts';
import type { Channel } from '../rig/model.ts';
import { countingNames, type NameUses, NO_USES } from '../rig/name-uses.ts';
import type { PlacedProblem } from '../rig/placed-problem.ts';
import { rigProblems } from '../rig/rig-problems.ts';
import { unusedNames } from '../rig/unused-names.ts';
import type { ChannelResult, Guard } from './channel-result.ts';
import type { ChannelView, Check, CheckPage, RigView, SaidOfRig } from './check.ts';
import { SAYS_NOTHING } from './check.ts';
import { digitalEdges } from './digital-edges.ts';
import { saidOfProblem, saidOfThing } from './document/problems.ts';
import { type Finding, identityOf, SEVERITIES, type Severity } from './finding.ts';
import { CHANNEL_CHECKS, PULSE_CHECKS, RIG_FOLDS } from './list.ts';
import { type ChannelSummary, type Roster, rosterOf } from './roster.ts';
import { UNHEARD_IS, unheardSources } from './unheard.ts';
import { viewOf } from './view.ts';

type Severities = Environment['severities'];

const NO_FINDINGS: readonly Finding[] = [];

/** Judges one channel: the reader's problems as findings, and every channel check. `severities` holds overrides by check name (`off` drops). */
export function judgeChannel(reading: ChannelReading, severities: Severities, guard: Guard): ChannelResult {
  const { channel, problems } = reading;
  if (problems.length === 0) return judgeModel(channel, severities, guard);
  const findings: Finding[] = [];
  for (const problem of problems) {
    const said = saidOfProblem(problem);
    addFinding(findings, said.check, 'error', said, channel, severities);
  }
  const chain = judgeInto(findings, channel, severities, guard);
  return { channel, chain, findings: inOrder(toldApart(findings)) };
}

/** As `judgeChannel`, for a channel that a search has made up (no text, no problems of reading). */
export function judgeModel(channel: Channel, severities: Severities, guard: Guard): ChannelResult {
  const findings: Finding[] = [];
  const chain = judgeInto(findings, channel, severities, guard);
  return { channel, chain, findings: findings.length === 0 ? NO_FINDINGS : inOrder(findings) };
}

/**
 * As `judgeModel` as long as every finding may stand: `undefined` as soon as one may not. Most of what a search makes
 * up fails, and at the check that the search is for.
 *
 * @param first the name of the check that is asked first
 */
export function judgeWhile(
  channel: Channel,
  severities: Severities,
  guard: Guard,
  first: string,
  mayStand: (finding: Finding) => boolean,
): ChannelResult | undefined {
  const view = guard('chain', () => viewOf(channel), undefined);
  if (!view) return undefined;
  const findings: Finding[] = [];
  for (const check of firstOf(first, channel)) {
    const before = findings.length;
    runCheck(findings, check, view, severities, guard);
    for (let index = before; index < findings.length; index++) if (!mayStand(findings[index]!)) return undefined;
  }
  const before = findings.length;
  runDigitalEdges(findings, view, severities, guard);
  for (let index = before; index < findings.length; index++) if (!mayStand(findings[index]!)) return undefined;
  return { channel, chain: view.chain, findings: inOrder(findings) };
}

/** What one check by itself says of a made-up channel. */
export function judgeBy(checkName: string, channel: Channel, severities: Severities, guard: Guard): readonly Finding[] {
  const check = checksFor(channel).find(({ name }) => name === checkName);
  const view = check && guard('chain', () => viewOf(channel), undefined);
  if (!check || !view) return NO_FINDINGS;
  const findings: Finding[] = [];
  runCheck(findings, check, view, severities, guard);
  return findings;
}

function checksFor({ pulses }: Channel): readonly Check<'channel'>[] {
  return pulses ? PULSE_CHECKS : CHANNEL_CHECKS;
}

/** All checks of a channel, the named one first. */
function firstOf(checkName: string, channel: Channel): readonly Check<'channel'>[] {
  return [...checksFor(channel)].sort(
    (one, other) => Number(other.name === checkName) - Number(one.name === checkName),
  );
}

/** What is said of no single channel, and what helps to say it faster after the next edit. */
export interface RigResult {
  readonly findings: readonly Finding[];
  readonly uses: NameUses;
  readonly roster: Roster;
}

/**
 * Folds over all channels: rates that do not go together, names nobody uses, sources nobody hears, and the problems of
 * everything but channels. A few milliseconds for 10,000 channels: it runs after every keystroke, and yields between
 * one fold and the next.
 *
 * @param before of an earlier text: the answer is the same without
 */
export function* judgingRig(
  environment: Environment,
  channels: readonly ChannelSummary[],
  guard: Guard,
  before: NameUses = NO_USES,
): Generator<undefined, RigResult> {
  const { severities } = environment;
  const roster = rosterOf(channels);
  const rig: RigView = { environment, channels, roster };
  const findings: Finding[] = [];
  const ranges = channelRanges(roster.ranged);
  const add = (check: string, severity: Severity, said: readonly SaidOfRig[]): void => {
    for (const one of said) {
      const { channel: name } = one;
      const channel = name === undefined ? undefined : { name, count: ranges.get(name) ?? 1 };
      addFinding(findings, check, severity, one, channel, severities);
    }
  };
  const addProblem = (problem: PlacedProblem): void => add(problem.problem.name, 'error', [saidOfThing(problem)]);
  guard('document', () => rigProblems(environment, channels, roster.noted), SAYS_NOTHING).forEach(addProblem);
  yield undefined;
  const uses = yield* countingNames(channels, before);
  guard('unused-name', () => unusedNames(environment, uses), SAYS_NOTHING).forEach(addProblem);
  yield undefined;
  for (const { name, severity, run } of RIG_FOLDS) {
    const said = guard(name, () => run(rig), SAYS_NOTHING);
    add(name, severity, said);
    yield undefined;
  }
  const unheard = guard(UNHEARD_IS, () => unheardSources(rig), SAYS_NOTHING);
  add(UNHEARD_IS, 'hint', unheard);
  return { findings: inOrder(toldApart(findings)), uses, roster };
}

/** Runs every channel check; its chain is the channel's, where it is complete enough to have one. */
function judgeInto(findings: Finding[], channel: Channel, severities: Severities, guard: Guard): Chain | undefined {
  const view = guard('chain', () => viewOf(channel), undefined);
  if (!view) return undefined;
  for (const check of checksFor(channel)) runCheck(findings, check, view, severities, guard);
  runDigitalEdges(findings, view, severities, guard);
  return view.chain;
}

function runCheck(
  findings: Finding[],
  { name, severity, run }: Check<'channel'>,
  view: ChannelView,
  severities: Severities,
  guard: Guard,
): void {
  const said = guard(name, () => run(view), SAYS_NOTHING);
  for (const one of said) addFinding(findings, name, severity, one, view.channel, severities);
}

/** What of a filter is out of range only at the rate that the channel gives it. */
function runDigitalEdges(findings: Finding[], view: ChannelView, severities: Severities, guard: Guard): void {
  for (const one of guard('out-of-range', () => digitalEdges(view), SAYS_NOTHING)) {
    addFinding(findings, 'out-of-range', 'error', one, view.channel, severities);
  }
}

function addFinding(
  findings: Finding[],
  check: string,
  usual: Severity,
  said: SaidOfRig,
  channel: Pick<Channel, 'name' | 'count'> | undefined,
  severities: Severities,
): void {
  const finding = findingOf({ name: check, severity: usual }, said, severities, channel);
  if (finding) findings.push(finding);
}

/** What a check says as a finding; `undefined` where the check is turned off. */
export function findingOf(
  { name, severity: usual }: Pick<CheckPage, 'name' | 'severity'>,
  said: SaidOfRig,
  severities: Severities,
  channel?: Pick<Channel, 'name' | 'count'>,
): Finding | undefined {
  const severity = severities.get(name) ?? said.severity ?? usual;
  if (severity === 'off') return undefined;
  return {
    check: name,
    severity,
    channel: channel?.name,
    thing: said.thing,
    about: said.about,
    stage: said.stage,
    message: channel && channel.count > 1 ? countedMessage(said.message, channel.count) : said.message,
    place: said.place,
    related: said.related ?? [],
    figures: said.figures ?? {},
    excess: said.excess ?? 1,
    ...(said.cure ? { cure: said.cure } : {}),
  };
}

/** How many channels each entry with a brace range stands for, by its name. */
function channelRanges(channels: readonly ChannelSummary[]): ReadonlyMap<string, number> {
  const ranges = new Map<string, number>();
  for (const { result } of channels) ranges.set(result.channel.name, result.channel.count);
  return ranges;
}

/** What is said once of the channels of a brace range tells of how many, ahead of its full stop. */
function countedMessage(message: string, count: number): string {
  const end = message.endsWith('.') ? message.length - 1 : message.length;
  return `${message.slice(0, end)} (${count} channels)${message.slice(end)}`;
}

/** Gives findings that would have the same identity a number each. */
export function toldApart(findings: readonly Finding[]): Finding[] {
  const seen = new Map<string, number>();
  return findings.map((finding) => {
    const identity = identityOf(finding);
    const count = (seen.get(identity) ?? 0) + 1;
    seen.set(identity, count);
    return count === 1 ? finding : { ...finding, about: `${finding.about ?? ''} (${count})` };
  });
}

/** By severity, then position in the entry that they stand in, then name. */
function inOrder(findings: Finding[]): readonly Finding[] {
  if (findings.length < 2) return findings;
  return findings.sort(
    (first, second) =>
      SEVERITIES.indexOf(first.severity) - SEVERITIES.indexOf(second.severity) ||
      first.place.start - second.place.start ||
      compare(first.check, second.check) ||
      compare(first.about ?? '', second.about ?? '') ||
      (first.stage ?? 0) - (second.stage ?? 0),
  );
}

function compare(first: string, second: string): number {
  if (first === second) return 0;
  return first < second ? -1 : 1;
}
