/**
 * Looks for a legal mapping that costs no more than asked and is none of the given placements, nor a mirror image of
 * one: one step from the given ones first, then among the search's results, then by the exact search, which also proves
 * that there is none.
 *
 * The exact search is told of an objective just above the one asked for, so that everything up to it is of interest, and
 * does not learn of what it finds. Of placements that are symmetric to each other it shows one; where that is an image of
 * an avoided one, all of them are.
 */
import { exactSearch, TABLE_ENTRIES_LIMIT } from './exact/exact-search';
import { tableEntries } from './exact/root-relaxation';
import { costStep } from './exact/standing-nets';
import { noOtherReason, noOtherYet } from './explain/no-other';
import { type PlacementInstance, type Tiling, tilingOf } from './instance';
import { legalMapping, mappingOf, startTiles } from './legal-mapping';
import { imageTest } from './mirror-images';
import { nearPlacements } from './near-placements';
import { nodeWatch } from './node-watch';
import type { SolveOptions } from './options';
import type { BestMapping, SolveOutcome, StopReason } from './outcome';
import type { AnotherAsk, CheckedProblem } from './problem';
import { searchPlacements } from './search/search';
import { firstLimits, type StretchLimits, stretchLimits } from './search-pass';
import type { SolveState } from './solve-state';
import type { WeightScale } from './weight-scale';

/** The part of the time that may be spent one step from the given placements, and how many of each one's are routed. */
const NEAR_SHARE = 0.1;
const MOST_NEAR = 100;
/** The part of the time that the search may take before the exact search begins. */
const SEARCH_SHARE = 0.15;
/** Far above rounding, far below the step between two costs. */
const TOLERANCE = 1e-6;

interface Ask {
  problem: CheckedProblem;
  instance: PlacementInstance;
  /** With the weights that the search works with. */
  searched: PlacementInstance;
  options: SolveOptions;
  state: SolveState;
  scale: WeightScale;
  asked: AnotherAsk;
}

interface Hunt extends Ask {
  /** The most that the other one may cost, in the solve's unit. */
  mostCost: number;
  isAvoided(tiling: Tiling): boolean;
  /** Objective of the cheapest avoided mapping that was met: bounds of the others hold for all mappings up to it. */
  leastAvoided: number;
  taken: boolean;
}

/** Preconditions: reasons for infeasibility are ruled out. `feasible` says that the proof of the bound is not finished. */
export function anotherPass(ask: Ask): SolveOutcome {
  const { problem, instance, options, state, scale, asked } = ask;
  const avoided = asked.than.flatMap((placement) => tilingOf(problem.kernel, problem.graph, placement) ?? []);
  const hunt: Hunt = {
    ...ask,
    mostCost: scale.fromValue(asked.objectiveValue),
    isAvoided: imageTest(instance, problem.graph.links, avoided),
    leastAvoided: Number.POSITIVE_INFINITY,
    taken: false,
  };
  const isAlone = options.engine === 'search' || tableEntries(instance) > TABLE_ENTRIES_LIMIT;
  state.setPhase('search');
  state.noteEngine('search');
  lookNear(hunt, avoided);
  if (!hunt.taken) searchFirst(hunt, avoided.at(-1) ?? null, isAlone);
  if (hunt.taken) return state.finish('another found');
  if (options.engine === 'search' || state.shouldStop()) {
    return unknown(hunt, 'search complete');
  }
  return searchAll(hunt, avoided.at(-1) ?? null);
}

/** Takes the mapping if it is one that was asked for. */
function look(hunt: Hunt, tiling: Tiling, mapping: BestMapping): void {
  if (hunt.isAvoided(tiling)) hunt.leastAvoided = Math.min(hunt.leastAvoided, mapping.objectiveValue);
  else if (!hunt.taken && mapping.objectiveValue <= hunt.mostCost + TOLERANCE) {
    hunt.state.offer(mapping);
    hunt.taken = true;
  }
}

/** Under a node limit no share of the time ends anything, so that the answer does not depend on the machine's speed. */
const shareOf = ({ nodeLimit }: SolveOptions, share: number): number => (nodeLimit === null ? share : 1);

const isOver = ({ taken, state }: Hunt): boolean => taken || state.shouldStop();

