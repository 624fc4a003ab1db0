import { levelsOf } from '../chain/source-level.ts';
import type { ChannelView, Check, Said } from './check.ts';
import { type Fold, foldsOf, saidOfFold } from './folds.ts';

export const foldUnlevelled: Check<'channel'> = {
  name: 'fold-unlevelled',
  kind: 'channel',
  severity: 'warning',
  finds: 'A source without a level lands in the band after folding; at full scale it would be above the fold limit.',
  why: 'Where a source lands is known without its level, whether it matters is not. Full scale is assumed, the worst that the converter can record. State a level, measured or bounded, and the finding becomes a plain yes or no.',
  shows: `rig: Footbridge
digitizers:
  logger: { bits: 24, full-scale: ±5 V }
filters:
  input: { response: butterworth, order: 4, cutoff: 30 Hz }
sources:
  tram-line: { frequency: 83 Hz }
channels:
  deck:
    digitizer: logger
    rate: 100 Hz
    filter: input
    band: 0.5 Hz .. 20 Hz
`,
  clean: `rig: Footbridge
digitizers:
  logger: { bits: 24, full-scale: ±5 V }
filters:
  input: { response: butterworth, order: 4, cutoff: 30 Hz }
sources:
  tram-line: { frequency: 83 Hz }
channels:
  deck:
    digitizer: logger
    rate: 100 Hz
    filter: input
    # 83 Hz is recorded at 17 Hz.
    band: 0.5 Hz .. 16.9 Hz
`,
  sources: [
    'Oppenheim and Schafer, Discrete-Time Signal Processing, the chapter on sampling: recorded(f) = |f - rate round(f / rate)|.',
  ],
  run: (view) => foldsOf(view, false).map((fold) => said(fold, view)),
};

function said(fold: Fold, { chain, channel }: ChannelView): Said {
  const plain = saidOfFold(fold, chain, 'would be');
  const { source } = fold.worst;
  const heard = channel.heard.find((one) => one.source === source);
  const hasLevel = heard !== undefined && levelsOf(heard).length > 0;
  const assumed = hasLevel
    ? "Its level can't be placed on this channel, so full scale is assumed."
    : 'It has no level, so full scale is assumed.';
  return { ...plain, message: `${plain.message} ${assumed}` };
}
