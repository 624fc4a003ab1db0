import type { Entry } from '../rig/entry.ts';
import type { Snapshot, TextEdit } from '../rig/snapshot.ts';
import type { ListNode } from '../rig/tree.ts';
import { columnOf, lineEndAfter, replaceNode, significantEnd, styleAt } from './edit-text.ts';
import { lastList } from './new-thing.ts';
import type { NewValue } from './written-value.ts';
import { valueText } from './written-value.ts';

/**
 * Writes an item after the last of a top-level key's list; the key itself where the file has none. `undefined` where
 * something else than a list stands behind it.
 */
export function addItem(snapshot: Snapshot, key: string, item: NewValue): readonly TextEdit[] | undefined {
  const entry = snapshot.entries.find(({ section, name }) => section === undefined && name === key);
  if (!entry) return lastList(snapshot, key, item);
  const { value } = entry;
  if (value.kind === 'empty') return beginList(snapshot, entry, item);
  if (value.kind !== 'list') return undefined;
  if (value.items.length === 0) return replaceNode(snapshot, entry, value, [item]);
  return value.flow ? addToFlowList(snapshot, entry, value, item) : addToBlockList(snapshot, entry, value, item);
}

function beginList(snapshot: Snapshot, entry: Entry, item: NewValue): readonly TextEdit[] | undefined {
  const start = snapshot.startOf(entry);
  if (start === undefined || !entry.key || snapshot.style === 'flow') return undefined;
  const style = styleAt(snapshot, entry, 0);
  const at = start + lineEndAfter(entry.text, Math.max(entry.value.start, entry.key.end));
  return [{ start: at, end: at, text: `${style.lineEnd}  - ${valueText(item, style)}` }];
}

function addToBlockList(
  snapshot: Snapshot,
  entry: Entry,
  list: ListNode,
  item: NewValue,
): readonly TextEdit[] | undefined {
  const start = snapshot.startOf(entry);
  const { text } = entry;
  const dash = text.indexOf('-', list.start);
  if (start === undefined || dash < 0 || text.slice(list.start, dash).trim() !== '') return undefined;
  const style = styleAt(snapshot, entry, list.start);
  const at = start + lineEndAfter(text, significantEnd(list, text));
  return [
    { start: at, end: at, text: `${style.lineEnd}${' '.repeat(columnOf(text, dash))}- ${valueText(item, style)}` },
  ];
}

/** Behind the last item, on a line of its own where that one has one. */
function addToFlowList(
  snapshot: Snapshot,
  entry: Entry,
  list: ListNode,
  item: NewValue,
): readonly TextEdit[] | undefined {
  const start = snapshot.startOf(entry);
  const last = list.items.at(-1);
  if (start === undefined || !last) return undefined;
  const { text } = entry;
  const style = { ...styleAt(snapshot, entry, list.start), flow: true };
  const at = start + significantEnd(last, text);
  const margin = /\n([ \t]*)$/.exec(text.slice(0, last.start));
  const gap = margin ? style.lineEnd + margin[1] : ' ';
  return [{ start: at, end: at, text: `,${gap}${valueText(item, style)}` }];
}
