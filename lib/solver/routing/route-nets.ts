/** Routes for the nets of a placement: the one entry to the router for the bench, the solver and the command line. */
import type { FabricGraph } from '../../fabric/compile';
import type { LinkId } from '../../fabric/fabric';
import type { EdgeId, Kernel, OpId } from '../../graph/kernel';
import type { Objective, Placement, Routes } from '../../mapping/mapping';
import type { Weights } from '../../mapping/weights';
import { pruneToTree, treeDepth, walkLinks } from './link-tree';
import { negotiate } from './negotiate';
import { type NetTask, netTasks } from './net-tasks';
import { straighten } from './straighten';

export interface RouteOptions {
  /** Changes the order in which nets are routed; 0 (the default) is the kernel's. */
  seed?: number;
  /** Rounds of negotiation for full links; 40 where absent. */
  maxRounds?: number;
  /** Routes to keep where they are still as short as can be, so that threads stay put while an op is dragged. */
  previous?: Routes;
  /** Takes `previous` as it is, however long, where it joins the nets; it is only shortened. */
  keepPrevious?: boolean;
  /** `wire` (the default) shares links; `path` gives every consumer its shortest path first. */
  objective?: Objective;
  /** Where nets compete for a link, those that weigh less give way. */
  weights?: Weights;
  /** Looked at before every net; true ends at once, and then routes may be missing or overfull. */
  shouldStop?: () => boolean;
}

export interface NetRoute {
  source: OpId;
  wireHops: number;
  /** The net's links, or the hops of its paths under the objective `path`, if no other net were there. */
  aloneHops: number;
  /** Whether `aloneHops` is proved to be the least possible within the clock's limit. */
  exact: boolean;
}

export interface RoutingResult {
  routes: Routes;
  overfullLinks: LinkId[];
  /** Connections whose path is longer than the clock allows. */
  tooLongEdges: EdgeId[];
  /** Connections between placed ops that no path joins. */
  unreachable: EdgeId[];
  nets: NetRoute[];
}

/**
 * Routes every net as far as its ops are placed. Where `overfullLinks`, `tooLongEdges` and `unreachable` are empty
 * the routes obey R5, R6 and R7. They may be non-empty although a legal routing exists: congestion is settled by a
 * heuristic. Each net is a cheapest tree at the price of the moment, exactly so up to about ten consumers on
 * 8 × 8 tiles. Pure and deterministic. Cost: about 1 ms for 30 ops on 8 × 8 without congestion.
 */
export function routePlacement(
  kernel: Kernel,
  graph: FabricGraph,
  placement: Placement,
  options: RouteOptions = {},
): RoutingResult {
  const objective = options.objective ?? 'wire';
  const tasks = netTasks(kernel, graph, placement, objective, options.weights);
  const shouldStop = options.shouldStop ?? (() => false);
  const start = tasks.map((task) => previousTree(graph, task, options.previous));
  const state = negotiate(graph, tasks, {
    objective,
    maxRounds: options.maxRounds ?? 40,
    order: orderOf(tasks.length, options.seed ?? 0),
    start,
    keepStart: options.keepPrevious ?? false,
    shouldStop,
  });
  // Threads that are kept are not touched, not even to make them straighter.
  straighten(graph, tasks, state, (i) => !options.keepPrevious && sameLinks(state.trees[i], start[i]));
  const routes: Routes = {};
  const tooLongEdges: EdgeId[] = [];
  tasks.forEach((task, i) => {
    const tree = state.trees[i] ?? [];
    if (tree.length > 0) routes[task.source] = inWalkingOrder(graph, task, tree);
    tooLongEdges.push(...tooLong(graph, task, tree));
  });
  return {
    routes,
    overfullLinks: graph.links.filter((_, link) => state.loads.excess(link) > 0).map((link) => link.id),
    tooLongEdges,
    unreachable: tasks.flatMap((task) => task.unreachable),
    nets: tasks.map((task, i) => ({
      source: task.source,
      wireHops: state.trees[i]?.length ?? 0,
      aloneHops: state.aloneHops[i] ?? 0,
      exact: state.exact[i] ?? false,
    })),
  };
}

/** A permutation of 0…count−1: the identity for seed 0, else shuffled by a linear congruential generator. */
function orderOf(count: number, seed: number): number[] {
  const order = Array.from({ length: count }, (_, i) => i);
  if (seed === 0) return order;
  let state = seed >>> 0;
  for (let i = count - 1; i > 0; i--) {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    const j = Math.floor((state / 2 ** 32) * (i + 1));
    const kept = order[i] ?? 0;
    order[i] = order[j] ?? 0;
    order[j] = kept;
  }
  return order;
}

/** A net's earlier tree, where it still joins the same tiles within the clock's limit; else undefined. */
function previousTree(graph: FabricGraph, task: NetTask, previous: Routes | undefined): number[] | undefined {
  const route = previous?.[task.source];
  if (!route) return undefined;
  const links: number[] = [];
  for (const id of route) {
    const link = graph.linkIndex.get(id);
    if (link === undefined) return undefined;
    links.push(link);
  }
  const pruned = pruneToTree(graph, task.sourceTile, task.targets, links);
  if (pruned.length !== links.length) return undefined;
  const depth = treeDepth(graph, task.sourceTile, task.targets, pruned);
  return depth <= (graph.maxHops ?? Number.MAX_SAFE_INTEGER) ? pruned : undefined;
}

/** Both lists are ascending. */
const sameLinks = (one: readonly number[] = [], other: readonly number[] = []): boolean =>
  one.length === other.length && one.every((link, i) => link === other[i]);

/** The links of a tree from the source outwards: the order in which a thread is drawn. */
function inWalkingOrder(graph: FabricGraph, task: NetTask, tree: readonly number[]): LinkId[] {
  const ids: LinkId[] = [];
  for (const link of walkLinks(graph, task.sourceTile, tree).entry.values()) {
    const id = graph.links[link]?.id;
    if (id !== undefined) ids.push(id);
  }
  return ids;
}

function tooLong(graph: FabricGraph, task: NetTask, tree: readonly number[]): EdgeId[] {
  if (graph.maxHops === null) return [];
  const limit = graph.maxHops;
  const { hops } = walkLinks(graph, task.sourceTile, tree);
  return task.edges.filter(({ tile }) => (hops.get(tile) ?? 0) > limit).map(({ id }) => id);
}
