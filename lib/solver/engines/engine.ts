/** What an integer-program engine is to the solver: data, so that more of them can be handed in. */
import type { IntegerProgram } from '../integer-program/integer-program';

export interface EngineLimits {
  /** Wall-clock time from the call. */
  timeLimitMs: number;
  seed: number;
  nowMs(): number;
  /** Looked at often; true ends the run with what is known. */
  shouldStop(): boolean;
  /** A known feasible point. */
  warmStart: Float64Array | null;
  /** Each better point as it is found; `values` is the engine's own copy. */
  onPoint?(objectiveValue: number, values: Float64Array): void;
  /** Each better proven bound. */
  onBound?(bound: number): void;
}

export type EngineStop = 'time limit' | 'stopped' | 'engine failed';

/** Numbers are finite or null. */
export type EngineOutcome =
  | { status: 'optimal'; objectiveValue: number; bound: number; values: Float64Array }
  | { status: 'infeasible' }
  | {
      status: 'unfinished';
      stop: EngineStop;
      bound: number | null;
      best: { objectiveValue: number; values: Float64Array } | null;
      message: string | null;
    };

export interface Engine {
  name: string;
  /** Blocks until done: only ever called in a thread. Never throws for a model it cannot solve. */
  solveModel(program: IntegerProgram, limits: EngineLimits): EngineOutcome;
}

/**
 * A proven bound, rounded up where every objective is an integer. Either way less what the engine's own tolerances may
 * have added, for rows and for the relative precision of large objectives.
 */
export function tightenBound(program: IntegerProgram, bound: number): number {
  const large = 1e-9 * Math.abs(bound);
  return program.hasIntegerObjective ? Math.ceil(bound - 1e-5 - large) : bound - 1e-6 - large;
}
