/**
 * Raises a relaxation's constant: op by op, the costs of an op's pairs are gathered on its tiles by the star
 * assignment of its neighbours, the assignment of ops to tiles takes what all of them pay, and what is left flows back
 * into the pairs for the next op. Tiles whose residual exceeds the slack to the cutoff are struck out.
 *
 * Sources: Gilmore 1962 and Lawler 1963 (stars), Hahn and Grant 1998 (dual ascent by passing reduced costs between the
 * inner assignments and the outer one), here on pairs that cost something only.
 */
import { type AssignmentSolver, assignmentSolver } from '../bounds/assignment';
import { type ReassignScratch, reassign, reassignScratch } from './reassign';
import type { PairTable, Relaxation } from './relaxation';

const EPSILON = 1e-6;

export interface AscentScratch extends ReassignScratch {
  star: AssignmentSolver;
  least: Float64Array;
  leastTile: Int32Array;
  /** Marks the places of a domain that were gathered. */
  gathered: Uint8Array;
  /** Counts the choices of a tile for an op that were struck out because they cost too much. */
  struck: number;
}

export const ascentScratch = (opCount: number, tileCount: number): AscentScratch => ({
  ...reassignScratch(tileCount),
  star: assignmentSolver(Math.max(1, opCount), tileCount),
  least: new Float64Array(opCount),
  leastTile: new Int32Array(opCount),
  gathered: new Uint8Array(tileCount),
  struck: 0,
});

export interface AscentLimits {
  /** A node is of interest only for tilings that cost at most this. */
  cutoff: number;
  sweeps: number;
  /** Sweeps end when one gains less than this. */
  leastGain: number;
}

/** Sweeps forward and backward in turn; false as soon as no tiling within the cutoff is left. */
export function raiseConstant(relaxation: Relaxation, limits: AscentLimits, scratch: AscentScratch): boolean {
  const count = relaxation.ops.length;
  for (let sweep = 0; sweep < limits.sweeps; sweep++) {
    const before = relaxation.constant;
    for (let k = 0; k < count; k++) {
      const op = sweep % 2 === 0 ? k : count - 1 - k;
      if ((relaxation.pairsOf[op] as PairTable[]).length === 0) continue;
      if (!gatherOp(relaxation, op, limits.cutoff, scratch)) return false;
      spreadOp(relaxation, op);
    }
    if (sweep > 0 && relaxation.constant - before < limits.leastGain) break;
  }
  return true;
}

/**
 * Gathers the op's star costs on its tiles, lets the assignment take its share and strikes tiles out. Afterwards the
 * op's residual on a tile is what choosing that tile adds to the constant at least.
 */
export function gatherOp(
  relaxation: Relaxation,
  op: number,
  cutoff: number,
  scratch: AscentScratch,
): boolean {
  const { tileCount, residual } = relaxation;
  const domain = relaxation.domains[op] as Int32Array;
  const base = op * tileCount;
  const { gathered } = scratch;
  for (let p = 0; p < domain.length; p++) {
    const at = base + (domain[p] as number);
    gathered[p] = residual[at] === Number.POSITIVE_INFINITY ? 0 : 1;
    if (gathered[p]) residual[at] = (residual[at] as number) + takeStar(relaxation, op, p, scratch);
  }
  if (!reassign(relaxation, op, scratch)) return false;
  const slack = cutoff + EPSILON - relaxation.constant;
  if (slack < 0) return false;
  for (let p = 0; p < domain.length; p++) {
    if (gathered[p] && (residual[base + (domain[p] as number)] as number) > slack) {
      strikeTile(relaxation, op, p);
      scratch.struck++;
    }
  }
  return true;
}

/** The op cannot stand on the p-th tile of its domain. */
export function strikeTile(relaxation: Relaxation, op: number, p: number): void {
  const tile = (relaxation.domains[op] as Int32Array)[p] as number;
  relaxation.residual[op * relaxation.tileCount + tile] = Number.POSITIVE_INFINITY;
  for (const pair of relaxation.pairsOf[op] as PairTable[]) {
    lowerRow(relaxation, pair, op, p, Number.NEGATIVE_INFINITY, null);
  }
}

