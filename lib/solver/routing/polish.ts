/**
 * Shorter trees after negotiation: each net that took a detour tries again.
 *
 * First on what is left free. Then on a tree of its own choice, where the nets that are in its way are taken up and
 * must find room again; the exchange stays only if no link gets fuller than it may and the hops of all nets
 * together, by their weights, get fewer. Cost: a few trees for each net with a detour, in at most PASSES rounds.
 */
import type { FabricGraph } from '../../fabric/compile';
import type { Objective } from '../../mapping/mapping';
import type { LinkLoads } from './link-loads';
import type { NetTask } from './net-tasks';
import { netTree, objectiveHops, weightedHops } from './net-tree';

const PASSES = 4;
/** An exchange that moves more nets than this rarely pays. */
const MOST_MOVED = 4;
/** What a full link costs a net that looks for its own choice: more than a free one, less than a long way round. */
const CROWDED = 1.5;

interface Polishing {
  graph: FabricGraph;
  tasks: readonly NetTask[];
  objective: Objective;
  trees: number[][];
  loads: LinkLoads;
  cost: Float64Array;
}

/** Shortens trees in place and keeps the loads right. Trees on overfull links are never made worse. */
export function polish(
  graph: FabricGraph,
  tasks: readonly NetTask[],
  options: { objective: Objective; order: readonly number[]; shouldStop(): boolean },
  state: { trees: number[][]; aloneHops: readonly number[]; loads: LinkLoads },
): void {
  const work: Polishing = {
    graph,
    tasks,
    objective: options.objective,
    trees: state.trees,
    loads: state.loads,
    cost: new Float64Array(graph.links.length),
  };
  for (let pass = 0; pass < PASSES; pass++) {
    let improved = false;
    for (const i of options.order) {
      if (options.shouldStop()) return;
      if (isAsAlone(work, i, state.aloneHops[i] ?? 0)) continue;
      if (intoFreeRoom(work, i) || byExchange(work, i)) improved = true;
    }
    if (!improved) return;
  }
}

function isAsAlone({ graph, tasks, objective, trees }: Polishing, i: number, aloneHops: number): boolean {
  const task = tasks[i];
  return !task || objectiveHops(graph, task, trees[i] ?? [], objective) <= aloneHops;
}

/** Weighted: an exchange pays where the heavier nets gain. */
function hopsOf({ graph, tasks, objective, trees }: Polishing, i: number): number {
  const task = tasks[i];
  return task ? weightedHops(graph, task, trees[i] ?? [], objective) : 0;
}

/** A tree for a net whose links are not counted at the moment; a full link costs `full`. */
function treeAt(work: Polishing, i: number, full: number): number[] | null {
  const { graph, loads, cost, tasks, objective } = work;
  const task = tasks[i];
  if (!task) return null;
  for (let link = 0; link < cost.length; link++) {
    cost[link] = (loads.nets[link] ?? 0) < (graph.links[link]?.channels ?? 0) ? 1 : full;
  }
  return netTree(graph, task, cost, objective)?.links ?? null;
}

function lift({ trees, loads }: Polishing, i: number): number[] {
  const tree = trees[i] ?? [];
  loads.remove(tree);
  trees[i] = [];
  return tree;
}

function lay({ trees, loads }: Polishing, i: number, tree: number[]): void {
  trees[i] = tree;
  loads.add(tree);
}

function intoFreeRoom(work: Polishing, i: number): boolean {
  const before = hopsOf(work, i);
  const old = lift(work, i);
  const found = treeAt(work, i, Number.POSITIVE_INFINITY);
  lay(work, i, found ?? old);
  if (found !== null && hopsOf(work, i) < before) return true;
  lift(work, i);
  lay(work, i, old);
  return false;
}

function byExchange(work: Polishing, i: number): boolean {
  const { loads, trees } = work;
  const old = new Map<number, number[]>();
  let before = hopsOf(work, i);
  const undo = (): false => {
    for (const net of old.keys()) lift(work, net);
    for (const [net, tree] of old) lay(work, net, tree);
    return false;
  };
  old.set(i, lift(work, i));
  const wanted = treeAt(work, i, CROWDED);
  if (wanted === null) return undo();
  lay(work, i, wanted);
  const crowded = new Set(wanted.filter((link) => loads.excess(link) > 0));
  const moved = trees.flatMap((tree, net) =>
    net !== i && tree.some((link) => crowded.has(link)) ? [net] : [],
  );
  if (moved.length > MOST_MOVED) return undo();
  for (const net of moved) {
    before += hopsOf(work, net);
    old.set(net, lift(work, net));
  }
  for (const net of moved) {
    const found = treeAt(work, net, Number.POSITIVE_INFINITY);
    if (found === null) return undo();
    lay(work, net, found);
  }
  const after = [i, ...moved].reduce((sum, net) => sum + hopsOf(work, net), 0);
  return after < before && fits(work, i) ? true : undo();
}

const fits = ({ trees, loads }: Polishing, i: number): boolean =>
  (trees[i] ?? []).every((link) => loads.excess(link) === 0);
