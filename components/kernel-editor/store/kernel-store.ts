/** The state of one kernel editor. Its actions are short calls into lib/graph; every change of the kernel is an edit. */
import { createStore, type StoreApi } from 'zustand/vanilla';
import {
  type ConnectionRequest,
  canConnect,
  copyFragment,
  type GraphEdit,
  type Kernel,
  type KernelFragment,
  newOp,
  type Op,
  type OpId,
  type OpKind,
  opName,
  pasteFragment,
  removeOpsEdit,
} from '@/lib/graph';
import { type Connecting, startConnecting } from './connecting';
import { emptyHistory, type History, perform, redo, undo } from './history';
import { indexOf } from './kernel-facts';
import { connectEdit } from './op-edits';
import { noSelection, pruned, type Selection, selectEdge, selectOps } from './selection';

export type PanelName = 'shortcuts' | 'connect' | 'keepVersion' | 'versions';
/** What a drag on the empty canvas does. */
export type DragMode = 'select' | 'pan';

export interface KernelState {
  kernel: Kernel;
  readOnly: boolean;
  history: History;
  selection: Selection;
  /** The op that the keyboard stands on. */
  focusedOp: OpId | null;
  fragment: KernelFragment | null;
  /** Times the fragment has been pasted: each paste lies a little further off. */
  pasteCount: number;
  connecting: Connecting | null;
  /** A connection that would close a cycle and waits for its distance. */
  loopOffer: ConnectionRequest | null;
  /** The line at the foot: what just happened or why something was refused. */
  said: string;
  dialog: PanelName | null;
  dragMode: DragMode;

  edit(edit: GraphEdit, label: string, joinKey?: string): boolean;
  undo(): void;
  redo(): void;
  select(selection: Selection): void;
  focusOp(id: OpId | null): void;
  addOp(kind: OpKind, positionPx: Op['positionPx']): OpId | null;
  removeSelected(): void;
  copy(): void;
  paste(fragment?: KernelFragment): readonly OpId[];
  startConnecting(from: OpId, by: Connecting['by']): void;
  stopConnecting(): void;
  /** Connects, or asks for a distance, or says why not. */
  connect(request: ConnectionRequest): void;
  connectLater(request: ConnectionRequest, distance: number): void;
  dismissLoopOffer(): void;
  say(text: string): void;
  openDialog(dialog: PanelName | null): void;
  setDragMode(mode: DragMode): void;
}

export type KernelStore = StoreApi<KernelState>;

const PASTE_STEP_PX = 32;

export function createKernelStore(start: { kernel: Kernel; readOnly: boolean }): KernelStore {
  return createStore<KernelState>((set, get) => {
    const follow = (change: { kernel: Kernel; history: History }) =>
      set((now) => ({
        kernel: change.kernel,
        history: change.history,
        selection: pruned(now.selection, change.kernel),
        focusedOp: change.kernel.ops.some((op) => op.id === now.focusedOp) ? now.focusedOp : null,
        connecting: null,
      }));
    const nameOf = (id: OpId): string => {
      const op = indexOf(get().kernel).opById.get(id);
      return op === undefined ? id : opName(op);
    };
    return {
      ...start,
      history: emptyHistory,
      selection: noSelection,
      focusedOp: null,
      fragment: null,
      pasteCount: 0,
      connecting: null,
      loopOffer: null,
      said: '',
      dialog: null,
      dragMode: 'select',

      edit(edit, label, joinKey) {
        if (get().readOnly) return false;
        const change = perform(get(), edit, label, joinKey ?? null);
        if (change.ok) follow(change.value);
        else set({ said: change.error });
        return change.ok;
      },
      undo() {
        const change = get().readOnly ? null : undo(get());
        if (change === null) return;
        follow(change);
        set({ said: `Undone: ${change.step.label}` });
      },
      redo() {
        const change = get().readOnly ? null : redo(get());
        if (change === null) return;
        follow(change);
        set({ said: `Done again: ${change.step.label}` });
      },
      select: (selection) => set({ selection }),
      focusOp: (id) => set({ focusedOp: id }),
      addOp(kind, positionPx) {
        const op = newOp(get().kernel, kind, positionPx);
        if (!get().edit({ type: 'addOp', op }, `add ${op.label}`)) return null;
        set({ selection: selectOps([op.id]), focusedOp: op.id, said: `Added ${opName(op)}` });
        return op.id;
      },
      removeSelected() {
        const { kernel, selection } = get();
        if (selection.edgeId !== null) {
          if (get().edit({ type: 'removeEdge', id: selection.edgeId }, 'remove connection')) {
            set({ said: 'Removed the connection' });
          }
          return;
        }
        const count = selection.opIds.size;
        const text = count === 1 ? 'one op' : `${count} ops`;
        if (count > 0 && get().edit(removeOpsEdit(kernel, selection.opIds), `remove ${text}`)) {
          set({ said: `Removed ${text}` });
        }
      },
      copy() {
        const { kernel, selection } = get();
        if (selection.opIds.size === 0) return;
        const fragment = copyFragment(kernel, selection.opIds);
        set({ fragment, pasteCount: 0, said: `Copied ${fragment.ops.length} ops` });
      },
      paste(given) {
        const fragment = given ?? get().fragment;
        if (fragment === null || fragment.ops.length === 0) return [];
        const offsetPx = PASTE_STEP_PX * (get().pasteCount + 1);
        const pasted = pasteFragment(get().kernel, fragment, { x: offsetPx, y: offsetPx });
        if (!get().edit(pasted.edit, `paste ${fragment.ops.length} ops`)) return [];
        set((now) => ({
          pasteCount: now.pasteCount + 1,
          selection: selectOps(pasted.opIds),
          focusedOp: pasted.opIds[0] ?? null,
          said: `Pasted ${pasted.opIds.length} ops`,
        }));
        return pasted.opIds;
      },
      startConnecting(from, by) {
        if (get().readOnly) return;
        const said = `Connecting from ${nameOf(from)}: choose an operand, or press Escape.`;
        set({ connecting: startConnecting(get().kernel, from, by), said });
      },
      stopConnecting: () => set({ connecting: null }),
      connect(request) {
        const answer = canConnect(get().kernel, request);
        set({ connecting: null });
        if (!answer.ok) set({ said: `Not connected. ${answer.reason}` });
        else if (answer.needsDistance) set({ loopOffer: request });
        else get().connectLater(request, 0);
      },
      connectLater(request, distance) {
        const edit = connectEdit(get().kernel, request, distance);
        set({ loopOffer: null });
        if (!get().edit(edit, 'connect')) return;
        const later =
          distance === 0 ? '' : `, carried ${distance === 1 ? 'one iteration' : `${distance} iterations`}`;
        set({
          said: `Connected ${nameOf(request.from)} to “${request.port}” of ${nameOf(request.to)}${later}`,
        });
        const added = edit.type === 'addEdge' ? edit.edge.id : null;
        if (added !== null && distance > 0) set({ selection: selectEdge(added) });
      },
      dismissLoopOffer: () => set({ loopOffer: null }),
      say: (said) => set({ said }),
      openDialog: (dialog) => set({ dialog }),
      setDragMode: (dragMode) => set({ dragMode }),
    };
  });
}
