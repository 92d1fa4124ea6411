// Cells as a graph: who reads whom.

/** Names from a node to the nodes it reads. */
export type Graph = ReadonlyMap<string, readonly string[]>;

/**
 * The cycles of a graph, each as the names along it, first name repeated at the end: ["a", "b", "a"] for a that reads b that
 * reads a. One shortest cycle for each node that lies on any, without repeats.
 */
export function cyclesOf(graph: Graph): string[][] {
  const cycles: string[][] = [];
  const seen = new Set<string>();
  for (const name of nodesOnCycles(graph)) {
    const cycle = shortestCycle(graph, name);
    if (!cycle) continue;
    const key = [...new Set(cycle)].sort().join("\n");
    if (seen.has(key)) continue;
    seen.add(key);
    cycles.push(cycle);
  }
  return cycles;
}

/** What remains after taking away, again and again, whatever reads nothing or is read by nothing. */
function nodesOnCycles(graph: Graph): string[] {
  const left = new Set(graph.keys());
  for (let before = -1; before !== left.size; ) {
    before = left.size;
    const read = new Set([...left].flatMap((name) => graph.get(name) ?? []));
    for (const name of left) {
      if (!read.has(name) || !(graph.get(name) ?? []).some((input) => left.has(input))) left.delete(name);
    }
  }
  return [...left];
}

function shortestCycle(graph: Graph, start: string): string[] | undefined {
  const cameFrom = new Map<string, string>();
  const queue = [start];
  for (let name = queue.shift(); name !== undefined; name = queue.shift()) {
    for (const input of graph.get(name) ?? []) {
      if (input === start) {
        const path = [start];
        for (let at = name; at !== start; at = cameFrom.get(at) as string) path.push(at);
        path.push(start);
        return path.reverse();
      }
      if (!cameFrom.has(input) && graph.has(input)) {
        cameFrom.set(input, name);
        queue.push(input);
      }
    }
  }
  return undefined;
}
