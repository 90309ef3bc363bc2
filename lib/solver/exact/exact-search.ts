/**
 * Exact placement and routing by depth-first branch and bound, level by level: each level asks whether any legal
 * mapping costs at most its cutoff, so the proven bound rises while the search runs, and a low cutoff strikes out most
 * tiles early (iterative deepening on cost: Korf 1985). At a node the dual ascent raises the relaxation's bound; nets
 * whose terminals all stand are routed together exactly, and what that costs more is part of the bound.
 */
import { neighboursOf } from '../bounds/pair-costs';
import type { PlacementInstance } from '../instance';
import { type AscentScratch, ascentScratch, gatherOp, raiseConstant, strikeTile } from './dual-ascent';
import { type JointRouter, jointRouter, type RoutingFabric } from './joint-routing';
import { type NetTightening, netTightening } from './net-tightening';
import { augment, reassignAll } from './reassign';
import { blankRelaxation, copyInto, isPossible, NOBODY, placeInto, type Relaxation } from './relaxation';
import { rootRelaxation, tableEntries } from './root-relaxation';
import { costStep, type NumberedNet, type StandingNets, standingNets } from './standing-nets';
import { fabricSymmetries, kernelSymmetries } from './symmetry';

export interface ExactHooks {
  /** Objective of the best legal mapping so far; Infinity while there is none. Read again and again. */
  incumbent(): number;
  shouldStop(): boolean;
  /** No legal mapping is cheaper than this. Rises. */
  onBound(bound: number): void;
  /**
   * A placement with the links of each net; null where nothing is routed (plain quadratic assignment). False when it is
   * refused after all: then nothing is claimed about it.
   */
  onMapping(tiling: Int32Array, netLinks: readonly (readonly number[])[] | null): boolean;
  onNodes?(nodes: number): void;
}

export interface ExactResult {
  /**
   * `proved`: the incumbent is optimal. `infeasible`: no legal mapping exists. `unresolved`: some placement's routing was
   * too hard to settle. `too large`: not tried.
   */
  kind: 'proved' | 'infeasible' | 'stopped' | 'unresolved' | 'too large';
  /** No legal mapping is cheaper. */
  bound: number;
  nodes: number;
  /** On the last level, some placement was refused because its nets cannot be routed together at that cost. */
  isCongested: boolean;
  /** The levels that were searched through, in their order. */
  levels: readonly ExactLevel[];
  /** Choices of a tile for an op that were struck out because their bound exceeded a cutoff. */
  struckTiles: number;
}

/** No legal mapping costs at most `cutoff`, or the incumbent is the cheapest: what `nodes` nodes have shown. */
export interface ExactLevel {
  cutoff: number;
  nodes: number;
}

/** Entries of all pair tables above which the search is left out: a node keeps its own. */
export const TABLE_ENTRIES_LIMIT = 2_500_000;
const SYMMETRY_LIMIT = 256;
const ROOT_SWEEPS = 40;
const ROOT_LEAST_GAIN = 0.02;
/** At inner nodes: fewer where one costs more, as more nodes then gain more. */
const nodeSweeps = (entries: number): number => (entries < 100_000 ? 6 : entries < 400_000 ? 2 : 1);
const NODE_LEAST_GAIN = 0.2;
/** Conflicts looked at for the nets that stand at an inner node, and for a whole placement. */
const INNER_ROUTE_NODES = 40;
const LEAF_ROUTE_NODES = 20_000;
const CHEAP_LEVEL_NODES = 30;
/** Nodes with more table entries look at the clock each time. */
const SLOW_NODE_ENTRIES = 20_000;
/** With more than this, the ascent looks at it for each op and triple. */
const SLOW_ASCENT_ENTRIES = 400_000;
/** Part of the costs' step that rounding may take: far above it for sums of any size, far below the next cost. */
const MARGIN = 1e-3;

/** What the ops placed so far decide: nets that stand, and the symmetries that leave those ops where they are. */
interface Decided {
  nets: readonly NumberedNet[];
  fabric: readonly Int32Array[];
  kernel: readonly Int32Array[];
}

const NOTHING_DONE = { nodes: 0, isCongested: false, levels: [], struckTiles: 0 } as const;

