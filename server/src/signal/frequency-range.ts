/** Frequencies from `lowHz` to `highHz`, which may be `Infinity`. */
export interface FrequencyRange {
  readonly lowHz: number;
  readonly highHz: number;
}

/** Ascending ranges that cover what the given ones do, none touching another. */
export function merged(ranges: readonly FrequencyRange[]): readonly FrequencyRange[] {
  const result: FrequencyRange[] = [];
  for (const range of [...ranges].sort((first, second) => first.lowHz - second.lowHz)) {
    const last = result[result.length - 1];
    if (last === undefined || range.lowHz > last.highHz) result.push(range);
    else if (range.highHz > last.highHz) result[result.length - 1] = { lowHz: last.lowHz, highHz: range.highHz };
  }
  return result;
}

/** The parts of `ranges` within `limit` that have some width. */
export function within(ranges: readonly FrequencyRange[], limit: FrequencyRange): readonly FrequencyRange[] {
  return ranges
    .map(({ lowHz, highHz }) => ({ lowHz: Math.max(lowHz, limit.lowHz), highHz: Math.min(highHz, limit.highHz) }))
    .filter(({ lowHz, highHz }) => lowHz < highHz);
}

/** The parts of `whole` that none of `taken` covers. */
export function without(whole: FrequencyRange, taken: readonly FrequencyRange[]): readonly FrequencyRange[] {
  const result: FrequencyRange[] = [];
  let lowHz = whole.lowHz;
  for (const range of within(merged(taken), whole)) {
    if (range.lowHz > lowHz) result.push({ lowHz, highHz: range.lowHz });
    lowHz = range.highHz;
  }
  if (lowHz < whole.highHz) result.push({ lowHz, highHz: whole.highHz });
  return result;
}
