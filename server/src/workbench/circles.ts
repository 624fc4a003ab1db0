/**
 * Everything that can be reached from a node, in groups: two nodes that reach each other are in one group, and a group
 * comes after all others that it reaches. After R. Tarjan, "Depth-first search and linear graph algorithms" (1972).
 *
 * @param root in a graph whose longest way is no longer than a stack is deep
 */
export function groupsFrom(root: string, nextOf: (node: string) => Iterable<string>): readonly (readonly string[])[] {
  const groups: string[][] = [];
  const numbers = new Map<string, number>();
  const open: string[] = [];
  const isOpen = new Set<string>();
  /** The lowest number of an open node that a node reaches. */
  const visit = (node: string): number => {
    const number = numbers.size;
    numbers.set(node, number);
    open.push(node);
    isOpen.add(node);
    let lowest = number;
    for (const next of nextOf(node)) {
      const known = numbers.get(next);
      if (known === undefined) lowest = Math.min(lowest, visit(next));
      else if (isOpen.has(next)) lowest = Math.min(lowest, known);
    }
    if (lowest === number) {
      const group = open.splice(open.indexOf(node));
      for (const member of group) isOpen.delete(member);
      groups.push(group);
    }
    return lowest;
  };
  visit(root);
  return groups;
}

/** The shortest way from one node to another, both included; empty where there is none. */
export function shortestWay(from: string, to: string, nextOf: (node: string) => Iterable<string>): readonly string[] {
  const before = new Map<string, string | undefined>([[from, undefined]]);
  for (const node of before.keys()) {
    if (node === to) return wayTo(node, before);
    for (const next of nextOf(node)) if (!before.has(next)) before.set(next, node);
  }
  return [];
}

function wayTo(node: string, before: ReadonlyMap<string, string | undefined>): readonly string[] {
  const way: string[] = [];
  for (let at: string | undefined = node; at !== undefined; at = before.get(at)) way.unshift(at);
  return way;
}

/** The nodes that can be reached from a node, itself first, the nearest ahead of the farther; at most `most`. */
export function reachedFrom(
  root: string,
  nextOf: (node: string) => Iterable<string>,
  most: number,
): ReadonlySet<string> {
  const reached = new Set([root]);
  for (const node of reached) {
    for (const next of nextOf(node)) {
      if (reached.size >= most) return reached;
      reached.add(next);
    }
  }
  return reached;
}
