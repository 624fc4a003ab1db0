import { formatHz } from '../quantity/write.ts';
import { type ChannelView, type Check, SAYS_NOTHING, type Said } from './check.ts';
import { isOver } from './shortfall.ts';
import { standingOnStage } from './standing.ts';
import { levelFigures, levelText, ordinal, overLimitText, rateText } from './wording.ts';

export const stepWithoutFilter: Check<'channel'> = {
  name: 'step-without-filter',
  kind: 'channel',
  severity: 'warning',
  finds: 'A `decimate` step keeps every so-manyth sample with no digital filter, and something folds into the band.',
  why: 'Keeping every fifth sample of a stored record is sampling again, at a fifth of the rate: all that lies above the new Nyquist frequency folds, and the analogue filter, made for the first rate, lets it through. A digital filter ahead of the step costs nothing but arithmetic.',
  shows: `rig: Motor drive
digitizers:
  rack: { bits: 24, full-scale: ±10 V }
filters:
  input: { response: butterworth, order: 8, cutoff: 4 kHz }
channels:
  phase-current:
    digitizer: rack
    rate: 25.6 kHz
    filter: input
    band: 10 Hz .. 1 kHz
    then:
      - { decimate: 5 }
`,
  clean: `rig: Motor drive
digitizers:
  rack: { bits: 24, full-scale: ±10 V }
filters:
  input: { response: butterworth, order: 8, cutoff: 4 kHz }
  tidy: { response: kaiser, pass: 0.05 fs, stop: 0.15 fs, stopband: 80 dB }
channels:
  phase-current:
    digitizer: rack
    rate: 25.6 kHz
    filter: input
    band: 10 Hz .. 1 kHz
    then:
      - { decimate: 5, filter: tidy }
`,
  sources: ['Oppenheim and Schafer, Discrete-Time Signal Processing, the chapter on sampling: changing the rate.'],
  run: (view) =>
    view.chain.stages.length === 1 ? SAYS_NOTHING : view.chain.stages.flatMap((_, index) => saidOfStage(view, index)),
};

function saidOfStage(view: ChannelView, index: number): readonly Said[] {
  const { chain } = view;
  const { kind, filters, step, rateHz } = chain.stages[index]!;
  if (kind !== 'decimate' || filters.length > 0 || !chain.understood) return SAYS_NOTHING;
  const stage = index + 1;
  const undeclared = view.undeclared[index];
  let level = undeclared && isOver(view, undeclared) ? undeclared.level : -Infinity;
  let atHz = undeclared?.atHz ?? 0;
  let what = 'what no source declares';
  for (const arrival of view.arrivals) {
    if (arrival.foldsAtStage !== stage || !arrival.overLimit || arrival.level < level) continue;
    level = arrival.level;
    atHz = arrival.atHz;
    what = `\`${arrival.source.name}\``;
  }
  if (level === -Infinity) return SAYS_NOTHING;
  const excess = level - chain.foldLimit;
  const standing = standingOnStage(chain, stage);
  return [
    {
      stage,
      message: `Keeping every ${ordinal(step?.kind === 'decimate' ? step.factor.value : 1)} sample without a filter folds everything above ${formatHz(rateHz / 2)} (half of ${rateText(rateHz)}) below it. Of ${what} at ${formatHz(atHz)} up to ${levelText(level, chain)} arrives in the band, ${overLimitText(level, chain)}.`,
      place: standing.place,
      related: standing.related,
      figures: { atHz, ...levelFigures(level, chain), stage },
      excess,
    },
  ];
}
