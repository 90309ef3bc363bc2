/** What follows from a kernel, reckoned once per state of it. Kernels never change in place, so they can be the key. */
import {
  type Edge,
  type EdgeId,
  indexKernel,
  type Kernel,
  type KernelIndex,
  type OpId,
  type Problem,
  validateKernel,
} from '@/lib/graph';

export function oncePerKernel<T>(reckon: (kernel: Kernel) => T): (kernel: Kernel) => T {
  const known = new WeakMap<Kernel, { value: T }>();
  return (kernel) => {
    const found = known.get(kernel) ?? { value: reckon(kernel) };
    known.set(kernel, found);
    return found.value;
  };
}

export const indexOf: (kernel: Kernel) => KernelIndex = oncePerKernel(indexKernel);

export const problemsOf: (kernel: Kernel) => readonly Problem[] = oncePerKernel(validateKernel);

export type Severity = Problem['severity'];

/** The worst problem that names each op first: the op at fault stands at the head of a problem's list. */
export const severityByOp: (kernel: Kernel) => ReadonlyMap<OpId, Severity> = oncePerKernel((kernel) => {
  const worst = new Map<OpId, Severity>();
  for (const problem of problemsOf(kernel)) {
    const id = problem.opIds[0];
    if (id !== undefined && worst.get(id) !== 'error') worst.set(id, problem.severity);
  }
  return worst;
});

export const edgeById: (kernel: Kernel) => ReadonlyMap<EdgeId, Edge> = oncePerKernel(
  (kernel) => new Map(kernel.edges.map((edge) => [edge.id, edge])),
);
