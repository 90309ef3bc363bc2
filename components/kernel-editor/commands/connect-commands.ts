import { opSpec } from '@/lib/graph';
import { indexOf } from '../store/kernel-facts';
import type { Command } from './command';

export const connectCommand: Command = {
  id: 'connect',
  label: 'Connect the result of the op',
  group: 'Connect',
  shortcuts: ['C', 'Enter'],
  writes: true,
  enabled: ({ state }) => state.focusedOp !== null,
  run: ({ state }) => {
    const op = state.focusedOp === null ? undefined : indexOf(state.kernel).opById.get(state.focusedOp);
    if (op === undefined) return;
    if (opSpec(op.kind).output === null) state.say(`${opSpec(op.kind).label} has no result to connect.`);
    else state.openDialog('connect');
  },
};
