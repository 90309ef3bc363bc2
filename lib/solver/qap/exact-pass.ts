/** The placement's exact search on an assignment problem. Nothing is routed: an assignment is legal as it stands. */
import { exactSearch } from '../exact/exact-search';
import type { PlacementInstance } from '../instance';
import type { StopReason } from '../outcome';
import { type QapModel, valueBound } from './qap-instance';
import type { QapState } from './qap-state';

/** Entries of the pairs' cost tables up to which a node of the exact search takes no more than about 0.1 s. */
const TABLE_ENTRIES = 400_000;

/** Raises the bound and betters the assignment until the gap is closed or the time is over. */
export function exactPass(model: QapModel, state: QapState, shouldStop: () => boolean): StopReason {
  const { scale, offset } = model;
  const instance = [withEveryPair(model.instance), model.instance].find(isWithinTables);
  if (!instance) return 'model too large';
  state.noteEngine('exact');
  const result = exactSearch(instance, null, {
    incumbent: () => (state.best().objectiveValue - offset) / scale,
    shouldStop,
    onBound: (bound) => state.raise(valueBound(model, bound)),
    onMapping: (tiling) => {
      state.offer(model.locationsOf(tiling), model.modelValue(tiling));
      return true;
    },
    onNodes: state.noteNodes,
  });
  if (result.kind === 'too large') return 'model too large';
  state.noteNodes(result.nodes);
  // Every permutation is an assignment, so a proof that there is none is a fault of the prover.
  if (result.kind === 'infeasible') throw new Error('The exact search found no assignment to exist.');
  if (Number.isFinite(result.bound)) state.raise(valueBound(model, result.bound));
  // More time would have let it go on.
  return result.kind === 'stopped' ? 'time limit' : 'search complete';
}

const isWithinTables = ({ pairs, tileCount }: PlacementInstance): boolean =>
  pairs.length * tileCount ** 2 <= TABLE_ENTRIES;

/**
 * Pairs without traffic join with weight 0: they cost nothing, but the dual ascent passes reduced costs through them
 * (Hahn and Grant 1998). nug12 is proved in 1,462 nodes with them and in 544,814 without.
 */
export function withEveryPair(instance: PlacementInstance): PlacementInstance {
  const free = instance.candidates.flatMap((tiles, op) => (tiles.length > 1 ? [op] : []));
  const met = new Set(instance.pairs.flatMap(({ from, to }) => [`${from}>${to}`, `${to}>${from}`]));
  const silent = free.flatMap((from, i) =>
    free.slice(i + 1).flatMap((to) => (met.has(`${from}>${to}`) ? [] : [{ from, to, weight: 0 }])),
  );
  return { ...instance, pairs: [...instance.pairs, ...silent] };
}
