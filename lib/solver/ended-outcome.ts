/** The outcome of a solve that has ended without more to say than its best mapping and its bound. */
import type { Objective } from '../mapping/mapping';
import type { SolveOptions } from './options';
import {
  type BestMapping,
  gapRatioOf,
  type SolveOutcome,
  type SolveProgress,
  type StopReason,
} from './outcome';

type Common = Pick<SolveOutcome, 'engine' | 'objective' | 'elapsedMs' | 'seed' | 'nodes' | 'certificate'>;

export function foundOutcome(
  best: BestMapping,
  bound: number,
  stopReason: StopReason,
  common: Common,
): SolveOutcome {
  const { objectiveValue, placement, routes } = best;
  const answer = { ...common, objectiveValue, placement, routes, reason: null, explanation: null };
  if (objectiveValue <= bound) {
    return { ...answer, status: 'optimal', bound: objectiveValue, gapRatio: 0, stopReason: 'proved optimal' };
  }
  const gapRatio = gapRatioOf(objectiveValue, bound) ?? 0;
  return { ...answer, status: 'feasible', bound, gapRatio, stopReason };
}

export function nothingOutcome(bound: number, stopReason: StopReason, common: Common): SolveOutcome {
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
    'weights too far apart': 'The search ended without a legal mapping: allow more time.',
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
    certificate: null,
  };
  const bound = last?.bound ?? 0;
  return last?.best
    ? foundOutcome(last.best, bound, stopReason, common)
    : nothingOutcome(bound, stopReason, common);
}
