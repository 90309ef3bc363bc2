/**
 * Cuts of the fabric worth a look, thinnest first: whole rows and columns on one side, and the least cuts between
 * every two tiles of a small fabric (Gomory and Hu 1961, in the form of Gusfield 1990).
 */
import type { FabricGraph } from '../../fabric/compile';
import { addTile, noTiles } from '../presolve/tile-sets';
import { flowNetwork } from './max-flow';
import { type TileCut, tileCut } from './tile-cut';

/** Tiles above which least cuts between all tiles would take more than about 10 ms. */
const TREE_TILES_LIMIT = 144;

export function fabricCuts(graph: FabricGraph): TileCut[] {
  const sides = [...prefixes(graph), ...(graph.tileCount <= TREE_TILES_LIMIT ? leastCutSides(graph) : [])];
  const different = new Map(sides.map((inside) => [inside.join(), inside]));
  return [...different.values()]
    .map((inside) => tileCut(inside, graph.links))
    .sort((a, b) => a.channelsOut + a.channelsIn - b.channelsOut - b.channelsIn);
}

function prefixes({ rows, cols, tileCount }: FabricGraph): Uint32Array[] {
  const where = (isInside: (row: number, col: number) => boolean): Uint32Array => {
    const inside = noTiles(tileCount);
    for (let tile = 0; tile < tileCount; tile++) {
      if (isInside(Math.floor(tile / cols), tile % cols)) addTile(inside, tile);
    }
    return inside;
  };
  return [
    ...Array.from({ length: rows - 1 }, (_, last) => where((row) => row <= last)),
    ...Array.from({ length: cols - 1 }, (_, last) => where((_row, col) => col <= last)),
  ];
}

/** For every two tiles one of these is a least cut between them, channels counted both ways. One flow a tile. */
function leastCutSides({ tileCount, links }: FabricGraph): Uint32Array[] {
  const network = flowNetwork(tileCount);
  for (const { from, to, channels } of links) network.join(from, to, channels, channels);
  const towards = new Int32Array(tileCount);
  const sides: Uint32Array[] = [];
  for (let tile = 1; tile < tileCount; tile++) {
    const other = towards[tile] as number;
    network.maxFlow(tile, other);
    const side = network.sourceSide();
    for (let later = tile + 1; later < tileCount; later++) {
      if (side[later] === 1 && towards[later] === other) towards[later] = tile;
    }
    const size = side.reduce((sum, is) => sum + is, 0);
    // What a single tile's links allow, the candidates tell already.
    if (size < 2 || size > tileCount - 2) continue;
    const inside = noTiles(tileCount);
    side.forEach((is, at) => {
      if (is === 1) addTile(inside, at);
    });
    sides.push(inside);
  }
  return sides;
}
