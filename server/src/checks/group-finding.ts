import type { ComparedGroup, GroupMember } from '../chain/group.ts';
import { formatHz, formatQuantity } from '../quantity/write.ts';
import type { PhaseLimit } from '../rig/model.ts';
import type { SaidOfRig } from './check.ts';
import type { Finding, RelatedPlace } from './finding.ts';
import { standingOn } from './standing.ts';

/** Relative. */
const ROUNDING = 1e-9;
const DEGREES_PER_TURN = 360;
/** Past this many degrees, an angle is told in turns. */
const MOST_DEGREES = 720;

/** How far one member of a group is from the first one. */
export interface Apart {
  readonly member: GroupMember;
  /** On the scale of what the group allows, over what it allows: 1 is as much as it does. */
  readonly excess: number;
  /** Of the channels that a brace range stands for, how many are over it; left out, all. */
  readonly over?: number;
}

/** Of all members over what their group allows, the one that differs most, and how many others do. */
export interface WorstApart<T extends Apart> {
  readonly worst: T;
  readonly others: number;
}

export function worstApart<T extends Apart>(found: Iterable<T>): WorstApart<T> | undefined {
  let worst: T | undefined;
  let count = 0;
  for (const apart of found) {
    if (!isOver(apart.excess)) continue;
    count += apart.over ?? apart.member.channel.count;
    if (!worst || apart.excess > worst.excess) worst = apart;
  }
  return worst && { worst, others: count - (worst.over ?? worst.member.channel.count) };
}

export function isOver(excess: number): boolean {
  return excess > 1 + ROUNDING;
}

/** A delay over what a group allows. */
export function delayExcess(delayS: number, { within, upToHz }: Pick<ComparedGroup, 'within' | 'upToHz'>): number {
  const size = Math.abs(delayS);
  return within.kind === 'time' ? size / within.seconds : degreesOf(size, upToHz) / within.degrees;
}

export function degreesOf(delayS: number, hz: number): number {
  return DEGREES_PER_TURN * hz * delayS;
}

/** What a channel says of the group that it is in: it stands where the channel names it, and relates the other one. */
export function saidOfMember(
  { group }: ComparedGroup,
  { channel }: GroupMember,
  reference: GroupMember,
  said: Pick<Finding, 'message' | 'figures' | 'excess'> & { readonly related?: readonly RelatedPlace[] },
): SaidOfRig {
  const { related = [], ...rest } = said;
  const standing = standingOn(channel, channel.group);
  return {
    ...rest,
    channel: channel.name,
    about: group.name,
    place: standing.place,
    related: [
      ...standing.related,
      { place: reference.channel.place, message: 'It is compared with this channel, the first of the group.' },
      ...(group.within ? [{ place: group.within.place, message: 'What the group allows stands here.' }] : []),
      ...related,
    ],
  };
}

/** A time, and at what the group asks for an angle, what it is in degrees: `10 us (3.6 deg at 1 kHz)`. */
export function delayText(delayS: number, { within, upToHz }: ComparedGroup): string {
  const time = timeText(delayS);
  return within.kind === 'time' ? time : `${time} (${angleText(degreesOf(delayS, upToHz))} at ${formatHz(upToHz)})`;
}

/** `` `tower` allows 2 deg up to 1 kHz``, and how many others are over that too. */
export function allowedText({ group, within, upToHz }: ComparedGroup, others: number): string {
  const limit = within.kind === 'time' ? timeText(within.seconds) : angleText(within.degrees);
  const more =
    others === 0
      ? ''
      : others === 1
        ? ', and 1 other of its channels is over that too'
        : `, and ${others.toLocaleString('en')} others of its channels are over that too`;
  return `\`${group.name}\` allows ${limit} up to ${formatHz(upToHz)}${more}.`;
}

export function limitFigures(within: PhaseLimit): Readonly<Record<string, number>> {
  return within.kind === 'time' ? { limitS: within.seconds } : { limitDeg: within.degrees };
}

export function timeText(seconds: number): string {
  return formatQuantity(Math.abs(seconds), 'time', 4);
}

export function angleText(degrees: number): string {
  const size = Math.abs(degrees);
  if (size < MOST_DEGREES) return formatQuantity(size, 'angle', 3);
  return `${formatQuantity(size / DEGREES_PER_TURN, 'number', 4)} turns`;
}
