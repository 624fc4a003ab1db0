import type { Dimension } from '../quantity/dimension.ts';

/** The kinds of map that a rig file is made of. `checks` and `hears` have names for keys and so no context. */
export type ContextName =
  | 'rig'
  | 'clock'
  | 'digitizer'
  | 'sensor'
  | 'filter'
  | 'source'
  | 'group'
  | 'channel'
  | 'run'
  | 'acceptance'
  | 'step'
  | 'pattern'
  | 'pulses'
  | 'spectrum'
  | 'interleave'
  | 'mains';

/** What a name in a rig file can stand for. */
export type ThingKind = 'clock' | 'digitizer' | 'sensor' | 'filter' | 'source' | 'group' | 'channel';

/** The ways of writing a quantity: `5 Hz`, `5 Hz .. 10 kHz`, `±10 V`. */
export type QuantityForm = 'value' | 'range' | 'symmetric';

/** Bounds in the base unit; an excluded end says so. */
export interface Bounds {
  readonly low?: number;
  readonly lowExcluded?: true;
  readonly high?: number;
  readonly highExcluded?: true;
  /** True where a number above the high end is too much to compute, and is cut down to it. */
  readonly clamped?: true;
}

export interface QuantityKind {
  readonly kind: 'quantity';
  /** The dimensions that may stand here, the usual one first. */
  readonly dimensions: readonly Dimension[];
  /** True where whatever a sensor measures may stand here too, a unit of the channel's own included. */
  readonly measured: boolean;
  readonly forms: readonly QuantityForm[];
  /** The unit a bare number is read in; `undefined` where that is the channel's measured unit. */
  readonly baseUnit: string | undefined;
  readonly bounds: Bounds;
  /** True where a range needs some width. */
  readonly width: boolean;
}

export interface NumberKind {
  readonly kind: 'number';
  readonly integer: boolean;
  readonly bounds: Bounds;
}

export interface ChoiceValue {
  readonly name: string;
  readonly doc: string;
  /** False for a value that is known but not computed by this version. */
  readonly computed: boolean;
}

export interface NameKind {
  readonly kind: 'name';
  readonly of: ThingKind;
  /** The context of a thing written in place of its name. */
  readonly inPlace: ContextName | undefined;
}

export interface MapKind {
  readonly kind: 'map';
  readonly context: ContextName;
}

/** What may stand behind a key. */
export type ValueKind =
  | QuantityKind
  | NumberKind
  | NameKind
  | MapKind
  | { readonly kind: 'choice'; readonly values: readonly ChoiceValue[] }
  | { readonly kind: 'truth' }
  | { readonly kind: 'text' }
  | { readonly kind: 'date' }
  /** The name of a check. */
  | { readonly kind: 'check-name' }
  /** The name of a practice that channels may follow. */
  | { readonly kind: 'practice-name' }
  /** A range of whole numbers, `1..128`. */
  | { readonly kind: 'number-range'; readonly bounds: Bounds }
  /** Named things, each a map of its context. */
  | { readonly kind: 'section'; readonly of: ThingKind; readonly context: ContextName }
  /** A map whose keys are names of things or of checks. */
  | { readonly kind: 'map-of'; readonly keys: ThingKind | 'check'; readonly value: ValueKind }
  | { readonly kind: 'list'; readonly of: ValueKind }
  /** A list of exactly these, such as `[1 kHz, 0.1 dB]`. */
  | { readonly kind: 'tuple'; readonly of: readonly ValueKind[] }
  | { readonly kind: 'alternatives'; readonly of: readonly ValueKind[] };

/** One row of the vocabulary: a key, where it may stand and what may stand behind it. */
export interface KeyRow {
  readonly contexts: readonly ContextName[];
  readonly key: string;
  readonly value: ValueKind;
  readonly required: boolean;
  /** What holds where the key is left out, as one would write it or say it. */
  readonly default: string | undefined;
  /** One or two sentences. */
  readonly doc: string;
  /** A value as one would write it behind the key. */
  readonly example: string;
  /** False for a key that is known but not computed by this version. */
  readonly computed: boolean;
}

