import { relativeDrift } from '../chain/clock-lock.ts';
import type { ComparedGroup, GroupMember } from '../chain/group.ts';
import { formatQuantity } from '../quantity/write.ts';
import type { Clock } from '../rig/model.ts';
import { type Check, type RigView, SAYS_NOTHING, type SaidOfRig } from './check.ts';
import {
  type Apart,
  allowedText,
  degreesOf,
  delayExcess,
  delayText,
  limitFigures,
  saidOfMember,
  timeText,
  worstApart,
} from './group-finding.ts';
import { timeOf } from './rig-time.ts';

interface Drifting extends Apart {
  readonly clock: Clock;
  /** Relative. */
  readonly drift: number;
}

export const clockDrift: Check<'rig'> = {
  name: 'clock-drift',
  kind: 'rig',
  severity: 'warning',
  finds: 'Channels of a group run on clocks of their own, which drift further apart than the group allows.',
  why: 'Two clocks are never equally fast. Unless one is locked to the other, or both to a third, the records grow apart with every second, at worst by both tolerances together; after a while samples of the same number are of different moments. A shared clock, or a clock signal that is recorded with both, cures it. Without a `duration` in `run`, or a tolerance of the clocks, nothing can be said.',
  shows: `rig: Tower
clocks:
  near: { frequency: 10 MHz, tolerance: 10 ppm }
  far: { frequency: 10 MHz, tolerance: 10 ppm }
digitizers:
  base-box: { clock: near }
  top-box: { clock: far }
groups:
  tower: { within: 1 ms, up-to: 10 Hz }
run: { duration: 60 s }
defaults: { rate: 1 kHz, band: 1 Hz .. 100 Hz, undeclared: -90 dBFS, group: tower }
channels:
  base: { digitizer: base-box }
  top: { digitizer: top-box }
`,
  clean: `rig: Tower
clocks:
  near: { frequency: 10 MHz, tolerance: 10 ppm }
  far: { frequency: 10 MHz, tolerance: 10 ppm }
digitizers:
  base-box: { clock: near }
  top-box: { clock: far }
groups:
  tower: { within: 1 ms, up-to: 10 Hz }
run: { duration: 50 s } # 20 ppm of it are 1 ms
defaults: { rate: 1 kHz, band: 1 Hz .. 100 Hz, undeclared: -90 dBFS, group: tower }
channels:
  base: { digitizer: base-box }
  top: { digitizer: top-box }
`,
  sources: ['Arithmetic: the sum of both tolerances times the duration.'],
  run(rig) {
    const { run } = rig.environment;
    if (!run?.durationS) return SAYS_NOTHING;
    const { value: durationS, place } = run.durationS;
    return timeOf(rig).groups.flatMap((compared): readonly SaidOfRig[] => {
      const said = driftOf(compared, durationS, rig);
      if (!said) return SAYS_NOTHING;
      return [{ ...said, related: [...(said.related ?? []), { place, message: 'How long is recorded stands here.' }] }];
    });
  },
};

function driftOf(compared: ComparedGroup, durationS: number, rig: RigView): SaidOfRig | undefined {
  const reference = compared.members.find((member) => clockOf(member) !== undefined);
  const referenceClock = reference && clockOf(reference);
  if (!reference || !referenceClock) return undefined;
  const found = worstApart(driftingMembers(compared, referenceClock, durationS, rig));
  if (!found) return undefined;
  const { member, clock, drift, excess } = found.worst;
  const driftS = drift * durationS;
  return saidOfMember(compared, member, reference, {
    message: `In ${timeText(durationS)} this channel may drift ${delayText(driftS, compared)} from \`${reference.channel.name}\`: \`${clock.name}\` is not locked to \`${referenceClock.name}\`, and they may differ by ${formatQuantity(drift, 'ratio', 3)}. ${allowedText(compared, found.others)}`,
    related: [{ place: clock.place, message: 'This clock runs by itself.' }],
    figures: {
      driftS,
      phaseDeg: degreesOf(driftS, compared.upToHz),
      atHz: compared.upToHz,
      ...limitFigures(compared.within),
    },
    excess,
  });
}

function* driftingMembers(
  compared: ComparedGroup,
  reference: Clock,
  durationS: number,
  { environment: { clocks } }: RigView,
): Generator<Drifting> {
  const drifts = new Map<Clock, number>();
  for (const member of compared.members) {
    const clock = clockOf(member);
    if (!clock || clock === reference) continue;
    const drift = drifts.get(clock) ?? relativeDrift(clock, reference, clocks);
    drifts.set(clock, drift);
    yield { member, clock, drift, excess: delayExcess(drift * durationS, compared) };
  }
}

function clockOf({ channel }: GroupMember): Clock | undefined {
  return channel.digitizer?.clock?.thing;
}
