import { formatHz } from '../quantity/write.ts';
import { type Check, SAYS_NOTHING } from './check.ts';
import { filtersAhead, standingOnFilters } from './standing.ts';
import { differenceText, levelFigures, levelText, overLimitText, stageText } from './wording.ts';

export const filterShort: Check<'channel'> = {
  name: 'filter-short',
  kind: 'channel',
  severity: 'warning',
  finds:
    'The filter takes too little off what would fold into the band, so content that no source declares may be left there.',
  why: 'Over all true frequencies that fold into the band, however high and at whatever stage, the least attenuation decides what may be left of what nobody has declared. Without a word on it, that is taken to be as high as full scale. State what is there with `undeclared`, from a measurement or a data sheet, or filter more. At the input of a modulator, whose rate is far above the band, this is only a hint until `undeclared` is stated.',
  shows: `rig: Fan bearing
digitizers:
  front-end: { bits: 24, full-scale: ±10 V }
filters:
  card: { response: butterworth, order: 6, cutoff: 6 kHz }
channels:
  bearing:
    digitizer: front-end
    rate: 25.6 kHz
    filter: card
    band: 10 Hz .. 5 kHz
    fold-limit: -70 dBFS
`,
  clean: `rig: Fan bearing
digitizers:
  front-end: { bits: 24, full-scale: ±10 V }
filters:
  # 20.6 kHz folds to 5 kHz, and there this filter takes off 64.3 dB.
  card: { response: butterworth, order: 6, cutoff: 6 kHz }
channels:
  bearing:
    digitizer: front-end
    rate: 25.6 kHz
    filter: card
    band: 10 Hz .. 5 kHz
    fold-limit: -70 dBFS
    undeclared: -10 dBFS
`,
  sources: ['Oppenheim and Schafer, Discrete-Time Signal Processing, the chapter on sampling.'],
  run(view) {
    const { shortfall } = view;
    if (shortfall?.kind !== 'filter-short') return SAYS_NOTHING;
    const { chain } = view;
    const { fold, isHint } = shortfall;
    const { stage, level, atHz, attenuationDb, undeclaredDb } = fold;
    const excess = level - chain.foldLimit;
    const standing = standingOnFilters(chain, stage);
    const where = stageText(chain, stage);
    return [
      {
        ...(isHint ? { severity: 'hint' as const } : {}),
        stage,
        message: `What no source declares near ${formatHz(atHz)} may be recorded inside the band: ${attenuationText(attenuationDb)}, and of ${levelText(undeclaredDb, chain)} that leaves ${levelText(level, chain)}, ${overLimitText(level, chain)}.${where === '' ? '' : ` It folds ${where}.`}`,
        place: standing.place,
        related: [...standing.related, ...filtersAhead(chain, stage)],
        figures: { atHz, attenuationDb, ...levelFigures(level, chain), stage },
        excess,
      },
    ];
  },
};

function attenuationText(db: number): string {
  return db < 0.05 ? 'nothing is taken off it' : `only ${differenceText(db)} is taken off it`;
}
