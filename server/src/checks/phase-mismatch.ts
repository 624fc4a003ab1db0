import type { ComparedGroup, GroupMember } from '../chain/group.ts';
import { comparisonUpTo, type PhaseParts, partsApart, phaseApart } from '../chain/phase-apart.ts';
import { formatHz } from '../quantity/write.ts';
import { type PhaseGap, sizeOf } from '../signal/phase-gap.ts';
import { type Check, SAYS_NOTHING, type SaidOfRig } from './check.ts';
import {
  type Apart,
  allowedText,
  angleText,
  limitFigures,
  saidOfMember,
  timeText,
  worstApart,
} from './group-finding.ts';
import { timeOf } from './rig-time.ts';

interface Turned extends Apart {
  readonly gap: PhaseGap;
}

const DEGREES_PER_RADIAN = 180 / Math.PI;

export const phaseMismatch: Check<'rig'> = {
  name: 'phase-mismatch',
  kind: 'rig',
  severity: 'warning',
  finds: 'Filters, sensors or digital steps of a group turn the phases of its channels further apart than it allows.',
  why: 'Every filter delays what it passes, the more the steeper it is and the nearer its cutoff. Channels that are filtered alike are delayed alike; where they are not, phases that are compared differ without anything having moved. The greatest difference is told up to the frequency at which it matters, and from where the bands of both channels have begun. Filters are taken as they are written: how far two of a kind may differ is not looked at, and of a mask or a measured curve, whose phase nobody knows, nothing is said unless both channels have it. Turns in a scan are told apart, as `scan-skew`.',
  shows: `rig: Tower
filters:
  one: { response: rc, order: 1, corner: 1 kHz }
  other: { response: rc, order: 1, corner: 1.1 kHz }
groups:
  tower: { within: 0.5 deg, up-to: 100 Hz }
defaults: { rate: 1 kHz, band: 1 Hz .. 100 Hz, undeclared: -90 dBFS, group: tower }
channels:
  base: { filter: one }
  top: { filter: other }
`,
  clean: `rig: Tower
filters:
  one: { response: rc, order: 1, corner: 1 kHz }
  other: { response: rc, order: 1, corner: 1.1 kHz }
groups:
  # atan 0.1 less atan 0.0909 is 0.516 degrees.
  tower: { within: 0.52 deg, up-to: 100 Hz }
defaults: { rate: 1 kHz, band: 1 Hz .. 100 Hz, undeclared: -90 dBFS, group: tower }
channels:
  base: { filter: one }
  top: { filter: other }
`,
  sources: [
    'Oppenheim and Schafer, Discrete-Time Signal Processing: phase and group delay of poles, zeros and taps.',
    'A. V. Oppenheim and A. S. Willsky, Signals and Systems: first- and second-order systems.',
  ],
  run: (rig) => timeOf(rig).groups.flatMap(mismatchOf),
};

function mismatchOf(compared: ComparedGroup): readonly SaidOfRig[] {
  const reference = compared.members.find(({ chain }) => chain !== undefined);
  const found = reference && worstApart(turnedMembers(compared, reference));
  if (!reference || !found) return SAYS_NOTHING;
  const { member, gap, excess } = found.worst;
  const { within } = compared;
  const phaseDeg = gap.phaseRad * DEGREES_PER_RADIAN;
  const size = within.kind === 'time' ? timeText(sizeOf(gap, 'time')) : angleText(phaseDeg);
  const side = gap.phaseRad < 0 ? 'behind' : 'ahead of';
  return [
    saidOfMember(compared, member, reference, {
      message: `At ${formatHz(gap.atHz)} this channel will be ${size} ${side} \`${reference.channel.name}\`, ${causeText(member, reference, gap)}: ${allowedText(compared, found.others)}`,
      figures: { phaseDeg, atHz: gap.atHz, ...limitFigures(within) },
      excess,
    }),
  ];
}

function* turnedMembers(compared: ComparedGroup, reference: GroupMember): Generator<Turned> {
  const { within, upToHz, members } = compared;
  const comparison = comparisonUpTo(upToHz, within.kind);
  const limit = within.kind === 'time' ? within.seconds : within.degrees / DEGREES_PER_RADIAN;
  for (const member of members) {
    if (!member.chain || !reference.chain || member === reference) continue;
    const gap = phaseApart(member.chain, reference.chain, comparison);
    if (gap) yield { member, gap, excess: sizeOf(gap, within.kind) / limit };
  }
}

const CAUSES: Readonly<Record<keyof PhaseParts, string>> = {
  sensor: 'by its sensor',
  analogue: 'by its analogue filters',
  digital: 'by its digital filters',
};

/** What makes most of it. */
function causeText({ chain }: GroupMember, reference: GroupMember, { atHz }: PhaseGap): string {
  if (!chain || !reference.chain) return '';
  const parts = partsApart(chain, reference.chain, atHz);
  const kinds = (['sensor', 'analogue', 'digital'] as const).filter((kind) => parts[kind] !== 0);
  const most = kinds.reduce((best, kind) => (Math.abs(parts[kind]) > Math.abs(parts[best]) ? kind : best), kinds[0]!);
  return kinds.length > 1 ? `most of it ${CAUSES[most]}` : CAUSES[most];
}
