/** Runs the autosave machine: timers, requests and a deadline for each. The clock and the transport are handed in. */
import type { Kernel } from '@/lib/graph';
import { autosave, type SaveAnswer, type SaveEvent, type SaveState } from './autosave';

export interface SaveRunnerParts {
  initial: SaveState;
  /** Rejecting counts as unreachable. */
  send(kernel: Kernel, baseRevision: number): Promise<SaveAnswer>;
  /** Calls back after a delay; returns what cancels it. */
  after(delayMs: number, run: () => void): () => void;
  onChange(state: SaveState): void;
}

export interface SaveRunner {
  state(): SaveState;
  dispatch(event: SaveEvent): void;
  /** Ends timers; an answer that comes later is not heard. */
  stop(): void;
}

export const ANSWER_DEADLINE_MS = 20_000;
const UNREACHABLE = 'server unreachable';

export function runAutosave(parts: SaveRunnerParts): SaveRunner {
  let state = parts.initial;
  let cancelWait = () => {};
  let stopped = false;

  function dispatch(event: SaveEvent): void {
    if (stopped) return;
    const step = autosave(state, event);
    state = step.state;
    for (const effect of step.effects) {
      cancelWait();
      if (effect.type === 'wait') cancelWait = parts.after(effect.delayMs, () => dispatch({ type: 'due' }));
      else request(effect.kernel, effect.baseRevision);
    }
    parts.onChange(state);
  }

  function request(kernel: Kernel, baseRevision: number): void {
    let answered = false;
    const answer = (event: SaveAnswer) => {
      if (answered) return;
      answered = true;
      cancelDeadline();
      dispatch(event);
    };
    const cancelDeadline = parts.after(ANSWER_DEADLINE_MS, () =>
      answer({ type: 'unreachable', reason: 'no answer from the server' }),
    );
    parts.send(kernel, baseRevision).then(answer, () => answer({ type: 'unreachable', reason: UNREACHABLE }));
  }

  return {
    state: () => state,
    dispatch,
    stop() {
      stopped = true;
      cancelWait();
    },
  };
}
