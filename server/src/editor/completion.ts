import type { CompletionItem, CompletionList } from 'vscode-languageserver-types';
import { CompletionItemKind, InsertTextFormat, MarkupKind } from 'vscode-languageserver-types';
import { CHECK_NAMES } from '../checks/list.ts';
import { unitsOf } from '../quantity/unit.ts';
import type { Position } from '../rig/place.ts';
import { keysOf } from '../rig/vocabulary.ts';
import type { KeyRow, ThingKind, ValueKind } from '../rig/vocabulary-kinds.ts';
import type { Evaluation } from '../workbench/evaluation.ts';
import { verdictText } from '../workbench/rate-words.ts';
import { ratesAround } from '../workbench/rates.ts';
import { protocolRange } from './convert.ts';
import type { Cursor } from './cursor.ts';
import { cursorIn } from './cursor.ts';
import { expectedAt } from './expectation.ts';
import { channelAt } from './map-view.ts';
import { thingsOf } from './things.ts';

/** Keys that fit, names that exist, values, reachable rates with their verdict, and units behind a number. */
export function completionsAt(evaluation: Evaluation, position: Position): CompletionList | null {
  const { snapshot } = evaluation;
  const offset = snapshot.offsetAt(position);
  const cursor = cursorIn(snapshot.text(), offset);
  if (cursor.inComment) return null;
  const isJson = snapshot.text().trimStart().startsWith('{') && /"\s*:/.test(snapshot.sliceText(0, 2_000));
  const range = protocolRange(snapshot, cursor.start, offset);
  const drafts = cursor.writes === 'key' ? keyDrafts(evaluation, cursor) : valueDrafts(evaluation, cursor, position);
  const items = drafts.map((draft, index): CompletionItem => {
    const text = isJson ? quotedForJson(draft) : draft.text;
    return {
      label: draft.label,
      kind: draft.kind,
      ...(draft.detail === undefined ? {} : { detail: draft.detail }),
      ...(draft.doc === undefined ? {} : { documentation: { kind: MarkupKind.Markdown, value: draft.doc } }),
      ...(draft.again ? { command: { title: 'Suggest', command: 'editor.action.triggerSuggest' } } : {}),
      insertTextFormat: InsertTextFormat.PlainText,
      sortText: String(index).padStart(4, '0'),
      filterText: isJson ? `"${draft.label}` : (draft.filter ?? draft.label),
      preselect: draft.preselect === true,
      textEdit: { range, newText: text },
    };
  });
  return { isIncomplete: false, items };
}

interface Draft {
  readonly label: string;
  readonly kind: CompletionItemKind;
  readonly text: string;
  readonly detail?: string;
  readonly doc?: string;
  /** What is typed is matched against this instead of the label. */
  readonly filter?: string;
  /** Suggestions are asked for again behind it: a key's values, say. */
  readonly again?: true;
  readonly preselect?: boolean;
}

function quotedForJson({ text }: Draft): string {
  const [key, ...rest] = text.split(/(?=: ?$)/);
  return `${JSON.stringify(key)}${rest.join('')}`;
}

function keyDrafts(evaluation: Evaluation, cursor: Cursor): readonly Draft[] {
  const expected = expectedAt(cursor.path);
  const isFree = ({ key }: { readonly key: string }): boolean => !cursor.siblings.has(key) || key === cursor.prefix;
  const keys = expected.contexts.flatMap((context) => keysOf(context)).filter(isFree);
  const inList = cursor.path.at(-1)?.kind === 'item';
  return [
    ...keys.map(keyDraft),
    ...expected.namesAsKeys.flatMap((of) =>
      namesOf(evaluation, of)
        .filter(isFree)
        .map(({ key, detail }) => ({ ...nameDraft(key, detail), text: `${key}: `, again: true as const })),
    ),
    // An item of a list may be a word as well as a map.
    ...(inList ? expected.values.flatMap((kind) => draftsFor(kind, evaluation, cursor)) : []),
  ];
}

