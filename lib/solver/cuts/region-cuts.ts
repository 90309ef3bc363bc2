/**
 * Cuts between the regions where ops can stand, found by flows. A net whose producer and consumer have no tile in common
 * sends one unit from somewhere in the one region to somewhere in the other. If the units of some nets do not all get
 * through, a least cut parts more of these nets than it has channels: its inside holds the region of each such net's
 * producer, its outside that of the consumer.
 *
 * Precondition: every op has a candidate. Nets looked at together: all from one region to another, all that enter a region or leave it, all that enter an op.
 */
import type { FabricGraph } from '../../fabric/compile';
import type { PlacementInstance } from '../instance';
import { addTile, commonTiles, noTiles, type TileSetId, type TileSets } from '../presolve/tile-sets';
import { flowNetwork } from './max-flow';
import { type TileCut, tileCut } from './tile-cut';

/** Arcs made or looked at: about 50 ms. */
const WORK_LIMIT = 5e5;

/** Two regions without a common tile that a net joins. */
interface Demand {
  net: number;
  source: TileSetId;
  target: TileSetId;
}

/** Cuts with too few channels; groups of nets whose flow would exceed the work limit are left out. */
export function regionCuts(
  instance: PlacementInstance,
  graph: FabricGraph,
  sets: TileSets,
  workLimit = WORK_LIMIT,
): TileCut[] {
  const cuts: TileCut[] = [];
  let work = 0;
  for (const demands of groupsOf(instance, sets)) {
    const { starts, ends } = endsOf(demands);
    const arcs = [...starts.keys(), ...ends.keys()].reduce(
      (sum, region) => sum + sets.count(region),
      graph.links.length,
    );
    if (work + arcs > workLimit) continue;
    const { inside, steps } = tooNarrow(demands, graph, sets);
    work += steps + arcs;
    if (inside) cuts.push(tileCut(inside, graph.links));
  }
  return cuts;
}

function groupsOf({ nets, candidates }: PlacementInstance, sets: TileSets): Demand[][] {
  const regions = candidates.map((tiles) => sets.of(tiles));
  const groups = new Map<string, Map<number, Demand>>();
  const add = (key: string, demand: Demand) => {
    const group = groups.get(key);
    if (group) group.set(demand.net, demand);
    else groups.set(key, new Map([[demand.net, demand]]));
  };
  nets.forEach(({ source, consumers }, net) => {
    const from = regions[source] as TileSetId;
    for (const consumer of consumers) {
      const target = regions[consumer] as TileSetId;
      if (commonTiles(sets.bits(from), sets.bits(target)) > 0) continue;
      const demand = { net, source: from, target };
      add(`${from}>${target}`, demand);
      add(`>${target}`, demand);
      add(`${from}>`, demand);
      add(`op ${consumer}`, demand);
    }
  });
  // A single net that does not get through is out of reach, which is known before.
  const groupOf = [...groups.values()]
    .map((group) => [...group.values()])
    .filter((group) => group.length > 1);
  return groupOf.sort((a, b) => b.length - a.length);
}

/** How many of the nets start, and how many end, in each region. */
function endsOf(demands: readonly Demand[]): {
  starts: Map<TileSetId, number>;
  ends: Map<TileSetId, number>;
} {
  const starts = new Map<TileSetId, number>();
  const ends = new Map<TileSetId, number>();
  for (const { source, target } of demands) {
    starts.set(source, (starts.get(source) ?? 0) + 1);
    ends.set(target, (ends.get(target) ?? 0) + 1);
  }
  return { starts, ends };
}

/** The inside of a least cut that is too narrow for the nets, or null where they all get through. */
function tooNarrow(demands: readonly Demand[], graph: FabricGraph, sets: TileSets) {
  const { starts, ends } = endsOf(demands);
  const { tileCount, links } = graph;
  const source = tileCount + starts.size + ends.size;
  const sink = source + 1;
  const network = flowNetwork(sink + 1);
  for (const { from, to, channels } of links) network.join(from, to, channels);
  let node = tileCount;
  for (const [region, nets] of starts) {
    network.join(source, node, nets);
    for (const tile of sets.tiles(region)) network.join(node, tile, nets);
    node++;
  }
  for (const [region, nets] of ends) {
    network.join(node, sink, nets);
    for (const tile of sets.tiles(region)) network.join(tile, node, nets);
    node++;
  }
  const flow = network.maxFlow(source, sink, demands.length);
  if (flow === demands.length) return { inside: null, steps: network.steps() };
  const inside = noTiles(tileCount);
  const side = network.sourceSide();
  for (let tile = 0; tile < tileCount; tile++) if (side[tile] === 1) addTile(inside, tile);
  return { inside, steps: network.steps() };
}
