import type { Channel, Filter, FilterUse } from '../rig/model.ts';
import { kaiserLength } from '../signal/kaiser.ts';
import type { Proposal, RemedyDefinition } from './definition.ts';
import { outcomeOf } from './describe.ts';
import type { Search } from './search.ts';
import { firstCured } from './search.ts';
import type { PlacedStep } from './steps.ts';
import { filterNames, madeUp, stepsOfFinding, stepValue, withStep } from './steps.ts';
import type { NewValue } from './written-value.ts';

/** Stop bands that are tried, the shallowest (and so the shortest filter) first. */
const STOPBANDS_DB = [30, 40, 50, 60, 70, 80, 90, 100, 110, 120, 130, 140, 150, 160] as const;

/** The edges are written as fractions of the rate with this many decimals. */
const EDGE_DECIMALS = 4;

export const filterTheStep: RemedyDefinition = {
  name: 'filter-the-step',
  kind: 'setting',
  finds:
    'The shortest digital low-pass ahead of a decimation with which the finding is gone: flat over the band, and stopping where the band would be folded into.',
  why: 'Keeping every M-th sample is sampling again, and folds what the new rate can not hold. A digital filter costs computing and a delay, but neither data nor hardware.',
  answers: [
    'step-without-filter',
    'fold-in-band',
    'fold-unlevelled',
    'filter-short',
    'on-nyquist',
    'thin-margin',
    'noise-folds',
  ],
  search: (search) => stepsOfFinding(search).flatMap((placed) => filtered(search, placed)),
};

interface Edges {
  readonly pass: number;
  readonly stop: number;
}

function filtered(search: Search, placed: PlacedStep): readonly Proposal[] {
  const { channel } = search;
  const edges = channel && edgesFor(search, placed);
  if (!channel || !edges) return [];
  const names = filterNames(placed.step.filters);
  if (!names) return [];
  const found = firstCured(search, STOPBANDS_DB, (stopbandDb) => withFilter(channel, placed, edges, stopbandDb));
  if (!found) return [];
  const written: NewValue = new Map([
    ['response', 'kaiser'],
    ['pass', `${edges.pass} fs`],
    ['stop', `${edges.stop} fs`],
    ['stopband', `${found.value} dB`],
  ]);
  const edited = stepValue(search, placed, 'filter', names.length === 0 ? written : [...names, written]);
  if (!edited) return [];
  const taps = kaiserLength(found.value, edges.pass, edges.stop, 1);
  return [
    {
      does: `Filter the decimation by ${placed.step.factor.value} with ${taps} taps`,
      outcome: outcomeOf(search, found.after),
      ...edited,
    },
  ];
}

/** Flat to the band's top, stopping where what lies above would fold onto the band's top; fractions of the step's input rate. */
function edgesFor({ context }: Search, { step }: PlacedStep): Edges | undefined {
  const chain = context.result?.chain;
  const stage = chain?.stages.find((one) => one.step === step);
  if (!chain || stage?.inputRateHz === undefined) return undefined;
  const unit = 10 ** EDGE_DECIMALS;
  const pass = Math.ceil((chain.bandHighHz / stage.inputRateHz) * unit - 1e-9) / unit;
  const stop = Math.floor(((stage.rateHz - chain.bandHighHz) / stage.inputRateHz) * unit + 1e-9) / unit;
  return pass > 0 && pass < stop && stop <= 0.5 ? { pass, stop } : undefined;
}

function withFilter(channel: Channel, { index, step }: PlacedStep, edges: Edges, stopbandDb: number): Channel {
  const { place } = step;
  const filter: Filter = {
    kind: 'filter',
    name: '',
    place,
    response: {
      response: 'kaiser',
      pass: madeUp({ kind: 'of-rate', fraction: edges.pass }, place),
      stop: madeUp({ kind: 'of-rate', fraction: edges.stop }, place),
      stopbandDb,
    },
    order: undefined,
    tolerance: 0,
    passes: 1,
  };
  const use: FilterUse = { place, filter };
  return withStep(channel, index, { ...step, filters: [...step.filters, use] });
}
