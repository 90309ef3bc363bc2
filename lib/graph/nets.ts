/** Nets: one producer with all its consumers. What placement and routing connect. */
import type { EdgeId, Kernel, OpId } from './kernel';
import { indexKernel } from './kernel-index';

export interface Net {
  source: OpId;
  /** Distinct, in the order of their first edge. The source is not among them: it feeds itself inside its PE. */
  consumers: readonly OpId[];
  /** Every edge out of the source but self-edges. */
  edges: readonly EdgeId[];
}

/** The nets with at least one consumer, in the order of the ops. Linear in ops and edges. */
export function netsOf(kernel: Kernel): Net[] {
  const nets: Net[] = [];
  for (const [source, edges] of indexKernel(kernel).edgesOutOf) {
    const outgoing = edges.filter((edge) => edge.to !== source);
    if (outgoing.length === 0) continue;
    nets.push({
      source,
      consumers: [...new Set(outgoing.map((edge) => edge.to))],
      edges: outgoing.map((edge) => edge.id),
    });
  }
  return nets;
}
