/**
 * Multi-start search in slices that grow: annealing without congestion for a first answer at once, then annealing of
 * ops and routes together, or tabu search where only pairs count. Each slice's tiling is made a legal mapping by
 * `settle`; tiles where routes were crowded become dearer.
 * Deterministic for a seed as far as time allows: slices are counted in moves, time only ends them.
 */
import { hopsBetween, type PlacementInstance, withinReach } from '../instance';
import { type AnnealMoves, anneal, annealMoves } from './anneal';
import { matchOps } from './matching';
import { placementCost } from './placement-cost';
import { type Random, seededRandom } from './random';
import { annealRouted, type RoutedTiling } from './routed-anneal';
import { type RoutedNets, routedNets, type SearchLink } from './routed-nets';
import { type TabuSearch, tabuSearch } from './tabu';

export interface SearchHooks {
  shouldStop(): boolean;
  /**
   * Tries to make the tiling legal. `crowdedTiles` of a failed try become dearer. `trees`, where given, are the link
   * indices of every net's tree, in the order of the instance's nets, and need no more room than there is.
   */
  settle(
    tiling: Int32Array,
    round: number,
    trees?: readonly (readonly number[])[],
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
  /** The fabric's links, in the fabric's order. Without them congestion is seen through `settle` only. */
  links?: readonly SearchLink[];
}

/** Moves of the first slice, for an answer at once; later slices grow to the last entry times the ops. */
const MOVES_PER_OP = [60, 400, 800, 1500, 1500, 3000, 3000, 6000] as const;
const ROUTED_MOVES_PER_OP = [40, 150, 600, 600, 1500, 3000, 5000] as const;
const QUICK_SLICES = 2;
/** Above this many, ops and routes together take turns with longer annealing of the ops alone. */
const MANY_OPS = 60;
/** Ops counted at most, so that a slice stays short. */
const MOST_OPS = 120;
const CROWD_COST = 0.5;
/** Where links would be filled less than this, the router alone is likely to do, and sooner. */
const EASY_FILL = 0.3;
/** Nets × tiles that may have a tree each. */
const ROUTED_LIMIT = 2_000_000;
const TABU_TILES = 128;
/** Table entries that a slice of tabu search goes through. */
const TABU_WORK = 2_000_000;

export interface SearchEnd {
  rounds: number;
  endedBy: 'stopped' | 'rounds' | 'stale' | 'bound';
}

export function searchPlacements(
  instance: PlacementInstance,
  start: Int32Array | null,
  limits: SearchLimits,
  hooks: SearchHooks,
): SearchEnd {
  const first = firstTiling(instance, start);
  if (!first) return { rounds: 0, endedBy: 'rounds' };
  const search = newSearch(instance, first, limits, hooks);
  if (start) settle(search, { tiling: first }, 0);
  // From a legal start there is no hurry for a first answer.
  const skipped = search.best.objectiveValue < Number.POSITIVE_INFINITY ? QUICK_SLICES : 0;
  for (let round = 0; round < limits.rounds; round++) {
    if (search.best.objectiveValue <= limits.bound) return { rounds: round, endedBy: 'bound' };
    if (hooks.shouldStop()) return { rounds: round, endedBy: 'stopped' };
    if (search.stale >= limits.staleRounds) return { rounds: round, endedBy: 'stale' };
    search.stale++;
    settle(search, slice(search, round + skipped), round);
  }
  return { rounds: limits.rounds, endedBy: 'rounds' };
}

interface Search {
  instance: PlacementInstance;
  moves: AnnealMoves;
  random: Random;
  hooks: SearchHooks;
  routed: RoutedNets | null;
  /** Of all links together. */
  channels: number;
  tabu: TabuSearch | null;
  tabuSlices: number;
  tried: Set<string>;
  best: { tiling: Int32Array; objectiveValue: number };
  stale: number;
}

function newSearch(
  instance: PlacementInstance,
  first: Int32Array,
  limits: SearchLimits,
  hooks: SearchHooks,
): Search {
  const hasTrees = limits.links !== undefined && instance.nets.length * instance.tileCount <= ROUTED_LIMIT;
  const isForTabu = instance.objective === 'path' && instance.tileCount <= TABU_TILES;
  return {
    instance,
    moves: annealMoves(instance, placementCost(instance)),
    random: seededRandom(limits.seed),
    hooks,
    routed: hasTrees && limits.links ? routedNets(instance, limits.links) : null,
    channels: (limits.links ?? []).reduce((sum, link) => sum + link.channels, 0),
    tabu: isForTabu ? tabuSearch(instance) : null,
    tabuSlices: 0,
    tried: new Set(),
    best: { tiling: first, objectiveValue: Number.POSITIVE_INFINITY },
    stale: 0,
  };
}

type Placed = { tiling: Int32Array; cost: number };
type Candidate = { tiling: Int32Array } | RoutedTiling;

function settle(search: Search, found: Candidate, round: number): void {
  const { tried, moves, best, hooks } = search;
  const trees = 'trees' in found && found.overfull === 0 ? found.trees : undefined;
  const key = `${trees && 'cost' in found ? found.cost : ''}:${found.tiling.join()}`;
  if (tried.has(key)) return;
  tried.add(key);
  const settled = hooks.settle(found.tiling, round, trees);
  if (!settled.ok) {
    for (const tile of settled.crowdedTiles) {
      moves.tileCost[tile] = (moves.tileCost[tile] as number) + CROWD_COST;
    }
    return;
  }
  if (settled.objectiveValue >= best.objectiveValue) return;
  search.best = { tiling: found.tiling.slice(), objectiveValue: settled.objectiveValue };
  search.stale = 0;
}

/**
 * Quick annealing first, again if it was good for a mapping; then every method that the problem allows in turn.
 * Trees make a move dearer the more ops there are, so many ops are mostly annealed without.
 */
function slice(search: Search, round: number): Candidate {
  const { routed, tabu, best, instance } = search;
  const isFound = best.objectiveValue < Number.POSITIVE_INFINITY;
  if (round === 0 && routed && instance.opCount <= MANY_OPS) return routedSlice(search, routed, round);
  if (round === 0 || (round === 1 && isFound)) return annealSlice(search, round);
  if (routed) {
    const isPlaced = instance.opCount > MANY_OPS ? round % 4 !== 2 : round % 3 === 1;
    return isPlaced && isFound ? annealSlice(search, round) : routedSlice(search, routed, round);
  }
  return tabu && round % 8 !== 7 ? tabuSlice(search, tabu) : annealSlice(search, round);
}

/** Even rounds start hot, odd ones warm from the best, so that they keep most of it. */
function annealSlice({ moves, best, random, hooks }: Search, round: number): Placed {
  const unit = moves.temperatureUnit;
  return anneal(
    moves,
    best.tiling,
    {
      moves: movesOf(MOVES_PER_OP, round, best.tiling.length),
      startTemperature: (round % 2 === 0 ? 4 : 1.2) * unit,
      endTemperature: 0.15 * unit,
      shouldStop: hooks.shouldStop,
    },
    random,
  );
}

const movesOf = (perOp: readonly number[], round: number, opCount: number): number =>
  (perOp[Math.min(round, perOp.length - 1)] as number) * Math.max(8, Math.min(opCount, MOST_OPS));

/** The table is kept from slice to slice, so that it goes on where it was. */
function tabuSlice(search: Search, tabu: TabuSearch): Placed {
  const { instance, best, random, hooks } = search;
  if (search.tabuSlices++ === 0) tabu.restart(best.tiling);
  const steps = Math.max(100, Math.min(4000, Math.ceil(TABU_WORK / instance.tileCount ** 2)));
  return tabu.run(steps, random, hooks.shouldStop);
}

/**
 * Even rounds start from a tiling of their own, odd ones from the best. Temperatures stay where the cost still falls,
 * for hops come whole: much above 1 nothing holds together, below a half nothing moves any more.
 */
function routedSlice(search: Search, routed: RoutedNets, round: number): Candidate {
  const { moves, best, random, hooks } = search;
  let start = best.tiling;
  const isFound = best.objectiveValue < Number.POSITIVE_INFINITY;
  const isFresh = !isFound || (round % 2 === 0 && start.length <= MANY_OPS);
  if (isFresh) {
    const placed =
      search.tabu && round % 4 === 2 ? tabuSlice(search, search.tabu) : annealSlice(search, round);
    if (hasTooLong(search.instance, placed.tiling)) return placed;
    if (round === 0 && placed.cost < EASY_FILL * search.channels) return placed;
    start = placed.tiling;
  }
  const unit = moves.temperatureUnit;
  return annealRouted(
    moves,
    routed,
    start,
    {
      moves: movesOf(ROUTED_MOVES_PER_OP, round, start.length),
      startTemperature: (isFresh ? 1 : 0.7) * unit,
      endTemperature: 0.5 * unit,
      startOverfull: 0.7,
      endOverfull: 2.5,
      shouldStop: hooks.shouldStop,
    },
    random,
  );
}

/** Trees cannot help where a connection is beyond the clock's limit by the shortest way. */
const hasTooLong = (instance: PlacementInstance, tiling: Int32Array): boolean =>
  instance.pairs.some(
    ({ from, to }) =>
      !withinReach(instance, hopsBetween(instance, tiling[from] as number, tiling[to] as number)),
  );

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
