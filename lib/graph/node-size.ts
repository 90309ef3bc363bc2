/** The size of an op's node on the canvas. The editor draws to it; layout and alignment reckon with it. */
import type { Op } from './kernel';
import { opSpec } from './op-catalog';

export const NODE_WIDTH_PX = 144;
const HEADER_PX = 36;
const PORT_ROW_PX = 20;
/** Positions are kept on this grid by layout. */
export const GRID_PX = 8;

export interface NodeSize {
  widthPx: number;
  heightPx: number;
}
export type NodeSizeOf = (op: Op) => NodeSize;

/** A header and a row for each operand of the op's kind; predicate and fallback sit on the header. */
export const nodeSizePx: NodeSizeOf = (op) => ({
  widthPx: NODE_WIDTH_PX,
  heightPx: HEADER_PX + PORT_ROW_PX * Math.max(1, opSpec(op.kind).inputs.length),
});
