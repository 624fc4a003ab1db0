import { recordedAtHz } from '../chain/arrivals.ts';
import type { Arrival, Chain } from '../chain/model.ts';
import { formatHz } from '../quantity/write.ts';
import type { Source } from '../rig/model.ts';
import type { ChannelView, Said } from './check.ts';
import { SAYS_NOTHING } from './check.ts';
import { filtersAhead, standingOnStage } from './standing.ts';
import { hzText, levelFigures, levelText, listText, overLimitText, stageText } from './wording.ts';

/** What one source leaves in the band by folding at one stage: its worst line, and the others. */
export interface Fold {
  readonly worst: Arrival;
  readonly others: readonly Arrival[];
  /** From 1. */
  readonly stage: number;
}

/** Everything that folds into the band above the limit, by source and stage; levels known or assumed, as asked. */
export function foldsOf({ arrivals, chain }: ChannelView, levelKnown: boolean): readonly Fold[] {
  // A filter that was not understood may well take off what seems to be left.
  if (!chain.understood) return SAYS_NOTHING;
  let bySource: Map<Source, GatheredFold[]> | undefined;
  for (const arrival of arrivals) {
    if (!arrival.overLimit || arrival.levelKnown !== levelKnown) continue;
    bySource ??= new Map();
    addTo(bySource, arrival);
  }
  return bySource ? [...bySource.values()].flat() : SAYS_NOTHING;
}

/** Whether anything that is declared, level and all, folds into the band above the limit. */
export function hasFoldInBand(view: Pick<ChannelView, 'chain' | 'arrivals'>): boolean {
  return view.chain.understood && view.arrivals.some((arrival) => arrival.overLimit && arrival.levelKnown);
}

/** A fold while what belongs to it is gathered: a source may send thousands of lines into the band. */
interface GatheredFold {
  worst: Arrival;
  readonly others: Arrival[];
  readonly stage: number;
}

function addTo(bySource: Map<Source, GatheredFold[]>, arrival: Arrival): void {
  const stage = arrival.foldsAtStage ?? 1;
  const ofSource = bySource.get(arrival.source);
  const known = ofSource?.find((fold) => fold.stage === stage);
  if (!known) {
    const fold: GatheredFold = { worst: arrival, others: [], stage };
    if (ofSource) ofSource.push(fold);
    else bySource.set(arrival.source, [fold]);
    return;
  }
  const isWorse = arrival.level > known.worst.level;
  known.others.push(isWorse ? known.worst : arrival);
  if (isWorse) known.worst = arrival;
}

/** A fold as a finding: `opening` is said of its worst line, the figures follow. */
export function saidOfFold(fold: Fold, chain: Chain, verb: 'is' | 'would be'): Said {
  const { worst, stage } = fold;
  const { source, level } = worst;
  const recordedHz = recordedAtHz(worst, chain);
  const excess = level - chain.foldLimit;
  const name = `\`${source.name}\``;
  const [own, ...rest] = linesOf(fold);
  const truth = hzText(own!.trueLowHz, own!.trueHighHz);
  const where = stageText(chain, stage);
  const sentences = [
    `${name} will be recorded at ${formatHz(recordedHz)}, inside the band, though ${whatText(worst)} is at ${truth}.`,
    `There it ${verb} ${levelText(level, chain)}, ${overLimitText(level, chain)}.`,
  ];
  if (where !== '') sentences.push(`It folds ${where}.`);
  if (rest.length > 0) sentences.push(`With it: ${listText(rest.map(lineText))}.`);
  const standing = standingOnStage(chain, stage);
  return {
    about: source.name,
    stage,
    message: sentences.join(' '),
    place: standing.place,
    related: [
      ...standing.related,
      { place: source.place, message: `${name} is declared here.` },
      ...filtersAhead(chain, stage),
    ],
    figures: { recordedHz, ...levelFigures(level, chain), stage },
    excess,
  };
}

function whatText({ component }: Arrival): string {
  return component === 'fundamental' ? 'it' : `its ${component}`;
}

/** A component of a source, whatever pieces it folds in. */
interface Line {
  readonly component: string;
  readonly level: number;
  readonly trueLowHz: number;
  readonly trueHighHz: number;
  readonly recordedLowHz: number;
  readonly recordedHighHz: number;
}

/** What folds, a line for each component: the worst first, then the others from the highest down. */
function linesOf({ worst, others }: Fold): readonly Line[] {
  const lines = new Map<string, Line>([[worst.component, worst]]);
  for (const arrival of others) {
    const known = lines.get(arrival.component);
    lines.set(arrival.component, known ? joined(known, arrival) : arrival);
  }
  const [own, ...rest] = lines.values();
  return [own!, ...rest.sort((first, second) => second.level - first.level)];
}

function joined(first: Line, second: Line): Line {
  return {
    component: first.component,
    level: Math.max(first.level, second.level),
    trueLowHz: Math.min(first.trueLowHz, second.trueLowHz),
    trueHighHz: Math.max(first.trueHighHz, second.trueHighHz),
    recordedLowHz: Math.min(first.recordedLowHz, second.recordedLowHz),
    recordedHighHz: Math.max(first.recordedHighHz, second.recordedHighHz),
  };
}

function lineText({ component, recordedLowHz, recordedHighHz }: Line): string {
  return `${component} at ${hzText(recordedLowHz, recordedHighHz)}`;
}
