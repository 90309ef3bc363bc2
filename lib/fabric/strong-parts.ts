/** Which tiles of a fabric can reach each other. */
import type { LinkGraph } from './link-graph';

/**
 * The parts of a fabric: in each, every router reaches every other and is reached by it. Parts in the order of
 * their first tile, tiles ascending. Cost: one search each way for every part.
 */
export function strongParts(graph: LinkGraph): number[][] {
  const part = new Int32Array(graph.tileCount).fill(-1);
  const parts: number[][] = [];
  for (let tile = 0; tile < graph.tileCount; tile++) {
    if (part[tile] !== -1) continue;
    const forward = reach(graph, tile, part, true);
    const backward = reach(graph, tile, part, false);
    const tiles = [...forward].filter((other) => backward.has(other)).sort((a, b) => a - b);
    for (const member of tiles) part[member] = parts.length;
    parts.push(tiles);
  }
  return parts;
}

function reach(graph: LinkGraph, start: number, part: Int32Array, forward: boolean): Set<number> {
  const reached = new Set([start]);
  const open = [start];
  for (let tile = open.pop(); tile !== undefined; tile = open.pop()) {
    for (const index of (forward ? graph.outLinks : graph.inLinks)[tile] ?? []) {
      const link = graph.links[index];
      if (!link) continue;
      const next = forward ? link.to : link.from;
      if (part[next] !== -1 || reached.has(next)) continue;
      reached.add(next);
      open.push(next);
    }
  }
  return reached;
}
