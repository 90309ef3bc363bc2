/** A fabric in several parts, none of which can hold all ops that hang together. */
import type { PlacementInstance } from '../instance';
import type { InfeasibleReason } from '../outcome';
import { type CheckedProblem, opLabel } from '../problem';
import { matchOps } from '../search/matching';

/** Ops × tiles looked at: about a tenth of a second. What would need more is left to the search. */
const WORK_LIMIT = 2e7;

/** Cost: one matching for each connected set of ops and part of the fabric that has room for it; none on a fabric in one part. */
export function explainParts(problem: CheckedProblem, instance: PlacementInstance): InfeasibleReason | null {
  const { kernel, graph } = problem;
  const partOf = joined(graph.tileCount, graph.links);
  const parts = members(partOf);
  if (parts.size === 1) return null;
  const setOf = joined(instance.opCount, instance.pairs);
  let work = 0;
  for (const ops of members(setOf).values()) {
    if (ops.length === 1) continue;
    const fits = [...parts].some(([part, tiles]) => {
      if (tiles.length < ops.length) return false;
      work += ops.length * instance.tileCount;
      if (work > WORK_LIMIT) return true;
      const candidates = ops.map((op) =>
        (instance.candidates[op] ?? []).filter((tile) => partOf[tile] === part),
      );
      return matchOps(candidates, instance.tileCount).ok;
    });
    if (fits) continue;
    const opIds = ops.flatMap((op) => kernel.ops[op]?.id ?? []);
    const first = opIds[0] ? opLabel(kernel, opIds[0]) : '';
    return {
      code: 'out of reach',
      message: `The fabric is in ${parts.size} parts that no link joins, and none of them has PEs for the ${ops.length} ops that are connected with each other, ${first} among them: join the parts by links, add units, or move pins.`,
      opIds,
      tileIds: [],
      edgeIds: [],
    };
  }
  return null;
}

/** For each of 0…count−1 the smallest number that it is joined with, whichever way the pairs point. Union by root. */
function joined(count: number, pairs: readonly { from: number; to: number }[]): number[] {
  const parent = Array.from({ length: count }, (_, i) => i);
  const root = (i: number): number => {
    let at = i;
    while (parent[at] !== at) {
      const up = parent[at] as number;
      parent[at] = parent[up] as number;
      at = up;
    }
    return at;
  };
  for (const { from, to } of pairs) {
    const [a, b] = [root(from), root(to)];
    parent[Math.max(a, b)] = Math.min(a, b);
  }
  return parent.map((_, i) => root(i));
}

function members(setOf: readonly number[]): Map<number, number[]> {
  const sets = new Map<number, number[]>();
  setOf.forEach((set, member) => {
    const known = sets.get(set);
    if (known) known.push(member);
    else sets.set(set, [member]);
  });
  return sets;
}
