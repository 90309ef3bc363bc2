/** Doing, undoing and redoing edits of one kernel. Pure: the store keeps what these return. */
import { applyEdit, type GraphEdit, invertEdit, type Kernel } from '@/lib/graph';
import { ok, type Result } from '@/lib/result';

/** One thing the person did, with the way back. */
export interface Step {
  label: string;
  forward: GraphEdit;
  backward: GraphEdit;
  /** Steps in a row with the same key are undone together (nudges of one selection); null never joins. */
  joinKey: string | null;
}

export interface History {
  done: readonly Step[];
  undone: readonly Step[];
}

export interface Change {
  kernel: Kernel;
  history: History;
}

const STEPS_KEPT = 500;

export const emptyHistory: History = { done: [], undone: [] };

/** Whether an edit leaves every kernel as it is: such edits make no step. */
export function isEmptyEdit(edit: GraphEdit): boolean {
  if (edit.type === 'batch') return edit.edits.every(isEmptyEdit);
  return edit.type === 'moveOps' && edit.moves.length === 0;
}

/** Applies an edit and remembers it; what had been undone before is forgotten. */
export function perform(
  { kernel, history }: Change,
  edit: GraphEdit,
  label: string,
  joinKey: string | null = null,
): Result<Change, string> {
  if (isEmptyEdit(edit)) return ok({ kernel, history });
  const applied = applyEdit(kernel, edit);
  if (!applied.ok) return applied;
  const step: Step = { label, forward: edit, backward: invertEdit(kernel, edit), joinKey };
  const last = history.done.at(-1);
  const joins = joinKey !== null && last?.joinKey === joinKey && history.undone.length === 0;
  const done = joins ? [...history.done.slice(0, -1), joined(last, step)] : [...history.done, step];
  return ok({ kernel: applied.value, history: { done: done.slice(-STEPS_KEPT), undone: [] } });
}

const joined = (first: Step, second: Step): Step => ({
  ...first,
  forward: { type: 'batch', edits: [first.forward, second.forward] },
  backward: { type: 'batch', edits: [second.backward, first.backward] },
});

/** The state before the last step, or null when there is none. */
export function undo({ kernel, history }: Change): (Change & { step: Step }) | null {
  const step = history.done.at(-1);
  if (step === undefined) return null;
  return {
    step,
    kernel: made(applyEdit(kernel, step.backward)),
    history: { done: history.done.slice(0, -1), undone: [...history.undone, step] },
  };
}

/** The state after the step that was undone last, or null when there is none. */
export function redo({ kernel, history }: Change): (Change & { step: Step }) | null {
  const step = history.undone.at(-1);
  if (step === undefined) return null;
  return {
    step,
    kernel: made(applyEdit(kernel, step.forward)),
    history: { done: [...history.done, step], undone: history.undone.slice(0, -1) },
  };
}

/** Steps fit the kernel they stand on, because nothing else writes it. */
function made(applied: Result<Kernel, string>): Kernel {
  if (!applied.ok) throw new Error(`A step of the history does not fit its kernel: ${applied.error}`);
  return applied.value;
}
