import type { Entry, NamedSection } from '../rig/entry.ts';
import type { Snapshot, TextEdit } from '../rig/snapshot.ts';
import { columnOf, isFlowEntry, lineEndAfter, setKey, significantEnd, styleAt } from './edit-text.ts';
import type { NewValue, TextStyle } from './written-value.ts';
import { pairText, valueText } from './written-value.ts';

/**
 * A name that no entry of the section has: the wanted one, or that with a number after it.
 *
 * @param used names of used files, which it is not to hide either
 */
export function freeName(
  snapshot: Snapshot,
  section: NamedSection,
  wanted: string,
  used: ReadonlySet<string> = new Set(),
): string {
  const taken = new Set(used);
  for (const entry of snapshot.entries) if (entry.section === section) taken.add(entry.name);
  if (!taken.has(wanted)) return wanted;
  for (let number = 2; ; number++) {
    const name = `${wanted}-${number}`;
    if (!taken.has(name)) return name;
  }
}

/** Writes a new named thing after the last of its section; the section itself where the file has none. */
export function addThing(
  snapshot: Snapshot,
  section: NamedSection,
  name: string,
  value: NewValue,
): readonly TextEdit[] | undefined {
  const last = snapshot.entries.filter((entry) => entry.section === section).at(-1);
  if (last) return afterThing(snapshot, last, name, value);
  const head = snapshot.entries.find((entry) => entry.section === undefined && entry.name === section);
  if (head) return intoEmptySection(snapshot, head, name, value);
  return withNewSection(snapshot, section, name, value);
}

function afterThing(snapshot: Snapshot, last: Entry, name: string, value: NewValue): readonly TextEdit[] | undefined {
  const start = snapshot.startOf(last);
  if (start === undefined || !last.key) return undefined;
  const style = styleAt(snapshot, last, 0);
  const pair = pairText(name, value, style);
  const end = Math.max(significantEnd(last.value, last.text), last.key.end);
  if (!isFlowEntry(snapshot, last)) {
    const at = start + lineEndAfter(last.text, end);
    const indent = ' '.repeat(columnOf(last.text, last.key.start));
    return [{ start: at, end: at, text: style.lineEnd + indent + pair }];
  }
  // The entry's text is a slice of its line: what stands before it tells whether things have lines of their own.
  const before = snapshot.sliceText(Math.max(0, start + last.key.start - 200), start + last.key.start);
  const ownLine = /\n([ \t]*)$/.exec(before);
  const at = start + end;
  return [{ start: at, end: at, text: ownLine ? `,${style.lineEnd}${ownLine[1]}${pair}` : `, ${pair}` }];
}

/** A section's head says nothing of its value, so the text is asked: `filters:` and `filters: {}` are empty ones. */
function intoEmptySection(
  snapshot: Snapshot,
  head: Entry,
  name: string,
  value: NewValue,
): readonly TextEdit[] | undefined {
  const start = snapshot.startOf(head);
  if (start === undefined || !head.key) return undefined;
  const braces = /^\s*:\s*(\{\s*\})/.exec(head.text.slice(head.key.end));
  if (!braces) return setKey(snapshot, head, head.value, name, value);
  const end = start + head.key.end + braces[0].length;
  const style = { ...styleAt(snapshot, head, 0), flow: true };
  return [{ start: end - (braces[1] ?? '').length, end, text: `{ ${pairText(name, value, style)} }` }];
}

function withNewSection(
  snapshot: Snapshot,
  section: NamedSection,
  name: string,
  value: NewValue,
): readonly TextEdit[] | undefined {
  if (snapshot.style === 'flow') return firstInFlow(snapshot, section, new Map([[name, value]]));
  return atTheEnd(snapshot, (lineEnd) => {
    const pair = pairText(name, value, { json: false, flow: false, lineEnd });
    return `${section}:${lineEnd}  ${pair}`;
  });
}

/** Writes a top-level key whose value is a list of one item, after all others. */
export function lastList(snapshot: Snapshot, key: string, item: NewValue): readonly TextEdit[] | undefined {
  if (snapshot.style === 'flow') return firstInFlow(snapshot, key, [item]);
  return atTheEnd(snapshot, (lineEnd) => {
    return `${key}:${lineEnd}  - ${valueText(item, { json: false, flow: false, lineEnd })}`;
  });
}

/** Writes a top-level key after all others, with a blank line ahead of it. */
function atTheEnd(
  snapshot: Snapshot,
  bodyOf: (lineEnd: TextStyle['lineEnd']) => string,
): readonly TextEdit[] | undefined {
  const last = snapshot.entries.at(-1);
  if (!last) return undefined;
  const { lineEnd } = styleAt(snapshot, last, 0);
  const tail = snapshot.sliceText(Math.max(0, snapshot.length - 4), snapshot.length);
  const endsLine = tail.endsWith('\n');
  const blank = endsLine && /\n\r?\n$/.test(tail) ? '' : lineEnd;
  const body = bodyOf(lineEnd);
  return [
    {
      start: snapshot.length,
      end: snapshot.length,
      text: endsLine ? blank + body + lineEnd : lineEnd + lineEnd + body,
    },
  ];
}

/** Writes a top-level key ahead of all others. */
export function firstPair(snapshot: Snapshot, key: string, value: NewValue): readonly TextEdit[] | undefined {
  if (snapshot.style === 'flow') return firstInFlow(snapshot, key, value);
  const first = snapshot.entries[0];
  if (!first) return undefined;
  const start = snapshot.startOf(first);
  const { lineEnd } = styleAt(snapshot, first, 0);
  if (start === undefined) return undefined;
  return [{ start, end: start, text: pairText(key, value, { json: false, flow: false, lineEnd }) + lineEnd }];
}

function firstInFlow(snapshot: Snapshot, key: string, value: NewValue): readonly TextEdit[] | undefined {
  const first = snapshot.entries[0];
  const start = first && snapshot.startOf(first);
  if (!first?.key || start === undefined) return undefined;
  const style = { ...styleAt(snapshot, first, 0), flow: true };
  const at = start + first.key.start;
  const gap = /\s*$/.exec(snapshot.sliceText(Math.max(0, at - 200), at))?.[0] ?? '';
  const separator = gap.includes('\n') ? gap : ' ';
  return [{ start: at, end: at, text: `${pairText(key, value, style)},${separator}` }];
}
