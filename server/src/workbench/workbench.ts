import type { Guard } from '../checks/channel-result.ts';
import type { Finding } from '../checks/finding.ts';
import type { FixAllResult } from '../remedies/fix-all.ts';
import { fixAll } from '../remedies/fix-all.ts';
import { remediesFor } from '../remedies/list.ts';
import type { Remedy, RemedyContext, RemedyKind, Trial } from '../remedies/remedy.ts';
import type { PositionRange } from '../rig/place.ts';
import type { Snapshot, TextEdit } from '../rig/snapshot.ts';
import { editSnapshot, readSnapshot } from '../rig/snapshot.ts';
import type { Evaluation, JudgedChannel } from './evaluation.ts';
import { evaluate, evaluating } from './evaluation.ts';
import { allFindings } from './findings.ts';

/** A change as an editor tells it: without a range it replaces the whole text. */
export interface TextChange {
  readonly range?: PositionRange;
  readonly text: string;
}

/** What a file was found to be. */
export type FileContent = { readonly text: string } | 'missing' | 'too-large';

interface OpenFile {
  readonly snapshot: Snapshot;
  /** Of `snapshot`, or of one before it that the next evaluation can grow out of. */
  readonly evaluation: Evaluation | undefined;
}

/**
 * The one place that is asked: it is told of files and of changes to them, and answers what is known of them.
 *
 * It reads no file, knows no protocol and no clock. What it answers is a function of the texts it was told.
 */
export class Workbench {
  readonly #files = new Map<string, OpenFile>();
  readonly #faults = new Set<string>();
  readonly #log: (message: string) => void;
  readonly #guard: Guard;

  /** @param log is told, once each, of checks that failed: a failing check is a bug of ours and costs only itself. */
  constructor(log: (message: string) => void) {
    this.#log = log;
    this.#guard = (checkName, run, otherwise) => {
      try {
        return run();
      } catch (fault) {
        this.#report(checkName, fault);
        return otherwise;
      }
    };
  }

  /** Tells the workbench what a file holds; `missing` and `too-large` forget what it held before. */
  setFile(uri: string, content: FileContent): void {
    if (typeof content === 'string') {
      this.#files.delete(uri);
      return;
    }
    const previous = this.#files.get(uri)?.evaluation;
    this.#files.set(uri, { snapshot: readSnapshot(content.text), evaluation: previous });
  }

  /** Applies changes one after the other, each to the text that the one before left. Unknown files are ignored. */
  editFile(uri: string, changes: readonly TextChange[]): void {
    const file = this.#files.get(uri);
    if (!file) return;
    let snapshot = file.snapshot;
    for (const change of changes) snapshot = changed(snapshot, change);
    this.#files.set(uri, { snapshot, evaluation: file.evaluation });
  }

  /** Forgets a file. */
  forgetFile(uri: string): void {
    this.#files.delete(uri);
  }

  /** The text as it stands, evaluated or not; `undefined` for a file it was never told of. */
  snapshot(uri: string): Snapshot | undefined {
    return this.#files.get(uri)?.snapshot;
  }

  /**
   * Evaluates a file step by step, what stands near `nearOffset` first; see {@link evaluating}. An edit or another
   * evaluation meanwhile makes the rest worthless but harmless: its result is then not kept.
   */
  *evaluating(uri: string, nearOffset?: number): Generator<unknown, Evaluation | undefined> {
    const file = this.#files.get(uri);
    if (!file) return undefined;
    if (file.evaluation?.snapshot === file.snapshot) return file.evaluation;
    const near = nearOffset === undefined ? undefined : file.snapshot.entryAt(nearOffset);
    const evaluation = yield* evaluating(file.snapshot, this.#guard, file.evaluation, near);
    if (this.#files.get(uri)?.snapshot === file.snapshot) this.#files.set(uri, { snapshot: file.snapshot, evaluation });
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
    const snapshot = editSnapshot(evaluation.snapshot, edits);
    const near = edits[0] && snapshot.entryAt(edits[0].start);
    const steps = evaluating(snapshot, this.#guard, evaluation, near);
    for (;;) {
      const { value, done } = steps.next();
      if (done) return value.rigFindings.every(mayStand);
      if (value && !value.result.findings.every(mayStand)) return false;
    }
  }

  #after(evaluation: Evaluation, edits: readonly TextEdit[]): Evaluation {
    return evaluate(editSnapshot(evaluation.snapshot, edits), this.#guard, evaluation);
  }

  #report(checkName: string, fault: unknown): void {
    const what = `${checkName}: ${fault instanceof Error ? fault.message : String(fault)}`;
    if (this.#faults.has(what)) return;
    this.#faults.add(what);
    this.#log(`The check ${what}${fault instanceof Error && fault.stack ? `\n${fault.stack}` : ''}`);
  }
}

/** The channel of that name, if the file has one. */
export function channelNamed(evaluation: Evaluation, name: string): JudgedChannel | undefined {
  return evaluation.channels.find((judged) => judged.result.channel.name === name);
}

function changed(snapshot: Snapshot, change: TextChange): Snapshot {
  if (!change.range) return editSnapshot(snapshot, [{ start: 0, end: snapshot.length, text: change.text }]);
  const start = snapshot.offsetAt(change.range.start);
  const end = snapshot.offsetAt(change.range.end);
  return editSnapshot(snapshot, [{ start: Math.min(start, end), end: Math.max(start, end), text: change.text }]);
}
