/**
 * Saving as a state machine: `autosave(state, event)` gives the next state and what to do. Pure; clock, timers and
 * transport are the runner's. Promises: one request at a time, no edit forgotten, no state of somebody else overwritten.
 */
import type { Kernel } from '@/lib/graph';
import { assertNever } from '@/lib/result';
import { sameKernel } from './same-kernel';

/** What somebody else saved in the meantime. */
export interface Theirs {
  kernel: Kernel;
  revision: number;
  changedBy: string;
}

export interface SaveState {
  phase: 'clean' | 'waiting' | 'saving' | 'retrying' | 'refused' | 'conflict';
  /** The last revision that the server told of. */
  revision: number;
  /** Null until something has been saved here. */
  savedAtMs: number | null;
  latest: Kernel;
  sent: Kernel | null;
  /** Sent, but without an answer: the server may hold it. */
  unanswered: Kernel | null;
  failures: number;
  reason: string | null;
  theirs: Theirs | null;
}

export type SaveAnswer =
  | { type: 'saved'; revision: number; atMs: number }
  | { type: 'conflict'; theirs: Theirs }
  /** Asking again is of no use before something has changed. */
  | { type: 'refused'; reason: string }
  | { type: 'unreachable'; reason: string };

export type SaveEvent =
  | { type: 'edited'; kernel: Kernel }
  | { type: 'due' }
  | { type: 'retry' }
  | { type: 'tookTheirs'; kernel: Kernel; revision: number }
  /** Edits of an earlier visit are about to be taken back; their save may have reached the server unheard. */
  | { type: 'recovered'; kernel: Kernel }
  | SaveAnswer;

export type SaveEffect =
  | { type: 'wait'; delayMs: number }
  | { type: 'send'; kernel: Kernel; baseRevision: number };

export interface SaveStep {
  state: SaveState;
  effects: readonly SaveEffect[];
}

export const SAVE_DELAY_MS = 800;
const RETRY_FIRST_MS = 1000;
const RETRY_LONGEST_MS = 30_000;

export const retryDelayMs = (failures: number): number =>
  Math.min(RETRY_LONGEST_MS, RETRY_FIRST_MS * 2 ** Math.max(0, failures - 1));

export const initialSave = (kernel: Kernel, revision: number): SaveState => ({
  phase: 'clean',
  revision,
  savedAtMs: null,
  latest: kernel,
  sent: null,
  unanswered: null,
  failures: 0,
  reason: null,
  theirs: null,
});

const stay = (state: SaveState): SaveStep => ({ state, effects: [] });

const send = (state: SaveState): SaveStep => ({
  state: { ...state, phase: 'saving', sent: state.latest },
  effects: [{ type: 'send', kernel: state.latest, baseRevision: state.revision }],
});

export function autosave(state: SaveState, event: SaveEvent): SaveStep {
  switch (event.type) {
    case 'edited':
      return edited({ ...state, latest: event.kernel });
    case 'due':
      return state.phase === 'waiting' || state.phase === 'retrying' ? send(state) : stay(state);
    case 'retry':
      return state.phase === 'retrying' || state.phase === 'refused' ? send(state) : stay(state);
    case 'saved':
      return saved(state, event);
    case 'unreachable':
      return unreachable(state, event.reason);
    case 'refused':
      return stay({ ...state, phase: 'refused', sent: null, reason: event.reason });
    case 'conflict':
      return conflict(state, event.theirs);
    case 'tookTheirs':
      return stay({ ...initialSave(event.kernel, event.revision), savedAtMs: state.savedAtMs });
    case 'recovered':
      return stay({ ...state, unanswered: event.kernel });
    default:
      return assertNever(event);
  }
}

function edited(state: SaveState): SaveStep {
  // While a request runs, a retry waits or a choice is open, the newest state is only remembered.
  if (state.phase !== 'clean' && state.phase !== 'refused') return stay(state);
  return {
    state: { ...state, phase: 'waiting', reason: null },
    effects: [{ type: 'wait', delayMs: SAVE_DELAY_MS }],
  };
}

function saved(state: SaveState, answer: { revision: number; atMs: number }): SaveStep {
  if (state.phase !== 'saving') return stay(state);
  const settled: SaveState = {
    ...state,
    revision: answer.revision,
    savedAtMs: answer.atMs,
    sent: null,
    unanswered: null,
    failures: 0,
    reason: null,
  };
  if (state.latest === state.sent) return stay({ ...settled, phase: 'clean' });
  return {
    state: { ...settled, phase: 'waiting' },
    effects: [{ type: 'wait', delayMs: SAVE_DELAY_MS }],
  };
}

function unreachable(state: SaveState, reason: string): SaveStep {
  if (state.phase !== 'saving') return stay(state);
  const failures = state.failures + 1;
  return {
    state: {
      ...state,
      phase: 'retrying',
      sent: null,
      unanswered: state.sent ?? state.unanswered,
      failures,
      reason,
    },
    effects: [{ type: 'wait', delayMs: retryDelayMs(failures) }],
  };
}

/** A state of our own that was saved though its answer got lost is no conflict: saving goes on from it. */
function conflict(state: SaveState, theirs: Theirs): SaveStep {
  if (state.phase !== 'saving') return stay(state);
  const own = [state.sent, state.unanswered].find(
    (kernel) => kernel !== null && sameKernel(kernel, theirs.kernel),
  );
  if (own) {
    const caughtUp: SaveState = {
      ...state,
      revision: theirs.revision,
      sent: null,
      unanswered: null,
      failures: 0,
    };
    return own === state.latest ? stay({ ...caughtUp, phase: 'clean', reason: null }) : send(caughtUp);
  }
  return stay({ ...state, phase: 'conflict', sent: null, reason: null, theirs });
}

/** Whether closing the page now would leave edits that only this browser has. */
export const hasUnsavedEdits = (state: SaveState): boolean => state.phase !== 'clean';
