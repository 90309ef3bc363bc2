/**
 * A good tree for many targets: attach the nearest target by its cheapest path, again and again, then take out one
 * branch after another and attach it anew while that makes the tree cheaper.
 *
 * Source of the method: H. Takahashi and A. Matsuyama, "An approximate solution for the Steiner problem in
 * graphs", Mathematica Japonica 24 (1980) 573–577; the second part is plain local search.
 *
 * Preconditions as in `subset-tree.ts`. Postcondition: a tree, not always a cheapest one; null where a target
 * cannot be reached. Cost: t searches for the start and t for each pass, at most PASSES of them.
 */
import type { LinkGraph } from '../../fabric/link-graph';
import { linkArrays } from './link-arrays';
import { pruneToTree } from './link-tree';
import { type TileHeap, tileHeap } from './tile-heap';

const PASSES = 8;

export function attachTree(
  graph: LinkGraph,
  source: number,
  targets: readonly number[],
  linkCost: ArrayLike<number>,
): number[] | null {
  const heap = tileHeap();
  let tree = growTree(graph, source, targets, [], linkCost, heap);
  if (tree === null) return null;
  for (let pass = 0; pass < PASSES; pass++) {
    const before = costOf(tree, linkCost);
    for (const target of targets) {
      const rest = pruneToTree(
        graph,
        source,
        targets.filter((other) => other !== target),
        tree,
      );
      const again = growTree(graph, source, targets, rest, linkCost, heap);
      if (again !== null && costOf(again, linkCost) < costOf(tree, linkCost)) tree = again;
    }
    if (costOf(tree, linkCost) >= before) break;
  }
  return tree;
}

/** The sum of the links' costs. */
export function costOf(links: readonly number[], linkCost: ArrayLike<number>): number {
  let cost = 0;
  for (const link of links) cost += linkCost[link] ?? Number.POSITIVE_INFINITY;
  return cost;
}

/** Grows a tree until it reaches all targets, the nearest first; null where one cannot be reached. */
export function growTree(
  graph: LinkGraph,
  source: number,
  targets: readonly number[],
  start: readonly number[],
  linkCost: ArrayLike<number>,
  heap: TileHeap,
): number[] | null {
  const links = new Set(start);
  const reached = new Set([source]);
  for (const link of start) reached.add(graph.links[link]?.to ?? source);
  const open = new Set(targets.filter((target) => !reached.has(target)));
  while (open.size > 0) {
    const path = cheapestPath(graph, reached, open, linkCost, heap);
    if (path === null) return null;
    for (const link of path) {
      links.add(link);
      const head = graph.links[link]?.to ?? source;
      reached.add(head);
      open.delete(head);
    }
  }
  return pruneToTree(graph, source, targets, links);
}

/** The cheapest path from any of the tiles `from` to any of the tiles `to` (Dijkstra), as links; null if none. */
function cheapestPath(
  graph: LinkGraph,
  from: ReadonlySet<number>,
  to: ReadonlySet<number>,
  linkCost: ArrayLike<number>,
  heap: TileHeap,
): number[] | null {
  const entry = new Int32Array(graph.tileCount).fill(-1);
  const cost = new Float64Array(graph.tileCount).fill(Number.POSITIVE_INFINITY);
  const end = search(graph, from, linkCost, heap, cost, entry, (tile) => to.has(tile));
  return end < 0 ? null : pathTo(graph, entry, end);
}

/** Least cost from a tile to every tile, Infinity where none leads there. */
export function costsFrom(
  graph: LinkGraph,
  start: number,
  linkCost: ArrayLike<number>,
  heap: TileHeap,
): Float64Array {
  const cost = new Float64Array(graph.tileCount).fill(Number.POSITIVE_INFINITY);
  search(graph, [start], linkCost, heap, cost, new Int32Array(graph.tileCount), () => false);
  return cost;
}

/** Dijkstra's search from several tiles; returns the first tile settled that ends it, −1 when all are settled. */
function search(
  graph: LinkGraph,
  from: Iterable<number>,
  linkCost: ArrayLike<number>,
  heap: TileHeap,
  cost: Float64Array,
  entry: Int32Array,
  ends: (tile: number) => boolean,
): number {
  const { head, outStart, outLinks } = linkArrays(graph);
  heap.clear();
  for (const tile of from) {
    cost[tile] = 0;
    heap.push(tile, 0);
  }
  for (let tile = heap.pop(); tile >= 0; tile = heap.pop()) {
    const settled = heap.lastCost();
    if (settled > (cost[tile] as number)) continue;
    if (ends(tile)) return tile;
    const stop = outStart[tile + 1] as number;
    for (let i = outStart[tile] as number; i < stop; i++) {
      const link = outLinks[i] as number;
      const next = head[link] as number;
      const reached = settled + (linkCost[link] as number);
      if (!(reached < (cost[next] as number))) continue;
      cost[next] = reached;
      entry[next] = link;
      heap.push(next, reached);
    }
  }
  return -1;
}

function pathTo(graph: LinkGraph, entry: Int32Array, end: number): number[] {
  const path: number[] = [];
  for (let link = entry[end] ?? -1; link >= 0; link = entry[graph.links[link]?.from ?? 0] ?? -1)
    path.push(link);
  return path.reverse();
}
