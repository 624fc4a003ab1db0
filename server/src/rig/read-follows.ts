import type { Practice } from '../practices/model.ts';
import { PRACTICE_NAMES, practiceNamed } from '../practices/practices.ts';
import { nearest } from '../quantity/spelling.ts';
import { clipped, type Field, innerPlace, itemsOf } from './fields.ts';
import type { FollowedPractice, Source } from './model.ts';
import { MAINS } from './read-source.ts';
import { type Reader, report } from './reader.ts';
import type { ScalarNode } from './tree.ts';
import { alternative, listed, scalarOf } from './values.ts';

const NONE: readonly never[] = [];

/** The practices that a field names: one, a list of them, or `none`. A name that stands there twice counts once. */
export function readFollows(reader: Reader, field: Field | undefined): readonly FollowedPractice[] {
  if (!field || field.node.kind === 'empty') return NONE;
  const { node } = field;
  if (node.kind === 'scalar' && node.text === 'none') return NONE;
  const items = node.kind === 'list' ? itemsOf(reader, field, node.items, alternative(field.kind, 'list').of) : [field];
  const followed: FollowedPractice[] = [];
  for (const item of items) {
    const name = scalarOf(reader, item);
    const practice = name && findPractice(reader, item, name);
    if (!practice || followed.some((one) => one.practice === practice)) continue;
    const place = innerPlace(item.entry, name);
    const mains = isCountedByMains(practice) ? findMains(reader) : undefined;
    followed.push(item.inherited ? { practice, place, inherited: item.inherited, mains } : { practice, place, mains });
  }
  return followed;
}

function findPractice(reader: Reader, field: Field, node: ScalarNode): Practice | undefined {
  const practice = practiceNamed(node.text);
  if (practice) return practice;
  const name = clipped(node.text);
  const near = nearest(node.text, PRACTICE_NAMES);
  report(reader, {
    name: 'unknown-name',
    place: innerPlace(field.entry, node),
    message: `There is no practice \`${name}\`; ${near ? `\`${near}\` is the nearest` : `those that are known are ${listed(PRACTICE_NAMES)}`}.`,
    about: name,
    cure: near ? { kind: 'replace', text: near } : undefined,
  });
  return undefined;
}

function isCountedByMains({ requirements }: Practice): boolean {
  return requirements.some(({ kind }) => kind === 'order' || kind === 'record');
}

/** The supply is what it is, whether or not this channel hears it; without one nothing is missing. */
function findMains(reader: Reader): Source | undefined {
  const thing = reader.scope.things.source.get(MAINS);
  reader.lookups.push({ kind: 'source', name: MAINS, thing });
  return thing;
}
