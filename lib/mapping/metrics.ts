/** The figures of a mapping, whole or partial: hops, links, units. */
import type { FabricGraph } from '../fabric/compile';
import type { LinkId, UnitId } from '../fabric/fabric';
import type { EdgeId, Kernel, OpId } from '../graph/kernel';
import { netsOf } from '../graph/nets';
import type { Objective, Placement, Routes } from './mapping';
import { weightedSum } from './weighted-sum';
import { edgeWeight, netWeight, type Weights } from './weights';

export interface MappingMetrics {
  /** Links over all nets' trees: a link that serves several consumers of one net counts once. */
  totalWireHops: number;
  /** Links over all connections' paths. */
  totalPathHops: number;
  longestPathHops: number;
  /** The clock's limit; null without a clock. */
  maxHops: number | null;
  /** Links that carry at least one net, of `linkCount` in the fabric. */
  linksUsed: number;
  linkCount: number;
  /** The link with the least room (nets − channels), then the most nets, then the first; null where none is used. */
  fullestLink: { linkId: LinkId; nets: number; channels: number } | null;
  /** Nets on each used link. */
  linkLoads: ReadonlyMap<LinkId, number>;
  /** PEs in use of each unit type of the fabric, in order of first appearance. */
  unitUse: { unit: UnitId; used: number; available: number }[];
  /** Hops of every connection that is routed; an op that feeds itself has 0. */
  connectionHops: ReadonlyMap<EdgeId, number>;
  /** Links of every net's tree, by source op. Nets that are not routed are absent. */
  netWireHops: ReadonlyMap<OpId, number>;
  placedOps: number;
  totalOps: number;
}

interface MappingInput {
  placement: Placement;
  routes: Routes;
}

/**
 * Measures a mapping as far as it goes: ops without a tile and connections without a path are left out of the sums.
 * Links that the fabric does not have are ignored, and a link named twice counts once, so that figures of a broken
 * mapping are still figures; whether it is legal is `verifyMapping`'s to say. Cost: linear in ops, edges and links.
 */
export function measureMapping(
  kernel: Kernel,
  graph: FabricGraph,
  { placement, routes }: MappingInput,
): MappingMetrics {
  const linkLoads = new Map<LinkId, number>();
  const connectionHops = new Map<EdgeId, number>();
  const netWireHops = new Map<OpId, number>();
  const edgesById = new Map(kernel.edges.map((edge) => [edge.id, edge]));
  for (const edge of kernel.edges) if (edge.from === edge.to) connectionHops.set(edge.id, 0);
  for (const net of netsOf(kernel)) {
    const links = linkIndices(graph, routes[net.source] ?? []);
    for (const link of links) {
      const id = graph.links[link]?.id;
      if (id !== undefined) linkLoads.set(id, (linkLoads.get(id) ?? 0) + 1);
    }
    const depth = hopsFrom(graph, links, tileOf(graph, placement, net.source));
    let reached = false;
    for (const edgeId of net.edges) {
      const consumer = edgesById.get(edgeId)?.to;
      const hops = consumer === undefined ? undefined : depth.get(tileOf(graph, placement, consumer));
      if (hops === undefined) continue;
      connectionHops.set(edgeId, hops);
      reached = true;
    }
    if (reached || links.length > 0) netWireHops.set(net.source, links.length);
  }
  const hops = [...connectionHops.values()];
  return {
    totalWireHops: sum(netWireHops.values()),
    totalPathHops: sum(hops),
    longestPathHops: hops.reduce((longest, value) => Math.max(longest, value), 0),
    maxHops: graph.maxHops,
    linksUsed: linkLoads.size,
    linkCount: graph.links.length,
    fullestLink: fullestLink(graph, linkLoads),
    linkLoads,
    unitUse: unitUse(kernel, graph, placement),
    connectionHops,
    netWireHops,
    placedOps: kernel.ops.filter((op) => tileOf(graph, placement, op.id) >= 0).length,
    totalOps: kernel.ops.length,
  };
}

/** What an objective makes of the figures: the sum of weighted hops. */
export function objectiveOf(
  metrics: Pick<MappingMetrics, 'netWireHops' | 'connectionHops'>,
  objective: Objective,
  weights?: Weights,
): number {
  const terms =
    objective === 'wire'
      ? [...metrics.netWireHops].map(([source, hops]) => [netWeight(weights, source), hops] as const)
      : [...metrics.connectionHops].map(([edge, hops]) => [edgeWeight(weights, edge), hops] as const);
  return weightedSum(terms);
}

const sum = (values: Iterable<number>): number => {
  let total = 0;
  for (const value of values) total += value;
  return total;
};

function tileOf(graph: FabricGraph, placement: Placement, op: OpId): number {
  const tile = placement[op];
  return tile === undefined ? -1 : graph.tileIndex(tile);
}

function linkIndices(graph: FabricGraph, route: readonly LinkId[]): number[] {
  const links = new Set<number>();
  for (const id of route) {
    const link = graph.linkIndex.get(id);
    if (link !== undefined) links.add(link);
  }
  return [...links];
}

/** Hops from a tile to every tile that the given links lead to. */
function hopsFrom(graph: FabricGraph, links: readonly number[], start: number): Map<number, number> {
  const depth = new Map<number, number>();
  if (start < 0) return depth;
  const next = new Map<number, number[]>();
  for (const index of links) {
    const link = graph.links[index];
    if (!link) continue;
    const heads = next.get(link.from);
    if (heads) heads.push(link.to);
    else next.set(link.from, [link.to]);
  }
  depth.set(start, 0);
  const queue = [start];
  for (let i = 0; i < queue.length; i++) {
    const tile = queue[i] ?? start;
    const hops = (depth.get(tile) ?? 0) + 1;
    for (const head of next.get(tile) ?? []) {
      if (depth.has(head)) continue;
      depth.set(head, hops);
      queue.push(head);
    }
  }
  return depth;
}

function fullestLink(graph: FabricGraph, loads: ReadonlyMap<LinkId, number>): MappingMetrics['fullestLink'] {
  let fullest: MappingMetrics['fullestLink'] = null;
  for (const link of graph.links) {
    const nets = loads.get(link.id);
    if (nets === undefined) continue;
    const excess = nets - link.channels;
    const best = fullest === null ? Number.NEGATIVE_INFINITY : fullest.nets - fullest.channels;
    if (fullest === null || excess > best || (excess === best && nets > fullest.nets)) {
      fullest = { linkId: link.id, nets, channels: link.channels };
    }
  }
  return fullest;
}

function unitUse(kernel: Kernel, graph: FabricGraph, placement: Placement): MappingMetrics['unitUse'] {
  const taken = new Set(kernel.ops.map((op) => tileOf(graph, placement, op.id)));
  const byUnit = new Map<UnitId, { unit: UnitId; used: number; available: number }>();
  graph.units.forEach((unit, tile) => {
    if (unit === null) return;
    const use = byUnit.get(unit) ?? { unit, used: 0, available: 0 };
    use.available += 1;
    if (taken.has(tile)) use.used += 1;
    byUnit.set(unit, use);
  });
  return [...byUnit.values()];
}
