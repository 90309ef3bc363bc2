/**
 * Plain layers for large kernels: each op one layer right of its deepest operand, ops of a layer in the order of the
 * mean row of their operands. Linear but for the sort within each layer. Expects edges without cycles.
 */
import type { Op, OpId } from './kernel';
import type { NodeSizeOf } from './node-size';

export function layerByDepth(
  ops: readonly Op[],
  edges: readonly { from: OpId; to: OpId }[],
  sizeOf: NodeSizeOf,
  gapPx: { layer: number; row: number },
): Map<OpId, { x: number; y: number }> {
  const operands = new Map<OpId, OpId[]>(ops.map((op) => [op.id, []]));
  const users = new Map<OpId, OpId[]>(ops.map((op) => [op.id, []]));
  for (const edge of edges) {
    operands.get(edge.to)?.push(edge.from);
    users.get(edge.from)?.push(edge.to);
  }
  const rowPx = new Map<OpId, number>();
  const placed = new Map<OpId, { x: number; y: number }>();
  let xPx = 0;
  for (const layer of layersOf(ops, operands, users)) {
    const meanRow = new Map(layer.map((op) => [op.id, mean(operands.get(op.id) ?? [], rowPx)]));
    layer.sort((a, b) => meanRow.get(a.id)! - meanRow.get(b.id)!);
    let yPx = 0;
    let widestPx = 0;
    for (const op of layer) {
      const size = sizeOf(op);
      placed.set(op.id, { x: xPx, y: yPx });
      rowPx.set(op.id, yPx + size.heightPx / 2);
      yPx += size.heightPx + gapPx.row;
      widestPx = Math.max(widestPx, size.widthPx);
    }
    xPx += widestPx + gapPx.layer;
  }
  return placed;
}

function mean(ids: readonly OpId[], rowPx: ReadonlyMap<OpId, number>): number {
  return ids.length === 0 ? 0 : ids.reduce((sum, id) => sum + (rowPx.get(id) ?? 0), 0) / ids.length;
}

function layersOf(
  ops: readonly Op[],
  operands: ReadonlyMap<OpId, readonly OpId[]>,
  users: ReadonlyMap<OpId, readonly OpId[]>,
): Op[][] {
  const opById = new Map(ops.map((op) => [op.id, op]));
  const waitingFor = new Map(ops.map((op) => [op.id, operands.get(op.id)?.length ?? 0]));
  const layers: Op[][] = [];
  for (let layer = ops.filter((op) => waitingFor.get(op.id) === 0); layer.length > 0; ) {
    layers.push(layer);
    const next: Op[] = [];
    for (const op of layer) {
      for (const user of users.get(op.id) ?? []) {
        const left = waitingFor.get(user)! - 1;
        waitingFor.set(user, left);
        if (left === 0) next.push(opById.get(user)!);
      }
    }
    layer = next;
  }
  return layers;
}
