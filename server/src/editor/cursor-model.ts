/** One step from the top of a rig file down to the cursor: into the value of a key, or into an item of a list. */
export type PathStep = { readonly kind: 'key'; readonly key: string } | { readonly kind: 'item' };

/**
 * Where a cursor stands in a text that may be unfinished: the steps down to the map, list or value it is in, and
 * whether a key or a value is being written.
 */
export interface Cursor {
  readonly path: readonly PathStep[];
  /** `key`: a key of the map at `path`, or an item's first word; `value`: the value at `path`. */
  readonly writes: 'key' | 'value';
  /** Inside braces or brackets, where commas end a value. */
  readonly inFlow: boolean;
  /** What is written so far on the cursor's line, up to the cursor, without its quote. */
  readonly prefix: string;
  /** Offset at which `prefix` begins, its quote included; on the cursor's line. */
  readonly start: number;
  /** Keys that the same map has already. */
  readonly siblings: ReadonlySet<string>;
  readonly inComment: boolean;
}
