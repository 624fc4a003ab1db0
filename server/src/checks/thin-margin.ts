import { formatHz } from '../quantity/write.ts';
import { type Check, SAYS_NOTHING } from './check.ts';
import { COMMON_MARGIN } from './shortfall.ts';
import { filtersAhead, standingOn, standingOnStage } from './standing.ts';
import { levelFigures, levelText, overLimitText } from './wording.ts';

export const thinMargin: Check<'channel'> = {
  name: 'thin-margin',
  kind: 'channel',
  severity: 'warning',
  finds: 'The band ends so close to half the rate that the filter has no room to fall in between.',
  why: 'What lies just above half the rate folds to just below it. Between the band and its first fold there is only twice the distance to half the rate, and within it the filter has to fall from the flatness you want to the attenuation you need. Spectrum work usually leaves a margin of 1.28, half the rate over the top of the band. Nothing is said where the filter manages in less.',
  shows: `rig: Fan bearing
digitizers:
  front-end: { bits: 24, full-scale: ±10 V }
filters:
  card: { response: elliptic, order: 8, ripple: 0.1 dB, stopband: 80 dB, pass-edge: 10.5 kHz }
channels:
  bearing:
    digitizer: front-end
    rate: 25.6 kHz
    filter: card
    band: 10 Hz .. 10.5 kHz
    fold-limit: -90 dBFS
`,
  clean: `rig: Fan bearing
digitizers:
  front-end: { bits: 24, full-scale: ±10 V }
filters:
  card: { response: elliptic, order: 8, ripple: 0.1 dB, stopband: 80 dB, pass-edge: 10.5 kHz }
channels:
  bearing:
    digitizer: front-end
    rate: 25.6 kHz
    filter: card
    band: 10 Hz .. 10.5 kHz
    # The margin is 1.22, but 80 dB are reached before the first fold.
    fold-limit: -80 dBFS
`,
  sources: ['Margin 1.28 (rate / 2.56): common practice of spectrum work; no source.'],
  run(view) {
    const { shortfall } = view;
    if (shortfall?.kind !== 'thin-margin') return SAYS_NOTHING;
    const { chain, channel } = view;
    const { fold, margin } = shortfall;
    const { stage, level } = fold;
    const excess = level - chain.foldLimit;
    const standing = standingOnStage(chain, stage);
    const nyquist = formatHz(chain.stages[stage - 1]!.nyquistHz);
    return [
      {
        stage,
        message: `What no source declares will be recorded inside the band, because the filter has too little room: the band ends at ${formatHz(chain.bandHighHz)} and half the rate is ${nyquist}, a margin of ${margin.toFixed(2)} where ${COMMON_MARGIN} is usual. Up to ${levelText(level, chain)} may be left of what is at ${formatHz(fold.atHz)}, ${overLimitText(level, chain)}.`,
        place: standing.place,
        related: [
          ...standing.related,
          { place: standingOn(channel, channel.band).place, message: 'The band ends here.' },
          ...filtersAhead(chain, stage),
        ],
        figures: {
          margin,
          usualMargin: COMMON_MARGIN,
          atHz: fold.atHz,
          attenuationDb: fold.attenuationDb,
          ...levelFigures(level, chain),
          stage,
        },
        excess,
      },
    ];
  },
};
