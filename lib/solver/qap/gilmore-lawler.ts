/**
 * The bound of Gilmore (1962) and Lawler (1963) for assignments without forbidden places.
 *
 * With op i on tile p, the other ops stand on distinct other tiles. What they cost with i is at least the scalar
 * product of the weights in falling order with the hops from p in rising order (Hardy, Littlewood and Pólya 1934,
 * theorem 368). Each pair is in two such stars, so half of all stars, chosen by a least assignment of ops to tiles,
 * bounds the whole. Pairs with a fixed op are linear in the other's tile and count in full.
 *
 * The same value as the star bound where hops are symmetric and all pairs are between free ops, for n³ steps instead
 * of n⁵. Where hops are not symmetric, the two directions are bounded apart, which may be weaker.
 */
import { leastAssignment } from '../bounds/assignment';
import type { PlacementInstance } from '../instance';

/**
 * Precondition: an instance of `qapInstance`: objective `path`; ops have all places,
 * but for at most one with a place of its own.
 */
export function gilmoreLawlerBound(instance: PlacementInstance, isSymmetric: boolean): number {
  const { tileCount, distance, candidates } = instance;
  const free = candidates.flatMap((tiles, op) => (tiles.length === 1 ? [] : [op]));
  const tiles = candidates[free[0] ?? -1] ?? [];
  const hops = (p: number, q: number): number => distance[p * tileCount + q] as number;
  const weights = sortedWeights(instance, isSymmetric);
  const leaving = tiles.map((p) => rising(tiles.flatMap((q) => (q === p ? [] : [hops(p, q)]))));
  const arriving = tiles.map((p) => rising(tiles.flatMap((q) => (q === p ? [] : [hops(q, p)]))));
  const linear = linearCosts(instance);
  const starAt = (op: number, column: number): number => {
    const out = productSum(weights.out[op] as number[], leaving[column] as number[]);
    const into = productSum(weights.into[op] as number[], arriving[column] as number[]);
    return (out + into) / 2 + linear(op, tiles[column] as number);
  };
  const table = free.map((op) => tiles.map((_, column) => starAt(op, column)));
  const assigned = leastAssignment(
    free.length,
    tiles.length,
    (row, column) => table[row]?.[column] ?? Number.POSITIVE_INFINITY,
  );
  return assigned?.cost ?? 0;
}

const isFixed = (instance: PlacementInstance, op: number): boolean => instance.candidates[op]?.length === 1;
const fixedTile = (instance: PlacementInstance, op: number): number =>
  (instance.candidates[op] as readonly number[])[0] as number;

/** Weights of each op to and from free ops, falling; all in `out` where both ways cost the same. */
function sortedWeights(instance: PlacementInstance, isSymmetric: boolean) {
  const out: number[][] = Array.from({ length: instance.opCount }, () => []);
  const into: number[][] = Array.from({ length: instance.opCount }, () => []);
  for (const { from, to, weight } of instance.pairs) {
    if (isFixed(instance, from) || isFixed(instance, to)) continue;
    out[from]?.push(weight);
    (isSymmetric ? out : into)[to]?.push(weight);
  }
  for (const list of [...out, ...into]) list.sort((a, b) => b - a);
  return { out, into };
}

/** What an op pays on a tile to fixed ops. */
function linearCosts(instance: PlacementInstance): (op: number, tile: number) => number {
  const { opCount, tileCount, distance } = instance;
  const cost = new Float64Array(opCount * tileCount);
  const add = (op: number, at: (tile: number) => number, weight: number): void => {
    for (let tile = 0; tile < tileCount; tile++) {
      const slot = op * tileCount + tile;
      cost[slot] = (cost[slot] as number) + weight * (distance[at(tile)] as number);
    }
  };
  for (const { from, to, weight } of instance.pairs) {
    if (isFixed(instance, from) === isFixed(instance, to)) continue;
    if (isFixed(instance, to)) add(from, (tile) => tile * tileCount + fixedTile(instance, to), weight);
    else add(to, (tile) => fixedTile(instance, from) * tileCount + tile, weight);
  }
  return (op, tile) => cost[op * tileCount + tile] as number;
}

const rising = (numbers: number[]): number[] => numbers.sort((a, b) => a - b);

function productSum(weights: readonly number[], hops: readonly number[]): number {
  let sum = 0;
  for (let k = 0; k < weights.length; k++) sum += (weights[k] as number) * (hops[k] as number);
  return sum;
}
