/**
 * A quadratic assignment problem as a placement with the objective `path`: one op a facility, one tile a location,
 * distances as hops. The placement's objective is exact up to a scale and an offset, so bounds carry over too.
 *
 * What makes any two matrices of whole numbers fit, each by an identity over permutations:
 * - where one matrix is symmetric, both directions of the other are added and each pair counts once;
 * - a constant added to all weights, or to all distances between distinct tiles, changes every placement by the same:
 *   so the least weight becomes 0 and the least distance 1, as hops are;
 * - common divisors of weights and of distances are taken out, so that bounds are rounded up to what can occur;
 * - diagonal products that depend on the placement become a pair with one more op that is fixed to one more tile.
 */
import { err, ok, type Result } from '../../result';
import { hopsBetween, type PlacedPair, type PlacementInstance, UNREACHABLE_HOPS } from '../instance';
import type { QapProblem } from './qap';

export interface QapModel {
  instance: PlacementInstance;
  /** value = scale · objective of the instance + offset, exactly. */
  scale: number;
  offset: number;
  /** The hop table is symmetric. */
  isSymmetric: boolean;
  /** Location by facility of a tiling. */
  locationsOf(tiling: ArrayLike<number>): Int32Array;
  /** The tiling of an assignment given as location by facility. */
  tilingOf(locationOf: ArrayLike<number>): Int32Array;
  /** Value of a tiling by way of the instance's pairs. */
  modelValue(tiling: ArrayLike<number>): number;
}

/** Bounds are sums of halves in doubles, so next to exact; objectives of the instance are whole. */
const BOUND_TOLERANCE = 1e-6;

/** The value that no assignment is below, where no objective of the instance is below `bound`. */
export const valueBound = ({ scale, offset }: QapModel, bound: number): number =>
  scale * Math.ceil(bound - BOUND_TOLERANCE) + offset;

type Shape = Pick<QapModel, 'instance' | 'scale' | 'offset' | 'isSymmetric'>;

/** Entries off the diagonal, as the ordered or unordered pairs that count. */
interface Terms {
  weights: PlacedPair[];
  distance: Float64Array;
  isSymmetric: boolean;
}

/**
 * Either matrix may serve as the distances; of those that fit, the one is taken that leaves fewer pairs. Refused with
 * a sentence where neither fits the hop table's 16 bits.
 */
export function qapInstance({ n, flow, distance }: QapProblem): Result<QapModel, string> {
  const asGiven = shapeOf(n, flow, distance);
  const swapped = shapeOf(n, distance, flow);
  const fits = [asGiven, swapped].filter((shape) => shape !== null);
  const [best] = fits.sort((a, b) => a.instance.pairs.length - b.instance.pairs.length);
  if (!best) {
    return err(
      `Both matrices have entries too far apart to be hop counts: the largest less the smallest entry off the diagonal, over their common divisor, may be ${UNREACHABLE_HOPS - 2} in one of them.`,
    );
  }
  /** Ops are facilities, or where the matrices changed places, locations. Its own inverse. */
  const turned = (permutation: Int32Array): Int32Array =>
    best === asGiven ? permutation : inverseOf(permutation);
  const locationsOf = (tiling: ArrayLike<number>): Int32Array => turned(Int32Array.from(tiling).slice(0, n));
  const tilingOf = (locationOf: ArrayLike<number>): Int32Array => {
    const tiling = Int32Array.from(best.instance.candidates.keys());
    tiling.set(turned(Int32Array.from(locationOf)));
    return tiling;
  };
  const { instance, scale, offset } = best;
  const at = (op: number, tiling: ArrayLike<number>): number => tiling[op] as number;
  const modelValue = (tiling: ArrayLike<number>): number =>
    instance.pairs.reduce(
      (sum, { from, to, weight }) =>
        sum + scale * weight * hopsBetween(instance, at(from, tiling), at(to, tiling)),
      offset,
    );
  return ok({ ...best, locationsOf, tilingOf, modelValue });
}

function inverseOf(permutation: Int32Array): Int32Array {
  const inverse = new Int32Array(permutation.length);
  permutation.forEach((to, from) => {
    inverse[to] = from;
  });
  return inverse;
}

