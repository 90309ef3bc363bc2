/**
 * A basis of short cycles of an undirected graph: every cycle is a sum of them.
 * Method: the shortest cycles through each vertex and edge, shortest first, kept while independent (Horton 1987), where
 * only cycles up to a length are wanted. Cost: vertices × edges candidates, each reduced by those kept.
 */

/** The cycles' vertices in their order, shorter cycles first. */
export function shortCycleBasis(neighbours: readonly ReadonlySet<number>[], longest: number): number[][] {
  const edgeOf = new Map<number, number>();
  const key = (a: number, b: number) => Math.min(a, b) * neighbours.length + Math.max(a, b);
  neighbours.forEach((others, a) => {
    for (const b of others) if (b > a) edgeOf.set(key(a, b), edgeOf.size);
  });
  const candidates = neighbours.flatMap((_, root) => cyclesThrough(neighbours, root, longest));
  candidates.sort((one, other) => one.length - other.length);
  const byTop = new Map<number, Set<number>>();
  const basis: number[][] = [];
  for (const cycle of candidates) {
    const edges = new Set(
      cycle.map((a, i) => edgeOf.get(key(a, cycle[(i + 1) % cycle.length] as number)) as number),
    );
    for (;;) {
      const top = Math.max(...edges);
      const kept = byTop.get(top);
      if (edges.size === 0) break;
      if (!kept) {
        byTop.set(top, edges);
        basis.push(cycle);
        break;
      }
      for (const edge of kept) if (!edges.delete(edge)) edges.add(edge);
    }
  }
  return basis;
}

/** For each edge off the tree of shortest paths from `root`, the cycle that it closes with it, if that meets itself only there. */
function cyclesThrough(
  neighbours: readonly ReadonlySet<number>[],
  root: number,
  longest: number,
): number[][] {
  const parent = new Map<number, number>([[root, -1]]);
  const depth = new Map<number, number>([[root, 0]]);
  for (const at of parent.keys()) {
    const next = (depth.get(at) as number) + 1;
    if (2 * next > longest + 1) continue;
    for (const other of neighbours[at] as ReadonlySet<number>) {
      if (parent.has(other)) continue;
      parent.set(other, at);
      depth.set(other, next);
    }
  }
  const pathFrom = (vertex: number): number[] => {
    const path: number[] = [];
    for (let at = vertex; at !== -1; at = parent.get(at) as number) path.push(at);
    return path;
  };
  const cycles: number[][] = [];
  for (const [a, depthA] of depth) {
    for (const b of neighbours[a] as ReadonlySet<number>) {
      const depthB = depth.get(b);
      if (b < a || depthB === undefined || depthA + depthB + 1 > longest) continue;
      if (parent.get(a) === b || parent.get(b) === a) continue;
      const one = pathFrom(a);
      const other = pathFrom(b).slice(0, -1);
      if (other.some((vertex) => one.includes(vertex))) continue;
      cycles.push([...one, ...other.reverse()]);
    }
  }
  return cycles;
}
