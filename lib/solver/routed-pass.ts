/** Closes the gap that congestion and large nets leave, by the full model of placement and routes, where it is small. */
import type { OpId } from '../graph/kernel';
import { tilingOf } from './instance';
import { type RoutedMappingPoint, routedColumnCount, routedProgram } from './integer-program/routed-program';
import { mappingOf } from './legal-mapping';
import type { BestMapping } from './outcome';
import { type PassInput, type PassResult, runEngines } from './placement-pass';
import type { CheckedProblem } from './problem';

/** Columns above which the full model is left out: engines seldom end on larger ones. */
export const ROUTED_COLUMNS_LIMIT = 6000;

export function routedPass(input: PassInput): PassResult {
  const { problem, instance, state } = input;
  if (routedColumnCount(instance, problem.graph.links.length) > ROUTED_COLUMNS_LIMIT) {
    return { kind: 'unfinished', stop: 'routing gap' };
  }
  state.setPhase('exact');
  const built = routedProgram(instance, problem.graph, state.bound());
  const best = state.best();
  const start = best ? pointOf(input, best) : null;
  return runEngines(input, built.program, start ? built.encode(start) : null, {
    onPoint: (values) => {
      const point = built.decode(values);
      if (!point) return;
      const mapping = mappingOf(problem, point.tiling, point.netLinks);
      if (mapping) state.offer(mapping);
    },
    infeasible: () => ({
      code: 'too few channels',
      message:
        'Placements exist, but none can be routed: the links have too few channels for the nets. Add channels or links, lengthen the clock period, or remove pins.',
      opIds: [],
      tileIds: [],
      edgeIds: [],
    }),
  });
}

const sourceId = (problem: CheckedProblem, op: number): OpId => problem.kernel.ops[op]?.id as OpId;

function pointOf({ problem, instance }: PassInput, best: BestMapping): RoutedMappingPoint | null {
  const tiling = tilingOf(problem.kernel, problem.graph, best.placement);
  if (!tiling) return null;
  const netLinks = instance.nets.map((net) =>
    (best.routes[sourceId(problem, net.source)] ?? []).flatMap((id) => problem.graph.linkIndex.get(id) ?? []),
  );
  return { tiling, netLinks };
}
