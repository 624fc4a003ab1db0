import type { Proposal, RemedyDefinition } from './definition.ts';
import { replacePart, replaceScalar } from './edit-text.ts';
import type { Search } from './search.ts';

export const correctSpelling: RemedyDefinition = {
  name: 'correct-spelling',
  kind: 'text',
  finds: 'The nearest key, name, word or unit that exists, in place of one that does not.',
  why: 'A key that is not known is not read, and a name that nobody has leads nowhere: the channel is then not checked as it was meant.',
  answers: ['unknown-key', 'unknown-name', 'wrong-kind', 'unit-mismatch', 'syntax', 'out-of-range'],
  search: searchSpelling,
};

function searchSpelling({ context }: Search): readonly Proposal[] {
  const { finding, snapshot } = context;
  const { cure, place } = finding;
  if (cure?.kind !== 'replace') return [];
  const old = place.entry.text.slice(place.start, place.end);
  const isQuoted = /^["']/.test(old);
  const edit = isQuoted ? replaceScalar(snapshot, place, cure.text) : replacePart(snapshot, place, cure.text);
  if (!edit) return [];
  return [{ does: `Write \`${cure.text}\``, outcome: `instead of \`${shortened(old)}\``, edits: [edit] }];
}

function shortened(text: string): string {
  const line = text.split('\n')[0] ?? '';
  return line.length > 40 ? `${line.slice(0, 40)}...` : line;
}
