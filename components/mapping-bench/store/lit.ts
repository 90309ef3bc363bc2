/** What lights up: an op, its PE and its nets, on both sides of the bench. */
import type { Kernel, OpId } from '@/lib/graph/kernel';
import { netsOf } from '@/lib/graph/nets';

export interface Lit {
  /** The op that is pointed at. */
  op: OpId;
  /** Ops at the other ends of its nets. */
  near: ReadonlySet<OpId>;
  /** Sources of the nets that it sends or receives. */
  nets: ReadonlySet<OpId>;
}

export function litBy(kernel: Kernel, op: OpId | null): Lit | null {
  if (op === null) return null;
  const nets = new Set<OpId>();
  const near = new Set<OpId>();
  for (const net of netsOf(kernel)) {
    if (net.source === op) {
      nets.add(net.source);
      for (const consumer of net.consumers) near.add(consumer);
    } else if (net.consumers.includes(op)) {
      nets.add(net.source);
      near.add(net.source);
    }
  }
  return { op, near, nets };
}
