/**
 * Routes placed nets together at least cost, exactly: each net takes its own least tree; where a link then carries too
 * much, one of the nets on it has to do without it, and each choice is tried (branch and bound on the conflicts, as in
 * conflict-based search for paths: Sharon, Stern, Felner and Sturtevant 2015), the cheapest first. Trees are the exact
 * ones of lib/solver/routing where the net's size allows. Nets with one consumer still free take part with the links that
 * they cannot do without at no cost, wherever that consumer goes (open-nets.ts).
 */
import type { LinkGraph } from '../../fabric/link-graph';
import type { Objective } from '../../mapping/mapping';
import { walkLinks } from '../routing/link-tree';
import { isWithinExactWork, shortestPathsTree, steinerTree } from '../routing/steiner-tree';
import { type OpenNetCosts, openNetCosts } from './open-nets';

export interface RoutingFabric extends LinkGraph {
  maxHops: number | null;
}

/** A net whose terminals all stand, or all but one. */
export interface StandingNet {
  /** The source's tile, then the consumers'. */
  tiles: readonly number[];
  /** Tiles that the one free consumer may take, always the same list for an op; none where all stand. */
  openTiles?: readonly number[];
  weight: number;
  /** Weight of each consumer's path, for the objective `path`. */
  pathWeights: readonly number[];
  /** Its own least tree, once it was asked for. */
  own?: LeastTree | null;
}

export interface LeastTree {
  /** Cost of the links; never above the least cost where `exact`. */
  cost: number;
  links: readonly number[];
  exact: boolean;
}

export type JointRoute =
  /** The least cost above the sum of each net's own, and the links of each net. */
  | { kind: 'routed'; extra: number; links: (readonly number[])[]; exact: boolean }
  /** No joint routing within the budget. */
  | { kind: 'over' }
  /** Too many conflicts for the work allowed: what is surely lost. */
  | { kind: 'unknown'; extra: number };

export interface JointRouter {
  /** The net's own least tree; null where it cannot be routed at all. */
  tree(net: StandingNet): LeastTree | null;
  /** Routes the nets so that they cost at most `budget` more than their own least trees. */
  route(nets: readonly StandingNet[], budget: number, maxNodes: number): JointRoute;
}

const CACHE_LIMIT = 200_000;

export function jointRouter(fabric: RoutingFabric, objective: Objective): JointRouter {
  const channels = Int32Array.from(fabric.links, (link) => link.channels);
  const load = new Int32Array(fabric.links.length);
  const cache = new Map<string, LeastTree | null>();
  const openNets = openNetCosts(fabric);
  const plain = new Float64Array(fabric.links.length).fill(1);

  const leastTree = (net: StandingNet, barred: readonly number[]): LeastTree | null => {
    if (net.openTiles) return openTree(openNets, net, net.openTiles, barred);
    if (barred.length > 0) return treeWithout(net, barred);
    if (net.own === undefined) net.own = treeWithout(net, barred);
    return net.own;
  };
  const treeWithout = (net: StandingNet, barred: readonly number[]): LeastTree | null => {
    const key = `${net.tiles.join()}|${barred.join()}|${net.weight}|${net.pathWeights.join()}`;
    const known = cache.get(key);
    if (known !== undefined) return known;
    const cost = barred.length === 0 ? plain : plain.slice();
    for (const link of barred) cost[link] = Number.POSITIVE_INFINITY;
    const made = objective === 'wire' ? wireTree(fabric, net, cost) : pathTree(fabric, net, cost);
    if (cache.size >= CACHE_LIMIT) cache.clear();
    cache.set(key, made);
    return made;
  };
  return {
    tree: (net) => leastTree(net, []),
    route: (nets, budget, maxNodes) => routeTogether({ nets, budget, maxNodes, channels, load, leastTree }),
  };
}

/** Its cost is what it pays for doing without the barred links; its links those that it cannot do without for nothing. */
function openTree(
  costs: OpenNetCosts,
  { tiles, weight }: StandingNet,
  openTiles: readonly number[],
  barred: readonly number[],
): LeastTree | null {
  const [source, consumer] = tiles as readonly [number, number];
  const found = costs(source, consumer, openTiles, barred);
  return found && { cost: weight * found.moreLinks, links: found.neededLinks, exact: true };
}

function wireTree(fabric: RoutingFabric, net: StandingNet, cost: Float64Array): LeastTree | null {
  const { tiles, weight } = net;
  const [source, ...targets] = tiles;
  const found = steinerTree(fabric, source as number, targets, cost, { maxDepthHops: fabric.maxHops });
  if (found && Number.isFinite(found.cost)) {
    return { cost: weight * found.links.length, links: found.links, exact: found.exact };
  }
  // A net too large for the exact methods may have a tree that they do not find: its own one stays, and stays in conflict.
  if (net.own && !isWithinExactWork(fabric, targets.length, fabric.maxHops))
    return { ...net.own, exact: false };
  return null;
}