function keyDraft(row: KeyRow): Draft {
  return {
    label: row.key,
    kind: CompletionItemKind.Property,
    text: holdsMap(row.value) ? `${row.key}:` : `${row.key}: `,
    detail: row.required ? 'required' : row.default === undefined ? '' : `left out: ${row.default}`,
    doc: `${row.doc}\n\n\`${row.key}: ${row.example}\``,
    ...(holdsMap(row.value) ? {} : { again: true as const }),
  };
}

function holdsMap(kind: ValueKind): boolean {
  return kind.kind === 'section' || kind.kind === 'map-of';
}

function valueDrafts(evaluation: Evaluation, cursor: Cursor, position: Position): readonly Draft[] {
  const expected = expectedAt(cursor.path);
  const last = cursor.path.at(-1);
  const isRate = last?.kind === 'key' && last.key === 'rate' && cursor.path.length <= 3;
  return [
    ...(isRate ? rateDrafts(evaluation, position, cursor) : []),
    ...expected.values.flatMap((kind) => draftsFor(kind, evaluation, cursor)),
  ];
}

function draftsFor(kind: ValueKind, evaluation: Evaluation, cursor: Cursor): readonly Draft[] {
  switch (kind.kind) {
    case 'choice':
      return kind.values.map(({ name, doc }) => ({
        label: name,
        kind: CompletionItemKind.EnumMember,
        text: name,
        doc,
      }));
    case 'truth':
      return ['true', 'false'].map((word) => ({ label: word, kind: CompletionItemKind.Keyword, text: word }));
    case 'name':
      return namesOf(evaluation, kind.of).map(({ key, detail }) => nameDraft(key, detail));
    case 'check-name':
      return namesOf(evaluation, 'check').map(({ key, detail }) => nameDraft(key, detail));
    case 'quantity':
      return unitDrafts(
        kind.dimensions.flatMap((dimension) => unitsOf(dimension).map(({ symbol }) => symbol)),
        cursor,
      );
    default:
      return [];
  }
}

function nameDraft(name: string, detail: string): Draft {
  return { label: name, kind: CompletionItemKind.Reference, text: name, detail };
}

function namesOf(
  evaluation: Evaluation,
  of: ThingKind | 'check',
): readonly { readonly key: string; readonly detail: string }[] {
  if (of === 'check') return CHECK_NAMES.map((name) => ({ key: name, detail: 'check' }));
  return thingsOf(evaluation, of).map(({ name, detail }) => ({ key: name, detail }));
}

/** The units that fit behind a number that has been written. */
function unitDrafts(symbols: readonly string[], { prefix }: Cursor): readonly Draft[] {
  const number = /^(?:.*\.\.\s*)?(?:±|\+\/-)?\s*[+-]?\d[\d.]*(?:[eE][+-]?\d+)?/.exec(prefix)?.[0];
  if (number === undefined) return [];
  return [...new Set(symbols)].map((symbol) => ({
    label: `${number.trim()} ${symbol}`,
    kind: CompletionItemKind.Unit,
    text: `${number.trim()} ${symbol}`,
    filter: prefix.startsWith(`${number} `) ? `${number} ${symbol}` : `${number}${symbol}`,
  }));
}

function rateDrafts(evaluation: Evaluation, position: Position, cursor: Cursor): readonly Draft[] {
  const judged = channelAt(evaluation, position);
  if (!judged) return [];
  const rates = ratesAround(judged, evaluation);
  const best = rates.find(({ errors, warnings }) => errors + warnings === 0);
  return rates.map((rate) => ({
    label: rate.text,
    kind: CompletionItemKind.Value,
    text: rate.text,
    detail: `margin ${rate.margin.toFixed(2)} · ${verdictText(rate)}`,
    preselect: rate === best && cursor.prefix === '',
  }));
}
