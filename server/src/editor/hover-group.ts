import { chainPhaseOf } from '../chain/chain-phase.ts';
import { type GroupMember, groupMembers } from '../chain/group.ts';
import { phaseApartAt } from '../chain/phase-apart.ts';
import { scansOf } from '../chain/scan.ts';
import { formatHz, formatQuantity } from '../quantity/write.ts';
import type { Group } from '../rig/model.ts';
import type { Evaluation } from '../workbench/evaluation.ts';
import { delayText } from './delay-words.ts';
import { codeMarkdown, tableMarkdown } from './picture-markdown.ts';
import { groupWords } from './things.ts';

/** A hover is read, not scrolled: members beyond these are counted. */
const MOST_MEMBERS = 16;
const DEGREES_PER_RADIAN = 180 / Math.PI;
const UNKNOWN = 'not known';

interface Row {
  readonly member: GroupMember;
  /** Against the first member, its turn in a scan included; `undefined` where it can't be told. */
  readonly phaseDeg: number | undefined;
}

/** The members of a group, how late each is, and how far from the first at the highest frequency; the furthest first. */
export function groupMarkdown(group: Group, { channels }: Evaluation): string {
  const head = `**${codeMarkdown(group.name)}** · ${groupWords(group)}`;
  const results = channels.map(({ result }) => result);
  const members = groupMembers(results, scansOf(results)).get(group.name) ?? [];
  const [reference] = members;
  const upToHz = group.upToHz?.value;
  if (!reference) return `${head}\n\nNo channel is in it.`;
  if (upToHz === undefined) return head;
  const rows = members.slice(1).map((member) => ({ member, phaseDeg: phaseAgainst(reference, member, upToHz) }));
  const ordered: readonly Row[] = [{ member: reference, phaseDeg: 0 }, ...rows.sort(byDistance)];
  const at = formatHz(upToHz);
  const table = tableMarkdown(
    ['channel', 'its turn', `group delay at ${at}`, `phase at ${at}`],
    ordered.slice(0, MOST_MEMBERS).map((row, index) => cellsOf(row, index === 0, upToHz)),
  );
  const more = ordered.length - MOST_MEMBERS;
  const count = members.reduce((sum, { channel }) => sum + channel.count, 0);
  const channelsText = count === 1 ? '1 channel' : `${count.toLocaleString('en')} channels`;
  return `${head} · ${channelsText}\n\n${table}${more > 0 ? `\n\n${more.toLocaleString('en')} more, all nearer to the first.` : ''}`;
}

function cellsOf({ member, phaseDeg }: Row, isReference: boolean, upToHz: number): readonly string[] {
  const { channel, chain } = member;
  const phase = chain && chainPhaseOf(chain);
  const isWhole = phase !== undefined && phase.untold.length === 0;
  return [
    codeMarkdown(channel.name),
    turnText(member),
    isWhole ? delayText(phase.whole.groupDelayS(upToHz)) : UNKNOWN,
    isReference ? 'compared with' : phaseDeg === undefined ? UNKNOWN : angleText(phaseDeg),
  ];
}

/** Of a brace range, from the first to the last of its channels. */
function turnText({ scanDelay }: GroupMember): string {
  if (!scanDelay) return UNKNOWN;
  const { firstS, lastS } = scanDelay;
  if (lastS === 0) return 'at once';
  return firstS === lastS ? `${delayText(lastS)} later` : `${delayText(firstS)} .. ${delayText(lastS)} later`;
}

function phaseAgainst(reference: GroupMember, member: GroupMember, upToHz: number): number | undefined {
  if (!reference.chain || !member.chain || !reference.scanDelay || !member.scanDelay) return undefined;
  // What is sampled later has gone further on.
  const scanDeg = 360 * upToHz * (member.scanDelay.lastS - reference.scanDelay.firstS);
  const phaseRad = phaseApartAt(member.chain, reference.chain, upToHz);
  return phaseRad === undefined ? undefined : phaseRad * DEGREES_PER_RADIAN + scanDeg;
}

/** What can't be told comes last. */
function byDistance(one: Row, other: Row): number {
  const distance = ({ phaseDeg }: Row): number => (phaseDeg === undefined ? -1 : Math.abs(phaseDeg));
  return distance(other) - distance(one);
}

/** What is less than a millionth of a degree is rounding. */
function angleText(degrees: number): string {
  return Math.abs(degrees) < 1e-6 ? '0 deg' : formatQuantity(degrees, 'angle', 4);
}
