import { GRID_PX, type Kernel, NODE_WIDTH_PX, nodeSizePx, type Op } from '@/lib/graph';

const STEP_PX = 40;
const GAP_PX = 16;
const TRIES = 200;

/** A place near the wish, on the grid, where a new op covers no other: straight below first, then further right. */
export function freePlacePx(kernel: Kernel, wishPx: Op['positionPx']): Op['positionPx'] {
  const start = { x: onGrid(wishPx.x), y: onGrid(wishPx.y) };
  const heightPx = 96;
  const covers = (at: Op['positionPx']) =>
    kernel.ops.some((op) => {
      const size = nodeSizePx(op);
      return (
        at.x < op.positionPx.x + size.widthPx + GAP_PX &&
        op.positionPx.x < at.x + NODE_WIDTH_PX + GAP_PX &&
        at.y < op.positionPx.y + size.heightPx + GAP_PX &&
        op.positionPx.y < at.y + heightPx + GAP_PX
      );
    });
  for (let i = 0; i < TRIES; i++) {
    const at = { x: start.x + Math.floor(i / 8) * 2 * STEP_PX, y: start.y + (i % 8) * STEP_PX };
    if (!covers(at)) return at;
  }
  return start;
}

const onGrid = (px: number): number => Math.round(px / GRID_PX) * GRID_PX;
