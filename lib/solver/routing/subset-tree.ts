/**
 * Minimum Steiner arborescence by dynamic programming over subsets of the targets.
 *
 * Source of the method: S. E. Dreyfus and R. A. Wagner, "The Steiner problem in graphs", Networks 1 (1971)
 * 195–207, in the form that merges subsets at a node and spreads each subset by a shortest-path search
 * (R. E. Erickson, C. L. Monma, A. F. Veinott, Mathematics of Operations Research 12 (1987) 634–664), on directed
 * links with the source as root.
 *
 * Precondition: targets are distinct and without the source; costs are positive, Infinity bars a link.
 * Postcondition: the links of a cheapest tree from the source to all targets, or null where none exists.
 * Cost: 3^t · tiles / 2 for merging and 2^t searches, t the number of targets; 12 · 2^t · tiles bytes.
 */
import type { LinkGraph } from '../../fabric/compile';
import { pruneToTree } from './link-tree';
import { type TileHeap, tileHeap } from './tile-heap';

const NO_CHOICE = -1;
/** A choice below this is a merge: the subset −2 − choice with the rest. At and above 0 it is a link. */
const MERGE = -2;

interface Table {
  graph: LinkGraph;
  linkCost: ArrayLike<number>;
  /** Cheapest tree from a tile to all targets of a subset, [subset · tiles + tile]. */
  cost: Float64Array;
  choice: Int32Array;
  heap: TileHeap;
}

export function subsetTree(
  graph: LinkGraph,
  source: number,
  targets: readonly number[],
  linkCost: ArrayLike<number>,
): number[] | null {
  const { tileCount } = graph;
  const subsets = 2 ** targets.length;
  const table: Table = {
    graph,
    linkCost,
    cost: new Float64Array(subsets * tileCount).fill(Number.POSITIVE_INFINITY),
    choice: new Int32Array(subsets * tileCount).fill(NO_CHOICE),
    heap: tileHeap(),
  };
  targets.forEach((target, i) => {
    table.cost[(1 << i) * tileCount + target] = 0;
  });
  for (let subset = 1; subset < subsets; subset++) {
    merge(table, subset);
    spread(table, subset, subset === subsets - 1 ? source : -1);
  }
  const whole = (subsets - 1) * tileCount + source;
  if (table.cost[whole] === Number.POSITIVE_INFINITY) return null;
  return pruneToTree(graph, source, targets, readBack(table, subsets - 1, source));
}

/** Joins two trees that start at one tile. Each split is tried once: the part with the lowest target leads. */
function merge({ graph, cost, choice }: Table, subset: number): void {
  const { tileCount } = graph;
  const lowest = subset & -subset;
  const base = subset * tileCount;
  for (let part = (subset - 1) & subset; part > 0; part = (part - 1) & subset) {
    if ((part & lowest) === 0) continue;
    const one = part * tileCount;
    const other = (subset ^ part) * tileCount;
    for (let tile = 0; tile < tileCount; tile++) {
      const joined = (cost[one + tile] ?? 0) + (cost[other + tile] ?? 0);
      if (joined < (cost[base + tile] ?? 0)) {
        cost[base + tile] = joined;
        choice[base + tile] = MERGE - part;
      }
    }
  }
}

/** Lengthens the trees of a subset backwards along links (Dijkstra); may stop once `goal` is settled. */
function spread({ graph, linkCost, cost, choice, heap }: Table, subset: number, goal: number): void {
  const base = subset * graph.tileCount;
  heap.clear();
  for (let tile = 0; tile < graph.tileCount; tile++) {
    const start = cost[base + tile] ?? 0;
    if (start < Number.POSITIVE_INFINITY) heap.push(tile, start);
  }
  for (let tile = heap.pop(); tile >= 0; tile = heap.pop()) {
    const settled = heap.lastCost();
    if (settled > (cost[base + tile] ?? 0)) continue;
    if (tile === goal) return;
    for (const link of graph.inLinks[tile] ?? []) {
      const tail = graph.links[link]?.from ?? 0;
      const reached = settled + (linkCost[link] ?? Number.POSITIVE_INFINITY);
      if (reached >= (cost[base + tail] ?? 0)) continue;
      cost[base + tail] = reached;
      choice[base + tail] = link;
      heap.push(tail, reached);
    }
  }
}

function readBack({ graph, choice }: Table, whole: number, source: number): number[] {
  const links: number[] = [];
  const open: [subset: number, tile: number][] = [[whole, source]];
  for (let next = open.pop(); next; next = open.pop()) {
    const [subset, tile] = next;
    const made = choice[subset * graph.tileCount + tile] ?? NO_CHOICE;
    if (made >= 0) {
      links.push(made);
      open.push([subset, graph.links[made]?.to ?? tile]);
    } else if (made <= MERGE) {
      open.push([MERGE - made, tile], [subset ^ (MERGE - made), tile]);
    }
  }
  return links;
}
