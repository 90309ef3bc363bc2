/**
 * Places a kernel on a fabric: presolve → search → exact search, or in its place the integer programs, with every
 * mapping routed and verified before it counts. One pass a function; each may end the solve by proving the best optimal.
 * Where the problem asks for another mapping than given ones, one pass of its own does that: another-pass.ts.
 */
import { ok, type Result } from '../result';
import { anotherPass } from './another-pass';
import { starBound, starWork, trivialBound } from './bounds/star-bound';
import type { Engine } from './engines/engine';
import { TABLE_ENTRIES_LIMIT } from './exact/exact-search';
import { tableEntries } from './exact/root-relaxation';
import { exactPass } from './exact-pass';
import { explainStars } from './explain/explain-stars';
import { buildInstance, type PlacementInstance, tilingOf } from './instance';
import { estimateEntries } from './integer-program/placement-program';
import { legalMapping, startTiles } from './legal-mapping';
import type { SolveOptions } from './options';
import type { SolveOutcome, SolveProgress, StopReason } from './outcome';
import { MODEL_ENTRIES_LIMIT, placementPass } from './placement-pass';
import { presolve } from './presolve/presolve';
import { type BadInput, type CheckedProblem, checkProblem, type PlacementProblem } from './problem';
import { routedPass } from './routed-pass';
import { searchPlacements } from './search/search';
import { type SolveClock, type SolveState, solveState } from './solve-state';

export interface SolveHooks extends SolveClock {
  onProgress(progress: SolveProgress): void;
  /** The integer-program engines at hand, for the choices that name them. */
  engines: readonly Engine[];
}

/** Work of the star bound above which it is left out: it comes before the first mapping, so within about half a second. */
const STAR_WORK_LIMIT = 2e7;
/** The part of the time that the search may take before the proof takes over; more as long as nothing is found. */
const SEARCH_SHARE = 0.1;
const FIRST_MAPPING_SHARE = 0.6;
/** Slices without a better mapping after which the proof begins; it lets the search go on now and then. */
const FIRST_STALE_ROUNDS = 4;

/**
 * Blocks until done: run it in a thread (see worker/). Under a node limit, same problem, options and seed give the same
 * answer as long as neither the time limit nor a stop ends it. Bad input is a value, not a throw.
 */
export function solve(
  problem: PlacementProblem,
  options: SolveOptions,
  hooks: SolveHooks,
): Result<SolveOutcome, BadInput> {
  const checked = checkProblem(problem);
  if (!checked.ok) return checked;
  const state = solveState(checked.value, options, hooks, hooks.onProgress);
  return ok(runPasses(checked.value, options, hooks, state));
}

function runPasses(
  problem: CheckedProblem,
  options: SolveOptions,
  hooks: SolveHooks,
  state: SolveState,
): SolveOutcome {
  const { kernel, graph, pins, objective, library } = problem;
  const whole = buildInstance(kernel, graph, pins, objective, library);
  const presolved = presolve(problem, whole);
  if (presolved.kind === 'infeasible') return state.infeasible(presolved.explanation);
  const { instance } = presolved;
  state.raise(Math.max(trivialBound(instance), problem.provenBound ?? 0));
  const star = starsWithinWork(instance);
  if (star) {
    const tooFar = explainStars(problem, instance, star.star);
    if (tooFar) return state.infeasible(tooFar);
    state.raise(Math.ceil(star.bound - 1e-6));
  }
  // Which placements are mirror images of each other is a matter of all candidates.
  if (problem.another) return anotherPass(problem, whole, options, state, problem.another);
  searchPass(problem, instance, options, state);
  if (options.engine === 'search' || state.shouldStop()) return state.finish('search complete');
  if (options.engine === 'auto') {
    const exact = exactPass(problem, instance, options, state, (stretch) =>
      improve(problem, instance, options, state, stretch),
    );
    if (exact.kind === 'infeasible') return state.infeasible(exact.explanation);
    return state.finish(exact.kind === 'unfinished' ? exact.stop : 'search complete');
  }
  const engines = enginesFor(options, hooks.engines);
  const placed = placementPass({
    problem,
    instance,
    star: star?.star ?? null,
    options,
    hooks,
    state,
    engines,
  });
  if (placed.kind === 'infeasible') return state.infeasible(placed.explanation);
  if (placed.kind === 'unfinished' || state.shouldStop()) return state.finish(stopOf(placed));
  const routed = routedPass({ problem, instance, options, hooks, state, engines });
  if (routed.kind === 'infeasible') return state.infeasible(routed.explanation);
  return state.finish(routed.kind === 'unfinished' ? 'routing gap' : 'search complete');
}

