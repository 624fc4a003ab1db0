/**
 * What an entry's text says, as plain data.
 *
 * Offsets count UTF-16 units from the start of the entry's own text, so that a tree stays true while the text around
 * its entry moves.
 */
export type TreeNode = ScalarNode | MapNode | ListNode | AliasNode | EmptyNode;

interface NodeBase {
  readonly start: number;
  readonly end: number;
  /** The name behind `&`, where the node has one. */
  readonly anchor?: string;
}

export interface ScalarNode extends NodeBase {
  readonly kind: 'scalar';
  /** The text that the scalar stands for: unquoted, unescaped, unfolded. */
  readonly text: string;
  readonly style: 'plain' | 'single-quoted' | 'double-quoted' | 'block';
}

export interface MapNode extends NodeBase {
  readonly kind: 'map';
  readonly pairs: readonly TreePair[];
  readonly flow: boolean;
}

export interface TreePair {
  readonly key: ScalarNode;
  readonly value: TreeNode;
}

export interface ListNode extends NodeBase {
  readonly kind: 'list';
  readonly items: readonly TreeNode[];
  readonly flow: boolean;
}

export interface AliasNode extends NodeBase {
  readonly kind: 'alias';
  readonly name: string;
}

/** A key with nothing after its colon, or a list item with nothing after its dash. */
export interface EmptyNode extends NodeBase {
  readonly kind: 'empty';
}
