/**
 * Minimum Steiner arborescence whose paths have at most a given number of hops.
 *
 * The subset programme of `subset-tree.ts` with one more index, the hops still allowed: a tree for a subset within
 * d hops is a link followed by a tree within d − 1, or two trees within d joined at a tile. No search is needed,
 * for every step lowers d. Where two branches meet at one router the deeper entry can be dropped, so the cheapest
 * set of links found this way is a tree after pruning.
 *
 * Precondition, postcondition as there; null where a target lies beyond the limit.
 * Cost: at most d · (3^t · tiles / 2 + 2^t · links); 12 · d · 2^t · tiles bytes.
 */
import type { LinkGraph } from '../../fabric/link-graph';
import { type LinkArrays, linkArrays } from './link-arrays';
import { hopsFromTile, pruneToTree } from './link-tree';

const NO_CHOICE = -1;
const SHORTER = -2;
const MERGE = -3;

export function boundedTree(
  graph: LinkGraph,
  source: number,
  targets: readonly number[],
  linkCost: ArrayLike<number>,
  maxDepthHops: number,
): number[] | null {
  const { tileCount } = graph;
  const links = linkArrays(graph);
  const subsets = 2 ** targets.length;
  const layer = subsets * tileCount;
  const cost = new Float64Array((maxDepthHops + 1) * layer).fill(Number.POSITIVE_INFINITY);
  const choice = new Int32Array((maxDepthHops + 1) * layer).fill(NO_CHOICE);
  targets.forEach((target, i) => {
    cost[(1 << i) * tileCount + target] = 0;
  });
  const ring = tilesByHops(graph, source);
  for (let hops = 0; hops <= maxDepthHops; hops++) {
    // Only tiles that the source reaches within the hops left can be part of a tree.
    const tiles = ring.slice(0, maxDepthHops - hops + 1).flat();
    for (let subset = 1; subset < subsets; subset++) {
      const base = hops * layer + subset * tileCount;
      if (hops > 0) lengthen(links, linkCost, cost, choice, base, base - layer, tiles);
      mergeLayer(tileCount, cost, choice, hops * layer, subset, tiles);
    }
  }
  const whole = maxDepthHops * layer + (subsets - 1) * tileCount + source;
  if (cost[whole] === Number.POSITIVE_INFINITY) return null;
  return pruneToTree(
    graph,
    source,
    targets,
    readBack(graph, choice, layer, maxDepthHops, subsets - 1, source),
  );
}

/** Tiles grouped by their hops from the source. */
function tilesByHops(graph: LinkGraph, source: number): number[][] {
  const groups: number[][] = [];
  hopsFromTile(graph, source).forEach((hops, tile) => {
    if (hops < 0) return;
    while (groups.length <= hops) groups.push([]);
    groups[hops]?.push(tile);
  });
  return groups;
}

function lengthen(
  { head, outStart, outLinks }: LinkArrays,
  linkCost: ArrayLike<number>,
  cost: Float64Array,
  choice: Int32Array,
  base: number,
  shorter: number,
  tiles: readonly number[],
): void {
  for (const tile of tiles) {
    let best = cost[shorter + tile] as number;
    let made = best < Number.POSITIVE_INFINITY ? SHORTER : NO_CHOICE;
    const end = outStart[tile + 1] as number;
    for (let i = outStart[tile] as number; i < end; i++) {
      const link = outLinks[i] as number;
      const reached = (cost[shorter + (head[link] as number)] as number) + (linkCost[link] as number);
      if (reached < best) {
        best = reached;
        made = link;
      }
    }
    cost[base + tile] = best;
    choice[base + tile] = made;
  }
}

function mergeLayer(
  tileCount: number,
  cost: Float64Array,
  choice: Int32Array,
  layerStart: number,
  subset: number,
  tiles: readonly number[],
): void {
  const lowest = subset & -subset;
  const base = layerStart + subset * tileCount;
  for (let part = (subset - 1) & subset; part > 0; part = (part - 1) & subset) {
    if ((part & lowest) === 0) continue;
    const one = layerStart + part * tileCount;
    const other = layerStart + (subset ^ part) * tileCount;
    for (const tile of tiles) {
      const joined = (cost[one + tile] as number) + (cost[other + tile] as number);
      if (joined < (cost[base + tile] as number)) {
        cost[base + tile] = joined;
        choice[base + tile] = MERGE - part;
      }
    }
  }
}

function readBack(
  graph: LinkGraph,
  choice: Int32Array,
  layer: number,
  maxDepthHops: number,
  whole: number,
  source: number,
): number[] {
  const links: number[] = [];
  const open: [hops: number, subset: number, tile: number][] = [[maxDepthHops, whole, source]];
  for (let next = open.pop(); next; next = open.pop()) {
    const [hops, subset, tile] = next;
    const made = choice[hops * layer + subset * graph.tileCount + tile] ?? NO_CHOICE;
    if (made >= 0) {
      links.push(made);
      open.push([hops - 1, subset, graph.links[made]?.to ?? tile]);
    } else if (made === SHORTER) {
      open.push([hops - 1, subset, tile]);
    } else if (made <= MERGE) {
      open.push([hops, MERGE - made, tile], [hops, subset ^ (MERGE - made), tile]);
    }
  }
  return links;
}
