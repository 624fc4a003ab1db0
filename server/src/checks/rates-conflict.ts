import type { Channel, Digitizer } from '../rig/model.ts';
import type { Check, SaidOfRig } from './check.ts';
import type { ChannelSummary } from './roster.ts';
import { standingOn } from './standing.ts';
import { rateText } from './wording.ts';

/** Relative. */
const ROUNDING = 1e-9;

/** One channel of a digitizer whose rates have to go together. */
interface Member {
  readonly channel: Channel;
  readonly rateHz: number;
  /** How far off the rate may be by the way it is written. */
  readonly halfDigitHz: number;
}

export const ratesConflict: Check<'rig'> = {
  name: 'rates-conflict',
  kind: 'rig',
  severity: 'error',
  finds: "Channels of one digitizer have rates that it can't run together.",
  why: 'Many chassis run all their channels at one rate, or at whole fractions of the fastest. Asked for anything else they refuse, or set the odd channel to a rate of their own choosing.',
  shows: `rig: Fan bearing
digitizers:
  front-end: { together: sub-multiples }
channels:
  bearing:
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 10 kHz
  strut:
    digitizer: front-end
    rate: 10 kHz
    band: 10 Hz .. 1 kHz
`,
  clean: `rig: Fan bearing
digitizers:
  front-end: { together: sub-multiples }
channels:
  bearing:
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 10 kHz
  strut:
    digitizer: front-end
    rate: 12.8 kHz
    band: 10 Hz .. 1 kHz
`,
  sources: ["The digitizer's data sheet, as the rig file gives it."],
  run({ roster }) {
    const said: SaidOfRig[] = [];
    for (const [digitizer, members] of membersOf(roster.together)) {
      if (digitizer.together.value === 'same') said.push(...notTheSame(digitizer, members));
      else said.push(...notFractions(digitizer, members));
    }
    return said;
  },
};

function membersOf(channels: readonly ChannelSummary[]): ReadonlyMap<Digitizer, readonly Member[]> {
  const found = new Map<Digitizer, Member[]>();
  for (const { result } of channels) {
    const { channel, chain } = result;
    const { digitizer, rateHz: rate } = channel;
    if (!chain || !rate || !digitizer || digitizer.together.value === 'free') continue;
    const written = rate.written?.kind === 'scalar' ? rate.written.halfDigit : 0;
    const halfDigitHz = chain.rateHz === rate.value ? written : 0;
    const members = found.get(digitizer);
    const member = { channel, rateHz: chain.rateHz, halfDigitHz };
    if (members) members.push(member);
    else found.set(digitizer, [member]);
  }
  return found;
}

/** The rate that most channels have, or the first of equals, is the one that the others have to have. */
function notTheSame(digitizer: Digitizer, members: readonly Member[]): readonly SaidOfRig[] {
  const counts = new Map<number, number>();
  for (const { rateHz, channel } of members) counts.set(rateHz, (counts.get(rateHz) ?? 0) + channel.count);
  const most = Math.max(...counts.values());
  const reference = members.find(({ rateHz }) => counts.get(rateHz) === most)!;
  return members
    .filter((member) => !isMultiple(reference, member, 1))
    .map((member) => saidOf(digitizer, member, reference, 'runs all its channels at one rate'));
}

function notFractions(digitizer: Digitizer, members: readonly Member[]): readonly SaidOfRig[] {
  const fastest = members.reduce((best, member) => (member.rateHz > best.rateHz ? member : best));
  return members
    .filter((member) => !isMultiple(fastest, member, Math.max(Math.round(fastest.rateHz / member.rateHz), 1)))
    .map((member) => saidOf(digitizer, member, fastest, 'runs its channels at whole fractions of its fastest rate'));
}

function isMultiple(fast: Member, slow: Member, times: number): boolean {
  const slackHz = fast.halfDigitHz + times * slow.halfDigitHz + ROUNDING * fast.rateHz;
  return Math.abs(fast.rateHz - times * slow.rateHz) <= slackHz;
}

function saidOf(digitizer: Digitizer, { channel, rateHz }: Member, reference: Member, rule: string): SaidOfRig {
  const standing = standingOn(channel, channel.rateHz);
  return {
    channel: channel.name,
    about: digitizer.name,
    message: `\`${digitizer.name}\` will not sample this channel at ${rateText(rateHz)} while \`${reference.channel.name}\` is at ${rateText(reference.rateHz)}: it ${rule}.`,
    place: standing.place,
    related: [
      ...standing.related,
      { place: digitizer.together.place, message: 'What it can run together stands here.' },
      { place: standingOn(reference.channel, reference.channel.rateHz).place, message: 'The other rate stands here.' },
    ],
    figures: { rateHz, otherRateHz: reference.rateHz },
    excess: 1,
  };
}