/** Every path is a shortest one, so the sum of their hops cannot be less. */
function pathTree(fabric: RoutingFabric, net: StandingNet, cost: Float64Array): LeastTree | null {
  const [source, ...targets] = net.tiles as readonly [number, ...number[]];
  const links = shortestPathsTree(barredGraph(fabric, cost), source, targets, cost);
  if (!links) return null;
  const { hops } = walkLinks(fabric, source, links);
  let total = 0;
  for (const [i, target] of targets.entries()) {
    const path = hops.get(target);
    if (path === undefined || (fabric.maxHops !== null && path > fabric.maxHops)) return null;
    total += (net.pathWeights[i] ?? 1) * path;
  }
  return { cost: total, links, exact: true };
}

/** The graph without the links that cost Infinity: hops must not count them. */
function barredGraph(fabric: RoutingFabric, cost: Float64Array): LinkGraph {
  if (cost.every(Number.isFinite)) return fabric;
  const open = (lists: LinkGraph['outLinks']) =>
    lists.map((links) => links.filter((link) => Number.isFinite(cost[link])));
  return { ...fabric, outLinks: open(fabric.outLinks), inLinks: open(fabric.inLinks) };
}

interface Task {
  nets: readonly StandingNet[];
  budget: number;
  maxNodes: number;
  channels: Int32Array;
  load: Int32Array;
  leastTree(net: StandingNet, barred: readonly number[]): LeastTree | null;
}

interface Branch {
  trees: readonly LeastTree[];
  barred: readonly (readonly number[])[];
  extra: number;
}

/** A way out of a conflict: the net does without the link. */
interface Detour {
  net: number;
  tree: LeastTree;
  increase: number;
}

function routeTogether(task: Task): JointRoute {
  const { nets, budget, maxNodes } = task;
  const trees: LeastTree[] = [];
  for (const net of nets) {
    const tree = task.leastTree(net, []);
    if (!tree) return { kind: 'over' };
    trees.push(tree);
  }
  if (!isOverfull(trees, task.channels, task.load)) return routed(trees, 0);
  // Dearest first, so that the cheapest is at the end; of equally cheap ones the youngest.
  const open: Branch[] = [{ trees, barred: nets.map(() => []), extra: 0 }];
  let nodes = 0;
  for (let branch = open.pop(); branch; branch = open.pop()) {
    if (++nodes > maxNodes) return { kind: 'unknown', extra: branch.extra };
    const conflict = dearestConflict(task, branch);
    if (!conflict) return routed(branch.trees, branch.extra);
    for (const { net, tree, increase } of conflict.detours) {
      const extra = branch.extra + increase;
      if (extra > budget) continue;
      const barred = [...(branch.barred[net] as number[]), conflict.link].sort((x, y) => x - y);
      insert(open, {
        trees: branch.trees.with(net, tree),
        barred: branch.barred.with(net, barred),
        extra,
      });
    }
  }
  return { kind: 'over' };
}

function insert(open: Branch[], branch: Branch): void {
  let low = 0;
  let high = open.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((open[middle] as Branch).extra >= branch.extra) low = middle + 1;
    else high = middle;
  }
  open.splice(low, 0, branch);
}

const routed = (trees: readonly LeastTree[], extra: number): JointRoute => ({
  kind: 'routed',
  extra,
  links: trees.map((tree) => tree.links),
  exact: trees.every((tree) => tree.exact),
});

/** Whether some link carries more nets than it has channels. `load` is a buffer, one entry a link. */
function isOverfull(trees: readonly LeastTree[], channels: Int32Array, load: Int32Array): boolean {
  load.fill(0);
  for (const { links } of trees) {
    for (const link of links) {
      load[link] = (load[link] as number) + 1;
      if ((load[link] as number) > (channels[link] as number)) return true;
    }
  }
  return false;
}

/**
 * The overfull link whose cheapest way out is dearest; its detours with the cheapest last, so that it is tried first.
 * One of any channels + 1 nets on the link has to leave it.
 */
function dearestConflict(
  { nets, channels, leastTree }: Task,
  { trees, barred }: Branch,
): { link: number; detours: Detour[] } | null {
  const users = new Map<number, number[]>();
  trees.forEach((tree, net) => {
    for (const link of tree.links) {
      const list = users.get(link);
      if (list) list.push(net);
      else users.set(link, [net]);
    }
  });
  let worst: { link: number; detours: Detour[]; least: number } | null = null;
  for (const [link, on] of users) {
    const room = channels[link] as number;
    if (on.length <= room) continue;
    const ways = on
      .map((net) => ({
        net,
        tree: leastTree(
          nets[net] as StandingNet,
          [...(barred[net] as number[]), link].sort((x, y) => x - y),
        ),
      }))
      .map(({ net, tree }) => ({
        net,
        tree,
        increase: tree ? increaseOf(tree, trees[net] as LeastTree) : Number.POSITIVE_INFINITY,
      }))
      .sort((x, y) => y.increase - x.increase)
      .slice(0, room + 1);
    const least = Math.min(...ways.map((way) => way.increase));
    if (worst && worst.least >= least) continue;
    const detours = ways.flatMap(({ net, tree, increase }) => (tree ? [{ net, tree, increase }] : []));
    worst = { link, detours, least };
  }
  return worst;
}

/** What is surely lost: between trees that may not be least ones, nothing is. */
const increaseOf = (after: LeastTree, before: LeastTree): number =>
  after.exact && before.exact ? after.cost - before.cost : 0;