interface Search {
  instance: PlacementInstance;
  hooks: ExactHooks;
  scratch: AscentScratch;
  router: JointRouter | null;
  nets: StandingNets;
  tightening: NetTightening;
  /** The node of each depth, written over again and again. */
  nodeAt: Relaxation[];
  kept: Int32Array;
  /** Tile of each placed op, −1 for free ones. */
  tileOf: Int32Array;
  /** Pairs of each instance op, before anything is placed. */
  pairCountOf: Int32Array;
  /** All objectives are multiples of it. */
  step: number;
  /** What a cost may exceed the cutoff by, as rounding. */
  margin: number;
  nodes: number;
  stopped: boolean;
  /** The least cutoff at which a placement was met that could be neither routed nor refused. */
  openAt: number;
  isCongested: boolean;
}

/** `fabric` null: nothing is routed. Deterministic, except where `shouldStop` ends it. */
export function exactSearch(
  instance: PlacementInstance,
  fabric: RoutingFabric | null,
  hooks: ExactHooks,
): ExactResult {
  if (tableEntries(instance) > TABLE_ENTRIES_LIMIT) return { kind: 'too large', bound: 0, ...NOTHING_DONE };
  const root = rootRelaxation(instance);
  if (!root) return { kind: 'infeasible', bound: Number.POSITIVE_INFINITY, ...NOTHING_DONE };
  const router = fabric && jointRouter(fabric, instance.objective);
  const step = costStep(instance);
  const search: Search = {
    instance,
    hooks,
    scratch: ascentScratch(instance.opCount, instance.tileCount),
    router,
    nets: standingNets(instance),
    tightening: netTightening(instance, router),
    nodeAt: [],
    kept: new Int32Array(instance.opCount * instance.tileCount),
    tileOf: new Int32Array(instance.opCount).fill(-1),
    pairCountOf: Int32Array.from(neighboursOf(instance), (others) => others.size),
    step,
    margin: MARGIN * step,
    nodes: 0,
    stopped: false,
    openAt: Number.POSITIVE_INFINITY,
    isCongested: false,
  };
  const decided: Decided = {
    nets: [],
    fabric: fabricSymmetries(instance, fabric?.links ?? [], SYMMETRY_LIMIT),
    kernel: closure(kernelSymmetries(instance, SYMMETRY_LIMIT), SYMMETRY_LIMIT),
  };
  return deepen(search, root, decided, dearestCost(instance, fabric));
}

/** Raises the cutoff until nothing below the incumbent is left to try. */
function deepen(search: Search, root: Relaxation, decided: Decided, most: number): ExactResult {
  const { hooks, step, margin } = search;
  const levels: ExactLevel[] = [];
  const result = (kind: ExactResult['kind'], bound: number): ExactResult => ({
    kind,
    bound,
    nodes: search.nodes,
    isCongested: search.isCongested,
    levels,
    struckTiles: search.scratch.struck,
  });
  const wholeBound = (constant: number) => step * Math.ceil((constant - margin) / step);
  const limits = {
    cutoff: Math.min(most, hooks.incumbent()),
    sweeps: ROOT_SWEEPS,
    leastGain: ROOT_LEAST_GAIN,
    shouldStop: hooks.shouldStop,
    onSweep: (constant: number) => hooks.onBound(wholeBound(constant)),
  };
  if (!raiseConstant(root, limits, search.scratch)) {
    const known = hooks.incumbent();
    return Number.isFinite(known) ? result('proved', known) : result('infeasible', Number.POSITIVE_INFINITY);
  }
  let bound = wholeBound(root.constant);
  hooks.onBound(bound);
  let stride = step;
  let before = 0;
  for (;;) {
    const known = hooks.incumbent();
    if (bound >= known - margin) return result('proved', known);
    if (bound > most) return result('infeasible', Number.POSITIVE_INFINITY);
    const cutoff = Math.min(bound + stride - step, known - step, most);
    const startNodes = search.nodes;
    search.isCongested = false;
    copyInto(nodeAt(search, root, 0), root);
    visit(search, 0, cutoff, decided);
    if (search.stopped) return result('stopped', bound);
    if (search.openAt <= cutoff + margin) return result('unresolved', Math.min(bound, hooks.incumbent()));
    levels.push({ cutoff, nodes: search.nodes - startNodes });
    bound = Math.min(cutoff + step, hooks.incumbent());
    hooks.onBound(bound);
    // A level that cost little, or hardly more than the one before, was too low to be worth a pass of its own.
    const visited = search.nodes - startNodes;
    const isCheap = visited < CHEAP_LEVEL_NODES || visited < 3 * before;
    stride = isCheap ? 2 * stride : step * Math.max(1, Math.floor(stride / step / 2));
    before = visited;
  }
}

