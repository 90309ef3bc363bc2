/** Proves the best mapping optimal, finds better ones, or proves that there is none: the exact search. */
import { exactSearch } from './exact/exact-search';
import { noPlacementReason } from './explain/proved-reasons';
import type { PlacementInstance } from './instance';
import { mappingOf } from './legal-mapping';
import { nodeWatch } from './node-watch';
import type { SolveOptions } from './options';
import type { InfeasibleReason, StopReason } from './outcome';
import type { CheckedProblem } from './problem';
import type { SolveState } from './solve-state';

export type ExactPassResult =
  | { kind: 'proved' }
  | { kind: 'infeasible'; explanation: InfeasibleReason }
  | { kind: 'unfinished'; stop: StopReason };

/** `improve` is a stretch of search, called with 1, 2, 3, … while the proof waits. */
export function exactPass(
  problem: CheckedProblem,
  instance: PlacementInstance,
  options: Pick<SolveOptions, 'nodeLimit'>,
  state: SolveState,
  improve: (stretch: number) => void,
): ExactPassResult {
  const watch = nodeWatch(options, state, improve);
  state.setPhase('exact');
  state.noteEngine('exact');
  const result = exactSearch(instance, problem.graph, {
    incumbent: () => state.best()?.objectiveValue ?? Number.POSITIVE_INFINITY,
    shouldStop: () => watch.isAtLimit() || state.shouldStop(),
    onBound: (bound) => void state.raise(bound, 'exact search'),
    onNodes: watch.onNodes,
    onMapping: (tiling, netLinks) => {
      const mapping = netLinks && mappingOf(problem, tiling, netLinks);
      if (mapping) state.offer(mapping);
      return mapping !== null;
    },
  });
  state.noteNodes(result.nodes);
  state.proof.levels = result.levels;
  state.proof.struckTiles = result.struckTiles;
  switch (result.kind) {
    case 'infeasible':
      // A legal mapping stands against it: nothing is concluded.
      return state.best()
        ? { kind: 'unfinished', stop: 'search complete' }
        : {
            kind: 'infeasible',
            explanation: result.isCongested ? tooFewChannels : noPlacementReason(problem),
          };
    case 'proved':
      state.raise(result.bound, 'exact search');
      return { kind: 'proved' };
    case 'unresolved':
      return { kind: 'unfinished', stop: 'routing gap' };
    case 'too large':
      return { kind: 'unfinished', stop: 'model too large' };
    case 'stopped':
      return { kind: 'unfinished', stop: watch.isAtLimit() ? 'node limit' : 'time limit' };
  }
}

const tooFewChannels: InfeasibleReason = {
  code: 'too few channels',
  message:
    'Proved by exhaustive search: placements exist, but none can be routed, as the links have too few channels for the nets. Add channels or links, lengthen the clock period, or remove pins.',
  opIds: [],
  tileIds: [],
  edgeIds: [],
};
