import type { Entry } from './entry.ts';
import { placeOf } from './fields.ts';
import type { PlacedProblem } from './placed-problem.ts';
import { placedProblem } from './reader.ts';

/** A problem that the reader of the entry's YAML found, at its place. */
export function yamlProblem(entry: Entry, problem: Entry['problems'][number]): PlacedProblem {
  return { problem, place: { entry, start: problem.start, end: problem.end }, related: [] };
}

/** Says that a name stands for two things, of which the first is kept; or that a section begins twice. */
export function duplicateName(entry: Entry, what: string, first: Entry | undefined): PlacedProblem {
  const key = entry.key;
  // Things are told apart by their names alone, so that nothing is lost where a section begins again.
  const fate = what === 'section' ? 'what stands beneath both is read' : 'this one is not read';
  return placedProblem({
    name: 'duplicate-name',
    place: key ? placeOf(entry, key) : { entry, start: 0, end: entry.text.length },
    message: `There already is a ${what} \`${entry.name}\`; ${fate}.`,
    about: entry.name,
    related: first?.key ? [{ place: placeOf(first, first.key), message: 'The first one stands here.' }] : [],
  });
}
