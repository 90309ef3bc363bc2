/** The order in which the ops of one iteration can be evaluated, and the cycles that prevent one. */
import type { Edge, Kernel, OpId } from './kernel';
import { indexKernel, type KernelIndex } from './kernel-index';

/**
 * A topological order of the ops over the edges of distance 0; null when such edges close a cycle.
 * Among ops that are ready together, the kernel's own order decides. Kahn's method (1962); linear.
 */
export function iterationOrder(kernel: Kernel): OpId[] | null {
  const { edgesInto, edgesOutOf } = indexKernel(kernel);
  const waitingFor = new Map<OpId, number>();
  const order: OpId[] = [];
  for (const [id, edges] of edgesInto) {
    const count = edges.filter((edge) => edge.distance === 0).length;
    waitingFor.set(id, count);
    if (count === 0) order.push(id);
  }
  for (let next = 0; next < order.length; next++) {
    for (const edge of edgesOutOf.get(order[next]!) ?? []) {
      if (edge.distance > 0) continue;
      const left = waitingFor.get(edge.to)! - 1;
      waitingFor.set(edge.to, left);
      if (left === 0) order.push(edge.to);
    }
  }
  return order.length === waitingFor.size ? order : null;
}

export interface Cycle {
  opIds: OpId[];
  edges: Edge[];
}

/**
 * One cycle of distance-0 edges through each knot of ops that cannot be ordered; empty when there is an order.
 * After striking out, again and again, every op without a predecessor, each op left has one that is left as well:
 * walking from any of them to predecessors must come back to an op of the walk, and that closes a cycle. Linear.
 */
export function sameIterationCycles(kernel: Kernel, index: KernelIndex = indexKernel(kernel)): Cycle[] {
  const left = opsWithoutOrder(index);
  const cycles: Cycle[] = [];
  const seenInWalk = new Map<OpId, number>();
  let walkCount = 0;
  for (const start of left) {
    if (seenInWalk.has(start)) continue;
    walkCount++;
    const walk: Edge[] = [];
    const stepOf = new Map<OpId, number>();
    let at = start;
    while (!seenInWalk.has(at)) {
      seenInWalk.set(at, walkCount);
      stepOf.set(at, walk.length);
      const edge = index.edgesInto.get(at)?.find((e) => e.distance === 0 && left.has(e.from));
      if (edge === undefined) break;
      walk.push(edge);
      at = edge.from;
    }
    const firstStep = stepOf.get(at);
    if (seenInWalk.get(at) !== walkCount || firstStep === undefined || firstStep === walk.length) continue;
    const edges = walk.slice(firstStep).reverse();
    cycles.push({ opIds: edges.map((edge) => edge.from), edges });
  }
  return cycles;
}

function opsWithoutOrder({ edgesInto, edgesOutOf }: KernelIndex): Set<OpId> {
  const left = new Set<OpId>(edgesInto.keys());
  const waitingFor = new Map<OpId, number>();
  const ready: OpId[] = [];
  for (const [id, edges] of edgesInto) {
    const count = edges.filter((edge) => edge.distance === 0).length;
    waitingFor.set(id, count);
    if (count === 0) ready.push(id);
  }
  for (let id = ready.pop(); id !== undefined; id = ready.pop()) {
    left.delete(id);
    for (const edge of edgesOutOf.get(id) ?? []) {
      if (edge.distance > 0) continue;
      const count = waitingFor.get(edge.to)! - 1;
      waitingFor.set(edge.to, count);
      if (count === 0) ready.push(edge.to);
    }
  }
  return left;
}
