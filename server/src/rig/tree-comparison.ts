import type { ScalarNode, TreeNode, TreePair } from './tree.ts';

/** True for two trees that say the same at the same places. */
export function isSameTree(a: TreeNode | undefined, b: TreeNode | undefined): boolean {
  if (!a || !b) return a === b;
  if (a.start !== b.start || a.end !== b.end || a.anchor !== b.anchor) return false;
  switch (a.kind) {
    case 'scalar':
      return b.kind === 'scalar' && isSameScalar(a, b);
    case 'map':
      return (
        b.kind === 'map' &&
        a.flow === b.flow &&
        a.pairs.length === b.pairs.length &&
        a.pairs.every((pair, index) => isSamePair(pair, b.pairs[index]!))
      );
    case 'list':
      return (
        b.kind === 'list' &&
        a.flow === b.flow &&
        a.items.length === b.items.length &&
        a.items.every((item, index) => isSameTree(item, b.items[index]))
      );
    case 'alias':
      return b.kind === 'alias' && a.name === b.name;
    case 'empty':
      return b.kind === 'empty';
  }
}

function isSameScalar(a: ScalarNode, b: ScalarNode): boolean {
  return a.text === b.text && a.style === b.style;
}

function isSamePair(a: TreePair, b: TreePair): boolean {
  return isSameTree(a.key, b.key) && isSameTree(a.value, b.value);
}
