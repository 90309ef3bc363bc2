/**
 * Trees for all nets at once: nets that share a full link negotiate for it.
 *
 * Every net is routed alone at first. Then, round by round, the nets on overfull links are taken up and routed
 * anew, where a full link costs more the more nets want it now and the longer it has been wanted, until no link is
 * overfull or the rounds are over. Nets that took a detour are at last tried again on what is left free, and in
 * exchange with lighter ones: weights decide there, and between rounds, as prices that differ by net were seen to leave
 * more links overfull.
 *
 * Source of the method: rip-up and re-route with present and historic congestion costs, L. McMurchie and C. Ebeling,
 * Proc. ACM Symposium on Field-Programmable Gate Arrays (1995) 111–117.
 *
 * Deterministic. Costs are multiples of 1/4096, so sums are exact and do not depend on their order.
 */
import type { FabricGraph } from '../../fabric/compile';
import type { Objective } from '../../mapping/mapping';
import { type LinkLoads, linkLoads } from './link-loads';
import type { NetTask } from './net-tasks';
import { netTree, objectiveHops, weightedHops } from './net-tree';
import { polish } from './polish';

const GRAIN = 4096;
/** Of equal trees the one on freer links: far too small to make up for one hop in a tree of under 1000 links. */
const TIE = 1 / GRAIN;
const FIRST_PRESSURE = 0.5;
const PRESSURE_GROWTH = 1.4;
const MOST_PRESSURE = 64;
const HISTORY_STEP = 0.5;
/** Rounds without fewer excess nets after which negotiation gives up. */
const STALE_ROUNDS = 8;

export interface NetTrees {
  /** Link indices of each task's tree. */
  trees: number[][];
  /** What each tree would cost by the objective if it were the only one. */
  aloneHops: number[];
  /** Whether `aloneHops` is proved to be the fewest. */
  exact: boolean[];
  loads: LinkLoads;
}

export interface NegotiateOptions {
  objective: Objective;
  maxRounds: number;
  /** The order in which nets are routed, as indices of tasks. */
  order: readonly number[];
  /** Trees to start from where they are as good as the net alone could have. */
  start: readonly (readonly number[] | undefined)[];
  /** Starts from `start` in any case. */
  keepStart?: boolean;
  /** Looked at before every net; true ends with the trees so far, of which some may be empty. */
  shouldStop(): boolean;
}

export function negotiate(
  graph: FabricGraph,
  tasks: readonly NetTask[],
  options: NegotiateOptions,
): NetTrees {
  const state = routeAlone(graph, tasks, options);
  const snapshot = (): Snapshot => takeSnapshot(graph, tasks, options.objective, state);
  let best = snapshot();
  if (best.excess > 0) {
    const history = new Float64Array(graph.links.length);
    const least = leastExcess(graph, tasks);
    let pressure = FIRST_PRESSURE;
    let stale = 0;
    for (let round = 0; round < options.maxRounds && best.excess > least && stale < STALE_ROUNDS; round++) {
      if (options.shouldStop()) break;
      reroute(graph, tasks, options, state, history, pressure);
      const now = snapshot();
      stale = now.excess < best.excess ? 0 : stale + 1;
      if (now.excess < best.excess || (now.excess === best.excess && now.hops < best.hops)) best = now;
      pressure = Math.min(MOST_PRESSURE, pressure * PRESSURE_GROWTH);
    }
    state.trees.forEach((tree, i) => {
      state.loads.remove(tree);
      state.trees[i] = best.trees[i] ?? tree;
    });
    for (const tree of state.trees) state.loads.add(tree);
  }
  polish(graph, tasks, options, state);
  return state;
}

