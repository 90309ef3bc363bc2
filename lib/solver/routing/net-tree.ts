/** The tree of one net at given link costs, under the objective and the clock's limit. */
import type { FabricGraph } from '../../fabric/compile';
import type { Objective } from '../../mapping/mapping';
import { treeDepth } from './link-tree';
import type { NetTask } from './net-tasks';
import { type SteinerTree, shortestPathsTree, steinerTree } from './steiner-tree';

/** Up to this many targets, a shallower tree of the same cost is looked for. */
const SHALLOW_TARGETS = 5;

/**
 * `wire`: a cheapest tree within the clock's limit, and for small nets the shallowest of these. `path`: fewest hops
 * to every consumer, and the cheapest such tree. Where the limit cannot be kept, fewest hops to every consumer
 * too. Null only where barred links (cost Infinity) leave no tree.
 */
export function netTree(
  graph: FabricGraph,
  task: NetTask,
  linkCost: ArrayLike<number>,
  objective: Objective,
): SteinerTree | null {
  const { sourceTile, targets, farthestHops } = task;
  const fewestHops = (): SteinerTree | null => {
    const links = shortestPathsTree(graph, sourceTile, targets, linkCost);
    return links && { links, cost: links.length, exact: false };
  };
  if (objective === 'path') {
    const direct = fewestHops();
    if (direct !== null) return direct;
  }
  const limited = steinerTree(graph, sourceTile, targets, linkCost, { maxDepthHops: graph.maxHops });
  if (limited === null) return fewestHops() ?? steinerTree(graph, sourceTile, targets, linkCost);
  if (!limited.exact || targets.length > SHALLOW_TARGETS) return limited;
  const depth = treeDepth(graph, sourceTile, targets, limited.links);
  if (depth <= farthestHops) return limited;
  const shallow = steinerTree(graph, sourceTile, targets, linkCost, { maxDepthHops: farthestHops });
  return shallow !== null && shallow.cost <= limited.cost ? shallow : limited;
}
