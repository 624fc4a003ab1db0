import { neighbouringRates } from '../chain/reachable.ts';
import type { Digitizer } from '../rig/model.ts';
import { type Check, SAYS_NOTHING } from './check.ts';
import type { RelatedPlace } from './finding.ts';
import { standingOn } from './standing.ts';
import { rateText } from './wording.ts';

export const rateUnreachable: Check<'channel'> = {
  name: 'rate-unreachable',
  kind: 'channel',
  severity: 'error',
  finds: "The clock and its dividers, or the list of rates, can't make this rate; names the two nearest that they can.",
  why: 'A digitizer that is asked for a rate it does not have takes another one, with or without a word. Every frequency in the record is then off by the difference. A rate written by hand is right within half a unit of its last digit.',
  shows: `rig: Fan bearing
clocks:
  chassis: { frequency: 13.1072 MHz, divide: 1..128 }
digitizers:
  front-end: { clock: chassis, prescale: 256 }
channels:
  bearing:
    digitizer: front-end
    rate: 20 kHz
    band: 10 Hz .. 5 kHz
`,
  clean: `rig: Fan bearing
clocks:
  chassis: { frequency: 13.1072 MHz, divide: 1..128 }
digitizers:
  front-end: { clock: chassis, prescale: 256 }
channels:
  bearing:
    digitizer: front-end
    # 13.1072 MHz / (256 x 3), to the digit.
    rate: 17.067 kHz
    band: 10 Hz .. 5 kHz
`,
  sources: ['Arithmetic: rate = frequency / (prescale x divider).'],
  run({ chain, channel }) {
    if (chain.rateReachable || !channel.digitizer) return SAYS_NOTHING;
    const { rateHz } = chain;
    const { belowHz, aboveHz } = neighbouringRates(channel.digitizer, rateHz);
    const nearest = [belowHz, aboveHz].filter((hz) => hz !== undefined);
    const standing = standingOn(channel, channel.rateHz);
    const advice =
      nearest.length === 0 ? '' : ` The nearest it can: ${nearest.map((hz) => rateText(hz)).join(' and ')}.`;
    return [
      {
        message: `The record will not be at ${rateText(rateHz)}, because \`${channel.digitizer.name}\` can't make that rate.${advice}`,
        place: standing.place,
        related: [...standing.related, ...originOf(channel.digitizer)],
        figures: {
          rateHz,
          ...(belowHz === undefined ? {} : { belowHz }),
          ...(aboveHz === undefined ? {} : { aboveHz }),
        },
        excess: Math.min(...nearest.map((hz) => Math.abs(Math.log(hz / rateHz)))),
      },
    ];
  },
};

function originOf({ rates, clock }: Digitizer): readonly RelatedPlace[] {
  if (rates) return [{ place: rates.place, message: 'The rates that it can make stand here.' }];
  const frequency = clock?.thing?.frequencyHz;
  return frequency ? [{ place: frequency.place, message: 'Its rates are divided from this clock.' }] : [];
}
