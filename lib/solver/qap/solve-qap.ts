/**
 * Solves a quadratic assignment problem by the passes that place kernels: bound by stars, search, exact search. Each
 * may end the solve by closing the gap. Every assignment's value is computed afresh from the matrices before it counts.
 */
import { ok, type Result } from '../../result';
import { starBound, starWork } from '../bounds/star-bound';
import { searchPlacements } from '../search/search';
import type { SolveClock } from '../solve-state';
import { exactPass } from './exact-pass';
import { gilmoreLawlerBound } from './gilmore-lawler';
import type { QapProblem } from './qap';
import { type QapModel, qapInstance, valueBound } from './qap-instance';
import { type QapOptions, type QapOutcome, type QapProgress, type QapState, qapState } from './qap-state';

export interface QapHooks extends SolveClock {
  onProgress(progress: QapProgress): void;
}

/** Work of the star bound above which it is left out: about half a second. */
const STAR_WORK_LIMIT = 1e8;
/** The exact search begins and ends by these parts of the time; the search has what is left on both sides. */
const EXACT_FROM = 0.1;
const EXACT_TO = 0.75;
/** Slices of the search. Before the exact search, more on large problems, where less may be hoped of a proof. */
const slicesBefore = (n: number): number => Math.max(16, 2 * n);
const SLICES_AFTER = 400;
/** Slices without a better assignment after which the search ends, unless time alone had ended the exact search. */
const STALE_SLICES = 120;

/**
 * Blocks until done. Same problem, options and seed give the same answer as long as neither the time limit nor a stop
 * ends it. Refused with a sentence where the matrices do not fit a placement. Precondition: entries are whole numbers
 * and n² · max |flow| · max |distance| is at most 2⁴⁹, so that all sums are exact.
 */
export function solveQap(
  problem: QapProblem,
  options: QapOptions,
  hooks: QapHooks,
): Result<QapOutcome, string> {
  const made = qapInstance(problem);
  if (!made.ok) return made;
  const model = made.value;
  const state = qapState(problem, options, hooks, hooks.onProgress);
  state.raise(starsBound(model));
  const until = (part: number) => (): boolean =>
    state.shouldStop() || state.elapsedMs() > part * options.timeLimitMs;
  const slices = slicesBefore(problem.n);
  const first = { rounds: slices, staleRounds: slices, seed: options.seed };
  searchPass(model, state, first, until(EXACT_FROM));
  const reason = state.shouldStop() ? 'search complete' : exactPass(model, state, until(EXACT_TO));
  const [rounds, staleRounds] = reason === 'time limit' ? [1e9, 1e9] : [SLICES_AFTER, STALE_SLICES];
  searchPass(model, state, { rounds, staleRounds, seed: options.seed + 1 }, state.shouldStop);
  return ok(state.finish(reason));
}

/** The placement's own search, from the best assignment that is known. */
function searchPass(
  model: QapModel,
  state: QapState,
  limits: { rounds: number; staleRounds: number; seed: number },
  shouldStop: () => boolean,
): void {
  if (shouldStop()) return;
  state.noteEngine('search');
  const { scale, offset } = model;
  searchPlacements(
    model.instance,
    model.tilingOf(state.best().locationOf),
    { ...limits, bound: (state.best().bound - offset) / scale },
    {
      shouldStop,
      settle: (tiling) => {
        const value = model.modelValue(tiling);
        state.offer(model.locationsOf(tiling), value);
        return { ok: true, objectiveValue: (value - offset) / scale };
      },
    },
  );
}

/** The value that no assignment is below. Where hops have a direction, the dearer star bound may be the higher one. */
function starsBound(model: QapModel): number {
  const { instance, isSymmetric } = model;
  const sorted = gilmoreLawlerBound(instance, isSymmetric);
  const isWorthwhile = !isSymmetric && starWork(instance) <= STAR_WORK_LIMIT;
  return valueBound(model, isWorthwhile ? Math.max(sorted, starBound(instance).bound) : sorted);
}
