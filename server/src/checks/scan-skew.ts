import type { ComparedGroup, GroupMember } from '../chain/group.ts';
import { type Check, SAYS_NOTHING, type SaidOfRig } from './check.ts';
import type { RelatedPlace } from './finding.ts';
import {
  type Apart,
  allowedText,
  degreesOf,
  delayExcess,
  delayText,
  isOver,
  limitFigures,
  saidOfMember,
  worstApart,
} from './group-finding.ts';
import { type RigTime, timeOf } from './rig-time.ts';

interface Late extends Apart {
  readonly delayS: number;
}

export const scanSkew: Check<'rig'> = {
  name: 'scan-skew',
  kind: 'rig',
  severity: 'warning',
  finds: 'Channels of a group are sampled one after the other, further apart than the group allows.',
  why: 'A scanned digitizer has one converter that takes its channels in turn, as they stand in the file. Each is late by its place in the scan, which turns its phase by 360 degrees times the frequency times the delay, and phases that are compared differ by as much without anything having moved. Where the delay is known it can be taken out afterwards, sample by sample; here nothing is assumed to do that.',
  shows: `rig: Tower
digitizers:
  scanner: { sampling: scanned, scan-interval: 10 us }
groups:
  tower: { within: 3 deg, up-to: 1 kHz }
defaults: { digitizer: scanner, rate: 10 kHz, band: 1 Hz .. 1 kHz, undeclared: -90 dBFS, group: tower }
channels:
  base: {}
  top: {}
`,
  clean: `rig: Tower
digitizers:
  scanner: { sampling: scanned, scan-interval: 10 us }
groups:
  # 10 us at 1 kHz are 3.6 degrees.
  tower: { within: 3.6 deg, up-to: 1 kHz }
defaults: { digitizer: scanner, rate: 10 kHz, band: 1 Hz .. 1 kHz, undeclared: -90 dBFS, group: tower }
channels:
  base: {}
  top: {}
`,
  sources: ['Arithmetic: a delay t turns the phase at f by 360 f t degrees.'],
  run: (rig) => skews(timeOf(rig)),
};

/** What `scan-skew` says of groups. */
export function skews({ groups }: RigTime): readonly SaidOfRig[] {
  return groups.flatMap(skewOf);
}

function skewOf(compared: ComparedGroup): readonly SaidOfRig[] {
  const reference = compared.members[0]!;
  const found = worstApart(lateMembers(compared, reference));
  if (!found) return SAYS_NOTHING;
  const { member, delayS, excess } = found.worst;
  const { upToHz, within } = compared;
  const side = delayS > 0 ? 'later' : 'earlier';
  return [
    saidOfMember(compared, member, reference, {
      message: `${nameOf(member, delayS)} will be sampled ${delayText(Math.abs(delayS), compared)} ${side} than ${firstOf(reference, member)}, by its turn in the scan: ${allowedText(compared, found.others)}`,
      related: scansAt(delayS > 0 ? member : reference),
      figures: { delayS, phaseDeg: degreesOf(delayS, upToHz), atHz: upToHz, ...limitFigures(within) },
      excess,
    }),
  ];
}

/** Of the channels of a brace range, it is the first or the last one that differs most. */
function nameOf({ channel, scanDelay }: GroupMember, delayS: number): string {
  if (channel.count === 1) return 'This channel';
  const isLast = delayS > 0 || scanDelay?.firstS === scanDelay?.lastS;
  return `The ${isLast ? 'last' : 'first'} of these channels`;
}

function firstOf(reference: GroupMember, member: GroupMember): string {
  if (reference === member) return 'the first of them';
  const name = `\`${reference.channel.name}\``;
  return reference.channel.count === 1 ? name : `the first of ${name}`;
}

function* lateMembers({ members, ...limits }: ComparedGroup, reference: GroupMember): Generator<Late> {
  const referenceS = reference.scanDelay?.firstS;
  if (referenceS === undefined) return;
  for (const member of members) {
    if (!member.scanDelay) continue;
    const first = member.scanDelay.firstS - referenceS;
    const last = member.scanDelay.lastS - referenceS;
    const delayS = Math.abs(last) >= Math.abs(first) ? last : first;
    const excess = delayExcess(delayS, limits);
    const { count } = member.channel;
    yield count === 1
      ? { member, delayS, excess }
      : { member, delayS, excess, over: howMany(first, last, count, limits) };
  }
}

/** Of so many channels, evenly from one delay to another, how many are over the limit. */
function howMany(first: number, last: number, count: number, limits: Pick<ComparedGroup, 'within' | 'upToHz'>): number {
  let over = 0;
  for (let turn = 0; turn < count; turn++) {
    if (isOver(delayExcess(first + ((last - first) * turn) / (count - 1), limits))) over++;
  }
  return over;
}

function scansAt({ channel }: GroupMember): readonly RelatedPlace[] {
  const { digitizer } = channel;
  const interval = digitizer?.scanIntervalS;
  if (interval) return [{ place: interval.place, message: 'The time from one channel to the next stands here.' }];
  if (!digitizer?.sampling) return SAYS_NOTHING;
  return [
    { place: digitizer.sampling.place, message: 'Its channels are spread evenly over the sample period, in turn.' },
  ];
}
