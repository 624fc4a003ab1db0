import type { Entry } from './entry.ts';
import { namePlace, placeOf } from './fields.ts';
import { MOST_CHANNELS } from './limits.ts';
import type { PlacedProblem } from './placed-problem.ts';
import { placedProblem } from './reader.ts';

/** A problem that the reader of the entry's YAML found, at its place. */
export function yamlProblem(entry: Entry, problem: Entry['problems'][number]): PlacedProblem {
  return { problem, place: { entry, start: problem.start, end: problem.end }, related: [] };
}

/** Says that a name stands for two things, of which the first is kept; or that a section begins twice. */
export function duplicateName(entry: Entry, what: string, first: Entry | undefined): PlacedProblem {
  // Things are told apart by their names alone, so that nothing is lost where a section begins again.
  const fate = what === 'section' ? 'what stands beneath both is read' : 'this one is not read';
  return duplicate(entry, `There already is a ${what} \`${entry.name}\`; ${fate}.`, first);
}

/**
 * Says that some of the names that a brace range stands for are taken.
 *
 * @param name the first of them
 * @param count how many there are
 * @param isRead false where it is all of them
 */
export function overlappingName(
  entry: Entry,
  name: string,
  count: number,
  isRead: boolean,
  first: Entry | undefined,
): PlacedProblem {
  const others = count > 1 ? `, and ${count - 1} more that this range stands for` : '';
  const outcome = isRead ? 'this range is checked all the same' : 'this one is not read';
  return duplicate(entry, `There already is a channel \`${name}\`${others}; ${outcome}.`, first);
}

function duplicate(entry: Entry, message: string, first: Entry | undefined): PlacedProblem {
  return placedProblem({
    name: 'duplicate-name',
    place: namePlace(entry),
    message,
    about: entry.name,
    related: first?.key ? [{ place: placeOf(first, first.key), message: 'The first one stands here.' }] : [],
  });
}

/** Says that from this channel on a file has more than it may. */
export function tooManyChannels(entry: Entry): PlacedProblem {
  const start = entry.key?.start ?? 0;
  const end = entry.key?.end ?? 0;
  const most = MOST_CHANNELS.toLocaleString('en');
  const message = `A file may have ${most} channels: this one and those after it are not checked.`;
  return { problem: { name: 'too-much', start, end, message }, place: { entry, start, end }, related: [] };
}
