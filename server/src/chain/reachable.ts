import { matchesExact } from '../quantity/compare.ts';
import type { Clock, Digitizer, Dividers, Given } from '../rig/model.ts';

/** The rates on either side of one that a digitizer can't make. */
export interface Neighbours {
  readonly belowHz: number | undefined;
  readonly aboveHz: number | undefined;
}

/** How the rates that a digitizer can make are told. */
type Rates =
  | { readonly kind: 'any' }
  | { readonly kind: 'list'; readonly ascending: readonly number[] }
  | { readonly kind: 'range'; readonly lowHz: number; readonly highHz: number }
  /** `numeratorHz` over each divider. */
  | { readonly kind: 'divided'; readonly numeratorHz: number; readonly dividers: Dividers };

const ANY: Rates = { kind: 'any' };

/** What is proposed where every rate can be made: round numbers, and those whose spectra have round lines. */
const USUAL_MANTISSAS = [1, 1.024, 1.25, 1.28, 1.6, 2, 2.048, 2.5, 2.56, 3.2, 4, 4.096, 5, 5.12, 6.4, 8, 8.192];

/** Relative: two computations of one rate may differ by this much. */
const ROUNDING = 1e-12;

/**
 * The exact rate that a written one stands for, which is what is computed with; `undefined` where the digitizer can't
 * make it. `3413.33 Hz` is 13.1072 MHz / 3840: a written rate is right within half a unit of its last digit.
 */
export function exactRate(digitizer: Digitizer | undefined, rate: Given<number>): number | undefined {
  const rates = ratesOf(digitizer);
  switch (rates.kind) {
    case 'any':
      return rate.value;
    case 'range':
      return within(rate, Math.min(Math.max(rate.value, rates.lowHz), rates.highHz));
    default: {
      const { belowHz, aboveHz } = nearestRates(rates, rate.value);
      return closest(rate.value, within(rate, belowHz), within(rate, aboveHz));
    }
  }
}

/** The two nearest rates that the digitizer can make, at or below and at or above; ignores what its maximum is. */
export function neighbouringRates(digitizer: Digitizer | undefined, rateHz: number): Neighbours {
  return nearestRates(ratesOf(digitizer), rateHz);
}

/**
 * The rates within `lowHz .. highHz`, up to the digitizer's maximum, that it can make, ascending.
 *
 * Where every rate can be made, round ones are proposed. Past `limit` those nearest to the `from` end are kept.
 */
export function reachableRates(
  digitizer: Digitizer | undefined,
  lowHz: number,
  highHz: number,
  limit: number,
  from: 'low' | 'high' = 'low',
): readonly number[] {
  const topHz = Math.min(highHz, digitizer?.maxRateHz?.value ?? Infinity);
  if (!(lowHz > 0 && topHz >= lowHz && topHz < Infinity) || limit < 1) return [];
  const rates = ratesOf(digitizer);
  switch (rates.kind) {
    case 'any':
      return cut(usualRates(lowHz, topHz, limit, from), limit, from);
    case 'range':
      return cut(usualRates(Math.max(lowHz, rates.lowHz), Math.min(topHz, rates.highHz), limit, from), limit, from);
    case 'list':
      return cut(
        rates.ascending.filter((hz) => hz >= lowHz * (1 - ROUNDING) && hz <= topHz * (1 + ROUNDING)),
        limit,
        from,
      );
    case 'divided':
      return dividedRates(rates.numeratorHz, rates.dividers, lowHz, topHz, limit, from);
  }
}

function ratesOf(digitizer: Digitizer | undefined): Rates {
  if (!digitizer) return ANY;
  const listed = digitizer.rates?.value;
  if (listed?.kind === 'range') return { kind: 'range', lowHz: listed.lowHz, highHz: listed.highHz };
  if (listed) {
    if (listed.ratesHz.length === 0) return ANY;
    return { kind: 'list', ascending: [...listed.ratesHz].sort((a, b) => a - b) };
  }
  const clock: Clock | undefined = digitizer.clock?.thing;
  if (!clock?.frequencyHz || !clock.divide) return ANY;
  return { kind: 'divided', numeratorHz: clock.frequencyHz.value / digitizer.prescale, dividers: clock.divide };
}

/** The rate where it is what was written. */
function within(rate: Given<number>, exactHz: number | undefined): number | undefined {
  if (exactHz === undefined) return undefined;
  const { value, written } = rate;
  if (Math.abs(exactHz - value) <= ROUNDING * value) return exactHz;
  // A search replaces the value and leaves what was written.
  const isAsWritten = written?.kind === 'scalar' && Math.abs(written.value - value) <= ROUNDING * value;
  return isAsWritten && matchesExact(written, exactHz) ? exactHz : undefined;
}

