/**
 * Every net with a tree of links while ops move: what the routed annealing prices its moves with.
 *
 * A net's tree grows from its source: the nearest consumer joins by its cheapest path, then the next, in one search
 * (Takahashi and Matsuyama 1980; for `path` a tree of shortest paths, Dijkstra 1959). A full link costs more, by how
 * much the annealing says, so the trees give way to each other while the ops still move. The trees are not always
 * the cheapest; the router has the last word. Deterministic. Memory: 4 bytes × nets × tiles.
 */
import type { PlacementInstance } from '../instance';
import { type TileHeap, tileHeap } from '../routing/tile-heap';
import type { Random } from './random';

export interface SearchLink {
  /** Tile indices. */
  from: number;
  to: number;
  channels: number;
}

export interface RoutedNets {
  instance: PlacementInstance;
  /** Nets that each op feeds or is fed by. */
  netsOfOp: readonly (readonly number[])[];
  /** What each net's tree adds to the objective, with the penalty for paths beyond the clock's limit. */
  length: Float64Array;
  /** Nets beyond the channels, summed over all links. */
  overfull: number;
  /** Other ties between paths of equal length while these differ. */
  tie: Float64Array;
  load: Int32Array;
  /** The tree of net n is tree[n · tileCount …], treeSize[n] links; likewise what was put aside. */
  tree: Int32Array;
  treeSize: Int32Array;
  aside: { tree: Int32Array; size: Int32Array; length: Float64Array };
  links: FlatLinks;
  /** For `path`: how many connections go to each consumer. */
  consumerWeight: readonly Float64Array[];
  search: SearchSpace;
}

interface FlatLinks {
  tail: Int32Array;
  head: Int32Array;
  channels: Int32Array;
  outStart: Int32Array;
  outLinks: Int32Array;
}

/** Scratch space of one search, by tile; stamps say which search an entry belongs to. */
interface SearchSpace {
  stamp: number;
  cost: Float64Array;
  entry: Int32Array;
  depth: Int32Array;
  reached: Int32Array;
  inTree: Int32Array;
  wanted: Int32Array;
  heap: TileHeap;
}

/** For each hop beyond the clock's limit, so that no mapping that breaks it looks good. */
export const EXCESS_HOP_COST = 6;
/** A consumer that no path leads to. */
const NO_PATH_COST = 1000;
/** Far below what a hop costs, even summed over a whole tree. */
const TIE = 1 / 1024;

export function routedNets(instance: PlacementInstance, links: readonly SearchLink[]): RoutedNets {
  const { tileCount, nets } = instance;
  const tiles = () => new Int32Array(tileCount);
  return {
    instance,
    netsOfOp: netsOfOps(instance),
    length: new Float64Array(nets.length),
    overfull: 0,
    tie: new Float64Array(links.length),
    load: new Int32Array(links.length),
    tree: new Int32Array(nets.length * tileCount),
    treeSize: new Int32Array(nets.length),
    aside: {
      tree: new Int32Array(nets.length * tileCount),
      size: new Int32Array(nets.length),
      length: new Float64Array(nets.length),
    },
    links: flatLinks(tileCount, links),
    consumerWeight: consumerWeights(instance),
    search: {
      stamp: 0,
      cost: new Float64Array(tileCount),
      entry: tiles(),
      depth: tiles(),
      reached: tiles(),
      inTree: tiles(),
      wanted: tiles(),
      heap: tileHeap(),
    },
  };
}

function netsOfOps({ opCount, nets }: PlacementInstance): number[][] {
  const lists: number[][] = Array.from({ length: opCount }, () => []);
  nets.forEach(({ source, consumers }, net) => {
    for (const op of [source, ...consumers]) lists[op]?.push(net);
  });
  return lists;
}

function consumerWeights({ nets, pairs }: PlacementInstance): Float64Array[] {
  const weightOf = new Map(pairs.map(({ from, to, weight }) => [`${from}>${to}`, weight]));
  return nets.map(({ source, consumers }) =>
    Float64Array.from(consumers, (op) => weightOf.get(`${source}>${op}`) ?? 1),
  );
}

function flatLinks(tileCount: number, links: readonly SearchLink[]): FlatLinks {
  const byTail: number[][] = Array.from({ length: tileCount }, () => []);
  links.forEach(({ from }, link) => {
    byTail[from]?.push(link);
  });
  const outStart = new Int32Array(tileCount + 1);
  byTail.forEach((list, tile) => {
    outStart[tile + 1] = (outStart[tile] as number) + list.length;
  });
  return {
    tail: Int32Array.from(links, (link) => link.from),
    head: Int32Array.from(links, (link) => link.to),
    channels: Int32Array.from(links, (link) => link.channels),
    outStart,
    outLinks: Int32Array.from(byTail.flat()),
  };
}

/** Takes a net's tree off the links; its `length` stays until it grows again. */
export function liftNet(state: RoutedNets, net: number): void {
  const { tree, load, links } = state;
  const first = net * state.instance.tileCount;
  const end = first + (state.treeSize[net] as number);
  for (let i = first; i < end; i++) {
    const link = tree[i] as number;
    const left = (load[link] as number) - 1;
    load[link] = left;
    if (left >= (links.channels[link] as number)) state.overfull--;
  }
}

function addLoad(state: RoutedNets, link: number): void {
  const before = state.load[link] as number;
  if (before >= (state.links.channels[link] as number)) state.overfull++;
  state.load[link] = before + 1;
}

