/** Copying part of a kernel and pasting it, into the same kernel or another. */
import { z } from 'zod';
import type { GraphEdit } from './graph-edit';
import { freshEdgeId, freshOpId, takenIds } from './ids';
import { type EdgeId, edgeSchema, KERNEL_LIMITS, type Kernel, type OpId, opSchema } from './kernel';

/** What the system clipboard holds as JSON text; anything may be there, so parse it with this. */
export const kernelFragmentSchema = z.strictObject({
  format: z.literal('pinloom.fragment'),
  formatVersion: z.literal(1),
  ops: z.array(opSchema).max(KERNEL_LIMITS.ops),
  edges: z.array(edgeSchema).max(KERNEL_LIMITS.edges),
});
export type KernelFragment = z.infer<typeof kernelFragmentSchema>;

/** The ops and the edges between them; edges to ops outside are left behind. */
export function copyFragment(kernel: Kernel, ids: Iterable<OpId>): KernelFragment {
  const chosen = new Set(ids);
  return {
    format: 'pinloom.fragment',
    formatVersion: 1,
    ops: kernel.ops.filter((op) => chosen.has(op.id)),
    edges: kernel.edges.filter((edge) => chosen.has(edge.from) && chosen.has(edge.to)),
  };
}

const COORDINATE_LIMIT_PX = 1e6;
const within = (valuePx: number): number =>
  Math.max(-COORDINATE_LIMIT_PX, Math.min(COORDINATE_LIMIT_PX, valuePx));

/**
 * The edit that adds a copy of the fragment under fresh ids, moved by the offset, and the ids it will have (to select
 * them). Edges of the fragment with an end outside it are dropped.
 */
export function pasteFragment(
  kernel: Kernel,
  fragment: KernelFragment,
  offsetPx: { x: number; y: number },
): { edit: GraphEdit; opIds: OpId[]; edgeIds: EdgeId[] } {
  const taken = takenIds(kernel);
  const renamed = new Map<OpId, OpId>();
  const edits: GraphEdit[] = [];
  const edgeIds: EdgeId[] = [];
  for (const op of fragment.ops) {
    const id = freshOpId(taken, op.id);
    taken.add(id);
    renamed.set(op.id, id);
    const positionPx = { x: within(op.positionPx.x + offsetPx.x), y: within(op.positionPx.y + offsetPx.y) };
    edits.push({ type: 'addOp', op: { ...op, id, positionPx } });
  }
  for (const edge of fragment.edges) {
    const from = renamed.get(edge.from);
    const to = renamed.get(edge.to);
    if (from === undefined || to === undefined) continue;
    const id = freshEdgeId(taken, edge.id);
    taken.add(id);
    edgeIds.push(id);
    edits.push({ type: 'addEdge', edge: { ...edge, id, from, to } });
  }
  return { edit: { type: 'batch', edits }, opIds: [...renamed.values()], edgeIds };
}
