/** Where the arrow keys lead: left and right along connections, up and down to the nearest op. */
import { type Kernel, nodeSizePx, type Op, type OpId } from '@/lib/graph';
import { indexOf } from '../store/kernel-facts';

export type Direction = 'left' | 'right' | 'up' | 'down';

interface Middle {
  x: number;
  y: number;
}

const middleOf = (op: Op): Middle => {
  const size = nodeSizePx(op);
  return { x: op.positionPx.x + size.widthPx / 2, y: op.positionPx.y + size.heightPx / 2 };
};

/** How far the op lies in the direction (above 0 only when it does) and how far aside. */
function offset(from: Middle, to: Middle, direction: Direction): { ahead: number; aside: number } {
  const [dx, dy] = [to.x - from.x, to.y - from.y];
  switch (direction) {
    case 'left':
      return { ahead: -dx, aside: Math.abs(dy) };
    case 'right':
      return { ahead: dx, aside: Math.abs(dy) };
    case 'up':
      return { ahead: -dy, aside: Math.abs(dx) };
    case 'down':
      return { ahead: dy, aside: Math.abs(dx) };
  }
}

/** The op to go to; null where none lies that way. Without a start it is the first op from the left. */
export function neighbourOf(kernel: Kernel, from: OpId | null, direction: Direction): OpId | null {
  const index = indexOf(kernel);
  const start = from === null ? undefined : index.opById.get(from);
  if (start === undefined) return firstOp(kernel);
  const linked =
    direction === 'left'
      ? (index.edgesInto.get(start.id) ?? []).map((edge) => edge.from)
      : direction === 'right'
        ? (index.edgesOutOf.get(start.id) ?? []).map((edge) => edge.to)
        : [];
  const along = linked.flatMap((id) => {
    const op = index.opById.get(id);
    return op === undefined || op.id === start.id ? [] : [op];
  });
  return nearest(start, along, direction) ?? nearest(start, kernel.ops, direction);
}

/** Nearest first by distance ahead with twice the distance aside, so that rows and columns hold together. */
function nearest(start: Op, ops: readonly Op[], direction: Direction): OpId | null {
  const from = middleOf(start);
  let best: { id: OpId; cost: number } | null = null;
  for (const op of ops) {
    if (op.id === start.id) continue;
    const { ahead, aside } = offset(from, middleOf(op), direction);
    const cost = ahead + 2 * aside;
    if (ahead > 0 && (best === null || cost < best.cost)) best = { id: op.id, cost };
  }
  return best?.id ?? null;
}

function firstOp(kernel: Kernel): OpId | null {
  const sorted = [...kernel.ops].sort(
    (a, b) => a.positionPx.x - b.positionPx.x || a.positionPx.y - b.positionPx.y,
  );
  return sorted[0]?.id ?? null;
}
