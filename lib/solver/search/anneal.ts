/**
 * Simulated annealing over placements (Kirkpatrick, Gelatt and Vecchi 1983): moves to a free tile and swaps of
 * two ops, always on candidate tiles, so R1–R4 hold throughout. The schedule is geometric in the number of moves.
 * Same random stream, same result. Cost: `moves` × the terms of two ops.
 */
import type { PlacementInstance } from '../instance';
import type { PlacementCost } from './placement-cost';
import type { Random } from './random';

export interface AnnealSchedule {
  moves: number;
  startTemperature: number;
  endTemperature: number;
  /** Looked at every 1024 moves; true ends the run with the best so far. */
  shouldStop?: () => boolean;
}

export interface AnnealMoves {
  instance: PlacementInstance;
  cost: PlacementCost;
  isCandidate(op: number, tile: number): boolean;
  /** For each op and tile, the op's candidates nearest to the tile. */
  nearCandidates: (op: number, tile: number) => readonly number[];
  /** What an op pays to stand on a tile; raised where routes were crowded. */
  tileCost: Float64Array;
  /** What one hop of one op typically costs: temperatures are in this unit. */
  temperatureUnit: number;
}

const NEAR_COUNT = 10;

export function annealMoves(instance: PlacementInstance, cost: PlacementCost): AnnealMoves {
  const cache = new Map<number, readonly number[]>();
  const { tileCount, candidates, distance } = instance;
  const groups = new Map<string, number>();
  const groupOf = candidates.map((list) => {
    const key = list.join();
    const group = groups.get(key) ?? groups.size;
    groups.set(key, group);
    return group;
  });
  return {
    instance,
    cost,
    isCandidate: candidateTest(instance),
    tileCost: new Float64Array(tileCount),
    temperatureUnit: temperatureUnit(instance),
    nearCandidates: (op, tile) => {
      const key = (groupOf[op] as number) * tileCount + tile;
      let near = cache.get(key);
      if (!near) {
        near = [...(candidates[op] ?? [])]
          .sort(
            (a, b) =>
              (distance[tile * tileCount + a] as number) - (distance[tile * tileCount + b] as number) ||
              a - b,
          )
          .slice(0, NEAR_COUNT);
        cache.set(key, near);
      }
      return near;
    },
  };
}

/** Mean weight, times the root of how many pairs or nets an op has beyond the usual four. */
function temperatureUnit(instance: PlacementInstance): number {
  const terms = instance.objective === 'path' ? instance.pairs : instance.nets;
  if (terms.length === 0) return 1;
  const meanWeight = terms.reduce((sum, one) => sum + one.weight, 0) / terms.length;
  const perOp = (2 * terms.length) / Math.max(1, instance.opCount);
  return meanWeight * Math.max(1, Math.sqrt(perOp / 4));
}

/** Anneals `start`, which stays as it is: returns the best tiling met and its cost, tile costs included. */
export function anneal(
  moves: AnnealMoves,
  start: Int32Array,
  schedule: AnnealSchedule,
  random: Random,
): { tiling: Int32Array; cost: number } {
  const { instance, tileCost, isCandidate } = moves;
  const movable = instance.candidates.flatMap((list, op) => (list.length > 1 ? [op] : []));
  const walk = startWalk(moves, start);
  const { tiling, opAt } = walk;
  let best = walk.current;
  const bestTiling = tiling.slice();
  if (movable.length === 0) return { tiling: bestTiling, cost: best };
  const cooling = (schedule.endTemperature / schedule.startTemperature) ** (1 / Math.max(1, schedule.moves));
  let temperature = schedule.startTemperature;
  for (let move = 0; move < schedule.moves; move++, temperature *= cooling) {
    if ((move & 1023) === 1023 && schedule.shouldStop?.()) break;
    const op = movable[random.below(movable.length)] as number;
    const from = tiling[op] as number;
    const to = pickTile(moves, tiling, op, random);
    if (to === from) continue;
    const other = opAt[to] as number;
    if (other >= 0 && !isCandidate(other, from)) continue;
    tiling[op] = to;
    if (other >= 0) tiling[other] = from;
    // Of two ops that change places the tiles' prices cancel out.
    const priced = other >= 0 ? 0 : (tileCost[to] as number) - (tileCost[from] as number);
    const delta = priced + changedTerms(walk, op, other);
    if (delta <= 0 || random.unit() < Math.exp(-delta / temperature)) {
      opAt[from] = other;
      opAt[to] = op;
      accept(walk, delta);
      if (walk.current < best - 1e-9) {
        best = walk.current;
        bestTiling.set(tiling);
      }
    } else {
      tiling[op] = from;
      if (other >= 0) tiling[other] = to;
    }
  }
  return { tiling: bestTiling, cost: best };
}

