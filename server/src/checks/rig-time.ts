import { type ComparedGroup, comparedGroups } from '../chain/group.ts';
import { type Scan, type ScannedChannel, scansOf } from '../chain/scan.ts';
import type { Environment } from '../rig/environment.ts';
import type { RigView } from './check.ts';

/** What checks over many channels look at where time matters. */
export interface RigTime {
  readonly scans: readonly Scan[];
  readonly groups: readonly ComparedGroup[];
}

/** Several checks ask for the same: it is folded once for each view of a rig. */
const times = new WeakMap<RigView, RigTime>();

/** The scans and the groups of a rig. */
export function timeOf(rig: RigView): RigTime {
  const known = times.get(rig);
  if (known) return known;
  const time = hasTime(rig) ? foldedTime(rig) : NO_TIME;
  times.set(rig, time);
  return time;
}

const NO_TIME: RigTime = { scans: [], groups: [] };

/** Most rigs have neither groups nor scans, and this runs after every keystroke. */
function hasTime({ environment: { groups, digitizers } }: RigView): boolean {
  if (groups.size > 0) return true;
  for (const { sampling } of digitizers.values()) if (sampling?.value === 'scanned') return true;
  return false;
}

function foldedTime({ environment: { groups }, channels, roster }: RigView): RigTime {
  const scans = scansOf(roster.scanned.map(({ result }) => result));
  // Turns are counted over all that are scanned, in a group or not.
  const asked = scans.length === 0 ? roster.grouped : channels;
  const compared = comparedGroups(
    groups,
    asked.map(({ result }) => result),
    scans,
  );
  return { scans, groups: compared };
}

/** The same of channels that somebody has made up. */
export function timeFrom({ groups }: Environment, channels: readonly ScannedChannel[]): RigTime {
  const scans = scansOf(channels);
  return { scans, groups: comparedGroups(groups, channels, scans) };
}