function closest(hz: number, below: number | undefined, above: number | undefined): number | undefined {
  if (below === undefined || above === undefined) return below ?? above;
  return hz - below <= above - hz ? below : above;
}

function nearestRates(rates: Rates, hz: number): Neighbours {
  switch (rates.kind) {
    case 'any':
      return { belowHz: hz, aboveHz: hz };
    case 'range':
      return {
        belowHz: hz < rates.lowHz ? undefined : Math.min(hz, rates.highHz),
        aboveHz: hz > rates.highHz ? undefined : Math.max(hz, rates.lowHz),
      };
    case 'list': {
      const above = rates.ascending.find((listed) => listed >= hz);
      return { belowHz: lastUpTo(rates.ascending, hz), aboveHz: above };
    }
    case 'divided': {
      const { numeratorHz, dividers } = rates;
      const divider = numeratorHz / hz;
      const lower = dividerAtOrBelow(dividers, divider);
      const upper = dividerAtOrAbove(dividers, divider);
      return {
        belowHz: upper === undefined ? undefined : numeratorHz / upper,
        aboveHz: lower === undefined ? undefined : numeratorHz / lower,
      };
    }
  }
}

/** The last of ascending values that is not above one. */
function lastUpTo(ascending: readonly number[], value: number): number | undefined {
  const above = ascending.findIndex((listed) => listed > value);
  return above < 0 ? ascending[ascending.length - 1] : ascending[above - 1];
}

/** How many steps above the lowest a divider is, and what the highest step is. */
function stepsTo(range: Extract<Dividers, { kind: 'range' }>, divider: number): number {
  return (divider - range.low) / range.step;
}

function highestOf(range: Extract<Dividers, { kind: 'range' }>): number {
  return range.low + Math.floor((range.high - range.low) / range.step) * range.step;
}

function dividerAtOrBelow(dividers: Dividers, divider: number): number | undefined {
  if (dividers.kind === 'list') return lastUpTo(dividers.values, divider);
  if (divider < dividers.low) return undefined;
  return Math.min(dividers.low + Math.floor(stepsTo(dividers, divider)) * dividers.step, highestOf(dividers));
}

function dividerAtOrAbove(dividers: Dividers, divider: number): number | undefined {
  if (dividers.kind === 'list') return dividers.values.find((value) => value >= divider);
  if (divider > highestOf(dividers)) return undefined;
  return Math.max(dividers.low + Math.ceil(stepsTo(dividers, divider)) * dividers.step, dividers.low);
}

function dividedRates(
  numeratorHz: number,
  dividers: Dividers,
  lowHz: number,
  highHz: number,
  limit: number,
  from: 'low' | 'high',
): readonly number[] {
  const least = (numeratorHz / highHz) * (1 - ROUNDING);
  const most = (numeratorHz / lowHz) * (1 + ROUNDING);
  // Ascending dividers are descending rates.
  const first = dividerAtOrAbove(dividers, least);
  const last = dividerAtOrBelow(dividers, most);
  if (first === undefined || last === undefined || first > last) return [];
  if (dividers.kind === 'list') {
    const found = dividers.values.filter((value) => value >= first && value <= last);
    return cut(found.map((value) => numeratorHz / value).reverse(), limit, from);
  }
  const count = Math.min(Math.round((last - first) / dividers.step) + 1, limit);
  const start = from === 'low' ? last : first + (count - 1) * dividers.step;
  return Array.from({ length: count }, (_, index) => numeratorHz / (start - index * dividers.step));
}

function usualRates(lowHz: number, highHz: number, limit: number, from: 'low' | 'high'): readonly number[] {
  if (!(highHz >= lowHz)) return [];
  const lowest = Math.floor(Math.log10(lowHz));
  const highest = Math.floor(Math.log10(highHz));
  const decades = Math.min(highest - lowest + 1, Math.ceil(limit / USUAL_MANTISSAS.length) + 1);
  const start = from === 'low' ? lowest : highest - decades + 1;
  const found: number[] = [];
  for (let decade = start; decade < start + decades; decade++) {
    for (const mantissa of USUAL_MANTISSAS) {
      // Read as text, so that 5.12 kHz is 5120 Hz and not 5119.999999999999.
      const hz = Number(`${mantissa}e${decade}`);
      if (hz >= lowHz && hz <= highHz) found.push(hz);
    }
  }
  return found;
}

function cut(ascending: readonly number[], limit: number, from: 'low' | 'high'): readonly number[] {
  return from === 'low' ? ascending.slice(0, limit) : ascending.slice(Math.max(ascending.length - limit, 0));
}
