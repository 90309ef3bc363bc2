/**
 * Places a kernel on a fabric: presolve → search → exact search, or in its place the integer programs, with every
 * mapping routed and verified before it counts. One pass a function; each may end the solve by proving the best optimal.
 * Where the problem asks for another mapping than given ones, one pass of its own does that: another-pass.ts.
 */
import { isWeighted } from '../mapping/weights';
import { ok, type Result } from '../result';
import { anotherPass } from './another-pass';
import { starBound, starWork, trivialBound } from './bounds/star-bound';
import { certificateOf } from './certificate';
import type { Engine } from './engines/engine';
import { exactPass } from './exact-pass';
import { explainStars } from './explain/explain-stars';
import { buildInstance, type PlacementInstance } from './instance';
import type { SolveOptions } from './options';
import type { SolveOutcome, SolveProgress, StopReason } from './outcome';
import { placementPass } from './placement-pass';
import { presolve } from './presolve/presolve';
import { type BadInput, type CheckedProblem, checkProblem, type PlacementProblem } from './problem';
import { routedPass } from './routed-pass';
import { improvePass, searchPass } from './search-pass';
import { forSearch } from './search-weights';
import { shortenPass } from './shorten-pass';
import { type SolveClock, type SolveState, solveState } from './solve-state';
import { type WeightScale, weightScale } from './weight-scale';

export interface SolveHooks extends SolveClock {
  onProgress(progress: SolveProgress): void;
  /** The integer-program engines at hand, for the choices that name them. */
  engines: readonly Engine[];
}

/** Work of the star bound above which it is left out: it comes before the first mapping, so within about half a second. */
const STAR_WORK_LIMIT = 2e7;
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
  const { kernel, objective, weights } = checked.value;
  const scale = weightScale(kernel, objective, weights);
  const scaled = { ...checked.value, weights: scale.weights };
  const state = solveState(scaled, options, hooks, hooks.onProgress, scale);
  const outcome = runPasses(scaled, options, hooks, state, scale);
  const levels = state.proof.levels.map(({ cutoff, nodes }) => ({ cutoff: scale.toValue(cutoff), nodes }));
  const trace = { ...state.proof, levels, isRepeatable: state.isRepeatable() };
  return ok({ ...outcome, certificate: certificateOf(problem, options, outcome, trace) });
}

function runPasses(
  problem: CheckedProblem,
  options: SolveOptions,
  hooks: SolveHooks,
  state: SolveState,
  scale: WeightScale,
): SolveOutcome {
  const { kernel, graph, pins, objective, library, weights } = problem;
  const whole = buildInstance(kernel, graph, pins, objective, library, weights);
  const presolved = presolve(problem, whole);
  if (presolved.kind === 'infeasible') return state.infeasible(presolved.explanation, 'counting');
  const { instance } = presolved;
  // On the largest problems a short limit is over by now.
  if (!problem.another && state.shouldStop()) return state.finish('time limit');
  state.raise(trivialBound(instance), 'counting');
  state.raise(scale.roundUp(scale.fromValue(problem.provenBound ?? 0)), null);
  const star = starsWithinWork(instance);
  if (star) {
    const tooFar = explainStars(problem, instance, star.star);
    if (tooFar) return state.infeasible(tooFar, 'bound of the stars');
    state.raise(scale.roundUp(star.bound), 'bound of the stars');
  }
  const forIt = (one: PlacementInstance) => (isWeighted(weights, objective) ? forSearch(one) : one);
  if (problem.another) {
    // Which placements are mirror images of each other is a matter of all candidates.
    const searched = forIt(whole);
    return anotherPass({ problem, instance: whole, searched, options, state, scale, asked: problem.another });
  }
  const searched = forIt(instance);
  searchPass(problem, searched, options, state);
  const breakTies = () => {
    if (scale.kind !== 'coarse' && state.isProved()) shortenPass(problem, instance, state);
  };
  if (options.engine === 'auto') breakTies();
  if (options.engine === 'search' || state.shouldStop()) return state.finish('search complete');
  if (options.engine === 'auto') {
    const exact = exactPass(problem, instance, options, state, (stretch) =>
      improvePass(problem, searched, options, state, stretch),
    );
    if (exact.kind === 'infeasible') return state.infeasible(exact.explanation, 'exact search');
    breakTies();
    const complete = scale.kind === 'coarse' ? 'weights too far apart' : 'search complete';
    return state.finish(exact.kind === 'unfinished' ? exact.stop : complete);
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
  if (placed.kind === 'infeasible') return state.infeasible(placed.explanation, 'integer program');
  if (placed.kind === 'unfinished' || state.shouldStop()) return state.finish(stopOf(placed));
  const routed = routedPass({ problem, instance, options, hooks, state, engines });
  if (routed.kind === 'infeasible') return state.infeasible(routed.explanation, 'integer program');
  return state.finish(routed.kind === 'unfinished' ? 'routing gap' : 'search complete');
}

const stopOf = (result: { kind: string; stop?: StopReason }): StopReason => result.stop ?? 'search complete';

const enginesFor = (options: SolveOptions, engines: readonly Engine[]): readonly Engine[] =>
  options.engine === 'program' ? engines : engines.filter((engine) => engine.name === options.engine);

const starsWithinWork = (instance: PlacementInstance): ReturnType<typeof starBound> | null =>
  starWork(instance) > STAR_WORK_LIMIT ? null : starBound(instance);
