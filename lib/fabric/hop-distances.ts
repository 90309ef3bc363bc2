/** All-pairs distances between routers in hops. */
import type { LinkGraph } from './link-graph';

/** Stands where no path leads from one router to the other. */
export const UNREACHABLE = 0xffff;

/**
 * Hops of the shortest path between every two routers, [from · tileCount + to], by a breadth-first search from
 * each. Cost: tileCount · (tileCount + links) time, 2 · tileCount² bytes.
 */
export function hopDistances(graph: LinkGraph): Uint16Array {
  const { tileCount } = graph;
  const heads = graph.outLinks.map((out) => Int32Array.from(out, (link) => graph.links[link]?.to ?? 0));
  const distance = new Uint16Array(tileCount * tileCount).fill(UNREACHABLE);
  const queue = new Int32Array(tileCount);
  for (let source = 0; source < tileCount; source++) {
    const row = source * tileCount;
    distance[row + source] = 0;
    queue[0] = source;
    let filled = 1;
    for (let next = 0; next < filled; next++) {
      const tile = queue[next] ?? 0;
      const hops = (distance[row + tile] ?? 0) + 1;
      for (const head of heads[tile] ?? []) {
        if (distance[row + head] !== UNREACHABLE) continue;
        distance[row + head] = hops;
        queue[filled++] = head;
      }
    }
  }
  return distance;
}
