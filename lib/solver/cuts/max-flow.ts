/**
 * Greatest flow between two nodes, and the least cut that proves it (Ford and Fulkerson 1956), by blocking flows in
 * layers (Dinic 1970). Capacities are whole. Cost: nodes² · arcs at worst, a few passes over the arcs on small flows.
 */
export interface FlowNetwork {
  /** An arc with this capacity, and one back with `back`. */
  join(from: number, to: number, capacity: number, back?: number): void;
  /** Units that get from `source` to `sink`, at most `limit`. Each call starts anew. */
  maxFlow(source: number, sink: number, limit?: number): number;
  /** After `maxFlow`: 1 for the nodes that the source still reaches. A flow below its limit fills all arcs out of them. */
  sourceSide(): Uint8Array;
  /** Looks at arcs so far. */
  steps(): number;
}

interface Flow {
  /** Arc 2i and its way back, 2i + 1. */
  arcsAt: number[][];
  heads: number[];
  /** What every arc can still take. */
  free: number[];
  /** Arcs from the source, −1 where nothing gets to. */
  layer: Int32Array;
  /** The next arc to try at each node. */
  nextArc: Int32Array;
  steps: number;
}

export function flowNetwork(nodeCount: number): FlowNetwork {
  const capacities: number[] = [];
  const flow: Flow = {
    arcsAt: Array.from({ length: nodeCount }, () => []),
    heads: [],
    free: [],
    layer: new Int32Array(nodeCount),
    nextArc: new Int32Array(nodeCount),
    steps: 0,
  };
  return {
    join: (from, to, capacity, back = 0) => {
      flow.arcsAt[from]?.push(capacities.length);
      flow.arcsAt[to]?.push(capacities.length + 1);
      flow.heads.push(to, from);
      capacities.push(capacity, back);
    },
    maxFlow: (source, sink, limit = Number.MAX_SAFE_INTEGER) => {
      flow.free = [...capacities];
      let total = 0;
      for (;;) {
        spread(flow, source);
        if (total === limit || flow.layer[sink] === -1) return total;
        flow.nextArc.fill(0);
        for (let units = -1; units !== 0 && total < limit; total += units) {
          units = push(flow, source, sink, limit - total);
        }
      }
    },
    sourceSide: () => Uint8Array.from(flow.layer, (at) => (at === -1 ? 0 : 1)),
    steps: () => flow.steps,
  };
}

function spread(flow: Flow, source: number): void {
  const { arcsAt, heads, free, layer } = flow;
  layer.fill(-1);
  layer[source] = 0;
  const reached = [source];
  for (const node of reached) {
    for (const arc of arcsAt[node] ?? []) {
      flow.steps++;
      const to = heads[arc] as number;
      if (free[arc] === 0 || layer[to] !== -1) continue;
      layer[to] = (layer[node] as number) + 1;
      reached.push(to);
    }
  }
}

/** One way to the sink along rising layers, with the units that fit through; 0 where there is none left. */
function push(flow: Flow, source: number, sink: number, limit: number): number {
  const { arcsAt, heads, free, layer, nextArc } = flow;
  const way: number[] = [];
  let node = source;
  while (node !== sink) {
    const arc = arcsAt[node]?.[nextArc[node] as number];
    flow.steps++;
    if (arc === undefined) {
      const last = way.pop();
      if (last === undefined) return 0;
      node = heads[last ^ 1] as number;
    } else if ((free[arc] as number) > 0 && layer[heads[arc] as number] === (layer[node] as number) + 1) {
      way.push(arc);
      node = heads[arc] as number;
      continue;
    }
    nextArc[node] = (nextArc[node] as number) + 1;
  }
  const units = way.reduce((least, arc) => Math.min(least, free[arc] as number), limit);
  for (const arc of way) {
    free[arc] = (free[arc] as number) - units;
    free[arc ^ 1] = (free[arc ^ 1] as number) + units;
  }
  return units;
}
