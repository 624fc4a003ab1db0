import type { StageFilter } from '../chain/model.ts';
import { formatHz } from '../quantity/write.ts';
import { type ChannelView, type Check, SAYS_NOTHING } from './check.ts';
import { type Standing, standingOn } from './standing.ts';
import { differenceText } from './wording.ts';
import { isOwnFilter, worstFilter } from './worst-filter.ts';

export const DEFAULT_FLATNESS_DB = 1;
const ROUNDING_DB = 1e-9;

export const bandDroop: Check<'channel'> = {
  name: 'band-droop',
  kind: 'channel',
  severity: 'warning',
  finds: 'Filters and steps together sag more than `flatness` somewhere inside the band, the sensor apart.',
  why: 'What the filter takes off inside the band is missing from every figure that is read from the record there. The sum of all filters counts, analogue and digital, each at the worst of its tolerance. Where a mask ends its pass band nothing is promised of the response, and that is said.',
  shows: `rig: Fan bearing
filters:
  card: { response: butterworth, order: 6, cutoff: 8 kHz }
channels:
  bearing:
    rate: 51.2 kHz
    filter: card
    band: 10 Hz .. 7.5 kHz
`,
  clean: `rig: Fan bearing
filters:
  card: { response: butterworth, order: 6, cutoff: 8 kHz }
channels:
  bearing:
    rate: 51.2 kHz
    filter: card
    # 1 dB down at 7.15 kHz.
    band: 10 Hz .. 7.1 kHz
`,
  sources: ['Butterworth, On the theory of filter amplifiers, 1930: 10 log10(1 + (f / cutoff)^(2 order)) dB.'],
  run(view) {
    const { channel, chain, bandResponse } = view;
    const { sagDb, sagAtHz } = bandResponse;
    const flatnessDb = channel.flatnessDb?.value ?? DEFAULT_FLATNESS_DB;
    if (sagDb <= flatnessDb + ROUNDING_DB) return SAYS_NOTHING;
    const worst = worstFilter(chain, chain.bandLowHz, chain.bandHighHz);
    const standing = standingFor(view, worst);
    const use = worst?.use;
    return [
      {
        message: sentence(view, sagDb, sagAtHz, flatnessDb),
        place: standing.place,
        related: [
          ...standing.related,
          ...(use?.filter
            ? [{ place: use.filter.place, message: `\`${use.filter.name || 'filter'}\` takes most of it.` }]
            : []),
        ],
        figures: { ...(Number.isFinite(sagDb) ? { sagDb } : {}), atHz: sagAtHz, flatnessDb },
        excess: sagDb - flatnessDb,
      },
    ];
  },
};

function sentence({ chain }: ChannelView, sagDb: number, atHz: number, flatnessDb: number): string {
  const limit = `\`flatness\` allows ${differenceText(flatnessDb)}`;
  if (sagDb < Infinity) {
    return `What is at ${formatHz(atHz)} will be recorded ${differenceText(sagDb)} too low, inside the band; ${limit}.`;
  }
  if (atHz <= 0)
    return `The constant part of the band will not be recorded, because the path does not pass 0 Hz; ${limit}.`;
  return `How high the band is recorded up to ${formatHz(chain.bandHighHz)} is not promised by its filters; ${limit}.`;
}

/** At the filter that takes most, where it is the channel's own; otherwise at the band. */
function standingFor({ channel }: ChannelView, worst: StageFilter | undefined): Standing {
  return standingOn(channel, worst?.use && isOwnFilter(worst) ? worst.use : channel.band);
}
