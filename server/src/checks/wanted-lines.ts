import { componentsOf } from '../chain/components.ts';
import type { Arrival, Chain } from '../chain/model.ts';
import type { FrequencyRange, Source } from '../rig/model.ts';
import { foldHz } from '../signal/folding.ts';
import type { ChannelView } from './check.ts';

/** Lines nearer to one another than this, relative to where they are, are one: no spectrum tells them apart. */
const ROUNDING = 1e-9;

/** A component of a wanted source. */
export interface WantedLine {
  readonly source: Source;
  readonly component: string;
  /** Where it is in the record; of what sweeps, where it is when it is nearest to its neighbour. */
  readonly hz: number;
}

/** Two neighbours in the band. */
export interface WantedPair {
  readonly lower: WantedLine;
  readonly upper: WantedLine;
  readonly distanceHz: number;
  /** True where both move together, and are as near as this only at the low end. */
  readonly sweeps: boolean;
}

/**
 * Of all lines of wanted sources that a channel hears, the two neighbours in its band that are nearest to one another;
 * lines that coincide count as one.
 *
 * What sweeps over a range is one line at any time. Its distance from others is known only where they move with it:
 * harmonics of one source, orders of one shaft (sources with the same range of speed), a carrier and its sidebands.
 */
export function closestWanted({ chain, arrivals }: ChannelView): WantedPair | undefined {
  // A chain that follows a shaft is at one speed, and so is what turns with it there.
  const wanted = chain.channel.heard.filter(({ source }) => source.wanted).map(({ source }) => source);
  if (wanted.length === 0) return undefined;
  let closest: WantedPair | undefined;
  const consider = (pair: WantedPair | undefined): void => {
    if (pair && (!closest || pair.distanceHz < closest.distanceHz)) closest = pair;
  };
  consider(closestStanding(arrivals, chain));
  for (const family of familiesOf(wanted)) consider(closestOfFamily(family, chain));
  for (const source of wanted) if (source.type === 'modulated') consider(closestSideband(source, chain));
  return closest;
}

/** Of lines that stand still; one that lands in the band by folding belongs to the fold checks. */
function closestStanding(arrivals: readonly Arrival[], { ratesHz }: Chain): WantedPair | undefined {
  const lines: WantedLine[] = [];
  for (const { source, component, nominalHz, inBand, folded } of arrivals) {
    if (!source.wanted || nominalHz === undefined || !inBand || folded) continue;
    lines.push({ source, component, hz: ratesHz.reduce(foldHz, nominalHz) });
  }
  lines.sort((one, other) => one.hz - other.hz);
  let closest: WantedPair | undefined;
  for (let index = 1; index < lines.length; index++) {
    const lower = lines[index - 1]!;
    const upper = lines[index]!;
    const distanceHz = upper.hz - lower.hz;
    if (distanceHz <= ROUNDING * upper.hz || (closest && distanceHz >= closest.distanceHz)) continue;
    closest = { lower, upper, distanceHz, sweeps: false };
  }
  return closest;
}

/** Lines at fixed multiples of one frequency that sweeps. */
interface Family {
  readonly base: FrequencyRange;
  readonly members: { readonly source: Source; readonly component: string; readonly multiple: number }[];
}

function familiesOf(wanted: readonly Source[]): Iterable<Family> {
  const families = new Map<string, Family>();
  for (const source of wanted) {
    if (source.type === 'modulated' || source.type === 'broadband') continue;
    const isShaft = source.type === 'rotating';
    const base = isShaft ? source.speed.value : source.frequency.value;
    if (base.lowHz === base.highHz) continue;
    const key = isShaft ? `shaft ${base.lowHz} ${base.highHz}` : `source ${source.name}`;
    const family = families.get(key) ?? { base, members: [] };
    families.set(key, family);
    const order = isShaft ? source.order : 1;
    for (const { label, harmonic } of componentsOf(source)) {
      family.members.push({ source, component: label, multiple: order * harmonic });
    }
  }
  return families.values();
}

/** Neighbours are nearest at the lowest base at which the lower one is in the band. */
function closestOfFamily({ base, members }: Family, chain: Chain): WantedPair | undefined {
  const { lowHz, highHz } = bandOf(chain);
  members.sort((one, other) => one.multiple - other.multiple);
  let closest: WantedPair | undefined;
  for (let index = 1; index < members.length; index++) {
    const lower = members[index - 1]!;
    const upper = members[index]!;
    const baseHz = Math.max(base.lowHz, lowHz / lower.multiple);
    const distanceHz = (upper.multiple - lower.multiple) * baseHz;
    if (baseHz > base.highHz || upper.multiple * baseHz > highHz) continue;
    if (distanceHz <= ROUNDING * upper.multiple * baseHz || (closest && distanceHz >= closest.distanceHz)) continue;
    closest = {
      lower: { source: lower.source, component: lower.component, hz: lower.multiple * baseHz },
      upper: { source: upper.source, component: upper.component, hz: upper.multiple * baseHz },
      distanceHz,
      sweeps: true,
    };
  }
  return closest;
}

/** A carrier that sweeps, or whose modulation does, and its first sideband; outer pairs are as far apart. */
function closestSideband(source: Extract<Source, { type: 'modulated' }>, chain: Chain): WantedPair | undefined {
  const carrier = source.carrier.value;
  const apartHz = source.modulation.value.lowHz;
  const isStill = carrier.lowHz === carrier.highHz && apartHz === source.modulation.value.highHz;
  if (isStill || source.sidebands < 1 || !(apartHz > 0)) return undefined;
  const { lowHz, highHz } = bandOf(chain);
  for (let multiple = 1; multiple <= source.harmonics; multiple++) {
    const carrierHz = Math.max(multiple * carrier.lowHz, lowHz);
    if (carrierHz > multiple * carrier.highHz || carrierHz + apartHz > highHz) continue;
    const label = multiple === 1 ? 'carrier' : `carrier x${multiple}`;
    const prefix = multiple === 1 ? '' : `${label} `;
    return {
      lower: { source, component: label, hz: carrierHz },
      upper: { source, component: `${prefix}sideband +1`, hz: carrierHz + apartHz },
      distanceHz: apartHz,
      sweeps: true,
    };
  }
  return undefined;
}

/** Where what sweeps is looked for, in true frequency: a band that is not folded on purpose ends with the record. */
function bandOf({ bandLowHz, bandHighHz, isBandpass, ratesHz }: Chain): FrequencyRange {
  const nyquistHz = ratesHz[ratesHz.length - 1]! / 2;
  return { lowHz: bandLowHz, highHz: isBandpass ? bandHighHz : Math.min(bandHighHz, nyquistHz) };
}
