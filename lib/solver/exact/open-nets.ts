/**
 * Nets of two consumers of which one is still free: what such a net pays at least for doing without some links, wherever
 * the free consumer goes. A tree of three terminals is three paths from the tile where they meet, so hops without the
 * barred links say it all. The clock is left aside, which can only lower what a net pays.
 */
import type { LinkGraph } from '../../fabric/link-graph';
import { meetingHops } from '../bounds/meeting-hops';

export interface OpenNetCost {
  /** Links more than without the bars, at least. */
  moreLinks: number;
  /** Links on one shortest way to the consumer that stands, each of which the net cannot do without for nothing more. */
  neededLinks: readonly number[];
}

/** Null where the net cannot be routed without the barred links. `openTiles` is told apart by identity. */
export type OpenNetCosts = (
  source: number,
  consumer: number,
  openTiles: readonly number[],
  barred: readonly number[],
) => OpenNetCost | null;

const CACHE_LIMIT = 100_000;
const HOPS_CACHE_LIMIT = 2_000;

export function openNetCosts(fabric: LinkGraph): OpenNetCosts {
  const { tileCount } = fabric;
  const known = new Map<readonly number[], Map<string, OpenNetCost | null>>();
  const hopTables = new Map<string, Float64Array>();

  /** Hops between all tiles without the barred links. */
  const hopsWithout = (barred: readonly number[]): Float64Array => {
    const key = barred.join();
    const found = hopTables.get(key);
    if (found) return found;
    if (hopTables.size >= HOPS_CACHE_LIMIT) hopTables.clear();
    const made = allHops(fabric, new Set(barred));
    hopTables.set(key, made);
    return made;
  };
  /** Links of the least tree for each tile of the free consumer. */
  const leastTrees = (hops: Float64Array, source: number, consumer: number, openTiles: readonly number[]) =>
    openTiles.map((tile) => meetingHops(hops, tileCount, source, consumer, tile));
  /** The least rise over all tiles that the free consumer can take. */
  const rise = (
    source: number,
    consumer: number,
    openTiles: readonly number[],
    barred: readonly number[],
  ) => {
    const before = leastTrees(hopsWithout([]), source, consumer, openTiles);
    const after = leastTrees(hopsWithout(barred), source, consumer, openTiles);
    let least = Number.POSITIVE_INFINITY;
    for (let i = 0; i < openTiles.length; i++) {
      const tile = openTiles[i];
      if (tile === source || tile === consumer || before[i] === Number.POSITIVE_INFINITY) continue;
      least = Math.min(least, (after[i] as number) - (before[i] as number));
    }
    return least;
  };
  const compute = (
    source: number,
    consumer: number,
    openTiles: readonly number[],
    barred: readonly number[],
  ): OpenNetCost | null => {
    const moreLinks = barred.length === 0 ? 0 : rise(source, consumer, openTiles, barred);
    if (moreLinks === Number.POSITIVE_INFINITY) return null;
    const way = shortestWay(fabric, source, consumer, new Set(barred));
    const neededLinks = way.filter(
      (link) =>
        rise(
          source,
          consumer,
          openTiles,
          [...barred, link].sort((x, y) => x - y),
        ) > moreLinks,
    );
    return { moreLinks, neededLinks };
  };
  return (source, consumer, openTiles, barred) => {
    let ofTiles = known.get(openTiles);
    if (!ofTiles || ofTiles.size >= CACHE_LIMIT) {
      ofTiles = new Map();
      known.set(openTiles, ofTiles);
    }
    const key = `${source}|${consumer}|${barred.join()}`;
    const found = ofTiles.get(key);
    if (found !== undefined) return found;
    const made = compute(source, consumer, openTiles, barred);
    ofTiles.set(key, made);
    return made;
  };
}

function allHops({ tileCount, links, outLinks }: LinkGraph, barred: ReadonlySet<number>): Float64Array {
  const hops = new Float64Array(tileCount * tileCount).fill(Number.POSITIVE_INFINITY);
  for (let source = 0; source < tileCount; source++) {
    const base = source * tileCount;
    hops[base + source] = 0;
    const queue = [source];
    for (const at of queue) {
      for (const link of outLinks[at] ?? []) {
        const next = links[link]?.to as number;
        if (barred.has(link) || hops[base + next] !== Number.POSITIVE_INFINITY) continue;
        hops[base + next] = (hops[base + at] as number) + 1;
        queue.push(next);
      }
    }
  }
  return hops;
}

/** The links of one shortest way; none where there is no way. */
function shortestWay(
  { links, outLinks }: LinkGraph,
  source: number,
  target: number,
  barred: ReadonlySet<number>,
): number[] {
  const entered = new Map<number, number>([[source, -1]]);
  for (const at of entered.keys()) {
    if (at === target) break;
    for (const link of outLinks[at] ?? []) {
      const next = links[link]?.to as number;
      if (!barred.has(link) && !entered.has(next)) entered.set(next, link);
    }
  }
  const way: number[] = [];
  for (let at = target; at !== source; ) {
    const link = entered.get(at);
    if (link === undefined) return [];
    way.push(link);
    at = links[link]?.from as number;
  }
  return way;
}
