import { type Alignment, alignEdit, layoutEdit } from '@/lib/graph';
import { type Command, someOps } from './command';

const align = (how: Alignment, label: string, least: number): Command => ({
  id: `align-${how}`,
  label,
  group: 'Arrange',
  shortcuts: [],
  writes: true,
  enabled: ({ state }) => state.selection.opIds.size >= least,
  run: ({ state }) => {
    if (state.edit(alignEdit(state.kernel, state.selection.opIds, how), label.toLowerCase())) {
      state.say(`${label}: ${state.selection.opIds.size} ops`);
    }
  },
});

/** Lays out the selection, or everything when fewer than two ops are selected. */
export const layoutCommand: Command = {
  id: 'layout',
  label: 'Lay out from left to right',
  group: 'Arrange',
  shortcuts: ['L'],
  writes: true,
  enabled: someOps,
  run: ({ state, canvas }) => {
    const part = state.selection.opIds.size > 1 ? state.selection.opIds : undefined;
    state.edit(layoutEdit(state.kernel, part), 'lay out');
    state.say(part === undefined ? 'Laid out the whole kernel' : `Laid out ${part.size} ops`);
    canvas?.fit();
  },
};

export const alignCommands: readonly Command[] = [
  align('left', 'Align left sides', 2),
  align('centre', 'Align centres across', 2),
  align('right', 'Align right sides', 2),
  align('top', 'Align tops', 2),
  align('middle', 'Align middles', 2),
  align('bottom', 'Align bottoms', 2),
  align('distributeAcross', 'Space out across', 3),
  align('distributeDown', 'Space out down', 3),
];
