import type { Problem } from './problem.ts';
import type { TreeNode } from './tree.ts';

/** What one text says, and what is wrong with its YAML; offsets count from the start of the text. */
export interface YamlReading {
  readonly root: TreeNode;
  readonly problems: readonly Problem[];
}
