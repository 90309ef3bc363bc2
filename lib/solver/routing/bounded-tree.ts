/**
 * Minimum Steiner arborescence whose paths have at most a given number of hops.
 *
 * The subset programme of `subset-tree.ts` with one more index, the hops still allowed: a tree for a subset within
 * d hops is a link followed by a tree within d − 1, or two trees within d joined at a tile. No search is needed,
 * for every step lowers d. Where two branches meet at one router the deeper entry can be dropped, so the cheapest
 * set of links found this way is a tree after pruning.
 *
 * Precondition, postcondition as there; null where a target lies beyond the limit.
 * Cost: d · (3^t · tiles / 2 + 2^t · links); 12 · d · 2^t · tiles bytes.
 */
import type { LinkGraph } from '../../fabric/compile';
import { pruneToTree } from './link-tree';

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
  const subsets = 2 ** targets.length;
  const layer = subsets * tileCount;
  const cost = new Float64Array((maxDepthHops + 1) * layer).fill(Number.POSITIVE_INFINITY);
  const choice = new Int32Array((maxDepthHops + 1) * layer).fill(NO_CHOICE);
  targets.forEach((target, i) => {
    cost[(1 << i) * tileCount + target] = 0;
  });
  for (let hops = 0; hops <= maxDepthHops; hops++) {
    for (let subset = 1; subset < subsets; subset++) {
      const base = hops * layer + subset * tileCount;
      if (hops > 0) lengthen(graph, linkCost, cost, choice, base, base - layer);
      mergeLayer(tileCount, cost, choice, hops * layer, subset);
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

function lengthen(
  graph: LinkGraph,
  linkCost: ArrayLike<number>,
  cost: Float64Array,
  choice: Int32Array,
  base: number,
  shorter: number,
): void {
  for (let tile = 0; tile < graph.tileCount; tile++) {
    let best = cost[shorter + tile] ?? Number.POSITIVE_INFINITY;
    let made = best < Number.POSITIVE_INFINITY ? SHORTER : NO_CHOICE;
    for (const link of graph.outLinks[tile] ?? []) {
      const head = graph.links[link]?.to ?? 0;
      const reached = (cost[shorter + head] ?? 0) + (linkCost[link] ?? Number.POSITIVE_INFINITY);
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
): void {
  const lowest = subset & -subset;
  const base = layerStart + subset * tileCount;
  for (let part = (subset - 1) & subset; part > 0; part = (part - 1) & subset) {
    if ((part & lowest) === 0) continue;
    const one = layerStart + part * tileCount;
    const other = layerStart + (subset ^ part) * tileCount;
    for (let tile = 0; tile < tileCount; tile++) {
      const joined = (cost[one + tile] ?? 0) + (cost[other + tile] ?? 0);
      if (joined < (cost[base + tile] ?? 0)) {
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
