import { frequenciesOf, hzOf } from '../chain/filter-response.ts';
import type { StageFilter } from '../chain/model.ts';
import { formatHz } from '../quantity/write.ts';
import type { ChannelView, Said } from './check.ts';
import { SAYS_NOTHING } from './check.ts';
import { type Standing, standingOn } from './standing.ts';
import { rateText } from './wording.ts';

/**
 * Digital filters whose frequencies are at or beyond half the rate that they work at: told as `out-of-range`, here and
 * not where the filter is read, because only a channel decides at which rate it works.
 */
export function digitalEdges(view: ChannelView): readonly Said[] {
  const { chain } = view;
  if (chain.stages.length === 1 && chain.after.length === 0) return SAYS_NOTHING;
  const said: Said[] = [];
  for (const [index, { inputRateHz, kind, filters }] of chain.stages.entries()) {
    if (inputRateHz === undefined) continue;
    const fractionOfHz = kind === 'modulator-decimation' ? chain.rateHz : inputRateHz;
    for (const filter of filters) said.push(...beyond(view, filter, fractionOfHz, inputRateHz, index + 1));
  }
  const lastHz = chain.ratesHz[chain.ratesHz.length - 1]!;
  for (const filter of chain.after) said.push(...beyond(view, filter, lastHz, lastHz, chain.stages.length + 1));
  return said;
}

function beyond(
  { channel }: ChannelView,
  { use, role }: StageFilter,
  fractionOfHz: number,
  inputRateHz: number,
  stage: number,
): readonly Said[] {
  const response = use?.filter?.response;
  if (!use?.filter || !response || response.response === 'points' || response.response === 'mask') return [];
  const greatest = Math.max(0, ...frequenciesOf(response).map((frequency) => hzOf(frequency, fractionOfHz)));
  const limitHz = response.response === 'half-band' ? inputRateHz / 4 : inputRateHz / 2;
  // A design may well stop at half the rate itself.
  const isWithin = response.response === 'kaiser' ? greatest <= limitHz : greatest < limitHz;
  if (isWithin) return [];
  const name = use.filter.name === '' ? 'This filter' : `\`${use.filter.name}\``;
  const standing: Standing = standingOn(channel, role === 'step' ? use : channel.rateHz);
  const part = response.response === 'half-band' ? 'a quarter' : 'half';
  return [
    {
      about: use.filter.name === '' ? 'filter' : use.filter.name,
      stage,
      message: `${name} can't do what it says here: ${formatHz(greatest)} is not below ${formatHz(limitHz)}, ${part} of the ${rateText(inputRateHz)} that it is given.`,
      place: standing.place,
      related: [...standing.related, { place: use.filter.place, message: `${name} is described here.` }],
      figures: { frequencyHz: greatest, limitHz, stage },
      excess: greatest / limitHz,
    },
  ];
}
