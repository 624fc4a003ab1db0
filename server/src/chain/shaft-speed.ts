import type { Channel, HeardSource, Source, Step } from '../rig/model.ts';
import { componentsOf } from './components.ts';

/** A step that resamples to shaft angle. */
export type PerTurnStep = Extract<Step, { readonly kind: 'per-turn' }>;

/** Speeds between the ends of the range that are looked at whatever is heard. */
const EVEN_SPEEDS = 9;

/** Speeds at which some line gets into the band or leaves it, and that are looked at besides. */
const MOST_EDGES = 48;
const MOST_FOLDS = 8;

/** The step of a channel that resamples to shaft angle, if it has one; a second one would turn with the same shaft. */
export function perTurnStepOf({ steps }: Channel): PerTurnStep | undefined {
  return steps.find((step) => step.kind === 'per-turn');
}

/**
 * Speeds of the shaft, in turns per second and ascending, at which a channel has to be looked at: the ends of the
 * range, some between, and those at which a line that does not turn with the shaft is folded onto an end of the band.
 * Between two of these the filter of the step, which follows the speed, only takes more off or less.
 */
export function speedsToLookAt(channel: Channel, step: PerTurnStep, bandLowHz: number, bandHighHz: number): number[] {
  const { lowHz, highHz } = step.speed.value;
  if (!(highHz > lowHz)) return [highHz];
  const speeds = Array.from(
    { length: EVEN_SPEEDS },
    (_, index) => lowHz * (highHz / lowHz) ** (index / (EVEN_SPEEDS - 1)),
  );
  speeds[EVEN_SPEEDS - 1] = highHz;
  let edges = 0;
  for (const { source } of channel.heard) {
    if (turnsWith(source, step)) continue;
    for (const component of componentsOf(source)) {
      for (const lineHz of new Set([component.lowHz, component.highHz])) {
        for (let fold = 1; fold <= MOST_FOLDS; fold++) {
          for (const edgeHz of [-bandHighHz, -bandLowHz, 0, bandLowHz, bandHighHz]) {
            const speedHz = (lineHz + edgeHz) / (fold * step.perTurn.value);
            if (speedHz <= lowHz || speedHz >= highHz || ++edges > MOST_EDGES) continue;
            speeds.push(speedHz);
          }
        }
      }
    }
  }
  return [...new Set(speeds)].sort((a, b) => a - b);
}

/** The channel with its shaft at one speed: what turns with the shaft has one frequency then. */
export function atSpeed(channel: Channel, step: PerTurnStep, speedHz: number): Channel {
  const range = { lowHz: speedHz, highHz: speedHz };
  const heard = channel.heard.map(
    (one): HeardSource =>
      turnsWith(one.source, step) && one.source.type === 'rotating'
        ? { ...one, source: { ...one.source, speed: { ...one.source.speed, value: range } } }
        : one,
  );
  const steps = channel.steps.map((other) =>
    other === step ? { ...step, speed: { ...step.speed, value: range } } : other,
  );
  return { ...channel, heard, steps };
}

/** A rotating source whose speed is the step's is taken to be the same shaft. */
function turnsWith(source: Source, { speed }: PerTurnStep): boolean {
  if (source.type !== 'rotating') return false;
  const { lowHz, highHz } = source.speed.value;
  return lowHz === speed.value.lowHz && highHz === speed.value.highHz;
}
