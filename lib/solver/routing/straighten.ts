/**
 * Fewer bends at the same length: threads that run straight are easier to follow by eye.
 *
 * Each stretch of a tree between source, branches and consumers is replaced by a stretch of as many hops with fewer
 * turns, where links have room and the rest of the tree is not touched. Hops of every path stay what they are.
 * Cost: for a stretch of k hops about k · (links within k hops).
 */
import type { FabricGraph } from '../../fabric/compile';
import type { LinkLoads } from './link-loads';
import { walkLinks } from './link-tree';
import type { NetTask } from './net-tasks';

/** Longer stretches are left alone: the gain to the eye is not worth the time. */
const LONGEST_STRETCH = 40;

interface Stretch {
  start: number;
  end: number;
  links: number[];
  /** The link before the stretch, or −1 at the source. */
  before: number;
  /** Links that go on from the end. */
  after: number[];
}

/** Straightens the trees in place, but those that `isKept`, and keeps the loads right. */
export function straighten(
  graph: FabricGraph,
  tasks: readonly NetTask[],
  state: { trees: number[][]; loads: LinkLoads },
  isKept: (task: number) => boolean = () => false,
): void {
  tasks.forEach((task, i) => {
    let tree = state.trees[i] ?? [];
    if (tree.length < 2 || isKept(i)) return;
    state.loads.remove(tree);
    for (const end of [...stretchEnds(graph, task, tree)]) {
      const stretch = stretchTo(graph, task, tree, end);
      if (stretch === null || stretch.links.length < 2 || stretch.links.length > LONGEST_STRETCH) continue;
      const better = straighter(graph, tree, stretch, state.loads);
      if (better === null) continue;
      const dropped = new Set(stretch.links);
      tree = [...tree.filter((link) => !dropped.has(link)), ...better].sort((a, b) => a - b);
    }
    state.trees[i] = tree;
    state.loads.add(tree);
  });
}

/** Tiles where a stretch ends: consumers and branches. */
function stretchEnds(graph: FabricGraph, task: NetTask, tree: readonly number[]): Set<number> {
  const leaving = new Map<number, number>();
  for (const link of tree) {
    const from = graph.links[link]?.from ?? -1;
    leaving.set(from, (leaving.get(from) ?? 0) + 1);
  }
  const ends = new Set(task.targets);
  for (const [tile, count] of leaving) if (count > 1 && tile !== task.sourceTile) ends.add(tile);
  return ends;
}

function stretchTo(graph: FabricGraph, task: NetTask, tree: readonly number[], end: number): Stretch | null {
  const ends = stretchEnds(graph, task, tree);
  const { entry } = walkLinks(graph, task.sourceTile, tree);
  const links: number[] = [];
  let tile = end;
  do {
    const link = entry.get(tile);
    if (link === undefined) return null;
    links.push(link);
    tile = graph.links[link]?.from ?? task.sourceTile;
  } while (tile !== task.sourceTile && !ends.has(tile));
  return {
    start: tile,
    end,
    links: links.reverse(),
    before: entry.get(tile) ?? -1,
    after: tree.filter((link) => graph.links[link]?.from === end),
  };
}

/** Rows and columns that a link steps, as one number. */
function direction(graph: FabricGraph, link: number): number {
  const { from, to } = graph.links[link] ?? { from: 0, to: 0 };
  const down = Math.floor(to / graph.cols) - Math.floor(from / graph.cols);
  return down * 256 + ((to % graph.cols) - (from % graph.cols));
}

const turns = (graph: FabricGraph, links: readonly number[]): number =>
  links.reduce((sum, link, i) => {
    const before = links[i - 1];
    return before === undefined || direction(graph, before) === direction(graph, link) ? sum : sum + 1;
  }, 0);

/** Turns of a stretch, with those where it leaves the link before it and where no link after it goes straight on. */
function turnsOf(graph: FabricGraph, stretch: Stretch, links: readonly number[]): number {
  const whole = stretch.before < 0 ? links : [stretch.before, ...links];
  return turns(graph, whole) + turnAtEnd(graph, stretch, links[links.length - 1] ?? -1);
}

function turnAtEnd(graph: FabricGraph, stretch: Stretch, last: number): number {
  if (stretch.after.length === 0) return 0;
  return stretch.after.some((link) => direction(graph, link) === direction(graph, last)) ? 0 : 1;
}

/** A stretch of the same length with fewer turns, or null. Layer by layer: fewest turns to each last link. */
function straighter(
  graph: FabricGraph,
  tree: readonly number[],
  stretch: Stretch,
  loads: LinkLoads,
): number[] | null {
  const now = turnsOf(graph, stretch, stretch.links);
  if (now === 0) return null;
  const length = stretch.links.length;
  const taken = takenTiles(graph, tree, stretch);
  const toEnd = hopsToEnd(graph, stretch, taken, loads);
  let layer = new Map<number, { turns: number; path: number[] }>();
  for (let hop = 0; hop < length; hop++) {
    const next = new Map<number, { turns: number; path: number[] }>();
    const states = hop === 0 ? [{ turns: 0, path: [] as number[] }] : layer.values();
    for (const { turns: sofar, path } of states) {
      const last = path[path.length - 1] ?? stretch.before;
      const tile = hop === 0 ? stretch.start : (graph.links[last]?.to ?? -1);
      for (const link of graph.outLinks[tile] ?? []) {
        if (toEnd.get(graph.links[link]?.to ?? -1) !== length - hop - 1 || !hasRoom(graph, loads, link))
          continue;
        const bend = last >= 0 && direction(graph, last) !== direction(graph, link) ? 1 : 0;
        const known = next.get(link);
        if (known && known.turns <= sofar + bend) continue;
        next.set(link, { turns: sofar + bend, path: [...path, link] });
      }
    }
    layer = next;
  }
  let best: number[] | null = null;
  let fewest = now;
  for (const [link, { turns: count, path }] of layer) {
    const total = count + turnAtEnd(graph, stretch, link);
    if (total >= fewest) continue;
    fewest = total;
    best = path;
  }
  return best;
}

const hasRoom = (graph: FabricGraph, loads: LinkLoads, link: number): boolean =>
  (loads.nets[link] ?? 0) < (graph.links[link]?.channels ?? 0);

/** Routers of the rest of the tree, which the new stretch must not enter. */
function takenTiles(graph: FabricGraph, tree: readonly number[], stretch: Stretch): Set<number> {
  const own = new Set(stretch.links);
  const taken = new Set<number>([stretch.start]);
  for (const link of tree) {
    if (own.has(link)) continue;
    taken.add(graph.links[link]?.to ?? -1);
    taken.add(graph.links[link]?.from ?? -1);
  }
  return taken;
}

/** Hops to the stretch's end from the tiles within its length, over links with room and free routers. */
function hopsToEnd(
  graph: FabricGraph,
  stretch: Stretch,
  taken: ReadonlySet<number>,
  loads: LinkLoads,
): Map<number, number> {
  const hops = new Map<number, number>([[stretch.end, 0]]);
  let front = [stretch.end];
  for (let count = 1; count < stretch.links.length; count++) {
    const next: number[] = [];
    for (const tile of front) {
      for (const link of graph.inLinks[tile] ?? []) {
        const tail = graph.links[link]?.from ?? -1;
        if (hops.has(tail) || taken.has(tail) || !hasRoom(graph, loads, link)) continue;
        hops.set(tail, count);
        next.push(tail);
      }
    }
    front = next;
  }
  return hops;
}