/** A tiling on its way, with what each term costs on it. */
interface Walk {
  cost: PlacementCost;
  tiling: Int32Array;
  opAt: Int32Array;
  current: number;
  termValue: Float64Array;
  /** The terms of the move at hand and what they would cost. */
  changed: Int32Array;
  changedValue: Float64Array;
  changedCount: number;
  stamp: Int32Array;
  tick: number;
}

function startWalk({ instance, cost, tileCost }: AnnealMoves, start: Int32Array): Walk {
  const tiling = start.slice();
  const termValue = Float64Array.from({ length: cost.termCount }, (_, term) => cost.term(term, tiling));
  const opAt = new Int32Array(instance.tileCount).fill(-1);
  tiling.forEach((tile, op) => {
    opAt[tile] = op;
  });
  return {
    cost,
    tiling,
    opAt,
    current:
      termValue.reduce((sum, value) => sum + value, 0) +
      tiling.reduce((sum, tile) => sum + (tileCost[tile] as number), 0),
    termValue,
    changed: new Int32Array(cost.termCount),
    changedValue: new Float64Array(cost.termCount),
    changedCount: 0,
    stamp: new Int32Array(cost.termCount),
    tick: 0,
  };
}

/** By how much the terms of one or two ops differ on the tiling as it is now; each term counts once. */
function changedTerms(walk: Walk, op: number, other: number): number {
  const { cost, tiling, termValue, changed, changedValue, stamp } = walk;
  const tick = ++walk.tick;
  let count = 0;
  let delta = 0;
  let terms = cost.termsOf[op] as readonly number[];
  for (let which = 0; which < 2; which++) {
    for (let k = 0; k < terms.length; k++) {
      const term = terms[k] as number;
      if (stamp[term] === tick) continue;
      stamp[term] = tick;
      const value = cost.term(term, tiling);
      changed[count] = term;
      changedValue[count++] = value;
      delta += value - (termValue[term] as number);
    }
    if (other < 0) break;
    terms = cost.termsOf[other] as readonly number[];
  }
  walk.changedCount = count;
  return delta;
}

function accept(walk: Walk, delta: number): void {
  walk.current += delta;
  for (let k = 0; k < walk.changedCount; k++) {
    walk.termValue[walk.changed[k] as number] = walk.changedValue[k] as number;
  }
}

/** Mostly a tile near one of the op's neighbours, otherwise any candidate. */
export function pickTile(moves: AnnealMoves, tiling: Int32Array, op: number, random: Random): number {
  const neighbours = moves.cost.neighboursOf[op] as readonly number[];
  if (neighbours.length > 0 && random.unit() < 0.8) {
    const neighbour = neighbours[random.below(neighbours.length)] as number;
    const near = moves.nearCandidates(op, tiling[neighbour] as number);
    return near[random.below(near.length)] as number;
  }
  const all = moves.instance.candidates[op] as readonly number[];
  return all[random.below(all.length)] as number;
}

function candidateTest(instance: PlacementInstance): (op: number, tile: number) => boolean {
  const allowed = new Uint8Array(instance.opCount * instance.tileCount);
  instance.candidates.forEach((list, op) => {
    for (const tile of list) allowed[op * instance.tileCount + tile] = 1;
  });
  return (op, tile) => allowed[op * instance.tileCount + tile] === 1;
}