/** On large problems there are often others nearby that the search, which starts afresh, does not come by. */
function lookNear(hunt: Hunt, avoided: readonly Tiling[]): void {
  const { problem, instance, options, state, mostCost } = hunt;
  const endMs = state.elapsedMs() + shareOf(options, NEAR_SHARE) * state.remainingMs();
  const shouldStop = () => isOver(hunt) || state.elapsedMs() >= endMs;
  const limits = { mostCost: mostCost + TOLERANCE, limit: MOST_NEAR, shouldStop };
  for (const around of avoided.toReversed()) {
    if (!isStandable(instance, around)) continue;
    for (const tiling of nearPlacements(instance, around, limits)) {
      if (shouldStop()) return;
      if (hunt.isAvoided(tiling)) continue;
      const legal = legalMapping(problem, tiling, options.seed, state.shouldStop);
      if (legal.ok) look(hunt, tiling, legal.mapping);
    }
  }
}

function searchFirst(hunt: Hunt, around: Tiling | null, isAlone: boolean): void {
  const { problem, instance, options, state } = hunt;
  const endMs = state.elapsedMs() + (isAlone ? 1 : shareOf(options, SEARCH_SHARE)) * state.remainingMs();
  const start = startTiles(problem, instance) ?? around;
  searchAround(hunt, start, firstLimits(options, isAlone), () => state.elapsedMs() >= endMs);
}

/** Every legal mapping that the search meets is looked at, not only those that are better than the last. */
function searchAround(hunt: Hunt, start: Tiling | null, limits: StretchLimits, isSpent: () => boolean): void {
  const { problem, instance, searched, state } = hunt;
  const { links } = problem.graph;
  searchPlacements(
    searched,
    start && isStandable(instance, start) ? start : null,
    // No mapping costs less than 0, so none ends the search: the one that does not count may be the cheapest.
    { ...limits, bound: -1, links },
    {
      shouldStop: () => isOver(hunt) || isSpent(),
      settle: (tiling, round, trees) => {
        const legal = legalMapping(problem, tiling, round, state.shouldStop, trees);
        if (!legal.ok) return legal;
        look(hunt, tiling, legal.mapping);
        return { ok: true, objectiveValue: legal.mapping.objectiveValue };
      },
    },
  );
}

/** An avoided placement may have been made under other pins. */
const isStandable = ({ candidates }: PlacementInstance, tiling: Tiling): boolean =>
  tiling.every((tile, op) => tile < 0 || candidates[op]?.includes(tile));

function searchAll(hunt: Hunt, around: Tiling | null): SolveOutcome {
  const { problem, instance, options, state, asked, mostCost, scale } = hunt;
  const watch = nodeWatch(options, state, (stretch) =>
    searchAround(hunt, around, stretchLimits(options, stretch), () => false),
  );
  state.setPhase('exact');
  state.noteEngine('exact');
  const result = exactSearch(instance, problem.graph, {
    incumbent: () => mostCost + costStep(instance),
    shouldStop: () => watch.isAtLimit() || isOver(hunt),
    onBound: (bound) => void state.raise(Math.min(bound, hunt.leastAvoided), 'exact search'),
    onNodes: watch.onNodes,
    onMapping: (tiling, netLinks) => {
      const mapping = netLinks && mappingOf(problem, tiling, netLinks);
      if (mapping) look(hunt, tiling, mapping);
      return mapping !== null;
    },
  });
  state.noteNodes(result.nodes);
  if (hunt.taken) return state.finish('another found');
  switch (result.kind) {
    case 'proved':
    case 'infeasible':
      return state.infeasible(noOtherReason(asked, scale.name), 'exact search');
    case 'unresolved':
      return unknown(hunt, 'routing gap');
    case 'too large':
      return unknown(hunt, 'model too large');
    case 'stopped':
      return unknown(hunt, watch.isAtLimit() ? 'node limit' : 'time limit');
  }
}

/** Nothing was found, and that there is nothing is not proved. */
function unknown({ state, asked, scale }: Hunt, stop: StopReason): SolveOutcome {
  const outcome = state.finish(stop);
  if (outcome.status !== 'unknown') return outcome;
  return { ...outcome, reason: noOtherYet(asked, scale.name, outcome.stopReason) };
}
