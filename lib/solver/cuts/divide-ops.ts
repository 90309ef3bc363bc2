/**
 * Whether the ops can be divided between the two sides of a cut so that the nets between them find channels enough.
 *
 * Method: depth-first over ops in the order in which nets join them, with the side of their neighbours tried first. A
 * branch ends where more nets cross than channels and `missing` allow, or a side is full; a whole division counts only if
 * a matching gives every op a tile on its side (Hall 1935). "None" is therefore a proof that nothing is legal with so many
 * channels more; "unknown" says that the work limit came first.
 */
import type { PlacementInstance } from '../instance';
import { hasTile } from '../presolve/tile-sets';
import { matchOps } from '../search/matching';
import { type CrossingCounts, crossingCounts, type NetsAt, netsAtOps } from './crossing-counts';
import { FREE, INSIDE, OUTSIDE } from './forced-crossings';
import type { TileCut } from './tile-cut';

export interface CutProblem {
  instance: PlacementInstance;
  cut: TileCut;
  /** Side of each op whose candidates are all on one; `FREE` elsewhere. */
  sides: Int8Array;
  /** Ops that can stand on each side at most. */
  roomInside: number;
  roomOutside: number;
}

export type Division = { kind: 'found'; sides: Int8Array } | { kind: 'none' } | { kind: 'unknown' };

/** Ops × tiles above which a division is believed without a matching, which claims less. */
const MATCHING_LIMIT = 20_000;

/** `work` is spent by one a net touched; the search ends when there is none left. */
export function divideOps(problem: CutProblem, missing: number, work: { left: number }): Division {
  const { instance, sides } = problem;
  const netsAt = netsAtOps(instance);
  const order = orderOf(instance, netsAt, sides);
  const counts = crossingCounts(instance, netsAt, problem.cut);
  /** Sides still to try at each depth, the next one last. */
  const toTry: number[][] = [];
  for (;;) {
    const depth = toTry.length;
    if (depth === order.length && hasTiles(problem, counts.sides, work)) {
      return { kind: 'found', sides: counts.sides.slice() };
    }
    if (depth < order.length) toTry.push(sidesToTry(problem, counts, order[depth] as number));
    if (!step(problem, counts, order, toTry, missing, work)) return { kind: 'none' };
    if (work.left <= 0) return { kind: 'unknown' };
  }
}

/** Puts the last op on its next side, or goes back to the last op that has another one. False where none has. */
function step(
  problem: CutProblem,
  counts: CrossingCounts,
  order: readonly number[],
  toTry: number[][],
  missing: number,
  work: { left: number },
): boolean {
  while (toTry.length > 0) {
    const op = order[toTry.length - 1] as number;
    if (counts.sides[op] !== FREE) counts.lift(op);
    const side = toTry.at(-1)?.pop();
    if (side === undefined) {
      toTry.pop();
      continue;
    }
    work.left -= counts.put(op, side);
    const fits = counts.inside() <= problem.roomInside && counts.outside() <= problem.roomOutside;
    if (fits && counts.missing() <= missing) return true;
  }
  return false;
}

/** The side where most of what it is joined to stands comes first; at a tie the one with more room. */
function sidesToTry(
  { sides, roomInside, roomOutside }: CutProblem,
  counts: CrossingCounts,
  op: number,
): number[] {
  const only = sides[op] as number;
  if (only !== FREE) return [only];
  const pull = counts.pull(op) || roomInside - counts.inside() - (roomOutside - counts.outside());
  return pull >= 0 ? [OUTSIDE, INSIDE] : [INSIDE, OUTSIDE];
}

/** Ops with one side only, then breadth-first along the nets from them, or from an op with the most nets. */
function orderOf({ opCount, nets }: PlacementInstance, netsAt: NetsAt, sides: Int8Array): number[] {
  const ops = [...netsAt.keys()];
  const isSeen = new Uint8Array(opCount);
  const isSpread = new Uint8Array(nets.length);
  const order: number[] = [];
  const see = (op: number) => {
    if (isSeen[op] === 1) return;
    isSeen[op] = 1;
    order.push(op);
  };
  for (const op of ops) if (sides[op] !== FREE) see(op);
  const busiest = ops.sort((a, b) => (netsAt[b]?.length ?? 0) - (netsAt[a]?.length ?? 0) || a - b);
  let next = 0;
  for (const start of busiest) {
    if (next === order.length) see(start);
    for (; next < order.length; next++) {
      for (const net of netsAt[order[next] as number] ?? []) {
        if (isSpread[net] === 1) continue;
        isSpread[net] = 1;
        const { source, consumers } = nets[net] ?? { source: 0, consumers: [] };
        see(source);
        consumers.forEach(see);
      }
    }
  }
  return order;
}

function hasTiles({ instance, cut }: CutProblem, sides: Int8Array, work: { left: number }): boolean {
  const { candidates, opCount, tileCount } = instance;
  if (opCount * tileCount > MATCHING_LIMIT) return true;
  work.left -= opCount * 10;
  const onSide = candidates.map((tiles, op) =>
    tiles.filter((tile) => hasTile(cut.inside, tile) === (sides[op] === INSIDE)),
  );
  return matchOps(onSide, tileCount).ok;
}
