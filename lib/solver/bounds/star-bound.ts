/**
 * Lower bounds from stars: what an op on a tile must at least pay to its neighbours, which need tiles of their own.
 *
 * Proof. For a fixed tile p of op i, the neighbours stand on distinct tiles other than p, so the sum of their pair
 * costs is at least the least assignment of neighbours to candidate tiles. Each pair is in two stars, so half of
 * all stars, chosen by one more assignment of ops to tiles, bounds the whole (Gilmore 1962, Lawler 1963).
 * Wire: every pair of a net's terminals is separated by a tree link at most ⌊t/2⌋·⌈t/2⌉ times in all, so
 * wireHops ≥ Σ undirected pair hops / (⌊t/2⌋·⌈t/2⌉); it is also at least the number of consumers.
 */
import { type PlacementInstance, UNREACHABLE_HOPS, withinReach } from '../instance';
import { leastAssignment } from './assignment';

export interface WeightedPair {
  a: number;
  b: number;
  /** Cost of the pair with a on tile p and b on tile q; Infinity where that is impossible. */
  cost: (p: number, q: number) => number;
}

export interface StarBound {
  /** No legal mapping has a smaller objective; Infinity where no placement exists. */
  bound: number;
  /** [op · tileCount + tile]: least sum of the op's pair costs there; Infinity where the op cannot stand. */
  star: Float64Array;
}

/** Cost: ops × tiles small assignments, and one of ops to tiles. */
export function starBound(instance: PlacementInstance, pairs = pairCosts(instance)): StarBound {
  const star = starCosts(instance, pairs);
  const { opCount, tileCount } = instance;
  const assigned = leastAssignment(
    opCount,
    tileCount,
    (op, tile) => (star[op * tileCount + tile] as number) / 2,
  );
  const bound =
    assigned === null || !Number.isFinite(assigned.cost) ? Number.POSITIVE_INFINITY : assigned.cost;
  return { bound: Math.max(bound, trivialBound(instance)), star };
}

/** Every pair needs a hop, every net as many links as consumers: distinct ops stand on distinct tiles. */
export function trivialBound(instance: PlacementInstance): number {
  return instance.objective === 'path'
    ? instance.pairs.reduce((sum, pair) => sum + pair.weight, 0)
    : instance.nets.reduce((sum, net) => sum + net.weight * net.consumers.length, 0);
}

/** The objective's pairwise under-estimate. */
export function pairCosts(instance: PlacementInstance): WeightedPair[] {
  const { tileCount, distance } = instance;
  const limit = reachPairs(instance);
  if (instance.objective === 'path') {
    return instance.pairs.map(({ from, to, weight }) => ({
      a: from,
      b: to,
      cost: (p, q) => {
        const hops = distance[p * tileCount + q] as number;
        return withinReach(instance, hops) ? weight * hops : Number.POSITIVE_INFINITY;
      },
    }));
  }
  const undirected = undirectedDistance(instance);
  const wire = instance.nets.flatMap(({ source, consumers, weight }) => {
    const ops = [source, ...consumers];
    const share = weight / (Math.floor(ops.length / 2) * Math.ceil(ops.length / 2));
    return ops.flatMap((a, i) =>
      ops.slice(i + 1).map((b) => ({
        a,
        b,
        cost: (p: number, q: number) => share * (undirected[p * tileCount + q] as number),
      })),
    );
  });
  return [...wire, ...limit];
}

/** Pairs that cost nothing but forbid paths beyond the limit. */
function reachPairs(instance: PlacementInstance): WeightedPair[] {
  const { tileCount, distance } = instance;
  return instance.pairs.map(({ from, to }) => ({
    a: from,
    b: to,
    cost: (p, q) =>
      withinReach(instance, distance[p * tileCount + q] as number) ? 0 : Number.POSITIVE_INFINITY,
  }));
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

function starCosts(instance: PlacementInstance, pairs: readonly WeightedPair[]): Float64Array {
  const { opCount, tileCount, candidates } = instance;
  const star = new Float64Array(opCount * tileCount).fill(Number.POSITIVE_INFINITY);
  const costsTo: Map<number, WeightedPair[]>[] = Array.from({ length: opCount }, () => new Map());
  for (const pair of pairs) {
    const flipped = { a: pair.b, b: pair.a, cost: (p: number, q: number) => pair.cost(q, p) };
    for (const one of [pair, flipped]) {
      const group = costsTo[one.a] as Map<number, WeightedPair[]>;
      group.set(one.b, [...(group.get(one.b) ?? []), one]);
    }
  }
  const allowed = candidates.map((list) => {
    const flags = new Uint8Array(tileCount);
    for (const tile of list) flags[tile] = 1;
    return flags;
  });
  for (let op = 0; op < opCount; op++) {
    const neighbours = [...(costsTo[op] as Map<number, WeightedPair[]>)];
    for (const p of candidates[op] ?? []) {
      const table = neighbours.map(([other, costs]) =>
        Float64Array.from({ length: tileCount }, (_, q) => {
          if (q === p || !allowed[other]?.[q]) return Number.POSITIVE_INFINITY;
          return costs.reduce((sum, one) => sum + one.cost(p, q), 0);
        }),
      );
      const least = leastAssignment(table.length, tileCount, (row, q) => table[row]?.[q] as number);
      star[op * tileCount + p] = least === null ? Number.POSITIVE_INFINITY : least.cost;
    }
  }
  return star;
}
