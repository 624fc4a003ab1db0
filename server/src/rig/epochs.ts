import type { Entry } from './entry.ts';

/** Where the entries that follow aliases stand among those that set anchors. */
export interface Epochs {
  /** Entries that set anchors, in document order. */
  readonly settingEntries: readonly Entry[];
  /** How many of those stand before an entry that follows aliases. */
  readonly epochOf: (entry: Entry) => number;
}

/**
 * Counts anchor-setting entries before every entry that follows aliases. Most files set their anchors ahead of all
 * channels: these then share one number, and no table of channels is needed.
 */
export function epochsOf(entries: readonly Entry[]): Epochs {
  const settingEntries: Entry[] = [];
  const others = new Map<Entry, number>();
  let shared: number | undefined;
  for (const entry of entries) {
    if (entry.aliases.length > 0 || entry.anchors.length > 0) {
      const epoch = settingEntries.length;
      if (entry.section === 'channels') shared ??= epoch;
      if (epoch !== shared) others.set(entry, epoch);
    }
    if (entry.anchors.length > 0) settingEntries.push(entry);
  }
  const usual = shared ?? 0;
  return { settingEntries, epochOf: (entry) => others.get(entry) ?? usual };
}
