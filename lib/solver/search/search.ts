/**
 * Multi-start search: anneals from a matched or given start, then from the best again and again, in slices that
 * grow. Each slice's tiling is made a legal mapping by `settle`; tiles where routes were crowded become dearer.
 * Deterministic for a seed as far as time allows: slices are counted in moves, time only ends them.
 */
import type { PlacementInstance } from '../instance';
import { type AnnealMoves, anneal, annealMoves } from './anneal';
import { matchOps } from './matching';
import { placementCost } from './placement-cost';
import { type Random, seededRandom } from './random';

export interface SearchHooks {
  shouldStop(): boolean;
  /** Tries to make the tiling legal. `crowdedTiles` of a failed try become dearer. */
  settle(
    tiling: Int32Array,
    round: number,
  ): { ok: true; objectiveValue: number } | { ok: false; crowdedTiles: number[] };
}

export interface SearchLimits {
  seed: number;
  /** Slices to run at most. */
  rounds: number;
  /** Slices without a better mapping after which the search ends. */
  staleRounds: number;
  /** The search ends when a mapping reaches it. */
  bound: number;
}

/** Moves of the first slice, for an answer at once; later slices grow to the last entry times the ops. */
const MOVES_PER_OP = [60, 400, 800, 1500] as const;
const CROWD_COST = 0.5;

export function searchPlacements(
  instance: PlacementInstance,
  start: Int32Array | null,
  limits: SearchLimits,
  hooks: SearchHooks,
): { rounds: number; endedBy: 'stopped' | 'rounds' | 'stale' | 'bound' } {
  const first = firstTiling(instance, start);
  if (!first) return { rounds: 0, endedBy: 'rounds' };
  const moves = annealMoves(instance, placementCost(instance));
  const random = seededRandom(limits.seed);
  const tried = new Set<string>();
  let best = { tiling: first, objectiveValue: Number.POSITIVE_INFINITY };
  let stale = 0;
  const settle = (tiling: Int32Array, round: number): void => {
    const key = tiling.join();
    if (tried.has(key)) return;
    tried.add(key);
    const settled = hooks.settle(tiling, round);
    if (!settled.ok) {
      for (const tile of settled.crowdedTiles) {
        moves.tileCost[tile] = (moves.tileCost[tile] as number) + CROWD_COST;
      }
      return;
    }
    if (settled.objectiveValue >= best.objectiveValue) return;
    best = { tiling: tiling.slice(), objectiveValue: settled.objectiveValue };
    stale = 0;
  };
  if (start) settle(first, 0);
  for (let round = 0; round < limits.rounds; round++) {
    if (best.objectiveValue <= limits.bound) return { rounds: round, endedBy: 'bound' };
    if (hooks.shouldStop()) return { rounds: round, endedBy: 'stopped' };
    if (stale >= limits.staleRounds) return { rounds: round, endedBy: 'stale' };
    stale++;
    settle(nextTiling(moves, best.tiling, round, random, hooks.shouldStop), round);
  }
  return { rounds: limits.rounds, endedBy: 'rounds' };
}

/** Even rounds start hot, odd ones warm from the best, so that they keep most of it. */
function nextTiling(
  moves: AnnealMoves,
  best: Int32Array,
  round: number,
  random: Random,
  shouldStop: () => boolean,
): Int32Array {
  const perOp = MOVES_PER_OP[Math.min(round, MOVES_PER_OP.length - 1)] as number;
  const scale = Math.max(8, Math.min(best.length, 120));
  const unit = moves.temperatureUnit;
  const hot = round % 2 === 0 ? 4 : 1.2;
  return anneal(
    moves,
    best,
    { moves: perOp * scale, startTemperature: hot * unit, endTemperature: 0.15 * unit, shouldStop },
    random,
  ).tiling;
}

/** The given start where it is whole, else one matched around it, else around none. */
export function firstTiling(instance: PlacementInstance, start: Int32Array | null): Int32Array | null {
  if (start && !start.includes(-1)) return start;
  const { tileCount } = instance;
  if (start) {
    const kept = new Set([...start].filter((tile) => tile >= 0));
    const around = matchOps(
      instance.candidates.map((tiles, op) => {
        const own = start[op] as number;
        return own >= 0 ? [own] : tiles.filter((tile) => !kept.has(tile));
      }),
      tileCount,
    );
    if (around.ok) return around.tiling;
  }
  const matched = matchOps(instance.candidates, tileCount);
  return matched.ok ? matched.tiling : null;
}
