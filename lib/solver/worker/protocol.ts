/** What the solver thread and its client say to each other. Plain data, structured-cloned. */
import type { SolveOptions } from '../options';
import type { SolveOutcome, SolveProgress } from '../outcome';
import type { BadInput, PlacementProblem } from '../problem';

/** Given to the thread at its start. */
export interface ThreadInput {
  problem: PlacementProblem;
  options: SolveOptions;
  /** One 32-bit cell: see `STOP_NONE` and its fellows. */
  stopCell: SharedArrayBuffer;
}

/** A solve blocks its thread, so it is stopped through memory, not by a message. */
export const STOP_NONE = 0;
export const STOP_BY_PERSON = 1;
export const STOP_BY_MEMORY = 2;

/** From the thread. */
export type ThreadMessage =
  | { type: 'progress'; progress: SolveProgress }
  | { type: 'done'; outcome: SolveOutcome }
  | { type: 'refused'; badInput: BadInput };
