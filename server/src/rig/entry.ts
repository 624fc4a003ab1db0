import type { Problem } from './problem.ts';
import type { ScalarNode, TreeNode } from './tree.ts';
import type { ThingKind } from './vocabulary-kinds.ts';

/** The top-level keys whose children are entries of their own. */
export const NAMED_SECTIONS = ['clocks', 'digitizers', 'sensors', 'filters', 'sources', 'groups', 'channels'] as const;
export type NamedSection = (typeof NAMED_SECTIONS)[number];

/** What stands in each of them. */
export const KIND_OF_SECTION = {
  clocks: 'clock',
  digitizers: 'digitizer',
  sensors: 'sensor',
  filters: 'filter',
  sources: 'source',
  groups: 'group',
  channels: 'channel',
} as const satisfies Readonly<Record<NamedSection, ThingKind>>;

/**
 * The smallest piece of a rig file that is read alone: one named thing or channel, or a top-level key that is no
 * section of named things (`rig`, `mains`, `defaults`, `run`, ...), or the head of a section.
 *
 * An entry is never changed: an edit that touches its text puts a new object in its place, and one that does not
 * leaves the very same object. Object identity therefore stands for "this text has not changed".
 */
export interface Entry {
  /** The section it stands in, `undefined` for a top-level key (section heads included). */
  readonly section: NamedSection | undefined;
  /** The text of its key: a channel's name, say; `''` where the text has no readable key. */
  readonly name: string;
  readonly key: ScalarNode | undefined;
  readonly value: TreeNode;
  /** The entry's own text, from which `key` and `value` take their offsets. */
  readonly text: string;
  /** What the reader of this text alone found wrong with its YAML. */
  readonly problems: readonly Problem[];
  /** Anchors set in it, in document order, and the names of the aliases it uses. */
  readonly anchors: readonly { readonly name: string; readonly node: TreeNode }[];
  readonly aliases: readonly string[];
}
