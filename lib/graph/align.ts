/** Lining up and spreading out ops on the canvas. */
import type { GraphEdit } from './graph-edit';
import type { Kernel, Op, OpId } from './kernel';
import { type NodeSizeOf, nodeSizePx } from './node-size';

export const alignments = ['left', 'centre', 'right', 'top', 'middle', 'bottom'] as const;
export const distributions = ['distributeAcross', 'distributeDown'] as const;
export type Alignment = (typeof alignments)[number] | (typeof distributions)[number];

type Axis = 'x' | 'y';
interface Box {
  op: Op;
  /** Near side and length along the axis that changes. */
  start: number;
  length: number;
}

const axisOf = (how: Alignment): Axis =>
  how === 'left' || how === 'centre' || how === 'right' || how === 'distributeAcross' ? 'x' : 'y';

/**
 * Moves the ops so that the sides or middles named agree, or so that the gaps between them are equal while the first
 * and last stay. Fewer than two ops (three to distribute) give an edit without moves.
 */
export function alignEdit(
  kernel: Kernel,
  ids: Iterable<OpId>,
  how: Alignment,
  sizeOf: NodeSizeOf = nodeSizePx,
): GraphEdit {
  const chosen = new Set(ids);
  const axis = axisOf(how);
  const boxes = kernel.ops
    .filter((op) => chosen.has(op.id))
    .map((op): Box => {
      const size = sizeOf(op);
      return { op, start: op.positionPx[axis], length: axis === 'x' ? size.widthPx : size.heightPx };
    });
  const starts = boxes.length < 2 ? new Map<OpId, number>() : newStarts(boxes, how);
  const moves = boxes.flatMap(({ op, start }) => {
    const to = starts.get(op.id) ?? start;
    return to === start ? [] : [{ id: op.id, positionPx: { ...op.positionPx, [axis]: to } }];
  });
  return { type: 'moveOps', moves };
}

function newStarts(boxes: readonly Box[], how: Alignment): Map<OpId, number> {
  const low = Math.min(...boxes.map((box) => box.start));
  const high = Math.max(...boxes.map((box) => box.start + box.length));
  switch (how) {
    case 'left':
    case 'top':
      return new Map(boxes.map((box) => [box.op.id, low]));
    case 'right':
    case 'bottom':
      return new Map(boxes.map((box) => [box.op.id, high - box.length]));
    case 'centre':
    case 'middle':
      return new Map(boxes.map((box) => [box.op.id, Math.round((low + high - box.length) / 2)]));
    case 'distributeAcross':
    case 'distributeDown':
      return spread(boxes);
  }
}

function spread(boxes: readonly Box[]): Map<OpId, number> {
  const sorted = [...boxes].sort((a, b) => a.start - b.start);
  const first = sorted[0];
  const last = sorted.at(-1);
  if (first === undefined || last === undefined || sorted.length < 3) return new Map();
  const filled = sorted.reduce((sum, box) => sum + box.length, 0);
  const gap = (last.start + last.length - first.start - filled) / (sorted.length - 1);
  let at = first.start;
  return new Map(
    sorted.map((box, i) => {
      // The last one is kept exactly where it was: sums of fractions would shift it.
      const start = i === sorted.length - 1 ? box.start : Math.round(at);
      at += box.length + gap;
      return [box.op.id, start];
    }),
  );
}
