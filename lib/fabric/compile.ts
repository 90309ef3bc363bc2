/**
 * A fabric as arrays of small integers, for everything that computes on it.
 *
 * Tiles are numbered row by row. Links are numbered tile by tile in the preset's order, then the added ones in
 * the document's order. What the document says in vain (links to tiles outside, doubled or self links) is left
 * out here and reported by `validateFabric`.
 */
import type { Fabric, LinkId, TileId, UnitId } from './fabric';
import { hopDistances } from './hop-distances';
import type { FabricLink, LinkGraph } from './link-graph';
import { maxHops } from './max-hops';
import { linkId, parseLink, parseTile, tileId } from './tiles';
import { presetNeighbours } from './topology';

export interface FabricGraph extends LinkGraph {
  rows: number;
  cols: number;
  tiles: readonly TileId[];
  /** Index of a tile, or −1 where the fabric has no such tile. */
  tileIndex(id: string): number;
  units: readonly (UnitId | null)[];
  linkIndex: ReadonlyMap<LinkId, number>;
  /** Hops between routers, [from · tileCount + to], UNREACHABLE where there is no way. Computed at first use. */
  readonly distance: Uint16Array;
  /** The clock's limit on the hops of a path; null without a clock. */
  maxHops: number | null;
}

/** Compiles a fabric. Cost: one pass over tiles and links; distances only when they are first read. */
export function compileFabric(fabric: Fabric): FabricGraph {
  const { rows, cols } = fabric;
  const tileCount = rows * cols;
  const tiles = Array.from({ length: tileCount }, (_, i) => tileId(Math.floor(i / cols), i % cols));
  const tileIndex = (id: string): number => {
    const at = parseTile(id);
    return at && at.row < rows && at.col < cols ? at.row * cols + at.col : -1;
  };
  const { links, linkIndex } = compileLinks(fabric, tiles, tileIndex);
  const outLinks: number[][] = tiles.map(() => []);
  const inLinks: number[][] = tiles.map(() => []);
  links.forEach((link, i) => {
    outLinks[link.from]?.push(i);
    inLinks[link.to]?.push(i);
  });
  const base = { tileCount, links, outLinks, inLinks };
  let distance: Uint16Array | null = null;
  return {
    ...base,
    rows,
    cols,
    tiles,
    tileIndex,
    units: tiles.map((_, i) => fabric.units[i] ?? null),
    linkIndex,
    get distance() {
      distance ??= hopDistances(base);
      return distance;
    },
    maxHops: maxHops(fabric),
  };
}

function compileLinks(fabric: Fabric, tiles: readonly TileId[], tileIndex: (id: string) => number) {
  const links: FabricLink[] = [];
  const linkIndex = new Map<LinkId, number>();
  const removed = new Set<string>(fabric.removedLinks);
  const channels = new Map<string, number>(Object.entries(fabric.linkChannels));
  const add = (id: LinkId, from: number, to: number) => {
    if (linkIndex.has(id)) return;
    linkIndex.set(id, links.length);
    links.push({ id, from, to, channels: channels.get(id) ?? fabric.channels });
  };
  tiles.forEach((tile, from) => {
    const row = Math.floor(from / fabric.cols);
    for (const to of presetNeighbours(fabric.topology, fabric.rows, fabric.cols, row, from % fabric.cols)) {
      const target = tiles[to];
      if (target === undefined) continue;
      const id = linkId(tile, target);
      if (!removed.has(id)) add(id, from, to);
    }
  });
  for (const id of fabric.addedLinks) {
    const ends = parseLink(id);
    if (!ends) continue;
    const from = tileIndex(ends.from);
    const to = tileIndex(ends.to);
    if (from >= 0 && to >= 0 && from !== to) add(id, from, to);
  }
  return { links, linkIndex };
}
