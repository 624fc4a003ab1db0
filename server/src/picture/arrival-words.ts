import type { Arrival } from '../chain/model.ts';

/** What an arrival is to the record; a picture tells it by shape, and repeats it by colour. */
export type MarkKind = 'native' | 'harmless' | 'spoils';

/** What the kinds mean. */
export const KIND_WORDS: Readonly<Record<MarkKind, string>> = {
  native: 'not folded',
  harmless: 'folded, harmless',
  spoils: 'folded, spoils the band',
};

const LONGEST_NAME = 28;

export function kindOf({ overLimit, folded }: Arrival): MarkKind {
  return overLimit ? 'spoils' : folded ? 'harmless' : 'native';
}

/** The source's name, with the component where that is not its plain self. */
export function labelOf({ source, component }: Arrival): string {
  const name = clippedName(source.name);
  return component === 'fundamental' || component === 'carrier' ? name : `${name} ${shortComponent(component)}`;
}

/** A name as a picture has room for it. */
export function clippedName(name: string): string {
  const characters = [...name];
  return characters.length <= LONGEST_NAME ? name : `${characters.slice(0, LONGEST_NAME - 1).join('')}…`;
}

function shortComponent(component: string): string {
  return component
    .replace('harmonic ', '×')
    .replace('carrier x', '×')
    .replace('carrier ', '')
    .replace('sideband ', 'sb ');
}
