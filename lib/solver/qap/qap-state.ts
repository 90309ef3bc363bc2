/** The best assignment and bound of one solve while it runs, in the values of the two matrices. */
import type { StopReason } from '../outcome';
import type { SolveClock } from '../solve-state';
import { type QapProblem, qapValue } from './qap';

export interface QapOptions {
  timeLimitMs: number;
  seed: number;
}

interface QapOutcomeBase {
  objectiveValue: number;
  /** No assignment has a smaller value. */
  bound: number;
  /** Location by facility, both counted from 0. */
  locationOf: number[];
  /** The methods that took part, such as `search + exact`. */
  engine: string;
  elapsedMs: number;
  seed: number;
  /** Nodes of the exact search's tree; null where it did not run or did not say. */
  nodes: number | null;
}

export interface OptimalQap extends QapOutcomeBase {
  status: 'optimal';
  stopReason: 'proved optimal';
  gapRatio: 0;
}

export interface FeasibleQap extends QapOutcomeBase {
  status: 'feasible';
  stopReason: StopReason;
  /** (value − bound) / |value|; null where the value is 0. */
  gapRatio: number | null;
}

/** There is always an assignment, so a solve never ends with less than a feasible one. */
export type QapOutcome = OptimalQap | FeasibleQap;

/** What a solve has so far; enough to answer with when its thread is ended. */
export type QapProgress = QapOutcomeBase;

export interface QapState {
  best(): QapProgress;
  elapsedMs(): number;
  isProved(): boolean;
  shouldStop(): boolean;
  /** Takes the assignment where its value, computed afresh, is better. Throws where `expected` is not that value. */
  offer(locationOf: ArrayLike<number>, expected: number): void;
  /** Takes a proven bound where it is higher. Throws for one above a known value. */
  raise(bound: number): void;
  noteEngine(name: string): void;
  noteNodes(nodes: number): void;
  finish(fallback: StopReason): QapOutcome;
}

/** Starts with facility i on location i and the given bound. */
export function qapState(
  problem: QapProblem,
  options: QapOptions,
  clock: SolveClock,
  onProgress: (progress: QapProgress) => void,
): QapState {
  const startMs = clock.nowMs();
  const elapsedMs = () => clock.nowMs() - startMs;
  const engines: string[] = [];
  const start = Array.from({ length: problem.n }, (_, i) => i);
  let locationOf = start;
  let objectiveValue = qapValue(problem, start) as number;
  let bound = Number.NEGATIVE_INFINITY;
  let nodes: number | null = null;
  const best = (): QapProgress => ({
    objectiveValue,
    bound,
    locationOf,
    engine: engines.join(' + ') || 'presolve',
    elapsedMs: Math.round(elapsedMs()),
    seed: options.seed,
    nodes,
  });
  const report = () => {
    if (Number.isFinite(bound)) onProgress(best());
  };
  const isProved = () => objectiveValue <= bound;
  const cause = (fallback: StopReason): StopReason => {
    if (clock.shouldStop()) return clock.stopCause?.() ?? 'stopped';
    return elapsedMs() >= options.timeLimitMs ? 'time limit' : fallback;
  };
  return {
    best,
    elapsedMs,
    isProved,
    shouldStop: () => isProved() || elapsedMs() >= options.timeLimitMs || clock.shouldStop(),
    offer: (offered, expected) => {
      const value = qapValue(problem, offered);
      if (value !== expected) {
        throw new Error(`The solver took an assignment to be worth ${expected}, and it is worth ${value}.`);
      }
      if (value < bound) throw new Error(`The bound ${bound} is above an assignment of value ${value}.`);
      if (value >= objectiveValue) return;
      locationOf = Array.from(offered);
      objectiveValue = value;
      report();
    },
    raise: (next) => {
      if (next > objectiveValue) throw new Error(`The bound ${next} is above the value ${objectiveValue}.`);
      if (!(next > bound)) return;
      bound = next;
      report();
    },
    noteEngine: (name) => {
      if (!engines.includes(name)) engines.push(name);
    },
    noteNodes: (count) => {
      nodes = count;
    },
    finish: (fallback) => qapOutcome(best(), cause(fallback)),
  };
}

/** The outcome of what a solve has. */
export function qapOutcome(progress: QapProgress, stopReason: StopReason): QapOutcome {
  const { objectiveValue, bound } = progress;
  if (objectiveValue <= bound) {
    return { ...progress, status: 'optimal', stopReason: 'proved optimal', gapRatio: 0 };
  }
  const gapRatio = objectiveValue === 0 ? null : (objectiveValue - bound) / Math.abs(objectiveValue);
  return { ...progress, status: 'feasible', stopReason, gapRatio };
}
