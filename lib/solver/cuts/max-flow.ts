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

export function flowNetwork(nodeCount: number): FlowNetwork {
  const arcsAt: number[][] = Array.from({ length: nodeCount }, () => []);
  const heads: number[] = [];
  const capacities: number[] = [];
  let free: number[] = [];
  let layer = new Int32Array(0);
  let nextArc = new Int32Array(0);
  let steps = 0;

  /** Layers by arcs from the source, −1 where nothing gets to. */
  const spread = (source: number): void => {
    layer = new Int32Array(nodeCount).fill(-1);
    layer[source] = 0;
    const reached = [source];
    for (const node of reached) {
      for (const arc of arcsAt[node] ?? []) {
        steps++;
        const to = heads[arc] as number;
        if (free[arc] === 0 || layer[to] !== -1) continue;
        layer[to] = (layer[node] as number) + 1;
        reached.push(to);
      }
    }
  };

  /** One way to the sink along rising layers, with the units that fit through; 0 where there is none left. */
  const push = (source: number, sink: number, limit: number): number => {
    const way: number[] = [];
    let node = source;
    while (node !== sink) {
      const arc = arcsAt[node]?.[nextArc[node] as number];
      steps++;
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
  };

  return {
    join: (from, to, capacity, back = 0) => {
      arcsAt[from]?.push(heads.length);
      arcsAt[to]?.push(heads.length + 1);
      heads.push(to, from);
      capacities.push(capacity, back);
    },
    maxFlow: (source, sink, limit = Number.MAX_SAFE_INTEGER) => {
      free = [...capacities];
      let flow = 0;
      for (;;) {
        spread(source);
        if (flow === limit || layer[sink] === -1) return flow;
        nextArc = new Int32Array(nodeCount);
        for (let units = push(source, sink, limit - flow); units > 0 && flow < limit; ) {
          flow += units;
          units = push(source, sink, limit - flow);
        }
      }
    },
    sourceSide: () => Uint8Array.from(layer, (at) => (at === -1 ? 0 : 1)),
    steps: () => steps,
  };
}
