import type { Group, PhaseLimit } from '../rig/model.ts';
import { type Scan, type ScanDelay, type ScannedChannel, scanDelays } from './scan.ts';

/** A channel of a group. */
export interface GroupMember extends ScannedChannel {
  /** How late it is sampled by its turn in a scan; `undefined` where nobody can tell. */
  readonly scanDelay: ScanDelay | undefined;
}

/** A group with the channels that name it. */
export interface ComparedGroup {
  readonly group: Group;
  readonly within: PhaseLimit;
  readonly upToHz: number;
  /** In document order: the first is what the others are compared with. */
  readonly members: readonly GroupMember[];
}

/** The members of each group by its name, in document order; a name may stand for no group that could be read. */
export function groupMembers(
  channels: readonly ScannedChannel[],
  scans: readonly Scan[],
): ReadonlyMap<string, readonly GroupMember[]> {
  const delayOf = scanDelays(scans);
  const byName = new Map<string, GroupMember[]>();
  for (const { channel, chain } of channels) {
    const scanDelay = delayOf(channel);
    const name = channel.group?.value;
    if (name === undefined) continue;
    const member = { channel, chain, scanDelay };
    const others = byName.get(name);
    if (others) others.push(member);
    else byName.set(name, [member]);
  }
  return byName;
}

/** The groups of a rig that say all that it takes to compare two channels, and have two of them. */
export function comparedGroups(
  groups: ReadonlyMap<string, Group>,
  channels: readonly ScannedChannel[],
  scans: readonly Scan[],
): readonly ComparedGroup[] {
  if (groups.size === 0) return [];
  return [...groupMembers(channels, scans)].flatMap(([name, members]): ComparedGroup[] => {
    const group = groups.get(name);
    if (!group?.within || !group.upToHz || !haveTwo(members)) return [];
    return [{ group, within: group.within.value, upToHz: group.upToHz.value, members }];
  });
}

function haveTwo(members: readonly GroupMember[]): boolean {
  return members.length > 1 || members[0]!.channel.count > 1;
}
