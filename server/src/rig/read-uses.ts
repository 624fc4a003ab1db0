import { clipped, type Field, innerPlace, itemsOf } from './fields.ts';
import { MOST_USED_FILES } from './limits.ts';
import type { PlacedProblem } from './placed-problem.ts';
import { type Reader, report } from './reader.ts';
import {
  type Brought,
  byKind,
  type Exports,
  type Gap,
  type JoinedThings,
  NAMED_KINDS,
  NOTHING_JOINED,
  type UsedFile,
  type UsedFiles,
  type UsesItem,
} from './used-things.ts';
import { alternative, reportWrongKind, scalarOf } from './values.ts';

/** Names that a message tells before it counts the rest. */
const MOST_NAMES_TOLD = 3;

/** The items of `uses`, each path once; what is no path is said. */
export function readUsesItems(reader: Reader, field: Field): readonly UsesItem[] {
  if (field.node.kind !== 'list') {
    reportWrongKind(reader, field);
    return [];
  }
  const items = new Map<string, UsesItem>();
  for (const item of itemsOf(reader, field, field.node.items, alternative(field.kind, 'list').of)) {
    const node = scalarOf(reader, item);
    if (!node || node.text === '') continue;
    const place = innerPlace(item.entry, node);
    if (items.size < MOST_USED_FILES) {
      if (!items.has(node.text)) items.set(node.text, { path: node.text, place });
      continue;
    }
    const most = MOST_USED_FILES.toLocaleString('en');
    const message = `A file may use ${most} others: this one and those after it are not read.`;
    report(reader, { name: 'too-much', place, message, about: field.path });
    break;
  }
  return [...items.values()];
}

/** Joins the things of the files that `uses` names, in its order: of two of one kind and name the first counts. */
export function readUses(reader: Reader, field: Field, used: UsedFiles): JoinedThings {
  const items = readUsesItems(reader, field);
  if (items.length === 0) return NOTHING_JOINED;
  const things = byKind(() => new Map<string, Brought>());
  let isComplete = true;
  let gap: Gap | undefined;
  for (const item of items) {
    const file: UsedFile = used.get(item.path) ?? { kind: 'unread' };
    if (file.kind === 'read') reportHidden(reader, item, addThings(things, item, file.exports));
    const own = reportedGap(reader, item, file);
    gap ??= own;
    if (own || file.kind !== 'read' || !file.exports.isComplete) isComplete = false;
  }
  return { things, isComplete, gap };
}

interface Hidden {
  readonly kind: string;
  readonly name: string;
  readonly by: Brought;
  readonly place: Brought['place'];
}

/** Adds what a file offers; answers with what was there already under its name. The same thing by two ways is no matter. */
function addThings(
  things: Readonly<Record<(typeof NAMED_KINDS)[number], Map<string, Brought>>>,
  item: UsesItem,
  exports: Exports,
): readonly Hidden[] {
  const hidden: Hidden[] = [];
  for (const kind of NAMED_KINDS) {
    for (const [name, exported] of exports.things[kind]) {
      const known = things[kind].get(name);
      if (!known) things[kind].set(name, { ...exported, item });
      else if (known.place.entry !== exported.place.entry)
        hidden.push({ kind, name, by: known, place: exported.place });
    }
  }
  return hidden;
}

function reportHidden(reader: Reader, item: UsesItem, hidden: readonly Hidden[]): void {
  const first = hidden[0];
  if (!first) return;
  const told = hidden.slice(0, MOST_NAMES_TOLD).map(({ kind, name }) => `the ${kind} \`${clipped(name)}\``);
  const more = hidden.length - told.length;
  const what = `${told.join(', ')}${more > 0 ? ` and ${more} more` : ''}`;
  report(reader, {
    name: 'duplicate-name',
    severity: 'hint',
    place: item.place,
    message: `\`${shown(item)}\` brings ${what} again: what the files before it in \`uses\` bring is taken.`,
    about: item.path,
    related: hidden.slice(0, MOST_NAMES_TOLD).flatMap(({ name, by, place }) => [
      { place: by.place, message: `This \`${clipped(name)}\` is taken.` },
      { place, message: `This \`${clipped(name)}\` is hidden.` },
    ]),
  });
}

/** Says what keeps a used file, or one that it uses, from being read. */
function reportedGap(reader: Reader, item: UsesItem, file: UsedFile): Gap | undefined {
  if (file.kind === 'unread') return undefined;
  if (file.kind === 'fault') {
    const clause = `\`${shown(item)}\` ${file.fault}`;
    reportGap(reader, item, { name: file.name, clause, place: item.place }, '', file.related);
    return { name: file.name, clause, place: item.place };
  }
  const { gap } = file.exports;
  if (!gap) return undefined;
  const opening = `Not all that \`${shown(item)}\` uses can be read: `;
  reportGap(reader, item, gap, opening, [{ place: gap.place, message: 'It is used here.' }]);
  return gap;
}

function reportGap(
  reader: Reader,
  item: UsesItem,
  { name, clause }: Gap,
  opening: string,
  related: PlacedProblem['related'],
): void {
  const message = `${opening}${clause}. Things from there have no part in the check, and a name that stands for nothing is not reported.`;
  report(reader, { name, place: item.place, message, about: item.path, related });
}

function shown({ path }: UsesItem): string {
  return clipped(path);
}
