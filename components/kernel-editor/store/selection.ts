/** What is chosen on the canvas: ops, or one connection. */
import type { EdgeId, Kernel, OpId } from '@/lib/graph';

export interface Selection {
  opIds: ReadonlySet<OpId>;
  edgeId: EdgeId | null;
}

export const noSelection: Selection = { opIds: new Set(), edgeId: null };

export const selectOps = (ids: Iterable<OpId>): Selection => ({ opIds: new Set(ids), edgeId: null });

export const selectEdge = (id: EdgeId): Selection => ({ opIds: new Set(), edgeId: id });

/** The selection without what the kernel no longer has; the same object when nothing is gone. */
export function pruned(selection: Selection, kernel: Kernel): Selection {
  if (selection.opIds.size === 0 && selection.edgeId === null) return selection;
  const present = new Set(kernel.ops.map((op) => op.id));
  const kept = [...selection.opIds].filter((id) => present.has(id));
  const edgeKept = selection.edgeId === null || kernel.edges.some((edge) => edge.id === selection.edgeId);
  if (kept.length === selection.opIds.size && edgeKept) return selection;
  return { opIds: new Set(kept), edgeId: edgeKept ? selection.edgeId : null };
}
