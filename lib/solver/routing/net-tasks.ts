/** What the router has to connect: each net's tiles in a placement, partial ones included. */
import type { FabricGraph } from '../../fabric/compile';
import type { EdgeId, Kernel, OpId } from '../../graph/kernel';
import { type Net, netsOf } from '../../graph/nets';
import type { Objective, Placement } from '../../mapping/mapping';
import { edgeWeight, isWeighted, netWeight, type Weights } from '../../mapping/weights';
import { hopsFromTile } from './link-tree';

export interface NetTask {
  source: OpId;
  sourceTile: number;
  /** Distinct tiles of placed consumers that can be reached, without the source's own. */
  targets: number[];
  /** The connections to these, with their consumer's tile, and their weight for `path` as a part of the mean one. */
  edges: { id: EdgeId; tile: number; weight: number }[];
  /** Connections to placed consumers that no path leads to. */
  unreachable: EdgeId[];
  /** The most hops that a shortest path to a target has: no tree is shallower. */
  farthestHops: number;
  /** What a link of the net counts for `wire` against one of another net, as a part of the mean; 1 without weights. */
  weight: number;
}

/** Nothing is free: of two nets that weigh nothing, each is still to be short. */
const LEAST_WEIGHT = 1 / 64;

/** What the nets and connections of a kernel weigh, as parts of the mean. */
interface RelativeWeights {
  ofNet(net: Net): number;
  ofEdge(edge: EdgeId): number;
}

function relativeWeights(nets: readonly Net[], objective: Objective, weights?: Weights): RelativeWeights {
  if (!isWeighted(weights, objective)) return { ofNet: () => 1, ofEdge: () => 1 };
  const mean = (values: readonly number[]) =>
    values.reduce((sum, value) => sum + value, 0) / Math.max(1, values.length) || 1;
  if (objective === 'wire') {
    const whole = mean(nets.map((net) => netWeight(weights, net.source)));
    return {
      ofNet: (net) => Math.max(LEAST_WEIGHT, netWeight(weights, net.source) / whole),
      ofEdge: () => 1,
    };
  }
  const whole = mean(nets.flatMap((net) => net.edges.map((edge) => edgeWeight(weights, edge))));
  return { ofNet: () => 1, ofEdge: (edge) => Math.max(LEAST_WEIGHT, edgeWeight(weights, edge) / whole) };
}

/** One task for each net whose source is placed. */
export function netTasks(
  kernel: Kernel,
  graph: FabricGraph,
  placement: Placement,
  objective: Objective = 'wire',
  weights?: Weights,
): NetTask[] {
  const tileOf = (op: OpId | undefined): number => {
    const tile = op === undefined ? undefined : placement[op];
    return tile === undefined ? -1 : graph.tileIndex(tile);
  };
  const consumerOf = new Map(kernel.edges.map((edge) => [edge.id, edge.to]));
  const tasks: NetTask[] = [];
  const nets = netsOf(kernel);
  const relative = relativeWeights(nets, objective, weights);
  for (const net of nets) {
    const sourceTile = tileOf(net.source);
    if (sourceTile < 0) continue;
    const hops = hopsFromTile(graph, sourceTile);
    const placed = net.edges
      .map((id) => ({ id, tile: tileOf(consumerOf.get(id)), weight: relative.ofEdge(id) }))
      .filter(({ tile }) => tile >= 0 && tile !== sourceTile);
    const edges = placed.filter(({ tile }) => (hops[tile] ?? -1) >= 0);
    tasks.push({
      source: net.source,
      sourceTile,
      targets: [...new Set(edges.map(({ tile }) => tile))],
      edges,
      unreachable: placed.filter(({ tile }) => (hops[tile] ?? -1) < 0).map(({ id }) => id),
      farthestHops: edges.reduce((most, { tile }) => Math.max(most, hops[tile] ?? 0), 0),
      weight: relative.ofNet(net),
    });
  }
  return tasks;
}
