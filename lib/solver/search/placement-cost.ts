/**
 * The cost that the search minimises: one term a pair or net, evaluated on the hop table.
 *
 * Path objective: exact without congestion. Wire objective: exact for nets of two terminals everywhere and of
 * three terminals (a median exists: the best meeting tile); above that the shortest of three easy trees, an
 * upper bound of the least tree. Paths beyond the hop limit cost `LIMIT_PENALTY` and their excess.
 */
import { hopsBetween, type PlacementInstance, UNREACHABLE_HOPS, withinReach } from '../instance';

export const LIMIT_PENALTY = 1000;

export interface PlacementCost {
  termCount: number;
  /** Terms that an op takes part in. */
  termsOf: readonly (readonly number[])[];
  /** Ops that share a term with an op, without itself. */
  neighboursOf: readonly (readonly number[])[];
  /** Cost of one term under a tiling. */
  term(term: number, tiling: Int32Array): number;
  total(tiling: Int32Array): number;
}

/** Above this, a net's estimate is one of linear cost. */
const PRIM_TERMINALS = 24;

type Term = { ops: readonly number[]; cost: (tiling: Int32Array) => number };

export function placementCost(instance: PlacementInstance): PlacementCost {
  const terms = [
    ...(instance.objective === 'path' ? pathTerms(instance) : wireTerms(instance)),
    ...(instance.objective === 'wire' ? limitTerms(instance) : []),
  ];
  const termsOf: number[][] = Array.from({ length: instance.opCount }, () => []);
  const neighbours = Array.from({ length: instance.opCount }, () => new Set<number>());
  terms.forEach((term, t) => {
    for (const op of term.ops) {
      termsOf[op]?.push(t);
      for (const other of term.ops) if (other !== op) neighbours[op]?.add(other);
    }
  });
  const costs = terms.map((term) => term.cost);
  const term = (t: number, tiling: Int32Array): number => (costs[t] as Term['cost'])(tiling);
  return {
    termCount: terms.length,
    termsOf,
    neighboursOf: neighbours.map((set) => [...set]),
    term,
    total: (tiling) => {
      let sum = 0;
      for (let t = 0; t < costs.length; t++) sum += term(t, tiling);
      return sum;
    },
  };
}

function pathTerms(instance: PlacementInstance): Term[] {
  const table = costTable(instance, (hops) => hops);
  return instance.pairs.map(({ from, to, weight }) => ({
    ops: [from, to],
    cost: (tiling) =>
      weight * (table[(tiling[from] as number) * instance.tileCount + (tiling[to] as number)] as number),
  }));
}

/** Terms that charge only for paths beyond the limit; none where every path of the fabric is within it. */
function limitTerms(instance: PlacementInstance): Term[] {
  if (instance.distance.every((hops) => withinReach(instance, hops))) return [];
  const table = costTable(instance, () => 0);
  return instance.pairs.map(({ from, to }) => ({
    ops: [from, to],
    cost: (tiling) => table[(tiling[from] as number) * instance.tileCount + (tiling[to] as number)] as number,
  }));
}

function costTable(instance: PlacementInstance, inReach: (hops: number) => number): ArrayLike<number> {
  const limit = instance.maxHops ?? 0;
  if (inReach(1) === 1 && instance.distance.every((hops) => withinReach(instance, hops))) {
    return instance.distance;
  }
  return Float64Array.from(instance.distance, (hops) => {
    if (withinReach(instance, hops)) return inReach(hops);
    return LIMIT_PENALTY + (hops === UNREACHABLE_HOPS ? instance.tileCount : hops - limit);
  });
}

function wireTerms(instance: PlacementInstance): Term[] {
  return instance.nets.map(({ source, consumers, weight }) => {
    const ops = [source, ...consumers];
    const cost = treeEstimate(instance, ops);
    return { ops, cost: weight === 1 ? cost : (tiling) => weight * cost(tiling) };
  });
}

