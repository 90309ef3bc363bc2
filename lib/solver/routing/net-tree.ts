/** The tree of one net at given link costs, under the objective and the clock's limit. */
import type { FabricGraph } from '../../fabric/compile';
import type { Objective } from '../../mapping/mapping';
import { costOf } from './attach-tree';
import { boundedTree } from './bounded-tree';
import { treeDepth, walkLinks } from './link-tree';
import type { NetTask } from './net-tasks';
import { type SteinerTree, shortestPathsTree, steinerTree } from './steiner-tree';

/** Up to this many targets, a shallower tree of the same cost is looked for. */
const SHALLOW_TARGETS = 5;

/**
 * `wire`: a cheapest tree within the clock's limit, and for small nets, unless `shallow` is false, one as shallow as
 * can be. `path`: fewest hops to every consumer, and the cheapest such tree; so too where a consumer lies beyond the
 * clock's limit. Null only where barred links (cost Infinity) leave no such tree.
 */
export function netTree(
  graph: FabricGraph,
  task: NetTask,
  linkCost: ArrayLike<number>,
  objective: Objective,
  shallow = true,
): SteinerTree | null {
  const { sourceTile, targets, farthestHops } = task;
  const fewestHops = (exact: boolean): SteinerTree | null => {
    const links = shortestPathsTree(graph, sourceTile, targets, linkCost);
    return links && { links, cost: costOf(links, linkCost), exact };
  };
  if (objective === 'path') {
    // Every path is as short as the fabric allows, so the sum of paths is the least there is.
    const direct = fewestHops(true);
    if (direct !== null) return direct;
  }
  const limited = steinerTree(graph, sourceTile, targets, linkCost, { maxDepthHops: graph.maxHops });
  if (limited === null) {
    const beyond = graph.maxHops !== null && farthestHops > graph.maxHops;
    return beyond ? (fewestHops(false) ?? steinerTree(graph, sourceTile, targets, linkCost)) : null;
  }
  if (!shallow || !limited.exact || targets.length > SHALLOW_TARGETS) return limited;
  const depth = treeDepth(graph, sourceTile, targets, limited.links);
  if (depth <= farthestHops) return limited;
  const links = boundedTree(graph, sourceTile, targets, linkCost, farthestHops);
  if (links === null || costOf(links, linkCost) > limited.cost) return limited;
  return { links, cost: limited.cost, exact: true };
}

/** What a tree adds to the objective where nets compete: its hops, by what they weigh against those of others. */
export function weightedHops(
  graph: FabricGraph,
  task: NetTask,
  tree: readonly number[],
  objective: Objective,
): number {
  if (objective === 'wire') return task.weight * tree.length;
  const { hops } = walkLinks(graph, task.sourceTile, tree);
  return task.edges.reduce((sum, { tile, weight }) => sum + weight * (hops.get(tile) ?? 0), 0);
}

/** What a tree adds to the objective where all weights are 1: its links for `wire`, the hops of all its connections for `path`. */
export function objectiveHops(
  graph: FabricGraph,
  task: NetTask,
  tree: readonly number[],
  objective: Objective,
): number {
  if (objective === 'wire') return tree.length;
  const { hops } = walkLinks(graph, task.sourceTile, tree);
  return task.edges.reduce((sum, { tile }) => sum + (hops.get(tile) ?? 0), 0);
}
