import type { ChannelResult } from '../checks/channel-result.ts';
import type { Finding } from '../checks/finding.ts';
import { identityOf } from '../checks/finding.ts';
import type { Environment } from '../rig/environment.ts';
import type { Snapshot, TextEdit } from '../rig/snapshot.ts';
import { editedFurther, editsOf, unedited } from './edit-history.ts';
import type { OfferedCandidate } from './list.ts';
import { candidatesFor } from './list.ts';
import { bringsNothing, isProved } from './proof.ts';
import type { Recheck, Remedy, RemedyContext, RemedyKind } from './remedy.ts';

/** A document as far as it has to be known to be set right: what the workbench calls an evaluation. */
export interface Fixable {
  readonly snapshot: Snapshot;
  readonly environment: Environment;
  readonly channels: readonly { readonly result: ChannelResult }[];
  readonly rigFindings: readonly Finding[];
}

export interface FixAllResult {
  /** Edits of the document as it was handed in. */
  readonly edits: readonly TextEdit[];
  /** What was applied, in the order in which it was; the edits of each are those of the text at its time. */
  readonly applied: readonly Remedy[];
}

/** Setting one finding right may bring others to light; after so many rounds what is left is left. */
const MOST_ROUNDS = 8;

/** How many candidates of one finding are tried in one round. */
const MOST_TRIED = 4;

/** What is to be applied together, each with the finding it takes away. */
interface Chosen {
  readonly finding: Finding;
  readonly candidate: OfferedCandidate;
}

/**
 * Applies to every finding that has one, and is not accepted, its first remedy of the kinds allowed, so long as any applies. What comes out
 * has fewer findings, and none that was not there before.
 *
 * @param kinds claims are never applied, whether or not they are among them
 * @param after the document after edits of another
 * @param only the name of the one remedy to apply, where not all are meant
 */
export function fixAll<Document extends Fixable>(
  document: Document,
  kinds: ReadonlySet<RemedyKind>,
  after: (from: Document, edits: readonly TextEdit[]) => Document,
  isCancelled: () => boolean,
  only?: string,
): FixAllResult {
  const applied: Remedy[] = [];
  const refused = new Set<string>();
  let history = unedited(document.snapshot.length);
  let current = document;
  for (let round = 0; round < MOST_ROUNDS && !isCancelled(); round++) {
    const wanted = chooseAll(current, kinds, only, refused, isCancelled);
    const accepted = acceptable(current, wanted, after, isCancelled);
    for (const { finding, candidate } of wanted) {
      if (!accepted.some((one) => one.candidate === candidate)) refused.add(refusal(finding, candidate));
    }
    if (accepted.length === 0) {
      if (wanted.length === 0) break;
      continue;
    }
    const edits = accepted.flatMap(({ candidate }) => candidate.edits);
    history = editedFurther(history, edits);
    applied.push(...accepted.map(({ candidate }) => remedyOf(candidate)));
    current = after(current, edits);
  }
  return { edits: editsOf(history, document.snapshot.length), applied };
}

/** A candidate for each finding, as far as their edits do not touch one another; the rest has its turn later. */
function chooseAll(
  document: Fixable,
  kinds: ReadonlySet<RemedyKind>,
  only: string | undefined,
  refused: ReadonlySet<string>,
  isCancelled: () => boolean,
): readonly Chosen[] {
  const results = document.channels.map(({ result }) => result);
  const chosen: Chosen[] = [];
  const taken = new TakenSpans();
  const choose = (finding: Finding, result: ChannelResult | undefined): void => {
    if (finding.accepted) return;
    const { snapshot, environment } = document;
    const context: RemedyContext = {
      finding,
      snapshot,
      environment,
      result,
      results,
      isCancelled,
    };
    let tried = 0;
    for (const candidate of candidatesFor(context, ({ name, kind }) => isWanted(name, kind))) {
      if (candidate.reachesOthers || candidate.fillIn !== undefined) continue;
      if (refused.has(refusal(finding, candidate))) continue;
      if (taken.add(candidate.edits)) {
        chosen.push({ finding, candidate });
        return;
      }
      if (++tried >= MOST_TRIED) return;
    }
  };
  const isWanted = (name: string, kind: RemedyKind): boolean =>
    kind !== 'claim' && kinds.has(kind) && (only === undefined || only === name);
  for (const finding of document.rigFindings) {
    if (isCancelled()) return [];
    choose(finding, finding.channel === undefined ? undefined : resultNamed(results, finding.channel));
  }
  for (const result of results) {
    if (isCancelled()) return [];
    // One at a time: what sets the first finding of a channel right often takes the others with it.
    const before = chosen.length;
    for (const finding of result.findings) {
      choose(finding, result);
      if (chosen.length > before) break;
    }
  }
  return chosen;
}

