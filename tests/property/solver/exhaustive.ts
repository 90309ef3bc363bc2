/**
 * Finds the optimum of tiny cases by trying everything: every placement, every tree of every net, every combination
 * within the channels. Shares nothing with the solver, the router or the verifier but the documents.
 */
import type { Fabric } from '@/lib/fabric/fabric';
import { canHost } from '@/lib/fabric/unit-library';
import type { Kernel } from '@/lib/graph/kernel';
import type { Objective, Pins, Placement } from '@/lib/mapping/mapping';
import type { Weights } from '@/lib/mapping/weights';

interface Link {
  from: string;
  to: string;
  channels: number;
}

/** Links by the rules of the model: preset neighbours, less the removed, plus the added ones. */
function linksOf(fabric: Fabric): Link[] {
  const { rows, cols, topology } = fabric;
  const ids = new Set<string>();
  for (let row = 0; row < rows; row++) {
    for (let col = 0; col < cols; col++) {
      for (const [dr, dc] of [-1, 0, 1].flatMap((r) => [-1, 0, 1].map((c) => [r, c] as const))) {
        if (dr === 0 && dc === 0) continue;
        if (topology !== 'diagonal' && dr !== 0 && dc !== 0) continue;
        let [r, c] = [row + dr, col + dc];
        if (topology === 'torus') [r, c] = [(r + rows) % rows, (c + cols) % cols];
        if (r < 0 || c < 0 || r >= rows || c >= cols || (r === row && c === col)) continue;
        ids.add(`r${row}c${col}>r${r}c${c}`);
      }
    }
  }
  for (const id of fabric.removedLinks) ids.delete(id);
  for (const id of fabric.addedLinks) ids.add(id);
  const channels: Record<string, number> = fabric.linkChannels;
  return [...ids].map((id) => {
    const [from, to] = id.split('>') as [string, string];
    return { from, to, channels: channels[id] ?? fabric.channels };
  });
}

interface Tree {
  links: number[];
  cost: number;
}

/** The least objective over all legal mappings, or null where there is none. */
export function exhaustiveOptimum(
  kernel: Kernel,
  fabric: Fabric,
  pins: Pins,
  objective: Objective,
  weights: Weights = {},
): number | null {
  let best: number | null = null;
  tryEverything(kernel, fabric, pins, objective, weights, (_, leastBelow) => {
    best = leastBelow(best ?? Number.POSITIVE_INFINITY) ?? best;
  });
  return best;
}

/** Every legal placement, op to tile, with the least objective that it can be routed at. */
export function everyPlacement(
  kernel: Kernel,
  fabric: Fabric,
  pins: Pins,
  objective: Objective,
): { placement: Placement; cost: number }[] {
  const found: { placement: Placement; cost: number }[] = [];
  tryEverything(kernel, fabric, pins, objective, {}, (placement, leastBelow) => {
    const cost = leastBelow(Number.POSITIVE_INFINITY);
    if (cost !== null) found.push({ placement: Object.fromEntries(placement) as Placement, cost });
  });
  return found;
}

