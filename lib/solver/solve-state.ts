/** The best mapping and bound of one solve while it runs, and how they become an outcome. */

import type { Objective } from '../mapping/mapping';
import { compareMappings } from './legal-mapping';
import type { SolveOptions } from './options';
import {
  type BestMapping,
  gapRatioOf,
  type InfeasibleReason,
  type SolveOutcome,
  type SolvePhase,
  type SolveProgress,
  type StopReason,
} from './outcome';
import type { CheckedProblem } from './problem';

export interface SolveClock {
  /** Monotonic milliseconds. */
  nowMs(): number;
  shouldStop(): boolean;
  /** Why `shouldStop` is true, where it is not a person's wish. */
  stopCause?(): 'stopped' | 'memory limit';
}

/** How often the number of nodes is reported while nothing else happens. */
const NODES_EVERY_MS = 250;

export interface SolveState {
  best(): BestMapping | null;
  bound(): number;
  elapsedMs(): number;
  remainingMs(): number;
  setPhase(phase: SolvePhase): void;
  /** Takes the mapping if it is better, and reports it. */
  offer(mapping: BestMapping): void;
  /** Takes a proven bound if it is higher, and reports it. A bound above a legal mapping is refused: false. */
  raise(bound: number): boolean;
  isProved(): boolean;
  /** Out of time, stopped by hand, or proved. */
  shouldStop(): boolean;
  noteEngine(name: string): void;
  /** Nodes that the exact search has looked at. */
  noteNodes(nodes: number): void;
  finish(fallback: StopReason): SolveOutcome;
  infeasible(explanation: InfeasibleReason): SolveOutcome;
}

export function solveState(
  problem: CheckedProblem,
  options: SolveOptions,
  clock: SolveClock,
  onProgress: (progress: SolveProgress) => void,
): SolveState {
  const startMs = clock.nowMs();
  const elapsedMs = () => clock.nowMs() - startMs;
  const remainingMs = () => options.timeLimitMs - elapsedMs();
  const engines: string[] = [];
  let phase: SolvePhase = 'presolve';
  let best: BestMapping | null = null;
  let bound = 0;
  let nodes = 0;
  let reportedMs = 0;
  const report = () => {
    reportedMs = elapsedMs();
    onProgress({
      phase,
      best,
      bound,
      gapRatio: gapRatioOf(best?.objectiveValue ?? null, bound),
      elapsedMs: elapsedMs(),
      nodes,
    });
  };
  const isProved = () => best !== null && best.objectiveValue <= bound;
  const common = () => ({
    engine: engines.join(' + ') || 'presolve',
    objective: problem.objective,
    elapsedMs: Math.round(elapsedMs()),
    seed: options.seed,
    nodes,
  });
  const cause = (fallback: StopReason): StopReason => {
    if (clock.shouldStop()) return clock.stopCause?.() ?? 'stopped';
    return remainingMs() <= 0 ? 'time limit' : fallback;
  };
  return {
    best: () => best,
    bound: () => bound,
    elapsedMs,
    remainingMs,
    isProved,
    setPhase: (next) => {
      phase = next;
      report();
    },
    offer: (mapping) => {
      if (best && compareMappings(mapping, best) >= 0) return;
      best = mapping;
      report();
    },
    raise: (next) => {
      if (!Number.isFinite(next)) return false;
      if (best && next > best.objectiveValue + 1e-6) return false;
      if (next > bound) {
        bound = best ? Math.min(next, best.objectiveValue) : next;
        report();
      }
      return true;
    },
    shouldStop: () => isProved() || remainingMs() <= 0 || clock.shouldStop(),
    noteEngine: (name) => {
      if (!engines.includes(name)) engines.push(name);
    },
    noteNodes: (looked) => {
      nodes = looked;
      if (elapsedMs() - reportedMs >= NODES_EVERY_MS) report();
    },
    finish: (fallback) =>
      best ? found(best, bound, cause(fallback), common()) : nothing(bound, cause(fallback), common()),
    infeasible: (explanation) => ({
      ...common(),
      status: 'infeasible',
      objectiveValue: null,
      bound: null,
      gapRatio: null,
      stopReason: 'proved infeasible',
      placement: null,
      routes: null,
      reason: explanation.message,
      explanation,
    }),
  };
}

type Common = Pick<SolveOutcome, 'engine' | 'objective' | 'elapsedMs' | 'seed' | 'nodes'>;

function found(best: BestMapping, bound: number, stopReason: StopReason, common: Common): SolveOutcome {
  const { objectiveValue, placement, routes } = best;
  const answer = { ...common, objectiveValue, placement, routes, reason: null, explanation: null };
  if (objectiveValue <= bound) {
    return { ...answer, status: 'optimal', bound: objectiveValue, gapRatio: 0, stopReason: 'proved optimal' };
  }
  const gapRatio = gapRatioOf(objectiveValue, bound) ?? 0;
  return { ...answer, status: 'feasible', bound, gapRatio, stopReason };
}

function nothing(bound: number, stopReason: StopReason, common: Common): SolveOutcome {
  const why: Record<StopReason, string> = {
    'time limit': 'No legal mapping was found within the time limit: allow more time.',
    'node limit':
      'The exact search reached its node limit before a legal mapping was found: allow more nodes.',
    stopped: 'The solve was stopped before a legal mapping was found.',
    'memory limit':
      'The solve reached its memory limit before a legal mapping was found: use a smaller fabric.',
    'model too large':
      'The search found no legal mapping, and the integer program would be too large to prove more.',
    'search complete': 'The search ended without a legal mapping: allow more time, or add channels or units.',
    'another found': 'The solve ended without a legal mapping.',
    'routing gap':
      'Placements exist, but none that was tried could be routed: add channels to the links or allow more time.',
    'thread failed': 'The solver thread ended unexpectedly before a legal mapping was found: try again.',
  };
  return {
    ...common,
    status: 'unknown',
    objectiveValue: null,
    bound,
    gapRatio: null,
    stopReason,
    placement: null,
    routes: null,
    reason: why[stopReason],
    explanation: null,
  };
}

/** The outcome of a solve that was cut off, from its last report. */
export function interruptedOutcome(
  objective: Objective,
  options: SolveOptions,
  last: SolveProgress | null,
  elapsedMs: number,
  stopReason: StopReason,
): SolveOutcome {
  const common = {
    engine: options.engine,
    objective,
    elapsedMs: Math.round(elapsedMs),
    seed: options.seed,
    nodes: last?.nodes ?? 0,
  };
  const bound = last?.bound ?? 0;
  return last?.best ? found(last.best, bound, stopReason, common) : nothing(bound, stopReason, common);
}