/**
 * Those of the chosen that may be applied together: all of them, or, where that fails, those of either half that may
 * be applied together with what has been accepted before.
 */
function acceptable<Document extends Fixable>(
  document: Document,
  chosen: readonly Chosen[],
  after: (from: Document, edits: readonly TextEdit[]) => Document,
  isCancelled: () => boolean,
): readonly Chosen[] {
  const accepted: Chosen[] = [];
  const consider = (part: readonly Chosen[]): void => {
    if (part.length === 0 || isCancelled()) return;
    const together = [...accepted, ...part];
    const edits = together.flatMap(({ candidate }) => candidate.edits);
    const checked = recheck(document, after(document, edits));
    if (together.every(({ finding }) => isProved(finding, checked)) && bringsNothing(checked)) {
      accepted.push(...part);
      return;
    }
    if (part.length === 1) return;
    const middle = part.length >> 1;
    consider(part.slice(0, middle));
    consider(part.slice(middle));
  };
  consider(chosen);
  return accepted;
}

/** The findings of whatever is not the very same in both. */
function recheck(before: Fixable, after: Fixable): Recheck {
  const same = new Set<object>(before.channels.map(({ result }) => result));
  const kept = new Set<object>();
  const findingsAfter: Finding[] = [...after.rigFindings];
  for (const { result } of after.channels) {
    if (same.has(result)) kept.add(result);
    else findingsAfter.push(...result.findings);
  }
  const findingsBefore: Finding[] = [...before.rigFindings];
  for (const { result } of before.channels) if (!kept.has(result)) findingsBefore.push(...result.findings);
  return { before: findingsBefore, after: findingsAfter };
}

function remedyOf({ reachesOthers: _, ...remedy }: OfferedCandidate): Remedy {
  return { ...remedy, preferred: false };
}

function refusal(finding: Finding, { name, title }: OfferedCandidate): string {
  return [identityOf(finding), name, title].join('\u0000');
}

function resultNamed(results: readonly ChannelResult[], name: string): ChannelResult | undefined {
  return results.find(({ channel }) => channel.name === name);
}

/** Stretches of text that edits have been chosen for. */
class TakenSpans {
  readonly #starts = new Map<number, number>();
  readonly #ordered: number[] = [];

  /** Takes the spans of the edits, all or none; false where one of them touches what is taken. */
  add(edits: readonly TextEdit[]): boolean {
    if (edits.some((edit) => this.#touches(edit))) return false;
    for (const { start, end } of edits) {
      this.#starts.set(start, end);
      this.#ordered.splice(this.#placeOf(start), 0, start);
    }
    return true;
  }

  #touches({ start, end }: TextEdit): boolean {
    const place = this.#placeOf(start);
    const before = this.#ordered[place - 1];
    if (before !== undefined && (this.#starts.get(before) ?? before) >= start) return true;
    const next = this.#ordered[place];
    return next !== undefined && next <= end;
  }

  /** How many of the taken spans begin before an offset. */
  #placeOf(start: number): number {
    let low = 0;
    let high = this.#ordered.length;
    while (low < high) {
      const middle = (low + high) >> 1;
      if ((this.#ordered[middle] as number) < start) low = middle + 1;
      else high = middle;
    }
    return low;
  }
}
