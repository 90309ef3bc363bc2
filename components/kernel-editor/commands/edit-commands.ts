import { copyFragment } from '@/lib/graph';
import { type Command, opsChosen, somethingChosen } from './command';

export const undoCommand: Command = {
  id: 'undo',
  label: 'Undo',
  group: 'Edit',
  shortcuts: ['Mod+Z'],
  writes: true,
  enabled: ({ state }) => state.history.done.length > 0,
  run: ({ state }) => state.undo(),
};

export const redoCommand: Command = {
  id: 'redo',
  label: 'Redo',
  group: 'Edit',
  shortcuts: ['Mod+Shift+Z', 'Mod+Y'],
  writes: true,
  enabled: ({ state }) => state.history.undone.length > 0,
  run: ({ state }) => state.redo(),
};

export const cutCommand: Command = {
  id: 'cut',
  label: 'Cut',
  group: 'Edit',
  shortcuts: ['Mod+X'],
  writes: true,
  enabled: opsChosen,
  run: ({ state, canvas }) => {
    state.copy();
    state.removeSelected();
    canvas?.focus(null);
  },
};

export const copyCommand: Command = {
  id: 'copy',
  label: 'Copy',
  group: 'Edit',
  shortcuts: ['Mod+C'],
  writes: false,
  enabled: opsChosen,
  run: ({ state }) => state.copy(),
};

export const pasteCommand: Command = {
  id: 'paste',
  label: 'Paste',
  group: 'Edit',
  shortcuts: ['Mod+V'],
  writes: true,
  enabled: ({ state }) => state.fragment !== null,
  run: ({ state, canvas }) => {
    const pasted = state.paste();
    canvas?.reveal(pasted);
    canvas?.focus(pasted[0] ?? null);
  },
};

export const duplicateCommand: Command = {
  id: 'duplicate',
  label: 'Duplicate',
  group: 'Edit',
  shortcuts: ['Mod+D'],
  writes: true,
  enabled: opsChosen,
  run: ({ state, canvas }) => {
    const pasted = state.paste(copyFragment(state.kernel, state.selection.opIds));
    canvas?.reveal(pasted);
    canvas?.focus(pasted[0] ?? null);
  },
};

export const removeCommand: Command = {
  id: 'remove',
  label: 'Delete',
  group: 'Edit',
  shortcuts: ['Delete', 'Backspace'],
  writes: true,
  enabled: somethingChosen,
  run: ({ state, canvas }) => {
    state.removeSelected();
    canvas?.focus(null);
  },
};
