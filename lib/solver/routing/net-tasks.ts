/** What the router has to connect: each net's tiles in a placement, partial ones included. */
import type { FabricGraph } from '../../fabric/compile';
import type { EdgeId, Kernel, OpId } from '../../graph/kernel';
import { netsOf } from '../../graph/nets';
import type { Placement } from '../../mapping/mapping';
import { hopsFromTile } from './link-tree';

export interface NetTask {
  source: OpId;
  sourceTile: number;
  /** Distinct tiles of placed consumers that can be reached, without the source's own. */
  targets: number[];
  /** The connections to these, with their consumer's tile. */
  edges: { id: EdgeId; tile: number }[];
  /** Connections to placed consumers that no path leads to. */
  unreachable: EdgeId[];
  /** The most hops that a shortest path to a target has: no tree is shallower. */
  farthestHops: number;
}

/** One task for each net whose source is placed. */
export function netTasks(kernel: Kernel, graph: FabricGraph, placement: Placement): NetTask[] {
  const tileOf = (op: OpId | undefined): number => {
    const tile = op === undefined ? undefined : placement[op];
    return tile === undefined ? -1 : graph.tileIndex(tile);
  };
  const consumerOf = new Map(kernel.edges.map((edge) => [edge.id, edge.to]));
  const tasks: NetTask[] = [];
  for (const net of netsOf(kernel)) {
    const sourceTile = tileOf(net.source);
    if (sourceTile < 0) continue;
    const hops = hopsFromTile(graph, sourceTile);
    const placed = net.edges
      .map((id) => ({ id, tile: tileOf(consumerOf.get(id)) }))
      .filter(({ tile }) => tile >= 0 && tile !== sourceTile);
    const edges = placed.filter(({ tile }) => (hops[tile] ?? -1) >= 0);
    tasks.push({
      source: net.source,
      sourceTile,
      targets: [...new Set(edges.map(({ tile }) => tile))],
      edges,
      unreachable: placed.filter(({ tile }) => (hops[tile] ?? -1) < 0).map(({ id }) => id),
      farthestHops: edges.reduce((most, { tile }) => Math.max(most, hops[tile] ?? 0), 0),
    });
  }
  return tasks;
}
