import type { Guard } from '../checks/channel-result.ts';
import type { Finding } from '../checks/finding.ts';
import type { FixAllResult } from '../remedies/fix-all.ts';
import { fixAll } from '../remedies/fix-all.ts';
import { remediesFor } from '../remedies/list.ts';
import type { Remedy, RemedyContext, RemedyKind, Trial } from '../remedies/remedy.ts';
import { channelNames } from '../rig/channel-range.ts';
import type { Snapshot, TextEdit } from '../rig/snapshot.ts';
import type { Evaluation, JudgedChannel } from './evaluation.ts';
import { evaluate, evaluating, readEdited } from './evaluation.ts';
import { type FileContent, Files, type TextChange } from './files.ts';
import { allFindings } from './findings.ts';
import { readLinked } from './links.ts';
import { canonicalUri } from './uris.ts';

export type { FileContent, TextChange } from './files.ts';

/**
 * The one place that is asked: it is told of files and of changes to them, and answers what is known of them.
 *
 * It reads no file, knows no protocol and no clock. What it answers is a function of the texts and of the day it was told.
 */
export class Workbench {
  readonly #files = new Files();
  readonly #faults = new Set<string>();
  readonly #log: (message: string) => void;
  readonly #guard: Guard;
  readonly #today: () => string;

  /**
   * @param log is told, once each, of checks that failed: a failing check is a bug of ours and costs only itself
   * @param today says which day it is, as `2026-12-01`: acceptances expire
   */
  constructor(log: (message: string) => void, today: () => string) {
    this.#log = log;
    this.#today = today;
    this.#guard = (checkName, run, otherwise) => {
      try {
        return run();
      } catch (fault) {
        this.#report(checkName, fault);
        return otherwise;
      }
    };
  }

  /** Tells the workbench what the disk holds of a file; where the file is open, what the editor holds counts. */
  setFile(uri: string, content: FileContent): void {
    this.#files.tell(uri, content);
  }

  /** Opens a file with a text that somebody works on, saved or not. */
  openFile(uri: string, text: string): void {
    this.#files.open(uri, text);
  }

  /** Applies changes one after the other, each to the text that the one before left. Unknown files are ignored. */
  editFile(uri: string, changes: readonly TextChange[]): void {
    this.#files.edit(uri, changes);
  }

  /** Closes an open file: what the disk holds counts again, if anybody has told of it. */
  closeFile(uri: string): void {
    this.#files.close(uri);
  }

  /** Forgets a file. */
  forgetFile(uri: string): void {
    this.#files.forget(uri);
  }

  /**
   * Files that others use and of which nobody has told: whoever can reads them and tells with {@link setFile}. There may
   * be more after that.
   */
  filesWanted(): readonly string[] {
    return this.#files.wanted();
  }

  /** Files that are known only because others use them. */
  filesUsed(): readonly string[] {
    return this.#files.used();
  }

  /** The files whose findings may be others when a file changes, because they use it. */
  usersOf(uri: string): readonly string[] {
    return this.#files.usersOf(uri);
  }

  /** Forgets what it was told of files that nobody uses any longer. */
  forgetUnused(): void {
    this.#files.forgetUnused();
  }

  /** The text as it stands, evaluated or not; `undefined` for a file it was never told of. */
  snapshot(uri: string): Snapshot | undefined {
    return this.#files.snapshotOf(uri);
  }

  /**
   * Evaluates a file step by step, what stands near `nearOffset` first; see {@link evaluating}. An edit or another
   * evaluation meanwhile makes the rest worthless but harmless: its result is then not kept.
   */
  *evaluating(uri: string, nearOffset?: number): Generator<unknown, Evaluation | undefined> {
    const key = canonicalUri(uri);
    const read = readLinked(key, this.#files);
    if (!read) return undefined;
    const today = this.#today();
    const known = this.#files.evaluationOf(key);
    const isKnown = known?.snapshot === read.snapshot && known.environment === read.environment;
    if (isKnown && known.accepting.today === today) {
      if (known.usedTexts === read.usedTexts) return known;
      const moved: Evaluation = { ...known, usedTexts: read.usedTexts };
      this.#files.keepEvaluation(key, moved);
      return moved;
    }
    yield undefined;
    const near = nearOffset === undefined ? undefined : read.snapshot.entryAt(nearOffset);
    const evaluation = yield* evaluating(read, this.#guard, today, known, near);
    if (this.#files.contentOf(key) === read.snapshot) this.#files.keepEvaluation(key, evaluation);
    return evaluation;
  }

  /** Evaluates a file at one go; `undefined` for a file it was never told of. */
  evaluation(uri: string): Evaluation | undefined {
    const steps = this.evaluating(uri);
    for (;;) {
      const step = steps.next();
      if (step.done) return step.value;
    }
  }

  /** The proved remedies of one finding of a file as it stands, best first. */
  remedies(uri: string, finding: Finding, isCancelled: () => boolean): readonly Remedy[] {
    const evaluation = this.evaluation(uri);
    if (!evaluation) return [];
    const judged = finding.channel === undefined ? undefined : channelNamed(evaluation, finding.channel);
    const context: RemedyContext = {
      finding,
      snapshot: evaluation.snapshot,
      environment: evaluation.environment,
      result: judged?.result,
      results: evaluation.channels.map((channel) => channel.result),
      isCancelled,
    };
    const tries: Trial = (edits, mayStand) => this.#mayStand(evaluation, edits, mayStand);
    return this.#guard('remedies', () => remediesFor(context, allFindings(evaluation), tries), []);
  }

  /**
   * Everything that `fix` and `Fix every channel` would do, as edits of the file as it stands.
   *
   * @param only the name of the one remedy to apply, where not all are meant
   */
  fixAll(
    uri: string,
    kinds: ReadonlySet<RemedyKind>,
    isCancelled: () => boolean,
    only?: string,
  ): FixAllResult | undefined {
    const evaluation = this.evaluation(uri);
    return evaluation && fixAll(evaluation, kinds, (from, edits) => this.#after(from, edits), isCancelled, only);
  }

  /** Whether all that is found in what edits would change may stand; the channels near the edits are judged first. */
  #mayStand(evaluation: Evaluation, edits: readonly TextEdit[], mayStand: (finding: Finding) => boolean): boolean {
    const read = readEdited(evaluation, edits);
    const near = edits[0] && read.snapshot.entryAt(edits[0].start);
    const steps = evaluating(read, this.#guard, evaluation.accepting.today, evaluation, near);
    for (;;) {
      const { value, done } = steps.next();
      if (done) return value.rigFindings.every(mayStand);
      if (value && !value.result.findings.every(mayStand)) return false;
    }
  }

  #after(evaluation: Evaluation, edits: readonly TextEdit[]): Evaluation {
    return evaluate(readEdited(evaluation, edits), this.#guard, evaluation.accepting.today, evaluation);
  }

  #report(checkName: string, fault: unknown): void {
    const what = `${checkName}: ${fault instanceof Error ? fault.message : String(fault)}`;
    if (this.#faults.has(what)) return;
    this.#faults.add(what);
    this.#log(`The check ${what}${fault instanceof Error && fault.stack ? `\n${fault.stack}` : ''}`);
  }
}

/** The channel of that name, or the one whose brace range yields the name, if the file has one. */
export function channelNamed({ channels }: Evaluation, name: string): JudgedChannel | undefined {
  return (
    channels.find(({ result }) => result.channel.name === name) ??
    channels.find(({ result: { channel } }) => channel.count > 1 && channelNames(channel.name).includes(name))
  );
}
