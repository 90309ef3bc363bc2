/** Look-ups over a kernel that the passes share. Built once per pass, in time linear in ops and edges. */
import type { Edge, Kernel, Op, OpId } from './kernel';

export interface KernelIndex {
  /** The first op of each id. */
  opById: ReadonlyMap<OpId, Op>;
  /** Edges into each op, in the kernel's order; every op has an entry. */
  edgesInto: ReadonlyMap<OpId, readonly Edge[]>;
  /** Edges out of each op, self-edges among them; every op has an entry. */
  edgesOutOf: ReadonlyMap<OpId, readonly Edge[]>;
}

/** Edges to or from ops that do not exist are left out. */
export function indexKernel(kernel: Kernel): KernelIndex {
  const opById = new Map<OpId, Op>();
  const edgesInto = new Map<OpId, Edge[]>();
  const edgesOutOf = new Map<OpId, Edge[]>();
  for (const op of kernel.ops) {
    if (opById.has(op.id)) continue;
    opById.set(op.id, op);
    edgesInto.set(op.id, []);
    edgesOutOf.set(op.id, []);
  }
  for (const edge of kernel.edges) {
    const into = edgesInto.get(edge.to);
    const outOf = edgesOutOf.get(edge.from);
    if (into === undefined || outOf === undefined) continue;
    into.push(edge);
    outOf.push(edge);
  }
  return { opById, edgesInto, edgesOutOf };
}