/** Puts a lifted net's tree aside at a place of the caller's choice. */
export function putAside(state: RoutedNets, net: number, place: number): void {
  const { tileCount } = state.instance;
  const size = state.treeSize[net] as number;
  for (let i = 0; i < size; i++) {
    state.aside.tree[place * tileCount + i] = state.tree[net * tileCount + i] as number;
  }
  state.aside.size[place] = size;
  state.aside.length[place] = state.length[net] as number;
}

/** Lays the tree that was put aside onto the links again. */
export function takeBack(state: RoutedNets, net: number, place: number): void {
  const { tileCount } = state.instance;
  const size = state.aside.size[place] as number;
  for (let i = 0; i < size; i++) {
    const link = state.aside.tree[place * tileCount + i] as number;
    state.tree[net * tileCount + i] = link;
    addLoad(state, link);
  }
  state.treeSize[net] = size;
  state.length[net] = state.aside.length[place] as number;
}

export function shuffleTies({ tie }: RoutedNets, random: Random): void {
  for (let link = 0; link < tie.length; link++) tie[link] = (random.below(64) / 64) * TIE;
}

/** Link indices of every net's tree. */
export function treesOf({ instance, tree, treeSize }: RoutedNets): number[][] {
  const { tileCount } = instance;
  return instance.nets.map((_, net) => [
    ...tree.subarray(net * tileCount, net * tileCount + (treeSize[net] as number)),
  ]);
}

/** Gives a lifted net a new tree; each net beyond a link's channels costs `overfullCost`. */
export function growNet(state: RoutedNets, net: number, tiling: Int32Array, overfullCost: number): void {
  const { instance, search } = state;
  const { source, consumers, weight } = instance.nets[net] as PlacementInstance['nets'][number];
  const isPath = instance.objective === 'path';
  const { cost, wanted, heap } = search;
  const stamp = ++search.stamp;
  const start = tiling[source] as number;
  state.treeSize[net] = 0;
  for (let k = 0; k < consumers.length; k++) wanted[tiling[consumers[k] as number] as number] = stamp;
  search.inTree[start] = stamp;
  search.reached[start] = stamp;
  search.depth[start] = 0;
  cost[start] = 0;
  heap.clear();
  heap.push(start, 0);
  let open = consumers.length;
  for (let tile = heap.pop(); tile >= 0; tile = heap.pop()) {
    if (heap.lastCost() > (cost[tile] as number)) continue;
    if (wanted[tile] === stamp) {
      wanted[tile] = 0;
      attach(state, net, tile);
      if (--open === 0) break;
      // The path's tiles, this one too, come back at cost 0.
      if (!isPath) continue;
    }
    relax(state, tile, weight, overfullCost);
  }
  state.length[net] = treeLength(state, net, tiling, open);
}

function relax(
  { links, search, load, tie }: RoutedNets,
  tile: number,
  hop: number,
  overfullCost: number,
): void {
  const { cost, reached, inTree, entry, heap, stamp } = search;
  const so = (cost[tile] as number) + hop;
  const end = links.outStart[tile + 1] as number;
  for (let i = links.outStart[tile] as number; i < end; i++) {
    const link = links.outLinks[i] as number;
    const head = links.head[link] as number;
    if (inTree[head] === stamp) continue;
    const over = (load[link] as number) + 1 - (links.channels[link] as number);
    const next = so + (tie[link] as number) + (over > 0 ? overfullCost * over : 0);
    if (reached[head] === stamp && next >= (cost[head] as number)) continue;
    reached[head] = stamp;
    cost[head] = next;
    entry[head] = link;
    heap.push(head, next);
  }
}

/** Joins the path that the search found to a tile to the net's tree. */
function attach(state: RoutedNets, net: number, target: number): void {
  const { links, search, tree, instance } = state;
  const { entry, inTree, depth, cost, heap, stamp } = search;
  const base = net * instance.tileCount;
  const first = state.treeSize[net] as number;
  let size = first;
  for (let tile = target; inTree[tile] !== stamp; ) {
    const link = entry[tile] as number;
    inTree[tile] = stamp;
    tree[base + size++] = link;
    tile = links.tail[link] as number;
  }
  for (let i = size - 1; i >= first; i--) {
    const link = tree[base + i] as number;
    const head = links.head[link] as number;
    depth[head] = (depth[links.tail[link] as number] as number) + 1;
    addLoad(state, link);
    if (instance.objective === 'path') continue;
    cost[head] = 0;
    heap.push(head, 0);
  }
  state.treeSize[net] = size;
}

function treeLength(state: RoutedNets, net: number, tiling: Int32Array, unreached: number): number {
  const { instance, search } = state;
  const { consumers, weight } = instance.nets[net] as PlacementInstance['nets'][number];
  const isPath = instance.objective === 'path';
  let sum = unreached * NO_PATH_COST + (isPath ? 0 : weight * (state.treeSize[net] as number));
  if (!isPath && instance.maxHops === null) return sum;
  const maxHops = instance.maxHops ?? Number.MAX_SAFE_INTEGER;
  const connections = state.consumerWeight[net] as Float64Array;
  for (let k = 0; k < consumers.length; k++) {
    const tile = tiling[consumers[k] as number] as number;
    if (search.inTree[tile] !== search.stamp) continue;
    const hops = search.depth[tile] as number;
    if (isPath) sum += (connections[k] as number) * hops;
    if (hops > maxHops) sum += EXCESS_HOP_COST * (hops - maxHops);
  }
  return sum;
}
