/**
 * Lower bounds from stars: what an op on a tile must at least pay to its neighbours, which need tiles of their own.
 *
 * Proof. For a fixed tile p of op i, the neighbours stand on distinct tiles other than p, so the sum of their pair
 * costs is at least the least assignment of neighbours to candidate tiles. Each pair is in two stars, so half of
 * all stars, chosen by one more assignment of ops to tiles, bounds the whole (Gilmore 1962, Lawler 1963).
 * Wire: every pair of a net's terminals is separated by a tree link at most ⌊t/2⌋·⌈t/2⌉ times in all, so
 * wireHops ≥ Σ undirected pair hops / (⌊t/2⌋·⌈t/2⌉); it is also at least the number of consumers.
 */
import type { PlacementInstance } from '../instance';
import { leastAssignment } from './assignment';
import { neighboursOf, pairCosts, type TileTable, transposed, type WeightedPair } from './pair-costs';

export interface StarBound {
  /** No legal mapping has a smaller objective; Infinity where no placement exists. */
  bound: number;
  /** [op · tileCount + tile]: least sum of the op's pair costs there; Infinity where the op cannot stand. */
  star: Float64Array;
}

/** Cost: `starWork` steps, and one assignment of ops to tiles. */
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

interface Neighbour {
  candidates: readonly number[];
  costs: { weight: number; table: TileTable }[];
}

/** Each op's neighbours with the costs of all pairs to them, the op's own tile first. */
function neighbourCosts(instance: PlacementInstance, pairs: readonly WeightedPair[]): Neighbour[][] {
  const flipped = new Map<TileTable, TileTable>();
  const flip = (table: TileTable): TileTable => {
    const known = flipped.get(table) ?? transposed(table, instance.tileCount);
    flipped.set(table, known);
    return known;
  };
  const groups: Map<number, Neighbour>[] = Array.from({ length: instance.opCount }, () => new Map());
  const add = (op: number, other: number, cost: Neighbour['costs'][number]) => {
    const known = groups[op]?.get(other);
    if (known) known.costs.push(cost);
    else groups[op]?.set(other, { candidates: instance.candidates[other] ?? [], costs: [cost] });
  };
  for (const { a, b, weight, table } of pairs) {
    add(a, b, { weight, table });
    add(b, a, { weight, table: flip(table) });
  }
  return groups.map((group) => [...group.values()]);
}

/** Steps that the stars take, about 5 ns each: costs looked up, and the small assignments. */
export function starWork(instance: PlacementInstance): number {
  return neighboursOf(instance).reduce((sum, others, op) => {
    const lookups = [...others].reduce((all, other) => all + (instance.candidates[other]?.length ?? 0), 0);
    const assignment = others.size ** 2 * Math.min(others.size ** 2, instance.tileCount);
    return sum + (instance.candidates[op]?.length ?? 0) * (lookups + assignment);
  }, 0);
}

function starCosts(instance: PlacementInstance, pairs: readonly WeightedPair[]): Float64Array {
  const { opCount, tileCount, candidates } = instance;
  const star = new Float64Array(opCount * tileCount).fill(Number.POSITIVE_INFINITY);
  neighbourCosts(instance, pairs).forEach((neighbours, op) => {
    for (const p of candidates[op] ?? []) star[op * tileCount + p] = starAt(neighbours, p, tileCount);
  });
  return star;
}

/**
 * The least assignment of d neighbours to tiles. Each needs only its d cheapest tiles: were it on another one, some
 * of these would be free, as the other neighbours hold d − 1 tiles at most.
 */
function starAt(neighbours: readonly Neighbour[], p: number, tileCount: number): number {
  const cheapest = neighbours.map((neighbour) =>
    cheapestTiles(neighbour, p * tileCount, p, neighbours.length),
  );
  if (cheapest.length <= 1)
    return cheapest[0]?.values[0] ?? (cheapest.length === 0 ? 0 : Number.POSITIVE_INFINITY);
  const column = new Map<number, number>();
  for (const { tiles } of cheapest) for (const q of tiles) if (!column.has(q)) column.set(q, column.size);
  const table = new Float64Array(cheapest.length * column.size).fill(Number.POSITIVE_INFINITY);
  cheapest.forEach(({ tiles, values }, row) => {
    tiles.forEach((q, i) => {
      table[row * column.size + (column.get(q) as number)] = values[i] as number;
    });
  });
  const least = leastAssignment(
    cheapest.length,
    column.size,
    (row, j) => table[row * column.size + j] as number,
  );
  return least === null ? Number.POSITIVE_INFINITY : least.cost;
}

/** The `count` tiles with the least finite costs, ascending; fewer where there are no more. */
function cheapestTiles({ candidates, costs }: Neighbour, row: number, p: number, count: number) {
  const tiles: number[] = [];
  const values: number[] = [];
  for (const q of candidates) {
    if (q === p) continue;
    let value = 0;
    for (const { weight, table } of costs) {
      const hops = table[row + q] as number;
      // Also a pair of weight 0 cannot be where there is no way.
      value += hops === Number.POSITIVE_INFINITY ? hops : weight * hops;
    }
    if (value === Number.POSITIVE_INFINITY) continue;
    if (values.length === count && value >= (values[count - 1] as number)) continue;
    let at = values.length === count ? count - 1 : values.length;
    for (; at > 0 && (values[at - 1] as number) > value; at--) {
      values[at] = values[at - 1] as number;
      tiles[at] = tiles[at - 1] as number;
    }
    values[at] = value;
    tiles[at] = q;
  }
  return { tiles, values };
}