/** Links of a tree from ops[0] to the others. Source of the trunk tree: single-trunk Steiner trees (Soukup 1981). */
function treeEstimate(instance: PlacementInstance, ops: readonly number[]): Term['cost'] {
  const [a, b, c] = ops as [number, number, number];
  const hops = (from: number, to: number): number =>
    Math.min(hopsBetween(instance, from, to), 2 * LIMIT_PENALTY);
  if (ops.length === 2) return (tiling) => hops(tiling[a] as number, tiling[b] as number);
  if (instance.isPlainMesh) {
    if (ops.length === 3) return (tiling) => boundingSpan(instance.cols, ops, tiling);
    const trunks = trunkTree(instance.rows, instance.cols, ops);
    if (ops.length > PRIM_TERMINALS) return trunks;
    const prim = directedPrim(hops, ops);
    return (tiling) => Math.min(prim(tiling), trunks(tiling));
  }
  if (ops.length > PRIM_TERMINALS) return sourceStar(hops, ops);
  if (ops.length > 3) return directedPrim(hops, ops);
  return (tiling) => {
    let best = Number.POSITIVE_INFINITY;
    const [p, q, r] = [tiling[a] as number, tiling[b] as number, tiling[c] as number];
    for (let m = 0; m < instance.tileCount; m++) {
      const length = hops(p, m) + hops(m, q) + hops(m, r);
      if (length < best) best = length;
    }
    return best;
  };
}

/** Each consumer on its own: far above the least tree, but cheap. */
const sourceStar =
  (hops: (from: number, to: number) => number, ops: readonly number[]): Term['cost'] =>
  (tiling) => {
    let sum = 0;
    for (let k = 1; k < ops.length; k++) {
      sum += hops(tiling[ops[0] as number] as number, tiling[ops[k] as number] as number);
    }
    return sum;
  };

function boundingSpan(cols: number, ops: readonly number[], tiling: Int32Array): number {
  let [rowLow, rowHigh, colLow, colHigh] = [0xffff, -1, 0xffff, -1];
  for (const op of ops) {
    const tile = tiling[op] as number;
    const row = Math.floor(tile / cols);
    const col = tile % cols;
    if (row < rowLow) rowLow = row;
    if (row > rowHigh) rowHigh = row;
    if (col < colLow) colLow = col;
    if (col > colHigh) colHigh = col;
  }
  return rowHigh - rowLow + colHigh - colLow;
}

/**
 * The shorter of a horizontal trunk at the median row and a vertical one at the median column. Terminals of one line
 * across the trunk share a branch on each side, so only the farthest counts.
 */
function trunkTree(rows: number, cols: number, ops: readonly number[]): Term['cost'] {
  const rowOf = new Int32Array(ops.length);
  const colOf = new Int32Array(ops.length);
  const rowTrunk = trunk(cols, ops.length);
  const colTrunk = trunk(rows, ops.length);
  return (tiling) => {
    for (let k = 0; k < ops.length; k++) {
      const tile = tiling[ops[k] as number] as number;
      rowOf[k] = Math.floor(tile / cols);
      colOf[k] = tile % cols;
    }
    return Math.min(rowTrunk(colOf, rowOf), colTrunk(rowOf, colOf));
  };
}

/** Length of the trunk along one axis with its branches across; scratch space is kept between calls. */
function trunk(lines: number, count: number): (along: Int32Array, across: Int32Array) => number {
  const sorted = new Int32Array(count);
  const up = new Int32Array(lines);
  const down = new Int32Array(lines);
  return (along, across) => {
    sorted.set(across);
    sorted.sort();
    const at = sorted[count >> 1] as number;
    let low = lines;
    let high = -1;
    let sum = 0;
    for (let k = 0; k < count; k++) {
      const line = along[k] as number;
      up[line] = 0;
      down[line] = 0;
      if (line < low) low = line;
      if (line > high) high = line;
    }
    for (let k = 0; k < count; k++) {
      const line = along[k] as number;
      const off = (across[k] as number) - at;
      if (-off > (up[line] as number)) {
        sum += -off - (up[line] as number);
        up[line] = -off;
      } else if (off > (down[line] as number)) {
        sum += off - (down[line] as number);
        down[line] = off;
      }
    }
    return high - low + sum;
  };
}

/** Joins the nearest op again and again, by the shortest way from an op that is joined already (Prim 1957). */
function directedPrim(hops: (from: number, to: number) => number, ops: readonly number[]): Term['cost'] {
  const count = ops.length;
  const nearest = new Float64Array(count);
  return (tiling) => {
    let sum = 0;
    nearest.fill(Number.POSITIVE_INFINITY);
    let joined = 0;
    for (let step = 1; step < count; step++) {
      nearest[joined] = -1;
      const from = tiling[ops[joined] as number] as number;
      let best = Number.POSITIVE_INFINITY;
      let next = -1;
      for (let k = 1; k < count; k++) {
        if ((nearest[k] as number) < 0) continue;
        const length = hops(from, tiling[ops[k] as number] as number);
        if (length < (nearest[k] as number)) nearest[k] = length;
        if ((nearest[k] as number) < best) {
          best = nearest[k] as number;
          next = k;
        }
      }
      sum += best;
      joined = next;
    }
    return sum;
  };
}