/** Takes the star of the op on its p-th tile out of the tables; returns its value. */
function takeStar(relaxation: Relaxation, op: number, p: number, scratch: AscentScratch): number {
  const pairs = relaxation.pairsOf[op] as PairTable[];
  const { tables, domains } = relaxation;
  const { least, leastTile } = scratch;
  let distinct = true;
  let sum = 0;
  for (let r = 0; r < pairs.length; r++) {
    const { a, b, offset } = pairs[r] as PairTable;
    const others = (a === op ? domains[b] : domains[a]) as Int32Array;
    const width = (domains[b] as Int32Array).length;
    const step = a === op ? 1 : width;
    let entry = a === op ? offset + p * width : offset + p;
    let value = Number.POSITIVE_INFINITY;
    let place = -1;
    for (let q = 0; q < others.length; q++, entry += step) {
      if ((tables[entry] as number) < value) {
        value = tables[entry] as number;
        place = q;
      }
    }
    if (place < 0) return Number.POSITIVE_INFINITY;
    const tile = others[place] as number;
    for (let before = 0; before < r; before++) if (leastTile[before] === tile) distinct = false;
    least[r] = value;
    leastTile[r] = tile;
    sum += value;
  }
  if (!distinct) return takeCrowdedStar(relaxation, op, p, scratch);
  if (sum === 0) return 0;
  for (let r = 0; r < pairs.length; r++) {
    if (least[r] !== 0) lowerRow(relaxation, pairs[r] as PairTable, op, p, least[r] as number, null);
  }
  return sum;
}

/** Neighbours want the same tile: the small assignment decides. */
function takeCrowdedStar(relaxation: Relaxation, op: number, p: number, { star }: AscentScratch): number {
  const pairs = relaxation.pairsOf[op] as PairTable[];
  const { tables, domains, tileCount } = relaxation;
  star.cost.fill(Number.POSITIVE_INFINITY, 0, pairs.length * tileCount);
  for (let r = 0; r < pairs.length; r++) {
    const { a, b, offset } = pairs[r] as PairTable;
    const others = (a === op ? domains[b] : domains[a]) as Int32Array;
    const width = (domains[b] as Int32Array).length;
    const step = a === op ? 1 : width;
    let entry = a === op ? offset + p * width : offset + p;
    const base = r * tileCount;
    for (let q = 0; q < others.length; q++, entry += step) {
      star.cost[base + (others[q] as number)] = tables[entry] as number;
    }
  }
  const value = star.solve(pairs.length);
  if (value === Number.POSITIVE_INFINITY || value === 0) return value;
  for (let r = 0; r < pairs.length; r++) {
    lowerRow(relaxation, pairs[r] as PairTable, op, p, star.rowDual[r] as number, star.columnDual);
  }
  return value;
}

/** Takes `by`, and the tiles' duals where given, from the entries of the op's p-th tile. Rounding ends at 0. */
function lowerRow(
  { tables, domains }: Relaxation,
  { a, b, offset }: PairTable,
  op: number,
  p: number,
  by: number,
  tileDual: Float64Array | null,
): void {
  const others = (a === op ? domains[b] : domains[a]) as Int32Array;
  const width = (domains[b] as Int32Array).length;
  const step = a === op ? 1 : width;
  let entry = a === op ? offset + p * width : offset + p;
  for (let q = 0; q < others.length; q++, entry += step) {
    const dual = tileDual ? (tileDual[others[q] as number] as number) : 0;
    const left = (tables[entry] as number) - by - dual;
    tables[entry] = Math.max(left, 0);
  }
}

/** Shares the op's residuals out among its pairs, so that its neighbours can gather them. */
function spreadOp(relaxation: Relaxation, op: number): void {
  const pairs = relaxation.pairsOf[op] as PairTable[];
  const { tileCount, residual } = relaxation;
  const domain = relaxation.domains[op] as Int32Array;
  for (let p = 0; p < domain.length; p++) {
    const at = op * tileCount + (domain[p] as number);
    const whole = residual[at] as number;
    if (whole === 0 || whole === Number.POSITIVE_INFINITY) continue;
    residual[at] = 0;
    const share = whole / pairs.length;
    for (const pair of pairs) lowerRow(relaxation, pair, op, p, -share, null);
  }
}
