/** What happens as the exact search counts its nodes: they are reported, end it at a limit, and let the search go on. */
import type { SolveOptions } from './options';
import type { SolveState } from './solve-state';

export interface NodeWatch {
  onNodes(nodes: number): void;
  isAtLimit(): boolean;
}

/** Nodes after which the search for mappings goes on for the first time; each later time after twice as many. */
const FIRST_STRETCH_NODES = 2000;

/** `improve` is a stretch of search, called with 1, 2, 3, … while the proof waits. */
export function nodeWatch(
  { nodeLimit }: Pick<SolveOptions, 'nodeLimit'>,
  state: SolveState,
  improve: (stretch: number) => void,
): NodeWatch {
  let stretches = 0;
  let isAtLimit = false;
  return {
    isAtLimit: () => isAtLimit,
    onNodes: (nodes) => {
      state.noteNodes(nodes);
      isAtLimit = nodeLimit !== null && nodes >= nodeLimit;
      if (isAtLimit || nodes < FIRST_STRETCH_NODES * 2 ** stretches) return;
      stretches++;
      improve(stretches);
    },
  };
}
