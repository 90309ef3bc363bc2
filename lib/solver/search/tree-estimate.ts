/**
 * About how many links the least tree of a net has: exact for two terminals, and for three where the best meeting
 * tile is looked for; above that the shortest of three easy trees, never below the least.
 */
import { hopsBetween, type PlacementInstance } from '../instance';

export type LengthOf = (tiling: Int32Array) => number;

/** Above this, a net's estimate is one of linear cost. */
const PRIM_TERMINALS = 24;
/** Where no way leads: beyond every length there is. */
const NO_WAY = 2000;

/** For ops, the first being the source: links of a tree to the others. Trunk trees: Soukup 1981. */
export function treeEstimates(instance: PlacementInstance): (ops: readonly number[]) => LengthOf {
  const { rows, cols, isPlainMesh } = instance;
  const hops = (from: number, to: number): number => Math.min(hopsBetween(instance, from, to), NO_WAY);
  const meeting = isPlainMesh ? null : meetingLength(instance.tileCount, hops);
  return (ops) => {
    const [a, b, c] = ops as [number, number, number];
    if (ops.length === 2) return (tiling) => hops(tiling[a] as number, tiling[b] as number);
    if (ops.length === 3) {
      if (!meeting) return boxOfThree(rows, cols, [a, b, c]);
      return (tiling) => meeting(tiling[a] as number, tiling[b] as number, tiling[c] as number);
    }
    if (ops.length > PRIM_TERMINALS) return isPlainMesh ? trunkTree(rows, cols, ops) : sourceStar(hops, ops);
    const prim = directedPrim(hops, ops);
    if (!isPlainMesh) return prim;
    const trunks = trunkTree(rows, cols, ops);
    return (tiling) => Math.min(prim(tiling), trunks(tiling));
  };
}

/** Up to this many tiles, the answer for three tiles is remembered: 4 MB. */
const REMEMBERED_TILES = 128;

/** Links from tile p to q and r by the best meeting tile. Cost: the tiles, once for each three of them. */
function meetingLength(
  tileCount: number,
  hops: (from: number, to: number) => number,
): (p: number, q: number, r: number) => number {
  const measure = (p: number, q: number, r: number): number => {
    let best = Number.POSITIVE_INFINITY;
    for (let m = 0; m < tileCount; m++) {
      const length = hops(p, m) + hops(m, q) + hops(m, r);
      if (length < best) best = length;
    }
    return best;
  };
  if (tileCount > REMEMBERED_TILES) return measure;
  const known = new Uint16Array(tileCount ** 3);
  return (p, q, r) => {
    const at = (p * tileCount + q) * tileCount + r;
    if (known[at] === 0) known[at] = measure(p, q, r);
    return known[at] as number;
  };
}

/** Each consumer on its own: far above the least tree, but cheap. */
const sourceStar =
  (hops: (from: number, to: number) => number, ops: readonly number[]): LengthOf =>
  (tiling) => {
    let sum = 0;
    for (let k = 1; k < ops.length; k++) {
      sum += hops(tiling[ops[0] as number] as number, tiling[ops[k] as number] as number);
    }
    return sum;
  };

/** Half the perimeter of three terminals' box: their least tree on a mesh (Hanan 1966). */
function boxOfThree(rows: number, cols: number, [a, b, c]: readonly [number, number, number]): LengthOf {
  const rowOf = Int32Array.from({ length: rows * cols }, (_, tile) => Math.floor(tile / cols));
  const colOf = Int32Array.from({ length: rows * cols }, (_, tile) => tile % cols);
  return (tiling) => {
    const [p, q, r] = [tiling[a] as number, tiling[b] as number, tiling[c] as number];
    return (
      span(rowOf[p] as number, rowOf[q] as number, rowOf[r] as number) +
      span(colOf[p] as number, colOf[q] as number, colOf[r] as number)
    );
  };
}

function span(a: number, b: number, c: number): number {
  return Math.max(a, b, c) - Math.min(a, b, c);
}

/**
 * The shorter of a horizontal trunk at the median row and a vertical one at the median column. Terminals of one line
 * across the trunk share a branch on each side, so only the farthest counts.
 */
function trunkTree(rows: number, cols: number, ops: readonly number[]): LengthOf {
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
function directedPrim(hops: (from: number, to: number) => number, ops: readonly number[]): LengthOf {
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
