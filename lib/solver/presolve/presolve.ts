/** What can be said and struck out before anything is searched: a reason why nothing is legal, or a smaller instance. */
import { explainCrowding } from '../explain/explain-crowding';
import { explainCuts } from '../explain/explain-cuts';
import { explainInfeasible } from '../explain/explain-infeasible';
import { explainLostOp } from '../explain/explain-lost-op';
import type { PlacementInstance } from '../instance';
import type { InfeasibleReason } from '../outcome';
import type { CheckedProblem } from '../problem';
import { filterCandidates } from './filter-candidates';

export type Presolved =
  /** The same problem with the candidates that the filter has left. */
  { kind: 'open'; instance: PlacementInstance } | { kind: 'infeasible'; explanation: InfeasibleReason };

/** Cost: `explainInfeasible`, `filterCandidates`, `explainCuts`; each bounded by a count of steps. */
export function presolve(problem: CheckedProblem, instance: PlacementInstance): Presolved {
  const plain = explainInfeasible(problem, instance);
  if (plain) return { kind: 'infeasible', explanation: plain };
  const filtered = filterCandidates(instance, problem.graph);
  const { emptied, losses } = filtered;
  if (emptied !== null) {
    return {
      kind: 'infeasible',
      explanation: explainLostOp(problem, instance, emptied, losses.get(emptied) ?? []),
    };
  }
  const left = { ...instance, candidates: filtered.candidates };
  const explanation =
    (filtered.struckOut > 0 ? explainCrowding(problem, left, losses) : null) ??
    explainCuts(problem, left, filtered.sets);
  return explanation ? { kind: 'infeasible', explanation } : { kind: 'open', instance: left };
}
