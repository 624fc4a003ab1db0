import { CompletionItemKind } from 'vscode-languageserver-types';
import { CHECK_NAMES } from '../checks/list.ts';
import type { Practice } from '../practices/model.ts';
import { PRACTICES } from '../practices/practices.ts';
import { demandText, practiceMarkdown } from '../practices/words.ts';
import type { Dimension } from '../quantity/dimension.ts';
import { unitsOf } from '../quantity/unit.ts';
import { dimensionOf } from '../rig/levels.ts';
import type { Sensor } from '../rig/model.ts';
import { keysOf } from '../rig/vocabulary.ts';
import type { KeyRow, QuantityKind, ThingKind, ValueKind } from '../rig/vocabulary-kinds.ts';
import type { Evaluation, JudgedChannel } from '../workbench/evaluation.ts';
import { verdictText } from '../workbench/rate-words.ts';
import { ratesAround } from '../workbench/rates.ts';
import type { Cursor } from './cursor-model.ts';
import { expectedAt } from './expectation.ts';
import { thingsOf } from './things.ts';

/** Something that may be written at the cursor. */
export interface Draft {
  readonly word: string;
  readonly kind: CompletionItemKind;
  /** What a key has behind it. */
  readonly behind?: ':' | ': ';
  readonly detail?: string;
  readonly doc?: string;
  /** What is typed is matched against this instead of the word. */
  readonly filter?: string;
  readonly preselect?: boolean;
}

/** Keys that fit, names that exist, values, reachable rates with their verdict, and units behind a number. */
export function draftsAt(evaluation: Evaluation, cursor: Cursor, channel: JudgedChannel | undefined): readonly Draft[] {
  const expected = expectedAt(cursor.path);
  const values = (): readonly Draft[] =>
    expected.values.flatMap((kind) => draftsFor(kind, evaluation, cursor, channel));
  const last = cursor.path.at(-1);
  if (cursor.writes === 'value') {
    const isRate = channel && last?.kind === 'key' && last.key === 'rate' && cursor.path.length === 3;
    return isRate ? [...rateDrafts(evaluation, channel, cursor), ...values()] : values();
  }
  const isFree = (key: string): boolean => !cursor.siblings.has(key) || key === cursor.prefix;
  return [
    ...expected.contexts
      .flatMap((context) => keysOf(context))
      .filter(({ key }) => isFree(key))
      .map(keyDraft),
    ...expected.namesAsKeys
      .flatMap((of) => namesOf(evaluation, of))
      .filter(({ word }) => isFree(word))
      .map((draft): Draft => ({ ...draft, behind: ': ' })),
    // An item of a list may be a word as well as a map.
    ...(last?.kind === 'item' ? values() : []),
  ];
}

function keyDraft(row: KeyRow): Draft {
  const holdsEntries = row.value.kind === 'section' || row.value.kind === 'map-of';
  const detail = row.required ? 'required' : row.default === undefined ? undefined : `left out: ${row.default}`;
  return {
    word: row.key,
    kind: CompletionItemKind.Property,
    behind: holdsEntries ? ':' : ': ',
    ...(detail === undefined ? {} : { detail }),
    doc: `${row.doc}\n\n\`${row.key}: ${row.example}\``,
  };
}

function draftsFor(
  kind: ValueKind,
  evaluation: Evaluation,
  cursor: Cursor,
  channel: JudgedChannel | undefined,
): readonly Draft[] {
  switch (kind.kind) {
    case 'choice':
      return kind.values.map(({ name, doc }) => ({ word: name, kind: CompletionItemKind.EnumMember, doc }));
    case 'truth':
      return ['true', 'false'].map((word) => ({ word, kind: CompletionItemKind.Keyword }));
    case 'name':
      return namesOf(evaluation, kind.of);
    case 'check-name':
      return namesOf(evaluation, 'check');
    case 'practice-name':
      return PRACTICES.map(practiceDraft);
    case 'quantity':
      return unitDrafts(unitSymbols(kind, evaluation, channel), cursor);
    default:
      return [];
  }
}

function practiceDraft(practice: Practice): Draft {
  return {
    word: practice.name,
    kind: CompletionItemKind.Reference,
    detail: practice.requirements.map(demandText).join('; ').replaceAll('`', ''),
    doc: practiceMarkdown(practice),
  };
}

function namesOf(evaluation: Evaluation, of: ThingKind | 'check'): readonly Draft[] {
  const things = of === 'check' ? CHECK_NAMES.map((name) => ({ name, detail: 'check' })) : thingsOf(evaluation, of);
  return things.map(({ name, detail }) => ({ word: name, kind: CompletionItemKind.Reference, detail }));
}

/** The units of a key's dimensions; before them, where it takes what a sensor measures, that sensor's. */
function unitSymbols(
  { dimensions, measured }: QuantityKind,
  { environment }: Evaluation,
  channel: JudgedChannel | undefined,
): readonly string[] {
  const symbolsOf = (dimension: Dimension): readonly string[] => unitsOf(dimension).map(({ symbol }) => symbol);
  const sensors = channel ? [channel.result.channel.sensor] : [...environment.sensors.values()];
  return [
    ...(measured ? sensors.flatMap((sensor) => measuredSymbols(sensor, symbolsOf)) : []),
    ...dimensions.flatMap(symbolsOf),
  ];
}

function measuredSymbols(
  sensor: Sensor | undefined,
  symbolsOf: (dimension: Dimension) => readonly string[],
): readonly string[] {
  const dimension = sensor?.measures && dimensionOf(sensor.measures.value);
  const own = sensor?.unit === undefined ? [] : [sensor.unit];
  return dimension === undefined ? own : [...own, ...symbolsOf(dimension)];
}

const NUMBER = /^(?:.*\.\.\s*)?(?:±|\+\/-)?\s*[+-]?\d+(?:\.\d+)?(?:[eE][+-]?\d+)?/;

/** The units that fit behind a number that has been written, and perhaps the beginning of a unit. */
function unitDrafts(symbols: readonly string[], { prefix }: Cursor): readonly Draft[] {
  const number = NUMBER.exec(prefix)?.[0];
  if (number === undefined || !/^\s*[^\s\d.]*$/.test(prefix.slice(number.length))) return [];
  const space = /^\s*/.exec(prefix.slice(number.length))![0];
  return [...new Set(symbols)].map((symbol) => ({
    word: `${number} ${symbol}`,
    kind: CompletionItemKind.Unit,
    filter: number + space + symbol,
  }));
}

function rateDrafts(evaluation: Evaluation, channel: JudgedChannel, { prefix }: Cursor): readonly Draft[] {
  const rates = ratesAround(channel, evaluation);
  const best = rates.find(({ errors, warnings }) => errors + warnings === 0);
  return rates.map((rate) => ({
    word: rate.text,
    kind: CompletionItemKind.Value,
    detail: `margin ${rate.margin.toFixed(2)} · ${verdictText(rate)}`,
    preselect: rate === best && prefix === '',
  }));
}
