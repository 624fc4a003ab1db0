import type { Finding } from '../checks/finding.ts';
import { MOST_CANDIDATES_PROVED } from '../rig/limits.ts';
import { accept } from './accept.ts';
import { addFilter } from './add-filter.ts';
import { addMissingKey } from './add-missing-key.ts';
import { anotherWindow } from './another-window.ts';
import { chooseRange } from './choose-range.ts';
import { correctSpelling } from './correct-spelling.ts';
import { decimateLess } from './decimate-less.ts';
import type { Proposal, RemedyDefinition, RemedyPage } from './definition.ts';
import { fewerAverages } from './fewer-averages.ts';
import { filterTheStep } from './filter-the-step.ts';
import { longerRecord } from './longer-record.ts';
import { narrowBand } from './narrow-band.ts';
import { mayStandWithout, noWorseThan } from './proof.ts';
import type { Candidate, Remedy, RemedyContext, RemedyKind, Trial } from './remedy.ts';
import { sampleElsewhere } from './sample-elsewhere.ts';
import { sampleFaster } from './sample-faster.ts';
import { startSearch } from './search.ts';
import { stateLevel } from './state-level.ts';
import { stateUndeclared } from './state-undeclared.ts';
import { steeperFilter } from './steeper-filter.ts';
import { writeUnit } from './write-unit.ts';

export type { RemedyPage } from './definition.ts';

/** In the order in which they are offered: `text` and `setting` first, then what changes the rig, the test, or what is known. */
const DEFINITIONS: readonly RemedyDefinition[] = [
  correctSpelling,
  writeUnit,
  addMissingKey,
  filterTheStep,
  sampleFaster,
  sampleElsewhere,
  decimateLess,
  chooseRange,
  longerRecord,
  anotherWindow,
  fewerAverages,
  steeperFilter,
  addFilter,
  narrowBand,
  stateLevel,
  stateUndeclared,
  accept,
];

/** The reference pages of all remedies. */
export const REMEDIES: readonly RemedyPage[] = DEFINITIONS;

export const REMEDY_NAMES: readonly string[] = DEFINITIONS.map(({ name }) => name);

const TITLE_BEGINS: Readonly<Record<RemedyKind, string>> = {
  text: '',
  setting: '',
  hardware: 'If the rig is changed: ',
  requirement: 'If the test allows: ',
  claim: 'If it is known: ',
};

/**
 * Every proved remedy of a finding, best first.
 *
 * @param before every finding of the document
 */
export function remediesFor(context: RemedyContext, before: readonly Finding[], tries: Trial): readonly Remedy[] {
  const isNoWorse = noWorseThan(before);
  const isProved = mayStandWithout(context.finding, isNoWorse);
  const proved: OfferedCandidate[] = [];
  const seen = new Set<string>();
  let proofs = 0;
  for (const candidate of candidatesFor(context)) {
    if (context.isCancelled() || proofs >= MOST_CANDIDATES_PROVED) break;
    const twin = JSON.stringify(candidate.edits);
    if (seen.has(twin)) continue;
    seen.add(twin);
    proofs++;
    if (tries(candidate.edits, candidate.kind === 'claim' ? isNoWorse : isProved)) proved.push(candidate);
  }
  const preferred = proved.find(mayBePreferred);
  return proved.map((candidate) => {
    const { reachesOthers: _, ...remedy } = candidate;
    return { ...remedy, preferred: candidate === preferred };
  });
}

/**
 * True for what may be applied without being asked twice: it stays within the finding's channel, and it leaves nothing
 * for a person to fill in.
 */
export function mayBePreferred({ kind, reachesOthers, fillIn }: OfferedCandidate): boolean {
  return (kind === 'text' || kind === 'setting') && !reachesOthers && fillIn === undefined;
}

/** What the search chooses, in the order in which it is offered and not yet proved; searched for as it is asked for. */
export function* candidatesFor(
  context: RemedyContext,
  isWanted: (page: RemedyPage) => boolean = () => true,
): Generator<OfferedCandidate> {
  const search = startSearch(context);
  for (const definition of DEFINITIONS) {
    if (!definition.answers.includes(context.finding.check) || !isWanted(definition)) continue;
    if (context.isCancelled()) return;
    for (const proposal of definition.search(search)) yield* candidatesOf(definition, proposal);
  }
}

/** A candidate, and whether it edits what other channels have the value from. */
export interface OfferedCandidate extends Candidate {
  readonly reachesOthers: boolean;
}

function* candidatesOf({ name, kind, titleBegins }: RemedyDefinition, proposal: Proposal): Generator<OfferedCandidate> {
  const { does, outcome, edits, fillIn, shared } = proposal;
  const begins = titleBegins ?? TITLE_BEGINS[kind];
  const ends = outcome === '' ? '' : `: ${outcome}`;
  const base = { name, kind } as const;
  yield {
    ...base,
    title: `${begins}${does}${ends}`,
    edits,
    reachesOthers: false,
    ...(fillIn === undefined ? {} : { fillIn }),
  };
  if (!shared) return;
  yield {
    ...base,
    title: `${begins}${does} for all ${shared.channels} channels${ends}`,
    edits: shared.edits,
    reachesOthers: true,
  };
}
