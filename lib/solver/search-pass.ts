/**
 * The search for legal mappings within a solve: once before the proof, and in stretches while the proof waits. Each
 * better mapping is reported at once.
 */
import { TABLE_ENTRIES_LIMIT } from './exact/exact-search';
import { tableEntries } from './exact/root-relaxation';
import { type PlacementInstance, tilingOf } from './instance';
import { estimateEntries } from './integer-program/placement-program';
import { legalMapping, startTiles } from './legal-mapping';
import type { SolveOptions } from './options';
import { MODEL_ENTRIES_LIMIT } from './placement-pass';
import type { CheckedProblem } from './problem';
import { searchPlacements } from './search/search';
import type { SolveState } from './solve-state';

/** The part of the time that the search may take before the proof takes over; more as long as nothing is found. */
const SEARCH_SHARE = 0.1;
const FIRST_MAPPING_SHARE = 0.6;
/** Slices without a better mapping after which the proof begins; it lets the search go on now and then. */
const FIRST_STALE_ROUNDS = 4;

/** Slices of one stretch of search, and its seed. */
export interface StretchLimits {
  rounds: number;
  staleRounds: number;
  seed: number;
}

/** Before a proof, or all that is done where none can follow. */
export const firstLimits = ({ seed }: SolveOptions, alone: boolean): StretchLimits =>
  alone ? { rounds: 400, staleRounds: 120, seed } : { rounds: 60, staleRounds: FIRST_STALE_ROUNDS, seed };

/** The 1st, 2nd, 3rd, … stretch while a proof waits: each a little more patient, with a seed of its own. */
export const stretchLimits = ({ seed }: SolveOptions, stretch: number): StretchLimits => ({
  rounds: 60,
  staleRounds: FIRST_STALE_ROUNDS + stretch,
  seed: seed + stretch,
});

/** From the problem's start, until its share is used up or it finds no more. */
export function searchPass(
  problem: CheckedProblem,
  instance: PlacementInstance,
  options: SolveOptions,
  state: SolveState,
): void {
  state.setPhase('search');
  state.noteEngine('search');
  // Where nothing can follow, the search has all the time.
  const alone = options.engine === 'search' || !canProve(options, instance);
  runSearch(
    problem,
    instance,
    startTiles(problem, instance),
    firstLimits(options, alone),
    state,
    searchShare(options, state, alone),
  );
}

const canProve = ({ engine }: SolveOptions, instance: PlacementInstance): boolean =>
  engine === 'auto'
    ? tableEntries(instance) <= TABLE_ENTRIES_LIMIT
    : estimateEntries(instance) <= MODEL_ENTRIES_LIMIT;

/** Another stretch from the best mapping; counted in slices, so that it can be repeated. */
export function improvePass(
  problem: CheckedProblem,
  instance: PlacementInstance,
  options: SolveOptions,
  state: SolveState,
  stretch: number,
): void {
  const best = state.best();
  const start = best ? tilingOf(problem.kernel, problem.graph, best.placement) : null;
  runSearch(problem, instance, start, stretchLimits(options, stretch), state, noShare);
}

/** How much of the search there may be. */
interface SearchShare {
  isOver(): boolean;
  /** A placement was tried to be routed. */
  tried(): void;
}

const noShare: SearchShare = { isOver: () => false, tried: () => undefined };

/**
 * A share of the time, or of tries where their number is given. Time is looked at only after a try, so that the number of
 * tries says exactly what the search has done, whatever ended it. Under a node limit, time does not count.
 */
function searchShare(
  { timeLimitMs, nodeLimit, searchTries }: SolveOptions,
  state: SolveState,
  alone: boolean,
): SearchShare {
  const startMs = state.elapsedMs();
  const isTimeUp = () => {
    if (alone || nodeLimit !== null) return false;
    const spentRatio = (state.elapsedMs() - startMs) / (timeLimitMs - startMs);
    return spentRatio >= (state.best() ? SEARCH_SHARE : FIRST_MAPPING_SHARE);
  };
  const { proof } = state;
  let isOver = searchTries === 0;
  return {
    isOver: () => isOver,
    tried: () => {
      proof.searchTries++;
      isOver = searchTries === null ? isTimeUp() : proof.searchTries >= searchTries;
    },
  };
}

function runSearch(
  problem: CheckedProblem,
  instance: PlacementInstance,
  start: Int32Array | null,
  limits: StretchLimits,
  state: SolveState,
  share: SearchShare,
): void {
  const { links } = problem.graph;
  searchPlacements(
    instance,
    start,
    { ...limits, bound: state.bound(), links },
    {
      shouldStop: () => state.shouldStop() || share.isOver(),
      settle: (tiling, round, trees) => {
        const legal = legalMapping(problem, tiling, round, state.shouldStop, trees);
        if (legal.ok) state.offer(legal.mapping);
        share.tried();
        return legal.ok ? { ok: true, objectiveValue: legal.mapping.objectiveValue } : legal;
      },
    },
  );
}
