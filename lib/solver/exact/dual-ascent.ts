/**
 * Raises a relaxation's constant: op by op, the costs of an op's pairs are gathered on its tiles by the star
 * assignment of its neighbours, the assignment of ops to tiles takes what all of them pay, and what is left flows back
 * into the pairs for the next op. Tiles whose residual exceeds the slack to the cutoff are struck out.
 *
 * Sources: Gilmore 1962 and Lawler 1963 (stars), Hahn and Grant 1998 (dual ascent by passing reduced costs between the
 * inner assignments and the outer one), here on the pairs of the cost graph only.
 */
import { type AssignmentSolver, assignmentSolver } from '../bounds/assignment';
import { type ReassignScratch, reassign, reassignScratch } from './reassign';
import type { Relaxation } from './relaxation';
import { passTriples } from './triple-ascent';

const EPSILON = 1e-6;

/** The pairs of one op with free ops, as columns. */
interface Partners {
  count: number;
  /** Where the pair's table begins; how it steps with the op's own tiles and with the other's. */
  start: Int32Array;
  own: Int32Array;
  step: Int32Array;
  /** Tiles of the other op, and where its domain begins. */
  size: Int32Array;
  base: Int32Array;
}

export interface AscentScratch extends ReassignScratch {
  partners: Partners;
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
  partners: {
    count: 0,
    start: new Int32Array(opCount),
    own: new Int32Array(opCount),
    step: new Int32Array(opCount),
    size: new Int32Array(opCount),
    base: new Int32Array(opCount),
  },
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
  /** Asked before each op and triple; a true ends the ascent where it stands, which is valid at any time. */
  shouldStop?: () => boolean;
  /** The constant after each sweep. */
  onSweep?: (constant: number) => void;
}

