import type { Field } from './fields.ts';

type Defaults = ReadonlyMap<string, Field>;

/**
 * Defaults with what all channels follow. The same object for the same two: channels are read again where their
 * defaults are another.
 */
const combined = new WeakMap<Field, { readonly defaults: Defaults; readonly both: Defaults }>();

/** The defaults of a file whose top says what all channels follow; a `follows` among the defaults goes before it. */
export function withFollows(defaults: Defaults, follows: Field | undefined): Defaults {
  if (!follows || defaults.has('follows')) return defaults;
  const known = combined.get(follows);
  if (known?.defaults === defaults) return known.both;
  const both = new Map([...defaults, ['follows', follows]]);
  combined.set(follows, { defaults, both });
  return both;
}