const stopOf = (result: { kind: string; stop?: StopReason }): StopReason => result.stop ?? 'search complete';

const enginesFor = (options: SolveOptions, engines: readonly Engine[]): readonly Engine[] =>
  options.engine === 'program' ? engines : engines.filter((engine) => engine.name === options.engine);

const starsWithinWork = (instance: PlacementInstance): ReturnType<typeof starBound> | null =>
  starWork(instance) > STAR_WORK_LIMIT ? null : starBound(instance);

/** Legal mappings from the search alone, each better one reported at once. */
function searchPass(
  problem: CheckedProblem,
  instance: PlacementInstance,
  options: SolveOptions,
  state: SolveState,
): void {
  state.setPhase('search');
  state.noteEngine('search');
  // Where nothing can follow, the search has all the time; under a node limit no share of time ends it.
  const alone = options.engine === 'search' || !canProve(options, instance);
  const startMs = state.elapsedMs();
  const spentRatio = () => (state.elapsedMs() - startMs) / (options.timeLimitMs - startMs);
  const hasShare = !alone && options.nodeLimit === null;
  const isOver = () => hasShare && spentRatio() >= (state.best() ? SEARCH_SHARE : FIRST_MAPPING_SHARE);
  const limits = alone ? { rounds: 400, staleRounds: 120 } : { rounds: 60, staleRounds: FIRST_STALE_ROUNDS };
  runSearch(
    problem,
    instance,
    startTiles(problem, instance),
    { ...limits, seed: options.seed },
    state,
    isOver,
  );
}

const canProve = ({ engine }: SolveOptions, instance: PlacementInstance): boolean =>
  engine === 'auto'
    ? tableEntries(instance) <= TABLE_ENTRIES_LIMIT
    : estimateEntries(instance) <= MODEL_ENTRIES_LIMIT;

/** Another stretch of search from the best mapping, while the proof waits; counted in slices, so that it can be repeated. */
function improve(
  problem: CheckedProblem,
  instance: PlacementInstance,
  options: SolveOptions,
  state: SolveState,
  stretch: number,
): void {
  const best = state.best();
  const start = best ? tilingOf(problem.kernel, problem.graph, best.placement) : null;
  const limits = { rounds: 60, staleRounds: FIRST_STALE_ROUNDS + stretch, seed: options.seed + stretch };
  runSearch(problem, instance, start, limits, state, () => false);
}

function runSearch(
  problem: CheckedProblem,
  instance: PlacementInstance,
  start: Int32Array | null,
  limits: { rounds: number; staleRounds: number; seed: number },
  state: SolveState,
  isOver: () => boolean,
): void {
  const { links } = problem.graph;
  searchPlacements(
    instance,
    start,
    { ...limits, bound: state.bound(), links },
    {
      shouldStop: () => state.shouldStop() || isOver(),
      settle: (tiling, round, trees) => {
        const legal = legalMapping(problem, tiling, round, state.shouldStop, trees);
        if (!legal.ok) return legal;
        state.offer(legal.mapping);
        return { ok: true, objectiveValue: legal.mapping.objectiveValue };
      },
    },
  );
}