/** No legal mapping costs more: nets share the fabric's channels, and a path visits no tile twice. */
function dearestCost(
  { objective, pairs, nets, tileCount, distance }: PlacementInstance,
  fabric: RoutingFabric | null,
): number {
  const total = (weights: readonly number[]) => weights.reduce((sum, weight) => sum + weight, 0);
  if (!fabric)
    return total(pairs.map((pair) => pair.weight)) * distance.reduce((most, hops) => Math.max(most, hops), 0);
  if (objective === 'path') return total(pairs.map((pair) => pair.weight)) * Math.max(1, tileCount - 1);
  const channels = total(fabric.links.map((link) => link.channels));
  return Math.max(1, ...nets.map((net) => net.weight)) * channels;
}

function nodeAt({ nodeAt: nodes }: Search, { graph }: Relaxation, depth: number): Relaxation {
  const known = nodes[depth];
  if (known) return known;
  const made = blankRelaxation(graph);
  nodes[depth] = made;
  return made;
}

function visit(search: Search, depth: number, levelCutoff: number, decided: Decided): void {
  const node = search.nodeAt[depth] as Relaxation;
  search.nodes++;
  if (search.nodes % 16 === 0 || node.tables.length > SLOW_NODE_ENTRIES) {
    search.hooks.onNodes?.(search.nodes);
    if (search.hooks.shouldStop()) search.stopped = true;
  }
  if (search.stopped) return;
  const cutoff = Math.min(levelCutoff, search.hooks.incumbent() - search.step);
  if (node.freeCount === 0) {
    settleLeaf(search, decided.nets, cutoff);
    return;
  }
  const extra = standingExtra(search, decided.nets, node.constant, cutoff);
  if (extra === null) return;
  const limits = {
    cutoff: cutoff + search.margin - extra,
    sweeps: nodeSweeps(node.tables.length),
    leastGain: NODE_LEAST_GAIN,
    ...(node.tables.length > SLOW_ASCENT_ENTRIES ? { shouldStop: search.hooks.shouldStop } : {}),
  };
  if (!reassignAll(node, search.scratch) || !raiseConstant(node, limits, search.scratch)) return;
  const op = branchingOp(node, search.pairCountOf);
  if (op < 0 || !gatherOp(node, op, limits.cutoff, search.scratch)) return;
  branch(search, depth, op, levelCutoff, decided);
}

/** What routing the standing nets together costs above their own trees; null where that exceeds the cutoff. */
function standingExtra(
  search: Search,
  standing: readonly NumberedNet[],
  constant: number,
  cutoff: number,
): number | null {
  const slack = cutoff + search.margin - constant;
  if (slack < 0) return null;
  if (!search.router) return 0;
  const nets = [...standing, ...search.nets.openNets(search.tileOf)];
  if (nets.length < 2) return 0;
  const routed = search.router.route(nets, slack, INNER_ROUTE_NODES);
  if (routed.kind === 'over') {
    search.isCongested = true;
    return null;
  }
  return routed.kind === 'unknown' || routed.exact ? routed.extra : 0;
}

/** The op whose choice decides most: few tiles left for the number of its pairs, placed neighbours included. */
function branchingOp(node: Relaxation, pairCountOf: Int32Array): number {
  let chosen = -1;
  let least = Number.POSITIVE_INFINITY;
  for (let f = 0; f < node.freeCount; f++) {
    const op = node.free[f] as number;
    const base = op * node.graph.tileCount;
    let count = 0;
    for (let p = 0; p < (node.domainSize[op] as number); p++) {
      if (isPossible(node, op, node.domain[base + p] as number)) count++;
    }
    if (count === 0) return -1;
    const score = Math.log(count + 0.5) / (1 + (pairCountOf[op] as number));
    if (score < least) {
      least = score;
      chosen = op;
    }
  }
  return chosen;
}

