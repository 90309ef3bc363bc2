/**
 * The cheapest tree of links from one router to several: exact where the work allows it, else a good one that
 * says that it may not be the cheapest.
 */
import type { LinkGraph } from '../../fabric/link-graph';
import { attachTree, costOf } from './attach-tree';
import { boundedTree } from './bounded-tree';
import { hopsFromTile, treeDepth } from './link-tree';
import { subsetTree } from './subset-tree';

export interface SteinerTree {
  /** Link indices, ascending. */
  links: number[];
  cost: number;
  /** The tree is proved to be a cheapest one (within `maxDepthHops` where that is given). */
  exact: boolean;
}

export interface SteinerOptions {
  /** No path from the source to a target may have more hops; null or absent: no limit. */
  maxDepthHops?: number | null;
  /** Steps that the exact method may take, about 2 ns each; beyond, the tree is built by attaching paths. */
  exactWork?: number;
}

/** Up to ten targets on 8 × 8 tiles, six on 64 × 64. */
const DEFAULT_EXACT_WORK = 4e6;

/**
 * The cheapest tree from `source` to the `targets`, by `linkCost` for each link index: positive numbers, Infinity
 * for a link that may not be used. Targets may repeat or name the source. Null where no tree exists. Deterministic.
 */
export function steinerTree(
  graph: LinkGraph,
  source: number,
  targets: readonly number[],
  linkCost: ArrayLike<number>,
  options: SteinerOptions = {},
): SteinerTree | null {
  const ends = [...new Set(targets)].filter((target) => target !== source);
  if (ends.length === 0) return { links: [], cost: 0, exact: true };
  const limit = options.maxDepthHops ?? null;
  const work = options.exactWork ?? DEFAULT_EXACT_WORK;
  const exact = isWithinExactWork(graph, ends.length, null, work);
  const free = exact ? subsetTree(graph, source, ends, linkCost) : attachTree(graph, source, ends, linkCost);
  if (free === null) return null;
  if (limit === null || treeDepth(graph, source, ends, free) <= limit) return finished(free, linkCost, exact);
  const boundedExact = isWithinExactWork(graph, ends.length, limit, work);
  const bounded = boundedExact
    ? boundedTree(graph, source, ends, linkCost, limit)
    : shortestPathsTree(graph, source, ends, linkCost, options);
  if (bounded === null || treeDepth(graph, source, ends, bounded) > limit) return null;
  return finished(bounded, linkCost, boundedExact);
}

/** Whether the exact method takes on a tree to so many targets, within a limit on the hops of its paths or without one. */
export const isWithinExactWork = (
  graph: LinkGraph,
  targets: number,
  maxDepthHops: number | null,
  work = DEFAULT_EXACT_WORK,
): boolean => graph.tileCount * 3 ** targets * (maxDepthHops ?? 1) <= work;

const finished = (links: number[], linkCost: ArrayLike<number>, exact: boolean): SteinerTree => ({
  links,
  cost: costOf(links, linkCost),
  exact,
});

/**
 * A cheap tree in which every target has the fewest hops that the fabric allows: the same methods on those links
 * only that lead one hop further from the source. Null where these links, or barred ones, do not reach a target.
 */
export function shortestPathsTree(
  graph: LinkGraph,
  source: number,
  targets: readonly number[],
  linkCost: ArrayLike<number>,
  options: SteinerOptions = {},
): number[] | null {
  const hops = hopsFromTile(graph, source);
  const forward = Float64Array.from(graph.links, (link, i) =>
    hops[link.to] === (hops[link.from] ?? 0) + 1 ? (linkCost[i] ?? 0) : Number.POSITIVE_INFINITY,
  );
  return steinerTree(graph, source, targets, forward, { exactWork: options.exactWork })?.links ?? null;
}

/** The fewest links that any tree from `source` to the `targets` has; null where some target is out of reach. */
export function minimumTreeHops(
  graph: LinkGraph,
  source: number,
  targets: readonly number[],
  options: SteinerOptions = {},
): { hops: number; exact: boolean } | null {
  const tree = steinerTree(graph, source, targets, new Float64Array(graph.links.length).fill(1), options);
  return tree && { hops: tree.links.length, exact: tree.exact };
}
