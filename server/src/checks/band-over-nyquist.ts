import { formatHz } from '../quantity/write.ts';
import { type Check, SAYS_NOTHING } from './check.ts';
import { standingOn, standingOnStage } from './standing.ts';
import { rateText, stageText } from './wording.ts';

export const bandOverNyquist: Check<'channel'> = {
  name: 'band-over-nyquist',
  kind: 'channel',
  severity: 'error',
  finds: "The band's top is at or above half the rate of some stage.",
  why: 'A record holds frequencies below half its rate and nothing else: the upper part of the band will not be in it, and what is up there will be found lower down instead.',
  shows: `rig: Fan bearing
channels:
  bearing:
    rate: 20 kHz
    band: 10 Hz .. 10 kHz
`,
  clean: `rig: Fan bearing
channels:
  bearing:
    rate: 20 kHz
    band: 10 Hz .. 9.99 kHz
`,
  sources: ['Shannon, Communication in the presence of noise, Proc. IRE 1949: the sampling theorem.'],
  run({ chain, channel }) {
    const { bandHighHz, stages } = chain;
    if (chain.isBandpass) return SAYS_NOTHING;
    const index = stages.findIndex(({ nyquistHz }) => bandHighHz >= nyquistHz);
    if (index < 0) return SAYS_NOTHING;
    const stage = index + 1;
    const { nyquistHz, rateHz } = stages[index]!;
    const standing = standingOnStage(chain, stage);
    const where = stageText(chain, stage);
    return [
      {
        stage,
        message: `The band up to ${formatHz(bandHighHz)} will not be in the record, which ends at ${formatHz(nyquistHz)}, half of ${rateText(rateHz)}${where === '' ? '' : `, ${where}`}.`,
        place: standing.place,
        related: [
          ...standing.related,
          { place: standingOn(channel, channel.band).place, message: 'The band ends here.' },
        ],
        figures: { bandHighHz, nyquistHz, margin: nyquistHz / bandHighHz, stage },
        excess: bandHighHz / nyquistHz,
      },
    ];
  },
};