/** Sweeps forward and backward in turn; false as soon as no tiling within the cutoff is left. */
export function raiseConstant(relaxation: Relaxation, limits: AscentLimits, scratch: AscentScratch): boolean {
  const { free, freeCount, graph } = relaxation;
  const { shouldStop } = limits;
  for (let sweep = 0; sweep < limits.sweeps; sweep++) {
    const before = relaxation.constant;
    if (!passTriples(relaxation, sweep % 2 === 1, limits)) return true;
    for (let k = 0; k < freeCount; k++) {
      const op = free[sweep % 2 === 0 ? k : freeCount - 1 - k] as number;
      if ((graph.pairsOf[op] as Int32Array).length === 0) continue;
      if (shouldStop?.()) return true;
      if (!gatherOp(relaxation, op, limits.cutoff, scratch)) return false;
      spreadOp(relaxation, op, scratch);
    }
    limits.onSweep?.(relaxation.constant);
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
  const { residual, domain, domainSize } = relaxation;
  const base = op * relaxation.graph.tileCount;
  const size = domainSize[op] as number;
  const { gathered } = scratch;
  listPartners(relaxation, op, scratch);
  for (let p = 0; p < size; p++) {
    const at = base + (domain[base + p] as number);
    gathered[p] = residual[at] === Number.POSITIVE_INFINITY ? 0 : 1;
    if (gathered[p]) residual[at] = (residual[at] as number) + takeStar(relaxation, p, scratch);
  }
  if (!reassign(relaxation, op, scratch)) return false;
  const slack = cutoff + EPSILON - relaxation.constant;
  if (slack < 0) return false;
  for (let p = 0; p < size; p++) {
    const tile = domain[base + p] as number;
    if (gathered[p] && (residual[base + tile] as number) > slack) {
      strikeTile(relaxation, op, p);
      scratch.struck++;
    }
  }
  return true;
}

/** The op cannot stand on the p-th tile of its domain. */
export function strikeTile(relaxation: Relaxation, op: number, p: number): void {
  const { graph, domain, domainSize, tables, tableAt } = relaxation;
  const base = op * graph.tileCount;
  relaxation.residual[base + (domain[base + p] as number)] = Number.POSITIVE_INFINITY;
  for (const pair of graph.pairsOf[op] as Int32Array) {
    const start = tableAt[pair] as number;
    if (start === -1) continue;
    const second = graph.second[pair] as number;
    const isFirst = second !== op;
    const width = domainSize[second] as number;
    const count = domainSize[isFirst ? second : (graph.first[pair] as number)] as number;
    const step = isFirst ? 1 : width;
    let entry = isFirst ? start + p * width : start + p;
    for (let q = 0; q < count; q++, entry += step) tables[entry] = Number.POSITIVE_INFINITY;
  }
}

/** The pairs of the op with free ops, and how their tables lie, for the loops that follow. */
function listPartners(relaxation: Relaxation, op: number, { partners }: AscentScratch): void {
  const { graph, domainSize, tableAt } = relaxation;
  let count = 0;
  for (const pair of graph.pairsOf[op] as Int32Array) {
    const start = tableAt[pair] as number;
    if (start === -1) continue;
    const second = graph.second[pair] as number;
    const isFirst = second !== op;
    const other = isFirst ? second : (graph.first[pair] as number);
    const width = domainSize[second] as number;
    partners.start[count] = start;
    partners.base[count] = other * graph.tileCount;
    partners.size[count] = domainSize[other] as number;
    partners.own[count] = isFirst ? width : 1;
    partners.step[count] = isFirst ? 1 : width;
    count++;
  }
  partners.count = count;
}

/** Takes the star of the op on its p-th tile out of the tables; returns its value. */
function takeStar(relaxation: Relaxation, p: number, scratch: AscentScratch): number {
  const { tables, domain } = relaxation;
  const { least, leastTile, partners } = scratch;
  let distinct = true;
  let sum = 0;
  for (let r = 0; r < partners.count; r++) {
    const step = partners.step[r] as number;
    const size = partners.size[r] as number;
    let entry = (partners.start[r] as number) + p * (partners.own[r] as number);
    let value = Number.POSITIVE_INFINITY;
    let place = -1;
    for (let q = 0; q < size; q++, entry += step) {
      if ((tables[entry] as number) < value) {
        value = tables[entry] as number;
        place = q;
      }
    }
    if (place < 0) return Number.POSITIVE_INFINITY;
    const tile = domain[(partners.base[r] as number) + place] as number;
    for (let before = 0; before < r; before++) if (leastTile[before] === tile) distinct = false;
    least[r] = value;
    leastTile[r] = tile;
    sum += value;
  }
  if (!distinct) return takeCrowdedStar(relaxation, p, scratch);
  if (sum === 0) return 0;
  for (let r = 0; r < partners.count; r++) {
    if (least[r] !== 0) lowerRow(relaxation, partners, r, p, least[r] as number, null);
  }
  return sum;
}

/** Neighbours want the same tile: the small assignment decides. */
function takeCrowdedStar(
  { tables, domain, graph: { tileCount } }: Relaxation,
  p: number,
  { star, partners }: AscentScratch,
): number {
  star.cost.fill(Number.POSITIVE_INFINITY, 0, partners.count * tileCount);
  for (let r = 0; r < partners.count; r++) {
    const step = partners.step[r] as number;
    const base = partners.base[r] as number;
    let entry = (partners.start[r] as number) + p * (partners.own[r] as number);
    for (let q = 0; q < (partners.size[r] as number); q++, entry += step) {
      star.cost[r * tileCount + (domain[base + q] as number)] = tables[entry] as number;
    }
  }
  const value = star.solve(partners.count);
  if (value === Number.POSITIVE_INFINITY || value === 0) return value;
  for (let r = 0; r < partners.count; r++) {
    lowerRow({ tables, domain }, partners, r, p, star.rowDual[r] as number, star.columnDual);
  }
  return value;
}

/** Takes `by`, and the tiles' duals where given, from the entries of the op's p-th tile. Rounding ends at 0. */
function lowerRow(
  { tables, domain }: Pick<Relaxation, 'tables' | 'domain'>,
  { start, own, step, size, base }: Partners,
  r: number,
  p: number,
  by: number,
  tileDual: Float64Array | null,
): void {
  const count = size[r] as number;
  const stride = step[r] as number;
  let entry = (start[r] as number) + p * (own[r] as number);
  if (!tileDual) {
    for (let q = 0; q < count; q++, entry += stride) {
      const left = (tables[entry] as number) - by;
      tables[entry] = Math.max(left, 0);
    }
    return;
  }
  const tiles = base[r] as number;
  for (let q = 0; q < count; q++, entry += stride) {
    const left = (tables[entry] as number) - by - (tileDual[domain[tiles + q] as number] as number);
    tables[entry] = Math.max(left, 0);
  }
}

/** Shares the op's residuals out among its pairs, so that its neighbours can gather them. Follows `gatherOp`. */
function spreadOp(relaxation: Relaxation, op: number, { partners }: AscentScratch): void {
  const { residual, domain, domainSize } = relaxation;
  if (partners.count === 0) return;
  const base = op * relaxation.graph.tileCount;
  for (let p = 0; p < (domainSize[op] as number); p++) {
    const at = base + (domain[base + p] as number);
    const whole = residual[at] as number;
    if (whole === 0 || whole === Number.POSITIVE_INFINITY) continue;
    residual[at] = 0;
    const share = whole / partners.count;
    for (let r = 0; r < partners.count; r++) lowerRow(relaxation, partners, r, p, -share, null);
  }
}
