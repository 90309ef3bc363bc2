/** A fabric's figures at a glance. */
import type { FabricGraph } from './compile';
import type { UnitId } from './fabric';
import { UNREACHABLE } from './hop-distances';
import { countUnits } from './presets';
import { strongParts } from './strong-parts';

export interface FabricStatistics {
  /** PEs of each unit, in order of first appearance. */
  unitCounts: ReadonlyMap<UnitId, number>;
  /** Tiles with a PE. */
  peCount: number;
  /** Directed links. */
  linkCount: number;
  /** Channels of all directed links. */
  channelCount: number;
  /** The longest of the shortest paths between routers that a path joins. */
  diameterHops: number;
  /** Mean shortest path over all ordered pairs of routers that a path joins, each router with itself included. */
  meanHopsIncludingSelf: number;
  /** The same without a router's way to itself; 0 on a single tile. */
  meanHopsExcludingSelf: number;
  /**
   * Channels, both directions together, across the straight middle cut that has fewest; the side with an odd number
   * of lines is cut beside the middle one. 0 on a single tile. An upper bound of the least cut on irregular fabrics.
   */
  bisectionChannels: number;
  /** Ordered pairs of routers that no path joins. */
  unreachablePairs: number;
  /** Groups of routers that reach each other both ways; 1 on a whole fabric. */
  connectedParts: number;
}

/** Computes the figures. Cost: all-pairs distances (computed at first use and kept by the graph). */
export function fabricStatistics(graph: FabricGraph): FabricStatistics {
  const { tileCount, distance } = graph;
  let sum = 0;
  let joined = 0;
  let diameterHops = 0;
  for (const hops of distance) {
    if (hops === UNREACHABLE) continue;
    joined += 1;
    sum += hops;
    if (hops > diameterHops) diameterHops = hops;
  }
  return {
    unitCounts: countUnits(graph.units),
    peCount: graph.units.filter((unit) => unit !== null).length,
    linkCount: graph.links.length,
    channelCount: graph.links.reduce((total, link) => total + link.channels, 0),
    diameterHops,
    meanHopsIncludingSelf: sum / joined,
    meanHopsExcludingSelf: joined > tileCount ? sum / (joined - tileCount) : 0,
    bisectionChannels: bisectionChannels(graph),
    unreachablePairs: tileCount * tileCount - joined,
    connectedParts: strongParts(graph).length,
  };
}

function bisectionChannels(graph: FabricGraph): number {
  const cuts = [
    cut(graph, graph.rows, (tile) => Math.floor(tile / graph.cols)),
    cut(graph, graph.cols, (tile) => tile % graph.cols),
  ].filter((channels) => channels !== null);
  return cuts.length === 0 ? 0 : Math.min(...cuts);
}

/** Channels between the first half of the lines (rows or columns) and the rest; null where there is one line. */
function cut(graph: FabricGraph, lines: number, lineOf: (tile: number) => number): number | null {
  if (lines < 2) return null;
  const half = Math.floor(lines / 2);
  const crossing = graph.links.filter((link) => lineOf(link.from) < half !== lineOf(link.to) < half);
  return crossing.reduce((total, link) => total + link.channels, 0);
}
