/** Bounds the objective by the placement model, and takes every placement the engine meets as a candidate. */
import { attemptsFor } from './engines/choose-engine';
import type { Engine, EngineOutcome } from './engines/engine';
import { noPlacementReason } from './explain/proved-reasons';
import { type PlacementInstance, tilingOf } from './instance';
import type { IntegerProgram } from './integer-program/integer-program';
import { estimateEntries, placementProgram } from './integer-program/placement-program';
import { legalMapping } from './legal-mapping';
import type { SolveOptions } from './options';
import type { InfeasibleReason, StopReason } from './outcome';
import type { CheckedProblem } from './problem';
import type { SolveClock, SolveState } from './solve-state';

export interface PassInput {
  problem: CheckedProblem;
  instance: PlacementInstance;
  options: SolveOptions;
  hooks: SolveClock;
  state: SolveState;
  engines: readonly Engine[];
}

export type PassResult =
  /** The model is solved; its optimum is the state's bound. */
  | { kind: 'solved' }
  | { kind: 'unfinished'; stop: StopReason }
  | { kind: 'infeasible'; explanation: InfeasibleReason };

/** Entries above which a model is not built: HiGHS was seen not to get past its presolve there within a minute. */
export const MODEL_ENTRIES_LIMIT = 150_000;

export function placementPass(input: PassInput & { star: Float64Array | null }): PassResult {
  const { problem, instance, star, state } = input;
  state.setPhase('bound');
  if (estimateEntries(instance) > MODEL_ENTRIES_LIMIT) return { kind: 'unfinished', stop: 'model too large' };
  const built = placementProgram(instance, star);
  const best = state.best();
  const tiling = best ? tilingOf(problem.kernel, problem.graph, best.placement) : null;
  return runEngines(input, built.program, tiling ? built.encode(tiling) : null, {
    onPoint: (values) => {
      const found = built.decode(values);
      if (!found) return;
      const legal = legalMapping(problem, found, 0, state.shouldStop);
      if (legal.ok) state.offer(legal.mapping);
    },
    infeasible: () => noPlacementReason(problem),
  });
}

export interface PointHandling {
  onPoint(values: Float64Array): void;
  infeasible(): InfeasibleReason;
}

/** Runs the engines in turn until one solves the model; what they prove on the way stays. */
export function runEngines(
  { options, hooks, state, engines }: PassInput,
  program: IntegerProgram,
  warmStart: Float64Array | null,
  handling: PointHandling,
): PassResult {
  let stop: StopReason = 'search complete';
  for (const attempt of attemptsFor(program, options.engine, engines, state.remainingMs())) {
    state.noteEngine(attempt.engine.name);
    const outcome = attempt.engine.solveModel(program, {
      timeLimitMs: Math.max(1, Math.min(attempt.timeLimitMs, state.remainingMs())),
      seed: options.seed,
      nowMs: hooks.nowMs,
      shouldStop: state.shouldStop,
      warmStart,
      onPoint: (_, values) => handling.onPoint(values),
      onBound: (bound) => void state.raise(bound, 'integer program'),
    });
    const result = take(outcome, state, handling);
    if (result) return result;
    if (state.shouldStop()) break;
    stop =
      outcome.status === 'unfinished' && outcome.stop === 'engine failed' ? 'thread failed' : 'time limit';
  }
  return { kind: 'unfinished', stop };
}

function take(outcome: EngineOutcome, state: SolveState, handling: PointHandling): PassResult | null {
  switch (outcome.status) {
    case 'infeasible':
      // A legal mapping stands against it: the engine erred, so nothing is concluded.
      return state.best() ? null : { kind: 'infeasible', explanation: handling.infeasible() };
    case 'optimal':
      if (!state.raise(outcome.bound, 'integer program')) return null;
      handling.onPoint(outcome.values);
      return { kind: 'solved' };
    case 'unfinished':
      if (outcome.bound !== null) state.raise(outcome.bound, 'integer program');
      if (outcome.best) handling.onPoint(outcome.best.values);
      return null;
  }
}
