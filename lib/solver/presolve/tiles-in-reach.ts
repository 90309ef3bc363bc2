/**
 * Where an op may stand if its neighbour stands somewhere in a set: tiles with another tile of the set in reach.
 * Method: breadth-first from all of the set at once, in which every router keeps the two sources that come to it
 * first; two, because a tile of the set must not count itself. Cost: at most two looks at every link.
 */
import type { LinkGraph } from '../../fabric/link-graph';
import { addTile, hasTile, noTiles, type TileSetId, type TileSets } from './tile-sets';

/** Whether paths lead from the set to the tiles, which come `after` it, or from the tiles to the set. */
export type ReachSide = 'after' | 'before';

export interface TilesInReach {
  /** Tiles p for which a path of at most `maxHops` joins p and a tile of the set other than p. */
  of(set: TileSetId, side: ReachSide): TileSetId;
  /** Looks at links so far. */
  steps(): number;
}

type Links = Pick<LinkGraph, 'links' | 'outLinks' | 'inLinks'>;

export function tilesInReach(sets: TileSets, graph: Links, maxHops: number | null): TilesInReach {
  const heads = {
    after: graph.outLinks.map((out) => Int32Array.from(out, (link) => graph.links[link]?.to ?? 0)),
    before: graph.inLinks.map((into) => Int32Array.from(into, (link) => graph.links[link]?.from ?? 0)),
  };
  const known = { after: new Map<TileSetId, TileSetId>(), before: new Map<TileSetId, TileSetId>() };
  const { tileCount } = sets;
  const all = sets.of(Array.from({ length: tileCount }, (_, tile) => tile));
  const first = new Int32Array(tileCount);
  const second = new Int32Array(tileCount);
  // Every router passes on two sources at most.
  const queue = new Int32Array(2 * tileCount);
  const labels = new Int32Array(2 * tileCount);
  let steps = 0;

  const findTwoNearest = (sources: readonly number[], side: ReachSide): void => {
    first.fill(-1);
    second.fill(-1);
    let filled = 0;
    const arrive = (tile: number, source: number) => {
      if (first[tile] === source || second[tile] !== -1) return;
      (first[tile] === -1 ? first : second)[tile] = source;
      queue[filled] = tile;
      labels[filled++] = source;
    };
    for (const source of sources) arrive(source, source);
    let next = 0;
    for (let hops = 0; next < filled && (maxHops === null || hops < maxHops); hops++) {
      for (const end = filled; next < end; next++) {
        const onward = heads[side][queue[next] as number] as Int32Array;
        steps += onward.length;
        for (let i = 0; i < onward.length; i++) arrive(onward[i] as number, labels[next] as number);
      }
    }
  };
  const spread = (set: TileSetId, side: ReachSide): TileSetId => {
    findTwoNearest(sets.tiles(set), side);
    const own = sets.bits(set);
    const inReach = noTiles(tileCount);
    for (let tile = 0; tile < tileCount; tile++) {
      if ((hasTile(own, tile) ? second : first)[tile] !== -1) addTile(inReach, tile);
    }
    return sets.ofBits(inReach);
  };
  const isOpen = (side: ReachSide) => {
    findTwoNearest([0], side);
    return !first.includes(-1);
  };
  /** Without a limit, on a fabric in one piece, everything is in reach of everything else. */
  const isUnbound = maxHops === null && isOpen('after') && isOpen('before');
  return {
    of: (set, side) => {
      if (isUnbound && sets.count(set) > 0) return sets.count(set) > 1 ? all : sets.without(all, set);
      const found = known[side].get(set) ?? spread(set, side);
      known[side].set(set, found);
      return found;
    },
    steps: () => steps,
  };
}
