/** What two ops at least pay together, as tables over their two tiles. */
import { type PlacementInstance, UNREACHABLE_HOPS, withinReach } from '../instance';

/** Costs at [p · tileCount + q]; Infinity where that is impossible. Shared between pairs, never changed. */
export type TileTable = Float64Array;

/** With `a` on tile p and `b` on tile q the pair costs weight · table[p, q]. */
export interface WeightedPair {
  a: number;
  b: number;
  weight: number;
  table: TileTable;
}

/**
 * The objective's pairwise under-estimate, and R7. Path: the hops themselves. Wire: hops between any two terminals
 * of a net, shared out so that no tree costs less; then pairs that cost nothing and forbid paths beyond the limit.
 */
export function pairCosts(instance: PlacementInstance): WeightedPair[] {
  if (instance.objective === 'path') {
    const table = reachTable(instance, (hops) => hops);
    return instance.pairs.map(({ from, to, weight }) => ({ a: from, b: to, weight, table }));
  }
  const undirected = undirectedDistance(instance);
  const wire = instance.nets.flatMap(({ source, consumers, weight }) => {
    const ops = [source, ...consumers];
    const share = weight / (Math.floor(ops.length / 2) * Math.ceil(ops.length / 2));
    return ops.flatMap((a, i) => ops.slice(i + 1).map((b) => ({ a, b, weight: share, table: undirected })));
  });
  if (instance.distance.every((hops) => withinReach(instance, hops))) return wire;
  const table = reachTable(instance, () => 0);
  return [...wire, ...instance.pairs.map(({ from, to }) => ({ a: from, b: to, weight: 1, table }))];
}

/** Asked for several times in one solve; a net of 2,000 terminals has two million pairs. */
const knownNeighbours = new WeakMap<PlacementInstance, readonly ReadonlySet<number>[]>();

/** For each op the others that it has a cost with, for the price of a look at the pairs or nets: no table is made. */
export function neighboursOf(instance: PlacementInstance): readonly ReadonlySet<number>[] {
  const known = knownNeighbours.get(instance) ?? findNeighbours(instance);
  knownNeighbours.set(instance, known);
  return known;
}

function findNeighbours(instance: PlacementInstance): Set<number>[] {
  const neighbours = Array.from({ length: instance.opCount }, () => new Set<number>());
  const terms =
    instance.objective === 'path'
      ? instance.pairs.map(({ from, to }) => [from, to])
      : instance.nets.map(({ source, consumers }) => [source, ...consumers]);
  for (const ops of terms) for (const a of ops) for (const b of ops) if (a !== b) neighbours[a]?.add(b);
  return neighbours;
}

const reachTable = (instance: PlacementInstance, cost: (hops: number) => number): TileTable =>
  Float64Array.from(instance.distance, (hops) =>
    withinReach(instance, hops) ? cost(hops) : Number.POSITIVE_INFINITY,
  );

/** The same costs, seen from the other op. */
export function transposed(table: TileTable, tileCount: number): TileTable {
  const flipped = new Float64Array(table.length);
  for (let p = 0; p < tileCount; p++) {
    for (let q = 0; q < tileCount; q++) flipped[q * tileCount + p] = table[p * tileCount + q] as number;
  }
  return flipped;
}

/**
 * Hops where links may be walked both ways, no more than the hops of any tree between two of its tiles.
 * Where all distances are symmetric they are these; otherwise Floyd and Warshall's method, or the one-hop floor on
 * fabrics too large for it.
 */
export function undirectedDistance(instance: PlacementInstance): Float64Array {
  const { tileCount, distance } = instance;
  const both = new Float64Array(tileCount * tileCount);
  let symmetric = true;
  for (let p = 0; p < tileCount; p++) {
    for (let q = 0; q < tileCount; q++) {
      const there = distance[p * tileCount + q] as number;
      const back = distance[q * tileCount + p] as number;
      if (there !== back) symmetric = false;
      both[p * tileCount + q] = Math.min(there, back);
    }
  }
  if (symmetric) {
    return both.map((hops) => (hops === UNREACHABLE_HOPS ? Number.POSITIVE_INFINITY : hops));
  }
  if (tileCount > 400) return both.map((hops) => Math.min(hops, 1));
  for (let m = 0; m < tileCount; m++) {
    for (let p = 0; p < tileCount; p++) {
      const toMiddle = both[p * tileCount + m] as number;
      if (toMiddle >= UNREACHABLE_HOPS) continue;
      for (let q = 0; q < tileCount; q++) {
        const through = toMiddle + (both[m * tileCount + q] as number);
        if (through < (both[p * tileCount + q] as number)) both[p * tileCount + q] = through;
      }
    }
  }
  return both.map((hops) => (hops >= UNREACHABLE_HOPS ? Number.POSITIVE_INFINITY : hops));
}
