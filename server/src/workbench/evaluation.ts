import { withAcceptances } from '../checks/acceptance-findings.ts';
import { type Accepting, acceptedResult, acceptingOn } from '../checks/accepting.ts';
import type { ChannelResult, Guard } from '../checks/channel-result.ts';
import type { Finding } from '../checks/finding.ts';
import { judgeChannel, judgingRig } from '../checks/judge.ts';
import { CHECK_NAMES } from '../checks/list.ts';
import { partOf } from '../checks/roster.ts';
import type { ChannelReading } from '../rig/channel-reading.ts';
import { readChannel, stillHolds } from '../rig/channel-reading.ts';
import type { Entry } from '../rig/entry.ts';
import type { Environment } from '../rig/environment.ts';
import { readEnvironment } from '../rig/environment.ts';
import type { NameUses } from '../rig/name-uses.ts';
import type { Snapshot, TextEdit } from '../rig/snapshot.ts';
import { editSnapshot } from '../rig/snapshot.ts';

/** One channel as read and judged. */
export interface JudgedChannel {
  readonly reading: ChannelReading;
  readonly result: ChannelResult;
  /** What it has to do with others. */
  readonly part: number;
}

/** A file that another one uses, directly or through others. */
export interface UsedText {
  readonly uri: string;
  readonly snapshot: Snapshot;
}

/** A text as far as it is read before its channels are. */
export interface ReadText {
  readonly snapshot: Snapshot;
  readonly environment: Environment;
  /** Every file that it uses, however many files lie between: places may stand in these. */
  readonly usedTexts: readonly UsedText[];
}

/**
 * Everything that is known of one text: a pure function of it, of those that it uses, and of the day.
 *
 * An evaluation shares with the one before it whatever an edit has not touched, object by object; a comparison of
 * identities therefore tells what an edit has changed.
 */
export interface Evaluation extends ReadText {
  /** In document order, as `environment.channelEntries`. */
  readonly channels: readonly JudgedChannel[];
  /** What is said of no single channel: named things, names nobody uses, rates that do not go together. */
  readonly rigFindings: readonly Finding[];
  /** What channels name, counted. */
  readonly uses: NameUses;
  /** What is accepted, and on which day that was asked. */
  readonly accepting: Accepting;
}

/** A text after edits, the files that it uses being as they were. */
export function readEdited({ snapshot, environment, usedTexts }: ReadText, edits: readonly TextEdit[]): ReadText {
  const edited = editSnapshot(snapshot, edits);
  const { used } = environment.core;
  return { snapshot: edited, environment: readEnvironment(edited, CHECK_NAMES, environment, used), usedTexts };
}

/**
 * Evaluates a text step by step: it yields after each small piece of work, so that the caller may stop between
 * two of them, and returns the evaluation. What it yields is the channel that it has just judged, if it has.
 *
 * @param today as `2026-12-01`, by which acceptances expire
 * @param near the entry whose neighbourhood is done first, the one somebody is typing in
 */
export function* evaluating(
  read: ReadText,
  guard: Guard,
  today: string,
  previous?: Evaluation,
  near?: Entry,
): Generator<JudgedChannel | undefined, Evaluation> {
  const { environment } = read;
  const accepting = acceptingOn(environment.acceptances, today, previous?.accepting);
  const channels = yield* reusing(environment, previous);
  yield undefined;
  if (accepting !== previous?.accepting) yield* marking(channels, accepting);
  for (const index of missing(channels, near ? environment.channelEntries.indexOf(near) : 0)) {
    const channel = judged(environment.channelEntries[index]!, environment, accepting, guard);
    channels[index] = channel;
    yield channel;
  }
  const complete = channels as readonly JudgedChannel[];
  const { findings, uses, roster } = yield* judgingRig(environment, complete, guard, previous?.uses);
  const rig = { environment, channels: complete, roster };
  const rigFindings = guard('accept', () => withAcceptances(findings, rig, accepting), findings);
  return { ...read, channels: complete, rigFindings, uses, accepting };
}

/** Evaluates at one go. */
export function evaluate(read: ReadText, guard: Guard, today: string, previous?: Evaluation): Evaluation {
  const steps = evaluating(read, guard, today, previous);
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
  }
}

function judged(entry: Entry, environment: Environment, accepting: Accepting, guard: Guard): JudgedChannel {
  const reading = readChannel(entry, environment);
  const result = acceptedResult(judgeChannel(reading, environment.severities, guard), accepting);
  return { reading, result, part: partOf(reading, result) };
}

/** Marks anew what is accepted of the channels that are kept, a few at a time. */
function* marking(channels: (JudgedChannel | undefined)[], accepting: Accepting): Generator<undefined> {
  for (const [index, kept] of channels.entries()) {
    if (index % MARKED_AT_ONCE === MARKED_AT_ONCE - 1) yield undefined;
    const result = kept && acceptedResult(kept.result, accepting);
    if (kept && result !== kept.result) channels[index] = { ...kept, result: result! };
  }
}

const MARKED_AT_ONCE = 256;
const REUSED_AT_ONCE = 2_000;

/** What still holds of the channels before, at the places they have now; looked at some at a time. */
function* reusing(
  environment: Environment,
  previous: Evaluation | undefined,
): Generator<undefined, (JudgedChannel | undefined)[]> {
  const entries = environment.channelEntries;
  const channels = new Array<JudgedChannel | undefined>(entries.length).fill(undefined);
  if (!previous || previous.environment.severities !== environment.severities) return channels;
  const before = previous.environment.channelEntries;
  // Nothing that they share has changed: only an alias may mean something else for standing elsewhere.
  const isSameCore = environment.core === previous.environment.core;
  const keep = (index: number, beforeIndex: number): void => {
    const old = previous.channels[beforeIndex]!;
    const holds = isSameCore && entries[index]!.aliases.length === 0;
    if (holds || stillHolds(old.reading, environment)) channels[index] = old;
  };
  let head = 0;
  while (head < entries.length && entries[head] === before[head]) {
    keep(head, head);
    head++;
    if (head % REUSED_AT_ONCE === 0) yield undefined;
  }
  let tail = 0;
  const longestTail = Math.min(entries.length, before.length) - head;
  while (tail < longestTail && entries[entries.length - 1 - tail] === before[before.length - 1 - tail]) {
    keep(entries.length - 1 - tail, before.length - 1 - tail);
    tail++;
    if (tail % REUSED_AT_ONCE === 0) yield undefined;
  }
  const moved = new Map<Entry, number>();
  for (let index = head; index < before.length - tail; index++) moved.set(before[index]!, index);
  for (let index = head; index < entries.length - tail; index++) {
    const beforeIndex = moved.get(entries[index]!);
    if (beforeIndex !== undefined) keep(index, beforeIndex);
  }
  return channels;
}

/** The places that are still empty, those nearest to `middle` first; of two as near, the one ahead. */
function missing(channels: readonly (JudgedChannel | undefined)[], middle: number): readonly number[] {
  const empty: number[] = [];
  for (let index = 0; index < channels.length; index++) if (!channels[index]) empty.push(index);
  let above = empty.findIndex((index) => index >= middle);
  if (above < 0) above = empty.length;
  let below = above - 1;
  const nearest: number[] = [];
  while (nearest.length < empty.length) {
    const isAbove = below < 0 || (above < empty.length && empty[above]! - middle < middle - empty[below]!);
    nearest.push(isAbove ? empty[above++]! : empty[below--]!);
  }
  return nearest;
}
