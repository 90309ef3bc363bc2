/**
 * Minimum Steiner arborescence by dynamic programming over subsets of the targets.
 *
 * Source of the method: S. E. Dreyfus and R. A. Wagner, "The Steiner problem in graphs", Networks 1 (1971)
 * 195–207, in the form that merges subsets at a node and spreads each subset by a shortest-path search
 * (R. E. Erickson, C. L. Monma, A. F. Veinott, Mathematics of Operations Research 12 (1987) 634–664), on directed
 * links with the source as root.
 *
 * A state is dropped where its cost and a bound on the rest of the tree (the shortest way from the source to its tile,
 * and to every target still missing) exceed the cost of a tree found by attaching paths.
 *
 * Precondition: targets are distinct and without the source; costs are positive, Infinity bars a link.
 * Postcondition: the links of a cheapest tree from the source to all targets, or null where none exists.
 * Cost: at most 3^t · tiles / 2 for merging and 2^t searches, t the number of targets; 12 · 2^t · tiles bytes.
 */
import type { LinkGraph } from '../../fabric/link-graph';
import { costOf, costsFrom, growTree } from './attach-tree';
import { type LinkArrays, linkArrays } from './link-arrays';
import { pruneToTree } from './link-tree';
import { type TileHeap, tileHeap } from './tile-heap';

const NO_CHOICE = -1;
/** A choice below this is a merge: the subset −2 − choice with the rest. At and above 0 it is a link. */
const MERGE = -2;

/** Forgives rounding where costs are not exact sums. */
const SLACK = 1 + 1e-9;

interface Table {
  tileCount: number;
  links: LinkArrays;
  linkCost: ArrayLike<number>;
  /** Cheapest tree from a tile to all targets of a subset, [subset · tiles + tile]. */
  cost: Float64Array;
  choice: Int32Array;
  /** Tiles with a finite cost, by subset. */
  settled: number[][];
  /** Least cost from the source to every tile. */
  fromSource: Float64Array;
  upperBound: number;
  heap: TileHeap;
}

export function subsetTree(
  graph: LinkGraph,
  source: number,
  targets: readonly number[],
  linkCost: ArrayLike<number>,
): number[] | null {
  const { tileCount } = graph;
  const heap = tileHeap();
  const grown = growTree(graph, source, targets, [], linkCost, heap);
  if (grown === null || targets.length === 1) return grown;
  const subsets = 2 ** targets.length;
  const fromSource = costsFrom(graph, source, linkCost, heap);
  const table: Table = {
    tileCount,
    links: linkArrays(graph),
    linkCost,
    cost: new Float64Array(subsets * tileCount).fill(Number.POSITIVE_INFINITY),
    choice: new Int32Array(subsets * tileCount).fill(NO_CHOICE),
    settled: Array.from({ length: subsets }, () => []),
    fromSource,
    upperBound: costOf(grown, linkCost) * SLACK,
    heap,
  };
  targets.forEach((target, i) => {
    table.cost[(1 << i) * tileCount + target] = 0;
    table.settled[1 << i]?.push(target);
  });
  for (let subset = 1; subset < subsets; subset++) {
    const missing = targets.filter((_, i) => (subset & (1 << i)) === 0);
    const farthest = missing.reduce((most, tile) => Math.max(most, fromSource[tile] ?? 0), 0);
    merge(table, subset);
    spread(table, subset, subset === subsets - 1 ? source : -1, farthest);
  }
  const whole = (subsets - 1) * tileCount + source;
  if (!((table.cost[whole] ?? 0) < costOf(grown, linkCost))) return grown;
  return pruneToTree(graph, source, targets, readBack(table, subsets - 1, source));
}

/** Joins two trees that start at one tile. Each split is tried once: the part with the lowest target leads. */
function merge({ tileCount, cost, choice, settled }: Table, subset: number): void {
  const lowest = subset & -subset;
  const base = subset * tileCount;
  const tiles = settled[subset] ?? [];
  for (let part = (subset - 1) & subset; part > 0; part = (part - 1) & subset) {
    if ((part & lowest) === 0) continue;
    const one = part * tileCount;
    const other = (subset ^ part) * tileCount;
    for (const tile of settled[part] ?? []) {
      const joined = (cost[one + tile] as number) + (cost[other + tile] as number);
      const known = cost[base + tile] as number;
      if (joined >= known) continue;
      if (known === Number.POSITIVE_INFINITY) tiles.push(tile);
      cost[base + tile] = joined;
      choice[base + tile] = MERGE - part;
    }
  }
}

/**
 * Lengthens the trees of a subset backwards along links (Dijkstra); may stop once `goal` is settled. `farthest` is the
 * least cost to reach all the targets that the subset misses.
 */
function spread(table: Table, subset: number, goal: number, farthest: number): void {
  const { tileCount, linkCost, cost, choice, heap, fromSource, upperBound } = table;
  const { tail, inStart, inLinks } = table.links;
  const base = subset * tileCount;
  const tiles = table.settled[subset] ?? [];
  heap.clear();
  for (const tile of tiles) heap.push(tile, cost[base + tile] as number);
  for (let tile = heap.pop(); tile >= 0; tile = heap.pop()) {
    const settled = heap.lastCost();
    if (settled > (cost[base + tile] as number)) continue;
    if (tile === goal) return;
    const end = inStart[tile + 1] as number;
    for (let i = inStart[tile] as number; i < end; i++) {
      const link = inLinks[i] as number;
      const before = tail[link] as number;
      const reached = settled + (linkCost[link] as number);
      const known = cost[base + before] as number;
      if (reached >= known || reached + Math.max(farthest, fromSource[before] as number) > upperBound)
        continue;
      if (known === Number.POSITIVE_INFINITY) tiles.push(before);
      cost[base + before] = reached;
      choice[base + before] = link;
      heap.push(before, reached);
    }
  }
}

function readBack({ tileCount, links: arrays, choice }: Table, whole: number, source: number): number[] {
  const links: number[] = [];
  const open: [subset: number, tile: number][] = [[whole, source]];
  for (let next = open.pop(); next; next = open.pop()) {
    const [subset, tile] = next;
    const made = choice[subset * tileCount + tile] ?? NO_CHOICE;
    if (made >= 0) {
      links.push(made);
      open.push([subset, arrays.head[made] ?? tile]);
    } else if (made <= MERGE) {
      open.push([MERGE - made, tile], [subset ^ (MERGE - made), tile]);
    }
  }
  return links;
}
