import { formatHz } from '../quantity/write.ts';
import { type Check, SAYS_NOTHING } from './check.ts';
import { standingOn, standingOnStage } from './standing.ts';
import { levelFigures, levelText, overLimitText } from './wording.ts';

export const noFilter: Check<'channel'> = {
  name: 'no-filter',
  kind: 'channel',
  severity: 'warning',
  finds: 'Nothing stands before the sampling, so whatever is above half the rate folds into the band as high as it is.',
  why: 'Wiring, drives and radio put content far above any band of interest, and without a filter all of it arrives in the record. Nothing is said where `undeclared` states that there is nothing up there to fear, nor of the input of a modulator, whose rate is far above the band.',
  shows: `rig: Footbridge
digitizers:
  logger: { bits: 24, full-scale: ±5 V }
channels:
  deck:
    digitizer: logger
    rate: 100 Hz
    band: 0.5 Hz .. 20 Hz
`,
  clean: `rig: Footbridge
digitizers:
  logger: { bits: 24, full-scale: ±5 V }
channels:
  deck:
    digitizer: logger
    rate: 100 Hz
    band: 0.5 Hz .. 20 Hz
    # Measured with an analyser: nothing above this.
    undeclared: -60 dBFS
`,
  sources: ['Common practice: an anti-aliasing filter stands before every sampling.'],
  run(view) {
    const { shortfall } = view;
    if (shortfall?.kind !== 'no-filter') return SAYS_NOTHING;
    const { chain, channel } = view;
    const { level, atHz, stage } = shortfall.fold;
    const excess = level - chain.foldLimit;
    const saysNone = channel.filterPlace !== undefined;
    const standing = saysNone ? standingOn(channel, { place: channel.filterPlace! }) : standingOnStage(chain, stage);
    return [
      {
        stage,
        message: `Anything from ${formatHz(atHz)} up that no source declares will be recorded inside the band, because no filter stands before the sampling. Up to ${levelText(level, chain)} of it may be left, ${overLimitText(level, chain)}.`,
        place: standing.place,
        related: standing.related,
        figures: { fromHz: atHz, ...levelFigures(level, chain), stage },
        excess,
      },
    ];
  },
};
