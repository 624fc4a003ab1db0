/** Every limit on what is read, searched or sent. Past one, the reader says so and goes on with what lies before it. */

/** UTF-16 units of one file: 4 Mi. */
export const MOST_CHARACTERS = 4 * 1024 * 1024;

/** Channels of one file; an entry with a brace range counts as all that it stands for. */
export const MOST_CHANNELS = 20_000;

/** Items of `accept` in one file. */
export const MOST_ACCEPTANCES = 1_000;

/** Characters of a name that is compared with a pattern, and of the pattern; longer ones are compared as they stand. */
export const MOST_PATTERN_CHARACTERS = 1_000;

/** Maps and lists inside one another. */
export const MOST_DEPTH = 64;

/** Times that aliases and merge keys are followed in one file. */
export const MOST_ALIAS_EXPANSIONS = 10_000;

/** Pairs of one map that is merged into another, or into many. */
export const MOST_MERGED_PAIRS = 1_000;

/**
 * The largest magnitude of a number in base units, and one over the smallest above 0: a few of them, multiplied by one
 * another, are still far from what a double can hold.
 */
export const MOST_MAGNITUDE = 1e50;

/** Names that a misspelled one is compared with one by one. */
export const MOST_COMPARED_NAMES = 250;

/** Problems noted of one entry's own text, and of text that it inherits. */
export const MOST_ENTRY_PROBLEMS = 100;
export const MOST_INHERITED_PROBLEMS = 20;

/** Harmonics of one source. */
export const MOST_HARMONICS = 1_000;

/** Pairs of sidebands of one source. */
export const MOST_SIDEBANDS = 1_000;

/** Slots of one turn of a pattern of samples. */
export const MOST_PATTERN_SLOTS = 100_000;

/** Converters that take turns. */
export const MOST_CONVERTERS = 1_000;

/** Syntax findings of one file. */
export const MOST_SYNTAX_FINDINGS = 200;

/** Findings of one file that are sent to an editor. */
export const MOST_FINDINGS_SENT = 1_000;

/** Candidates that a search for remedies proves. */
export const MOST_CANDIDATES_PROVED = 64;

/** The highest order of a filter. */
export const MOST_FILTER_ORDER = 50;

/** Files that one file may use, those that they use counted in. */
export const MOST_USED_FILES = 1_000;
