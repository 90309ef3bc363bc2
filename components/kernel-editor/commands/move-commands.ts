import type { GraphEdit } from '@/lib/graph';
import { type Direction, neighbourOf } from '../canvas/neighbour';
import { selectOps } from '../store/selection';
import { type Command, opsChosen, someOps } from './command';

const NUDGE_PX = 8;
const LEAP_PX = 40;

const directions: readonly { name: Direction; key: string; text: string; dx: number; dy: number }[] = [
  { name: 'left', key: 'ArrowLeft', text: 'left', dx: -1, dy: 0 },
  { name: 'right', key: 'ArrowRight', text: 'right', dx: 1, dy: 0 },
  { name: 'up', key: 'ArrowUp', text: 'up', dx: 0, dy: -1 },
  { name: 'down', key: 'ArrowDown', text: 'down', dx: 0, dy: 1 },
];

const go = ({ name, key, text }: (typeof directions)[number]): Command => ({
  id: `go-${name}`,
  label:
    name === 'left' || name === 'right' ? `Go ${text}, along a connection` : `Go ${text}, to the nearest op`,
  group: 'Move',
  shortcuts: [key],
  writes: false,
  enabled: someOps,
  run: ({ state, canvas }) => {
    const next = neighbourOf(state.kernel, state.focusedOp, name);
    if (next === null) return;
    state.select(selectOps([next]));
    canvas?.focus(next);
  },
});

const nudge = ({ name, key, text, dx, dy }: (typeof directions)[number], stepPx: number): Command => ({
  id: `nudge-${name}-${stepPx}`,
  label: `Move the selection ${text} by ${stepPx}`,
  group: 'Move',
  shortcuts: [stepPx === NUDGE_PX ? `Shift+${key}` : `Alt+Shift+${key}`],
  writes: true,
  enabled: opsChosen,
  run: ({ state }) => {
    const chosen = state.kernel.ops.filter((op) => state.selection.opIds.has(op.id));
    const edit: GraphEdit = {
      type: 'moveOps',
      moves: chosen.map(({ id, positionPx: { x, y } }) => ({
        id,
        positionPx: { x: x + dx * stepPx, y: y + dy * stepPx },
      })),
    };
    state.edit(edit, 'move ops', `nudge ${chosen.map((op) => op.id).join(' ')}`);
  },
});

export const moveCommands: readonly Command[] = [
  ...directions.map(go),
  ...directions.map((direction) => nudge(direction, NUDGE_PX)),
  ...directions.map((direction) => nudge(direction, LEAP_PX)),
];
