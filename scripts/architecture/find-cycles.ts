/**
 * Groups of files that import each other in a circle (strongly connected components of more than one file, or a file
 * that imports itself). Tarjan, SIAM J. Comput. 1, 146 (1972).
 */
export function findCycles(graph: ReadonlyMap<string, readonly string[]>): string[][] {
  const order = new Map<string, number>();
  const low = new Map<string, number>();
  const open: string[] = [];
  const isOpen = new Set<string>();
  const cycles: string[][] = [];
  const visit = (node: string): number => {
    const mine = order.size;
    order.set(node, mine);
    let lowest = mine;
    open.push(node);
    isOpen.add(node);
    for (const next of graph.get(node) ?? []) {
      if (!order.has(next)) lowest = Math.min(lowest, visit(next));
      else if (isOpen.has(next)) lowest = Math.min(lowest, low.get(next) ?? (order.get(next) as number));
    }
    low.set(node, lowest);
    if (lowest === mine) {
      const group: string[] = [];
      let last: string;
      do {
        last = open.pop() as string;
        isOpen.delete(last);
        group.push(last);
      } while (last !== node);
      if (group.length > 1 || graph.get(node)?.includes(node)) cycles.push(group.sort());
    }
    return lowest;
  };
  for (const node of graph.keys()) if (!order.has(node)) visit(node);
  return cycles;
}
