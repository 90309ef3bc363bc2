/** A net's tree as link indices, and what can be read off it. */
import type { LinkGraph } from '../../fabric/link-graph';

/** Hops from `start` to every tile over the given links only; the link each tile is first entered by. */
export function walkLinks(
  graph: LinkGraph,
  start: number,
  links: Iterable<number>,
): { hops: Map<number, number>; entry: Map<number, number> } {
  const leaving = new Map<number, number[]>();
  for (const index of links) {
    const from = graph.links[index]?.from ?? -1;
    const list = leaving.get(from);
    if (list) list.push(index);
    else leaving.set(from, [index]);
  }
  const hops = new Map<number, number>([[start, 0]]);
  const entry = new Map<number, number>();
  const queue = [start];
  for (let next = 0; next < queue.length; next++) {
    const tile = queue[next] ?? start;
    for (const index of leaving.get(tile) ?? []) {
      const head = graph.links[index]?.to ?? -1;
      if (hops.has(head)) continue;
      hops.set(head, (hops.get(tile) ?? 0) + 1);
      entry.set(head, index);
      queue.push(head);
    }
  }
  return { hops, entry };
}

/**
 * The part of a set of links that a tree needs: from `start` to each target by fewest hops within the set, every
 * router entered once, no loose ends. Targets that the set does not reach are left out. The cost and the hops of
 * every path are at most those of the set it is cut from.
 */
export function pruneToTree(
  graph: LinkGraph,
  start: number,
  targets: readonly number[],
  links: Iterable<number>,
): number[] {
  const { entry } = walkLinks(graph, start, links);
  const kept = new Set<number>();
  for (const target of targets) {
    let tile = target;
    while (tile !== start) {
      const link = entry.get(tile);
      if (link === undefined || kept.has(link)) break;
      kept.add(link);
      tile = graph.links[link]?.from ?? start;
    }
  }
  return [...kept].sort((a, b) => a - b);
}

/** Hops of the longest path from `start` to a target; Infinity where one is not reached. */
export function treeDepth(
  graph: LinkGraph,
  start: number,
  targets: readonly number[],
  links: Iterable<number>,
): number {
  const { hops } = walkLinks(graph, start, links);
  return targets.reduce((depth, target) => Math.max(depth, hops.get(target) ?? Number.POSITIVE_INFINITY), 0);
}

/** Hops of the shortest path from `start` to every tile, −1 where there is none. Breadth first, all links. */
export function hopsFromTile(graph: LinkGraph, start: number): Int32Array {
  const hops = new Int32Array(graph.tileCount).fill(-1);
  const queue = new Int32Array(graph.tileCount);
  hops[start] = 0;
  queue[0] = start;
  let filled = 1;
  for (let next = 0; next < filled; next++) {
    const tile = queue[next] ?? 0;
    for (const index of graph.outLinks[tile] ?? []) {
      const head = graph.links[index]?.to ?? 0;
      if (hops[head] !== -1) continue;
      hops[head] = (hops[tile] ?? 0) + 1;
      queue[filled++] = head;
    }
  }
  return hops;
}
