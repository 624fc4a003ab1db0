import type { KeyRow, ValueKind } from '../../server/src/rig/vocabulary-kinds.ts';

/** The lists of keys that the grammar holds, each as the alternatives of a regular expression, longest first. */
export interface GrammarKeys {
  readonly all: string;
  /** Keys whose value may be the name of a thing. */
  readonly references: string;
  /** Keys whose value is a choice among fixed words. */
  readonly choices: string;
}

function holds(value: ValueKind, kind: ValueKind['kind']): boolean {
  if (value.kind === kind) return true;
  if (value.kind === 'list') return holds(value.of, kind);
  return value.kind === 'alternatives' && value.of.some((one) => holds(one, kind));
}

function alternatives(rows: readonly KeyRow[]): string {
  const keys = [...new Set(rows.map(({ key }) => key))];
  return keys.sort((a, b) => b.length - a.length || (a < b ? -1 : 1)).join('|');
}

/** The lists as the vocabulary has them. */
export function grammarKeys(vocabulary: readonly KeyRow[]): GrammarKeys {
  const references = vocabulary.filter(({ value }) => holds(value, 'name'));
  const referenceKeys = new Set(references.map(({ key }) => key));
  return {
    all: alternatives(vocabulary),
    references: alternatives(references),
    choices: alternatives(vocabulary.filter((row) => holds(row.value, 'choice') && !referenceKeys.has(row.key))),
  };
}

const LIST = String.raw`[a-z-]+(?:\|[a-z-]+)+`;
const VALUE_RULE = (name: string) =>
  new RegExp(String.raw`("${name}": \{\s*"match": "[^(]*\(\?<!\[[^\]]*\]\)\()(${LIST})(\))`);
const KEY_LIST = /[a-z-]+(?:\|[a-z-]+){40,}/g;

/** The lists as a grammar's text has them; those of all keys once for each place that holds one. */
export function keysInGrammar(text: string): { all: string[]; references: string; choices: string } {
  return {
    all: text.match(KEY_LIST) ?? [],
    references: VALUE_RULE('reference-value').exec(text)?.[2] ?? '',
    choices: VALUE_RULE('choice-value').exec(text)?.[2] ?? '',
  };
}

/** The grammar's text with its lists replaced. */
export function withKeys(text: string, keys: GrammarKeys): string {
  return text
    .replace(KEY_LIST, keys.all)
    .replace(VALUE_RULE('reference-value'), `$1${keys.references}$3`)
    .replace(VALUE_RULE('choice-value'), `$1${keys.choices}$3`);
}
