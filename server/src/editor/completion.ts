import type { CompletionItem, CompletionList } from 'vscode-languageserver-types';
import { CompletionItemKind, InsertTextFormat, MarkupKind } from 'vscode-languageserver-types';
import type { Position } from '../rig/place.ts';
import type { Evaluation } from '../workbench/evaluation.ts';
import type { Draft } from './completion-drafts.ts';
import { draftsAt } from './completion-drafts.ts';
import type { Slot } from './completion-slot.ts';
import { slotAt, wordIn } from './completion-slot.ts';
import { cursorAt } from './cursor.ts';
import { channelAt } from './map-view.ts';

/** What may be written at a position; nothing in a comment, nor where more than a word stands. */
export function completionsAt(evaluation: Evaluation, position: Position): CompletionList | null {
  const { snapshot } = evaluation;
  const cursor = cursorAt(snapshot, snapshot.offsetAt(position));
  if (cursor.inComment) return null;
  const slot = slotAt(snapshot, position, cursor);
  if (!slot) return null;
  const drafts = draftsAt(evaluation, cursor, channelAt(evaluation, position));
  return {
    // Units follow the number that has been typed: with another digit they are others.
    isIncomplete: drafts.some(({ kind }) => kind === CompletionItemKind.Unit),
    items: drafts.map((draft, index) => itemOf(draft, slot, index)),
  };
}

function itemOf(draft: Draft, slot: Slot, index: number): CompletionItem {
  const isBare = draft.kind === CompletionItemKind.Keyword && slot.quote === '';
  const word = isBare ? draft.word : wordIn(slot, draft.word);
  const holdsMore = draft.behind === ': ';
  return {
    label: draft.word,
    kind: draft.kind,
    ...(draft.detail === undefined ? {} : { detail: draft.detail }),
    ...(draft.doc === undefined ? {} : { documentation: { kind: MarkupKind.Markdown, value: draft.doc } }),
    // Suggestions are asked for again behind a key: those of its values.
    ...(holdsMore ? { command: { title: 'Suggest', command: 'editor.action.triggerSuggest' } } : {}),
    insertTextFormat: InsertTextFormat.PlainText,
    sortText: String(index).padStart(4, '0'),
    filterText: slot.quote + (draft.filter ?? draft.word),
    preselect: draft.preselect === true,
    textEdit: { range: slot.range, newText: slot.colonFollows ? word : word + (draft.behind ?? '') },
  };
}
