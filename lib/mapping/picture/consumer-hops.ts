/** The hops that arrive at each op: one entry for each net that it consumes. */
import type { FabricGraph } from '../../fabric/compile';
import type { Kernel, OpId } from '../../graph/kernel';
import { netsOf } from '../../graph/nets';
import type { Placement } from '../mapping';
import type { MappingMetrics } from '../metrics';

export interface ArrivingNet {
  /** Number of the net in the kernel's order. */
  net: number;
  source: OpId;
  hops: number;
}

/** By consumer, in the order of the nets. Connections that are not routed are left out. */
export function consumerHops(
  kernel: Kernel,
  metrics: Pick<MappingMetrics, 'connectionHops'>,
): Map<OpId, ArrivingNet[]> {
  const arriving = new Map<OpId, ArrivingNet[]>();
  const edges = new Map(kernel.edges.map((edge) => [edge.id, edge]));
  netsOf(kernel).forEach(({ source, edges: netEdges }, net) => {
    const told = new Set<OpId>();
    for (const id of netEdges) {
      const edge = edges.get(id);
      const hops = metrics.connectionHops.get(id);
      if (!edge || hops === undefined || told.has(edge.to)) continue;
      told.add(edge.to);
      const there = arriving.get(edge.to);
      if (there) there.push({ net, source, hops });
      else arriving.set(edge.to, [{ net, source, hops }]);
    }
  });
  return arriving;
}

/** Where the numbered knots of a tile sit, in px from the tile's upper left corner. */
export function knotPlaces(count: number, tilePx: number): { x: number; y: number }[] {
  const gap = count <= 1 ? 0 : Math.min(17, (tilePx - 22) / (count - 1));
  return Array.from({ length: count }, (_, i) => ({ x: 13 + i * gap, y: tilePx - 17 }));
}

/** The op on each tile, by tile index. Where two share a tile, the later one in the kernel's order. */
export function opOnTile(kernel: Kernel, graph: FabricGraph, placement: Placement): Map<number, OpId> {
  const found = new Map<number, OpId>();
  for (const op of kernel.ops) {
    const tile = placement[op.id];
    const index = tile === undefined ? -1 : graph.tileIndex(tile);
    if (index >= 0) found.set(index, op.id);
  }
  return found;
}
