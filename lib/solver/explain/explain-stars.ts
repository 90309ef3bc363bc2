/** An op whose neighbours cannot all be within reach of it, wherever it stands: seen from its infinite stars. */
import type { PlacementInstance } from '../instance';
import type { InfeasibleReason } from '../outcome';
import { type CheckedProblem, opLabel } from '../problem';

export function explainStars(
  problem: CheckedProblem,
  instance: PlacementInstance,
  star: Float64Array,
): InfeasibleReason | null {
  const { kernel, graph } = problem;
  for (const [i, op] of kernel.ops.entries()) {
    const tiles = instance.candidates[i] ?? [];
    if (tiles.some((tile) => Number.isFinite(star[i * instance.tileCount + tile]))) continue;
    const neighbours = new Set<number>();
    for (const { from, to } of instance.pairs) {
      if (from === i) neighbours.add(to);
      if (to === i) neighbours.add(from);
    }
    const limit =
      graph.maxHops === null ? 'joined to it by links' : `within the clock's ${graph.maxHops} hops`;
    const message = `Wherever ${opLabel(kernel, op.id)} stands, its ${neighbours.size} connected ops cannot all have PEs of their own ${limit}: lengthen the clock period, add links or units, or split the op's connections.`;
    const near = [...neighbours].flatMap((other) => kernel.ops[other]?.id ?? []);
    const edges = kernel.edges.filter((edge) => (edge.from === op.id) !== (edge.to === op.id));
    return {
      code: 'out of reach',
      message,
      opIds: [op.id, ...near],
      tileIds: [],
      edgeIds: edges.map((edge) => edge.id),
    };
  }
  return null;
}
