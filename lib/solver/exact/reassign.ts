/**
 * Repairs the cheapest assignment of free ops to tiles after costs have risen, and moves what it gains into the
 * relaxation's constant. Tiles that no op needs are held by "nobody" at their empty cost, so that the assignment is
 * one of equalities and no cost is lost when an op moves away.
 *
 * Method: one shortest augmenting path (Dijkstra on reduced costs; Jonker and Volgenant 1987), from the op without a
 * tile to the tile without a holder.
 */
import { NOBODY, type Relaxation } from './relaxation';

export interface ReassignScratch {
  slack: Float64Array;
  /** The op (or NOBODY) from which a tile was reached. */
  via: Int32Array;
  settled: Uint8Array;
}

export const reassignScratch = (tileCount: number): ReassignScratch => ({
  slack: new Float64Array(tileCount),
  via: new Int32Array(tileCount),
  settled: new Uint8Array(tileCount),
});

/** Below this a residual counts as 0: rounding, far from the costs' granularity. */
export const ROUNDING = 1e-9;

/** Restores the assignment for every op; false where none exists. */
export function reassignAll(relaxation: Relaxation, scratch: ReassignScratch): boolean {
  const { free, freeCount, tileOf, residual, graph } = relaxation;
  for (let f = 0; f < freeCount; f++) {
    const op = free[f] as number;
    if ((residual[op * graph.tileCount + (tileOf[op] as number)] as number) > ROUNDING) {
      if (!reassign(relaxation, op, scratch)) return false;
    }
  }
  return true;
}

/** Gives the op the tile that is cheapest for all; false where no assignment exists. Cost: tiles × ops reached. */
export function reassign(relaxation: Relaxation, op: number, scratch: ReassignScratch): boolean {
  const target = relaxation.tileOf[op] as number;
  const { holderOf } = relaxation;
  holderOf[target] = NOBODY;
  return augment(relaxation, op, target, scratch);
}

/** The same where `op` (or NOBODY) has lost its tile, and `target` its holder. */
export function augment(
  relaxation: Relaxation,
  op: number,
  target: number,
  scratch: ReassignScratch,
): boolean {
  const { residual, emptyCost, holderOf } = relaxation;
  const { tileCount } = relaxation.graph;
  const { slack, via, settled } = scratch;
  slack.fill(Number.POSITIVE_INFINITY);
  settled.fill(0);
  let nobodyDistance = op === NOBODY ? 0 : Number.POSITIVE_INFINITY;
  let nobodyAt = -1;
  let row = op;
  let reached = 0;
  let tile = -1;
  let scan = true;
  while (tile !== target) {
    const costs = row === NOBODY ? emptyCost : residual;
    const base = row === NOBODY ? 0 : row * tileCount;
    let least = Number.POSITIVE_INFINITY;
    tile = -1;
    for (let t = 0; t < tileCount; t++) {
      if (settled[t]) continue;
      if (scan) {
        const through = reached + (costs[base + t] as number);
        if (through < (slack[t] as number)) {
          slack[t] = through;
          via[t] = row;
        }
      }
      if ((slack[t] as number) < least) {
        least = slack[t] as number;
        tile = t;
      }
    }
    if (tile < 0) return false;
    settled[tile] = 1;
    reached = least;
    row = holderOf[tile] as number;
    scan = row !== NOBODY || nobodyDistance === Number.POSITIVE_INFINITY;
    if (row === NOBODY && scan) {
      nobodyAt = tile;
      nobodyDistance = reached;
    }
  }
  if (reached > 0) shiftCosts(relaxation, op, target, reached, nobodyDistance, scratch);
  moveHolders(relaxation, op, target, nobodyAt, via);
  relaxation.constant += reached;
  return true;
}

/** The dual step: rows on the path pay, tiles on it become dearer for all others. */
function shiftCosts(
  { graph: { tileCount }, free, freeCount, residual, emptyCost, holderOf }: Relaxation,
  op: number,
  target: number,
  total: number,
  nobodyDistance: number,
  { slack, settled }: ReassignScratch,
): void {
  const lower = (row: number, by: number) => {
    const base = row * tileCount;
    for (let t = 0; t < tileCount; t++) residual[base + t] = (residual[base + t] as number) - by;
  };
  if (op !== NOBODY) lower(op, total);
  if (nobodyDistance < total) {
    for (let t = 0; t < tileCount; t++) emptyCost[t] = (emptyCost[t] as number) - (total - nobodyDistance);
  }
  for (let tile = 0; tile < tileCount; tile++) {
    if (!settled[tile] || tile === target) continue;
    const by = total - (slack[tile] as number);
    if (by <= 0) continue;
    const holder = holderOf[tile] as number;
    if (holder !== NOBODY) lower(holder, by);
    for (let f = 0; f < freeCount; f++) {
      const at = (free[f] as number) * tileCount + tile;
      residual[at] = (residual[at] as number) + by;
    }
    emptyCost[tile] = (emptyCost[tile] as number) + by;
  }
}

function moveHolders(
  { tileOf, holderOf }: Relaxation,
  op: number,
  target: number,
  nobodyAt: number,
  via: Int32Array,
): void {
  let tile = target;
  for (;;) {
    const row = via[tile] as number;
    holderOf[tile] = row;
    if (row === NOBODY) {
      if (op === NOBODY) return;
      tile = nobodyAt;
      continue;
    }
    const before = tileOf[row] as number;
    tileOf[row] = tile;
    if (row === op) return;
    tile = before;
  }
}
