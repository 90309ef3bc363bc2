/**
 * A placement problem as small integers: what search, bounds and integer programs work on.
 * Ops and tiles are indices; pins and units have become lists of candidate tiles.
 */
import type { FabricGraph } from '../fabric/compile';
import { builtInLibrary, canHost, type UnitLibrary } from '../fabric/unit-library';
import type { Kernel, OpId } from '../graph/kernel';
import { netsOf } from '../graph/nets';
import type { OpKind } from '../graph/op-catalog';
import type { Objective, Pins, Placement } from '../mapping/mapping';
import { weightedSum } from '../mapping/weighted-sum';
import { edgeWeight, netWeight, type Weights } from '../mapping/weights';

export const UNREACHABLE_HOPS = 0xffff;

/** All edges from one op to another, joined; the weight is the sum of theirs, 1 each under the objective `wire`. */
export interface PlacedPair {
  from: number;
  to: number;
  weight: number;
}

export interface PlacedNet {
  source: number;
  consumers: readonly number[];
  /** 1 under the objective `path`. */
  weight: number;
}

export interface HopTable {
  tileCount: number;
  rows: number;
  cols: number;
  /** Hops from tile p to tile q at [p · tileCount + q], UNREACHABLE_HOPS where there is no way. */
  distance: Uint16Array;
  maxHops: number | null;
}

export interface PlacementInstance extends HopTable {
  objective: Objective;
  opCount: number;
  /** Tiles that implement the op (R3) and agree with its pin (R4), ascending. */
  candidates: readonly (readonly number[])[];
  pairs: readonly PlacedPair[];
  nets: readonly PlacedNet[];
  /** Every distance is the grid's row distance plus column distance. */
  isPlainMesh: boolean;
}

/** Tile index by op index. */
export type Tiling = Int32Array;

/** Preconditions: a checked problem. Cost: ops × tiles, and tiles² for the test of the mesh. */
export function buildInstance(
  kernel: Kernel,
  graph: FabricGraph,
  pins: Pins,
  objective: Objective,
  library: UnitLibrary = builtInLibrary,
  weights: Weights = {},
): PlacementInstance {
  const index = new Map<OpId, number>(kernel.ops.map((op, i) => [op.id, i]));
  // Ops of one kind share their list.
  const hosts = new Map<OpKind, number[]>();
  const hostsFor = (kind: OpKind): number[] => {
    const known =
      hosts.get(kind) ?? graph.units.flatMap((unit, tile) => (canHost(unit, kind, library) ? [tile] : []));
    hosts.set(kind, known);
    return known;
  };
  const candidates = kernel.ops.map((op) => {
    const pin = pins[op.id];
    if (pin === undefined) return hostsFor(op.kind);
    const pinned = graph.tileIndex(pin);
    return hostsFor(op.kind).includes(pinned) ? [pinned] : [];
  });
  const nets = netsOf(kernel).map((net) => ({
    source: index.get(net.source) as number,
    consumers: net.consumers.map((id) => index.get(id) as number),
    weight: objective === 'wire' ? netWeight(weights, net.source) : 1,
  }));
  const table = {
    tileCount: graph.tileCount,
    rows: graph.rows,
    cols: graph.cols,
    distance: graph.distance,
    maxHops: graph.maxHops,
  };
  return {
    ...table,
    objective,
    opCount: kernel.ops.length,
    candidates,
    pairs: joinPairs(
      kernel.edges.map((edge) => ({
        from: index.get(edge.from) as number,
        to: index.get(edge.to) as number,
        weight: objective === 'path' ? edgeWeight(weights, edge.id) : 1,
      })),
    ),
    nets,
    isPlainMesh: hasMeshDistances(table),
  };
}

/** Pairs with the same ends become one; an op that feeds itself costs nothing and is left out. */
export function joinPairs(pairs: readonly PlacedPair[]): PlacedPair[] {
  const joined = new Map<string, PlacedPair>();
  for (const { from, to, weight } of pairs) {
    if (from === to) continue;
    const key = `${from}>${to}`;
    const known = joined.get(key);
    if (known) known.weight = sumOf(known.weight, weight);
    else joined.set(key, { from, to, weight });
  }
  return [...joined.values()];
}

const sumOf = (...weights: number[]): number => weightedSum(weights.map((weight) => [weight, 1]));

/** Whether all hop counts are grid distances, which also says that every link joins grid neighbours. */
export function hasMeshDistances({ tileCount, cols, distance }: HopTable): boolean {
  for (let p = 0; p < tileCount; p++) {
    const row = Math.floor(p / cols);
    const col = p % cols;
    for (let q = 0; q < tileCount; q++) {
      const grid = Math.abs(Math.floor(q / cols) - row) + Math.abs((q % cols) - col);
      if (distance[p * tileCount + q] !== grid) return false;
    }
  }
  return true;
}

export const hopsBetween = (table: HopTable, from: number, to: number): number =>
  table.distance[from * table.tileCount + to] as number;

/** Whether a path of that many hops exists and is within the clock's limit (R7). */
export const withinReach = (table: HopTable, hops: number): boolean =>
  hops !== UNREACHABLE_HOPS && (table.maxHops === null || hops <= table.maxHops);

export function tilingOf(kernel: Kernel, graph: FabricGraph, placement: Placement): Tiling | null {
  const tiling = new Int32Array(kernel.ops.length);
  for (const [i, op] of kernel.ops.entries()) {
    const tile = placement[op.id];
    const at = tile === undefined ? -1 : graph.tileIndex(tile);
    if (at < 0) return null;
    tiling[i] = at;
  }
  return tiling;
}

export function placementOf(kernel: Kernel, graph: FabricGraph, tiling: ArrayLike<number>): Placement {
  const placement: Placement = {};
  for (const [i, op] of kernel.ops.entries()) {
    const tile = graph.tiles[tiling[i] as number];
    if (tile !== undefined) placement[op.id] = tile;
  }
  return placement;
}
