import type { Problem } from './problem.ts';
import type { TreeNode } from './tree.ts';
import { readDirectly } from './yaml-tree-direct.ts';
import { composeYaml } from './yaml-tree-library.ts';

/** What one text says, and what is wrong with its YAML; offsets count from the start of the text. */
export interface YamlReading {
  readonly root: TreeNode;
  readonly problems: readonly Problem[];
}

/** Reads one YAML document. Never throws: what can't be read is an empty node and a problem. */
export function readYaml(text: string): YamlReading {
  const root = readDirectly(text);
  return root ? { root, problems: [] } : composeYaml(text);
}