/** Calls `meet` with each placement that keeps R1 to R4, and what tells its least objective below a number, if any. */
function tryEverything(
  kernel: Kernel,
  fabric: Fabric,
  pins: Pins,
  objective: Objective,
  weights: Weights,
  meet: (placement: ReadonlyMap<string, string>, leastBelow: (below: number) => number | null) => void,
): void {
  const links = linksOf(fabric);
  const { clock } = fabric;
  const limit = clock ? Math.floor((clock.periodPs - clock.entryDelayPs) / clock.hopDelayPs) : links.length;
  const tiles = fabric.units.map((_, i) => `r${Math.floor(i / fabric.cols)}c${i % fabric.cols}`);
  const treesFrom = new Map<string, Map<string, number>[]>();
  for (const tile of tiles) treesFrom.set(tile, everyTree(links, tile, limit));
  const nets = [...new Set(kernel.edges.map((edge) => edge.from))]
    .map((source) => ({ source, edges: kernel.edges.filter((e) => e.from === source && e.to !== source) }))
    .filter((net) => net.edges.length > 0);
  const placement = new Map<string, string>();
  const placeFrom = (next: number): void => {
    const op = kernel.ops[next];
    if (!op) {
      const choices = nets.map(({ source, edges }) => {
        const targets = edges.map((edge) => placement.get(edge.to) as string);
        const trees = usefulTrees(treesFrom.get(placement.get(source) as string) ?? [], links, targets);
        const perTarget = edges.map((edge) => weights.edges?.[edge.id] ?? 1);
        const cost = (tree: DeepTree): number =>
          objective === 'wire'
            ? (weights.nets?.[source] ?? 1) * tree.links.length
            : targets.reduce(
                (sum, target, i) => sum + (perTarget[i] ?? 1) * (tree.depth.get(target) as number),
                0,
              );
        return trees.map((tree) => ({ links: tree.links, cost: cost(tree) })).sort((a, b) => a.cost - b.cost);
      });
      meet(placement, (below) => leastWithinChannels(choices, links, below));
      return;
    }
    tiles.forEach((tile, i) => {
      if ((pins[op.id] ?? tile) !== tile || !canHost(fabric.units[i] ?? null, op.kind)) return;
      if ([...placement.values()].includes(tile)) return;
      placement.set(op.id, tile);
      placeFrom(next + 1);
      placement.delete(op.id);
    });
  };
  placeFrom(0);
}

/** Every tree of links out of a tile with no path beyond the limit, as tile → depth; its links are in `treeLinks`. */
function everyTree(links: readonly Link[], root: string, limit: number): Map<string, number>[] {
  const found = new Map<string, Map<string, number>>();
  const grow = (depth: Map<string, number>, used: readonly number[]): void => {
    const key = [...used].sort((a, b) => a - b).join();
    if (found.has(key)) return;
    found.set(key, depth);
    treeLinks.set(depth, [...used]);
    links.forEach((link, i) => {
      const at = depth.get(link.from);
      if (at === undefined || depth.has(link.to) || at + 1 > limit) return;
      grow(new Map(depth).set(link.to, at + 1), [...used, i]);
    });
  };
  grow(new Map([[root, 0]]), []);
  return [...found.values()];
}
const treeLinks = new WeakMap<Map<string, number>, number[]>();

interface DeepTree {
  links: number[];
  depth: ReadonlyMap<string, number>;
}

/** Trees that reach the targets and end in targets only. */
function usefulTrees(
  trees: readonly Map<string, number>[],
  links: readonly Link[],
  targets: readonly string[],
): DeepTree[] {
  return trees
    .filter((depth) => targets.every((target) => depth.has(target)))
    .flatMap((depth) => {
      const own = treeLinks.get(depth) ?? [];
      const starts = new Set(own.map((i) => links[i]?.from));
      const hasLooseEnd = own.some((i) => {
        const to = links[i]?.to as string;
        return !starts.has(to) && !targets.includes(to);
      });
      return hasLooseEnd ? [] : [{ links: own, depth }];
    });
}

function leastWithinChannels(
  choices: readonly (readonly Tree[])[],
  links: readonly Link[],
  below: number,
): number | null {
  const free = links.map((link) => link.channels);
  let best = below;
  let found: number | null = null;
  const choose = (net: number, cost: number): void => {
    if (cost >= best) return;
    const trees = choices[net];
    if (!trees) {
      best = cost;
      found = cost;
      return;
    }
    for (const tree of trees) {
      if (cost + tree.cost >= best) break;
      if (tree.links.some((link) => free[link] === 0)) continue;
      for (const link of tree.links) free[link] = (free[link] as number) - 1;
      choose(net + 1, cost + tree.cost);
      for (const link of tree.links) free[link] = (free[link] as number) + 1;
    }
  };
  choose(0, 0);
  return found;
}