/** Excess that no routing avoids: nets that end at a tile beyond the channels that lead into it. */
function leastExcess(graph: FabricGraph, tasks: readonly NetTask[]): number {
  const nets = new Int32Array(graph.tileCount);
  for (const task of tasks) for (const tile of task.targets) nets[tile] = (nets[tile] ?? 0) + 1;
  const room = (tile: number): number =>
    (graph.inLinks[tile] ?? []).reduce((sum, link) => sum + (graph.links[link]?.channels ?? 0), 0);
  return nets.reduce((sum, count, tile) => sum + Math.max(0, count - room(tile)), 0);
}

interface Snapshot {
  trees: number[][];
  excess: number;
  hops: number;
}

function takeSnapshot(
  graph: FabricGraph,
  tasks: readonly NetTask[],
  objective: Objective,
  state: NetTrees,
): Snapshot {
  return {
    trees: [...state.trees],
    excess: state.loads.totalExcess(),
    hops: tasks.reduce((sum, task, i) => sum + weightedHops(graph, task, state.trees[i] ?? [], objective), 0),
  };
}

/** Each net on a cheapest tree of its own; full links are avoided only where that costs no hop. */
function routeAlone(graph: FabricGraph, tasks: readonly NetTask[], options: NegotiateOptions): NetTrees {
  const loads = linkLoads(graph);
  const state: NetTrees = {
    trees: tasks.map(() => []),
    aloneHops: tasks.map(() => 0),
    exact: tasks.map(() => false),
    loads,
  };
  const cost = new Float64Array(graph.links.length);
  for (const i of options.order) {
    const task = tasks[i];
    if (!task) continue;
    if (options.shouldStop()) return state;
    for (let link = 0; link < cost.length; link++) cost[link] = 1 + tieCost(graph, loads, link);
    const found = netTree(graph, task, cost, options.objective);
    const start = options.start[i];
    const links = found?.links ?? [];
    const alone = objectiveHops(graph, task, links, options.objective);
    const isKept =
      start &&
      (options.keepStart ||
        (objectiveHops(graph, task, start, options.objective) === alone && fits(loads, start)));
    const tree = isKept ? [...start] : links;
    state.trees[i] = tree;
    state.aloneHops[i] = alone;
    state.exact[i] = found?.exact ?? false;
    loads.add(tree);
  }
  return state;
}

const fits = (loads: LinkLoads, tree: readonly number[]): boolean => {
  loads.add(tree);
  const fit = tree.every((link) => loads.excess(link) === 0);
  loads.remove(tree);
  return fit;
};

function tieCost(graph: FabricGraph, loads: LinkLoads, link: number): number {
  const nets = loads.nets[link] ?? 0;
  return nets >= (graph.links[link]?.channels ?? 1) ? 2 * TIE : nets > 0 ? TIE : 0;
}

/** One round: history grows on overfull links, and the nets on them are routed anew, one after the other. */
function reroute(
  graph: FabricGraph,
  tasks: readonly NetTask[],
  options: NegotiateOptions,
  state: NetTrees,
  history: Float64Array,
  pressure: number,
): void {
  const { loads, trees } = state;
  for (let link = 0; link < history.length; link++) {
    history[link] = (history[link] ?? 0) + HISTORY_STEP * loads.excess(link);
  }
  const cost = new Float64Array(history.length);
  for (const i of options.order) {
    const task = tasks[i];
    const tree = trees[i] ?? [];
    if (!task || !tree.some((link) => loads.excess(link) > 0)) continue;
    if (options.shouldStop()) return;
    loads.remove(tree);
    for (let link = 0; link < cost.length; link++) {
      const over = (loads.nets[link] ?? 0) + 1 - (graph.links[link]?.channels ?? 1);
      const raw = (1 + (history[link] ?? 0)) * (over > 0 ? 1 + pressure * over : 1);
      cost[link] = Math.round(raw * GRAIN) / GRAIN;
    }
    // Detours are what negotiation is about, so even `path` routes by cost here; polishing shortens again.
    trees[i] = netTree(graph, task, cost, 'wire', false)?.links ?? tree;
    loads.add(trees[i] ?? []);
  }
}
