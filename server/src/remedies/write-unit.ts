import type { Place } from '../rig/place.ts';
import type { Cure } from '../rig/problem.ts';
import type { Snapshot, TextEdit } from '../rig/snapshot.ts';
import type { Proposal, RemedyDefinition } from './definition.ts';
import { replacePart, replaceScalar } from './edit-text.ts';
import type { Search } from './search.ts';

export const writeUnit: RemedyDefinition = {
  name: 'write-unit',
  kind: 'text',
  finds: 'The unit in which a bare number was read.',
  why: 'The number is taken in the base unit of its key. Written out, everybody reads it as it is computed with.',
  answers: ['unit-missing'],
  search: searchUnit,
};

function searchUnit({ context }: Search): readonly Proposal[] {
  const { finding, snapshot } = context;
  const { cure, place } = finding;
  if (!cure || cure.kind === 'add-key') return [];
  const number = withoutQuotes(place.entry.text.slice(place.start, place.end));
  const text = cure.kind === 'replace' ? withoutQuotes(cure.text) : number + cure.text;
  const edit = unitEdit(snapshot, place, cure, text);
  return edit ? [{ does: `Write \`${text}\``, outcome: 'as it is read now', edits: [edit] }] : [];
}

function unitEdit(
  snapshot: Snapshot,
  place: Place,
  cure: Exclude<Cure, { readonly kind: 'add-key' }>,
  text: string,
): TextEdit | undefined {
  if (cure.kind === 'replace') return replaceScalar(snapshot, place, text);
  const { entry } = place;
  const closed = /["']$/.test(entry.text.slice(place.start, place.end));
  const end = closed ? place.end - 1 : place.end;
  return replacePart(snapshot, { entry, start: end, end }, cure.text);
}

function withoutQuotes(text: string): string {
  return /^(["']).*\1$/s.test(text) ? text.slice(1, -1) : text;
}