interface RowExtras {
  readonly required?: true;
  readonly default?: string;
  readonly computed?: false;
}

/** A row of the table. */
export function row(
  contexts: ContextName | readonly ContextName[],
  key: string,
  value: ValueKind,
  example: string,
  doc: string,
  extras: RowExtras = {},
): KeyRow {
  return {
    contexts: typeof contexts === 'string' ? [contexts] : contexts,
    key,
    value,
    required: extras.required ?? false,
    default: extras.default,
    doc,
    example,
    computed: extras.computed ?? true,
  };
}

type QuantityExtras = Partial<Pick<QuantityKind, 'forms' | 'bounds' | 'width'>>;

const VALUE_ONLY: readonly QuantityForm[] = ['value'];
export const VALUE_OR_RANGE: readonly QuantityForm[] = ['value', 'range'];
export const RANGE_ONLY: readonly QuantityForm[] = ['range'];
export const POSITIVE: Bounds = { low: 0, lowExcluded: true };
export const NOT_NEGATIVE: Bounds = { low: 0 };

export function quantity(
  dimensions: Dimension | readonly Dimension[],
  baseUnit: string,
  extras: QuantityExtras = {},
): QuantityKind {
  return {
    kind: 'quantity',
    dimensions: typeof dimensions === 'string' ? [dimensions] : dimensions,
    measured: false,
    forms: extras.forms ?? VALUE_ONLY,
    baseUnit,
    bounds: extras.bounds ?? POSITIVE,
    width: extras.width ?? false,
  };
}

/** A quantity in whatever the channel's sensor measures, or in one of the other dimensions. */
export function measuredQuantity(others: readonly Dimension[], extras: QuantityExtras = {}): QuantityKind {
  return {
    kind: 'quantity',
    dimensions: others,
    measured: true,
    forms: extras.forms ?? VALUE_ONLY,
    baseUnit: undefined,
    bounds: extras.bounds ?? {},
    width: extras.width ?? false,
  };
}

export function integer(bounds: Bounds): NumberKind {
  return { kind: 'number', integer: true, bounds };
}

export function number(bounds: Bounds): NumberKind {
  return { kind: 'number', integer: false, bounds };
}

/** A choice among documented words; those in `notComputed` are known but not computed by this version. */
export function choice(values: Readonly<Record<string, string>>, notComputed: readonly string[] = []): ValueKind {
  return {
    kind: 'choice',
    values: Object.entries(values).map(([name, doc]) => ({ name, doc, computed: !notComputed.includes(name) })),
  };
}

export function nameOf(of: ThingKind, inPlace?: ContextName): NameKind {
  return { kind: 'name', of, inPlace };
}

export function listOf(of: ValueKind): ValueKind {
  return { kind: 'list', of };
}

export function mapOf(context: ContextName): MapKind {
  return { kind: 'map', context };
}

export function either(...of: readonly ValueKind[]): ValueKind {
  return { kind: 'alternatives', of };
}

export const TEXT: ValueKind = { kind: 'text' };
export const TRUTH: ValueKind = { kind: 'truth' };
export const PRACTICE: ValueKind = { kind: 'practice-name' };
export const FREQUENCY = quantity('frequency', 'Hz');
export const RATE = quantity(['rate', 'frequency'], 'Hz');
export const TIME = quantity('time', 's');
export const FREQUENCY_OR_RANGE = quantity('frequency', 'Hz', { forms: VALUE_OR_RANGE });
/** A shaft's speed; 50 Hz is 3000 rpm. */
export const SPEED = quantity(['rotation', 'frequency'], 'rpm', { forms: VALUE_OR_RANGE });
export const TOLERANCE = quantity('ratio', '%', { bounds: { low: 0, high: 1, highExcluded: true } });
export const FULL_SCALE = quantity('voltage', 'V', { forms: ['symmetric', 'range'], bounds: {}, width: true });
const FILTER = nameOf('filter', 'filter');
export const FILTERS = either(FILTER, listOf(FILTER));
/** A level of a sinusoid: in the measured unit, in volts, or relative to full scale. */
export const LEVEL = measuredQuantity(['dbfs', 'voltage']);
