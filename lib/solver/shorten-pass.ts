/**
 * Breaks ties between mappings of least cost by the shorter longest path: with the best mapping proved, the exact search
 * is asked for one of the same cost whose paths are all shorter than its longest, and again, until there is none.
 * A limit on paths is what the clock is (R7), so nothing new is searched by.
 */
import { exactSearch } from './exact/exact-search';
import { costStep } from './exact/standing-nets';
import type { PlacementInstance } from './instance';
import { mappingOf } from './legal-mapping';
import type { BestMapping } from './outcome';
import type { CheckedProblem } from './problem';
import type { SolveState } from './solve-state';

/** Nodes for each length that is asked for: ties are not worth more than a proof. */
const NODES_A_LENGTH = 500;

/** Precondition: the best mapping is proved optimal. True when no mapping of its cost has a shorter longest path. */
export function shortenPass(
  problem: CheckedProblem,
  instance: PlacementInstance,
  state: SolveState,
): boolean {
  state.setPhase('ties');
  for (let best = state.best(); best && best.longestPathHops > 1; ) {
    const shorter = shorterThan(problem, instance, state, best);
    if (shorter === 'unknown') return false;
    if (shorter === 'none') return true;
    state.offer(shorter);
    best = shorter;
  }
  return true;
}

function shorterThan(
  problem: CheckedProblem,
  instance: PlacementInstance,
  state: SolveState,
  best: BestMapping,
): BestMapping | 'none' | 'unknown' {
  const maxHops = best.longestPathHops - 1;
  const most = best.objectiveValue + costStep(instance);
  let found: BestMapping | null = null;
  let nodes = 0;
  const isOver = () => found !== null || nodes >= NODES_A_LENGTH || state.isOutOfTime();
  const result = exactSearch(
    { ...instance, maxHops },
    { ...problem.graph, maxHops },
    {
      incumbent: () => most,
      shouldStop: isOver,
      onBound: () => undefined,
      onNodes: (looked) => {
        nodes = looked;
      },
      onMapping: (tiling, netLinks) => {
        const mapping = netLinks && mappingOf(problem, tiling, netLinks);
        if (mapping && mapping.longestPathHops <= maxHops) found ??= mapping;
        return mapping !== null;
      },
    },
  );
  if (found) return found;
  return result.kind === 'proved' || result.kind === 'infeasible' ? 'none' : 'unknown';
}