function branch(search: Search, depth: number, op: number, cutoff: number, decided: Decided): void {
  const node = search.nodeAt[depth] as Relaxation;
  const base = op * node.graph.tileCount;
  const costAt = (tile: number) => node.residual[base + tile] as number;
  const tiles = [...node.domain.subarray(base, base + (node.domainSize[op] as number))]
    .filter((tile) => isPossible(node, op, tile))
    .sort((a, b) => costAt(a) - costAt(b) || a - b);
  for (const tile of tiles) {
    if (!isPossible(node, op, tile)) continue;
    if (descend(search, depth, op, tile)) {
      search.tileOf[op] = tile;
      search.tightening.tighten(search.nodeAt[depth + 1] as Relaxation, op, search.tileOf);
      visit(search, depth + 1, cutoff, {
        nets: [...decided.nets, ...search.nets.completedBy(op, search.tileOf)],
        fabric: decided.fabric.filter((image) => image[tile] === tile),
        kernel: decided.kernel.filter((image) => image[op] === op),
      });
      search.tileOf[op] = -1;
      if (search.stopped) return;
    }
    strikeImages(node, op, tile, decided);
  }
}

/** Writes the child with the op on the tile one depth below; false where nothing is left. */
function descend(search: Search, depth: number, op: number, tile: number): boolean {
  const node = search.nodeAt[depth] as Relaxation;
  const child = nodeAt(search, node, depth + 1);
  const mover = node.holderOf[tile] as number;
  const left = node.tileOf[op] as number;
  if (!placeInto(child, node, op, tile, search.kept)) return false;
  if (left === tile) return true;
  // The op leaves a tile that it held; whoever held the new one, an op or nobody, goes where it is cheapest.
  child.holderOf[left] = NOBODY;
  return augment(child, mover, left, search.scratch);
}

/** The op on this tile is searched through, and so is every symmetric choice: none of them need be tried below. */
function strikeImages(node: Relaxation, op: number, tile: number, { fabric, kernel }: Decided): void {
  const tiles = new Set(fabric.map((image) => image[tile] as number));
  const ops = new Set([op, ...kernel.map((image) => image[op] as number)]);
  for (let f = 0; f < node.freeCount; f++) {
    const other = node.free[f] as number;
    if (!ops.has(other)) continue;
    const base = other * node.graph.tileCount;
    for (let p = 0; p < (node.domainSize[other] as number); p++) {
      if (tiles.has(node.domain[base + p] as number)) strikeTile(node, other, p);
    }
  }
}

/** Products of the permutations, breadth first, until there are no more or `limit` of them. */
function closure(images: readonly Int32Array[], limit: number): Int32Array[] {
  const known = new Map(images.map((image) => [image.join(), image]));
  for (const image of known.values()) {
    for (const next of images) {
      if (known.size >= limit) return [...known.values()];
      const product = image.map((to) => next[to] as number);
      const key = product.join();
      if (!known.has(key)) known.set(key, product);
    }
  }
  return [...known.values()];
}

/** All ops stand: routed at its true cost, it is a mapping, or out of the question, or too hard to say. */
function settleLeaf(search: Search, standing: readonly NumberedNet[], cutoff: number): void {
  const { router, hooks, nets, tileOf, instance } = search;
  if (!router) {
    if (nets.pairCost(tileOf) <= cutoff + search.margin && !hooks.onMapping(tileOf.slice(), null))
      leaveOpen(search, cutoff);
    return;
  }
  let cost = 0;
  let exact = true;
  for (const net of standing) {
    const tree = router.tree(net);
    if (!tree) return;
    cost += tree.cost;
    exact &&= tree.exact;
  }
  const budget = cutoff + search.margin - cost;
  if (budget < 0 && exact) return;
  const routed = router.route(standing, Math.max(0, budget), LEAF_ROUTE_NODES);
  if (routed.kind !== 'routed') {
    if (routed.kind === 'over' && exact) search.isCongested = true;
    else leaveOpen(search, cutoff);
    return;
  }
  const links: (readonly number[])[] = instance.nets.map(() => []);
  for (const [i, net] of standing.entries()) links[net.index] = routed.links[i] ?? [];
  const isTaken = hooks.onMapping(tileOf.slice(), links);
  if (!isTaken || !routed.exact) leaveOpen(search, cutoff);
}

const leaveOpen = (search: Search, cutoff: number): void => {
  search.openAt = Math.min(search.openAt, cutoff);
};