/** Null where the distances do not fit. Cost: n². */
function shapeOf(n: number, flow: Float64Array, distance: Float64Array): Shape | null {
  const terms = termsOf(n, flow, distance);
  const diagonal = diagonalTerms(n, flow, distance);
  const weightFloor = least(terms.weights.map((pair) => pair.weight));
  const hops = offDiagonal(n, terms.distance);
  const hopFloor = least(hops);
  const hopSum = hops.reduce((sum, hop) => sum + hop, 0) / (terms.isSymmetric ? 2 : 1);
  const pairs = terms.weights.map((pair) => ({ ...pair, weight: pair.weight - weightFloor }));
  const weightStep = commonDivisor([...pairs.map((pair) => pair.weight), ...diagonal.weight]);
  const hopStep = commonDivisor([...hops.map((hop) => hop - hopFloor), ...diagonal.hop]);
  const hopsOf = (raised: number): number => raised / hopStep + 1;
  const weightSum = pairs.reduce((sum, pair) => sum + pair.weight, 0);
  const fixedSum = diagonal.weight.reduce((sum, weight) => sum + weight, 0);
  if (hops.some((hop) => hopsOf(hop - hopFloor) >= UNREACHABLE_HOPS)) return null;
  if (diagonal.hop.some((hop) => hopsOf(hop) >= UNREACHABLE_HOPS)) return null;
  const tileCount = n + (diagonal.weight.length > 0 ? 1 : 0);
  const table = new Uint16Array(tileCount * tileCount);
  for (let p = 0; p < n; p++) {
    for (let q = 0; q < n; q++) {
      if (p !== q) table[p * tileCount + q] = hopsOf((terms.distance[p * n + q] as number) - hopFloor);
    }
  }
  diagonal.hop.forEach((hop, p) => {
    table[p * tileCount + n] = hopsOf(hop);
    table[n * tileCount + p] = hopsOf(hop);
  });
  const toFixed = diagonal.weight.map((weight, op) => ({ from: op, to: n, weight }));
  const scaled = [...pairs, ...toFixed]
    .filter((pair) => pair.weight !== 0)
    .map((pair) => ({ ...pair, weight: pair.weight / weightStep }));
  return {
    instance: placementInstance(n, tileCount, table, scaled),
    scale: weightStep * hopStep,
    offset: diagonal.offset + weightFloor * hopSum + (hopFloor - hopStep) * weightSum - hopStep * fixedSum,
    isSymmetric: terms.isSymmetric,
  };
}

function termsOf(n: number, flow: Float64Array, distance: Float64Array): Terms {
  const bothWays = isMirrored(n, distance);
  const isSymmetric = bothWays || isMirrored(n, flow);
  const withTransposed = (matrix: Float64Array): Float64Array =>
    matrix.map((entry, at) => entry + (matrix[(at % n) * n + Math.floor(at / n)] as number));
  const counted = bothWays ? withTransposed(flow) : flow;
  const weights: PlacedPair[] = [];
  for (let from = 0; from < n; from++) {
    for (let to = isSymmetric ? from + 1 : 0; to < n; to++) {
      if (from !== to) weights.push({ from, to, weight: counted[from * n + to] as number });
    }
  }
  return { weights, distance: isSymmetric && !bothWays ? withTransposed(distance) : distance, isSymmetric };
}

/**
 * flow[i, i] · distance[p, p] = weight[i] · hop[p] + what is the same for every placement, with weights and hops that
 * are 0 or more. Both lists are empty where one diagonal is constant, as nothing depends on the placement then.
 */
function diagonalTerms(n: number, flow: Float64Array, distance: Float64Array) {
  const flows = diagonalOf(n, flow);
  const distances = diagonalOf(n, distance);
  const [flowFloor, distanceFloor] = [least(flows), least(distances)];
  const weight = flows.map((one) => one - flowFloor);
  const hop = distances.map((one) => one - distanceFloor);
  const offset =
    flowFloor * hop.reduce((sum, one) => sum + one, 0) +
    distanceFloor * flows.reduce((sum, one) => sum + one, 0);
  const isConstant = weight.every((one) => one === 0) || hop.every((one) => one === 0);
  return isConstant ? { weight: [], hop: [], offset } : { weight, hop, offset };
}

function placementInstance(
  n: number,
  tileCount: number,
  distance: Uint16Array,
  pairs: PlacedPair[],
): PlacementInstance {
  const locations = Array.from({ length: n }, (_, tile) => tile);
  return {
    tileCount,
    rows: 1,
    cols: tileCount,
    distance,
    maxHops: null,
    objective: 'path',
    opCount: tileCount,
    candidates: Array.from({ length: tileCount }, (_, op) => (op < n ? locations : [n])),
    pairs,
    nets: [],
    isPlainMesh: false,
  };
}

function isMirrored(n: number, matrix: Float64Array): boolean {
  return matrix.every((entry, at) => entry === matrix[(at % n) * n + Math.floor(at / n)]);
}

const diagonalOf = (n: number, matrix: Float64Array): number[] =>
  Array.from({ length: n }, (_, i) => matrix[i * n + i] as number);

const offDiagonal = (n: number, matrix: Float64Array): number[] =>
  [...matrix].filter((_, at) => Math.floor(at / n) !== at % n);

const least = (numbers: readonly number[]): number =>
  numbers.length === 0 ? 0 : numbers.reduce((low, one) => Math.min(low, one), Number.POSITIVE_INFINITY);

/** Of numbers that are 0 or more; 1 where all are 0 (Euclid). */
function commonDivisor(numbers: readonly number[]): number {
  let divisor = 0;
  for (const one of numbers) {
    let [a, b] = [divisor, one];
    while (b !== 0) [a, b] = [b, a % b];
    divisor = a;
  }
  return divisor === 0 ? 1 : divisor;
}
