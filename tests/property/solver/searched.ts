/** The exact search on its own, with everything that it says. */
import { compileFabric } from '@/lib/fabric/compile';
import type { LinkId } from '@/lib/fabric/fabric';
import { builtInLibrary } from '@/lib/fabric/unit-library';
import type { OpId } from '@/lib/graph/kernel';
import type { Routes } from '@/lib/mapping/mapping';
import { measureMapping, objectiveOf } from '@/lib/mapping/metrics';
import { verifyMapping } from '@/lib/mapping/verify';
import { type ExactResult, exactSearch } from '@/lib/solver/exact/exact-search';
import { buildInstance, placementOf } from '@/lib/solver/instance';
import type { TinyCase } from './tiny-cases';

export interface Answer {
  result: ExactResult;
  /** Every bound that was reported, in order. */
  bounds: number[];
  best: number | null;
  broken: unknown[];
}

/** No first solution is given, so it has to find the optimum itself. */
export function searched(
  { kernel, fabric, pins, objective, weights }: TinyCase,
  stopAfter = Number.POSITIVE_INFINITY,
): Answer {
  const graph = compileFabric(fabric);
  const instance = buildInstance(kernel, graph, pins, objective, builtInLibrary, weights);
  const answer: Omit<Answer, 'result'> = { bounds: [], best: null, broken: [] };
  let looks = 0;
  const result = exactSearch(instance, graph, {
    incumbent: () => answer.best ?? Number.POSITIVE_INFINITY,
    shouldStop: () => ++looks > stopAfter,
    onBound: (bound) => answer.bounds.push(bound),
    onMapping: (tiling, netLinks) => {
      const routes: Routes = {};
      instance.nets.forEach((net, n) => {
        routes[kernel.ops[net.source]?.id as OpId] = (netLinks?.[n] ?? []).map(
          (link) => graph.links[link]?.id as LinkId,
        );
      });
      const placement = placementOf(kernel, graph, tiling);
      answer.broken.push(...verifyMapping(kernel, fabric, { placement, routes, pins }));
      const value = objectiveOf(measureMapping(kernel, graph, { placement, routes }), objective, weights);
      answer.best = Math.min(value, answer.best ?? value);
      return true;
    },
  });
  return { ...answer, result };
}
