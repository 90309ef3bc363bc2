/** What earlier solves of one kernel on one fabric have shown for a set of pins that need not be theirs. */
import type { Objective, Pins, Placement } from '../mapping/mapping';
import { sameWeights, type Weights } from '../mapping/weights';
import type { Answer } from './pin-price';

/** A solve that has ended, however it did. */
export interface EarlierSolve {
  pins: Pins;
  objective: Objective;
  weights: Weights | undefined;
  /** It has proved that no legal mapping with its pins exists. */
  isInfeasible: boolean;
  /** No legal mapping with its pins is cheaper; null where nothing was proved. */
  bound: number | null;
  /** Its best legal mapping, if it found one. */
  best: { placement: Placement; objectiveValue: number } | null;
}

/**
 * A bound holds wherever its pins hold, and so does the proof that there is no mapping: more pins leave fewer mappings.
 * A mapping counts wherever it happens to keep the pins. Solves of another objective or with other weights say nothing.
 * `from`: the solve whose mapping it is.
 */
export function knownAnswer<Solve extends EarlierSolve>(
  pins: Pins,
  objective: Objective,
  solves: readonly Solve[],
  weights?: Weights,
): Answer & { from: Solve | null } {
  let bound = 0;
  let from: Solve | null = null;
  let isInfeasible = false;
  for (const solve of solves) {
    if (solve.objective !== objective || !sameWeights(solve.weights, weights, objective)) continue;
    if (keeps(pins, solve.pins)) {
      isInfeasible ||= solve.isInfeasible;
      bound = Math.max(bound, solve.bound ?? 0);
    }
    if (solve.best && keeps(solve.best.placement, pins) && solve.best.objectiveValue < bestOf(from)) {
      from = solve;
    }
  }
  const objectiveValue = from?.best?.objectiveValue ?? null;
  if (objectiveValue !== null) {
    const status = objectiveValue <= bound ? 'optimal' : 'feasible';
    return { status, objective, objectiveValue, bound: Math.min(bound, objectiveValue), from };
  }
  if (isInfeasible) return { status: 'infeasible', objective, objectiveValue, bound: null, from };
  return { status: 'unknown', objective, objectiveValue, bound, from };
}

const bestOf = (solve: EarlierSolve | null): number =>
  solve?.best?.objectiveValue ?? Number.POSITIVE_INFINITY;

/** Whether every op that `pins` names is where they say. */
const keeps = (where: Pins | Placement, pins: Pins): boolean =>
  Object.entries(pins).every(([op, tile]) => where[op as keyof typeof where] === tile);
