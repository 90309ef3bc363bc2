import { noSelection, selectOps } from '../store/selection';
import { type Command, someOps } from './command';

export const selectAllCommand: Command = {
  id: 'selectAll',
  label: 'Select all ops',
  group: 'Select',
  shortcuts: ['Mod+A'],
  writes: false,
  enabled: someOps,
  run: ({ state }) => {
    state.select(selectOps(state.kernel.ops.map((op) => op.id)));
    state.say(`${state.kernel.ops.length} ops selected`);
  },
};

/** Escape ends the innermost thing that is going on: a connection, then the selection. */
export const escapeCommand: Command = {
  id: 'escape',
  label: 'End the connection, or select nothing',
  group: 'Select',
  shortcuts: ['Escape'],
  writes: false,
  enabled: ({ state }) =>
    state.connecting !== null || state.selection.opIds.size > 0 || state.selection.edgeId !== null,
  run: ({ state }) => {
    if (state.connecting !== null) {
      state.stopConnecting();
      state.say('Connection given up');
    } else state.select(noSelection);
  },
};

export const toggleCommand: Command = {
  id: 'toggle',
  label: 'Add the op to the selection, or take it out',
  group: 'Select',
  shortcuts: ['Shift+Enter', ' '],
  writes: false,
  enabled: ({ state }) => state.focusedOp !== null,
  run: ({ state }) => {
    const id = state.focusedOp;
    if (id === null) return;
    const chosen = new Set(state.selection.opIds);
    if (!chosen.delete(id)) chosen.add(id);
    state.select(selectOps(chosen));
  },
};
