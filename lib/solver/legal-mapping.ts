/** From a tiling to a legal mapping: routed, verified, measured. Nothing else becomes an answer. */

import { netsOf } from '../graph/nets';
import type { Placement, Routes } from '../mapping/mapping';
import { measureMapping, objectiveOf } from '../mapping/metrics';
import { verifyMapping } from '../mapping/verify';
import { type PlacementInstance, placementOf } from './instance';
import type { BestMapping } from './outcome';
import type { CheckedProblem } from './problem';
import { routePlacement } from './routing/route-nets';

export type LegalAnswer =
  | { ok: true; mapping: BestMapping }
  /** Ends of the links that carry too much, or of paths that are too long. */
  | { ok: false; crowdedTiles: number[] };

/**
 * `shouldStop` ends the routing; what is not routed by then is not legal. `trees` are link indices for each of the
 * kernel's nets, in the order of `netsOf`, to start from.
 */
export function legalMapping(
  problem: CheckedProblem,
  tiling: ArrayLike<number>,
  seed: number,
  shouldStop: () => boolean,
  trees?: readonly (readonly number[])[],
): LegalAnswer {
  const placement = placementOf(problem.kernel, problem.graph, tiling);
  const routed = routePlacement(problem.kernel, problem.graph, placement, {
    objective: problem.objective,
    weights: problem.weights,
    seed,
    shouldStop,
    ...(trees && { previous: routesOf(problem, trees), keepPrevious: true }),
  });
  const mapping = verifiedMapping(problem, placement, routed.routes);
  if (mapping) return { ok: true, mapping };
  const crowded = new Set<number>();
  for (const id of routed.overfullLinks) {
    const link = problem.graph.links[problem.graph.linkIndex.get(id) ?? -1];
    if (link) for (const tile of [link.from, link.to]) crowded.add(tile);
  }
  return { ok: false, crowdedTiles: [...crowded] };
}

/** Routes of link indices, one list for each of the kernel's nets in the order of `netsOf`, which is the instance's. */
function routesOf({ kernel, graph }: CheckedProblem, trees: readonly (readonly number[])[]): Routes {
  const routes: Routes = {};
  netsOf(kernel).forEach(({ source }, net) => {
    routes[source] = (trees[net] ?? []).flatMap((link) => graph.links[link]?.id ?? []);
  });
  return routes;
}

/** The mapping of a tiling with the links of each net; null where it breaks a rule. */
export const mappingOf = (
  problem: CheckedProblem,
  tiling: ArrayLike<number>,
  netLinks: readonly (readonly number[])[],
): BestMapping | null =>
  verifiedMapping(problem, placementOf(problem.kernel, problem.graph, tiling), routesOf(problem, netLinks));

/** Null where any rule of R1 to R7 is broken. */
function verifiedMapping(problem: CheckedProblem, placement: Placement, routes: Routes): BestMapping | null {
  const { kernel, fabric, pins, library, graph, objective, weights } = problem;
  if (verifyMapping(kernel, fabric, { placement, routes, pins }, { library }).length > 0) return null;
  const metrics = measureMapping(kernel, graph, { placement, routes });
  return {
    objectiveValue: objectiveOf(metrics, objective, weights),
    longestPathHops: metrics.longestPathHops,
    placement,
    routes,
  };
}

/** Smaller than 0 where `a` is better: by the objective, ties by the shorter longest path. */
export const compareMappings = (a: BestMapping, b: BestMapping): number =>
  a.objectiveValue - b.objectiveValue || a.longestPathHops - b.longestPathHops;

/** Keeps the tiles of `start` that are candidates and not taken; the rest is −1. */
export function startTiles(problem: CheckedProblem, instance: PlacementInstance): Int32Array | null {
  if (!problem.start) return null;
  const taken = new Set<number>();
  return Int32Array.from(problem.kernel.ops, (op, i) => {
    const tile = problem.graph.tileIndex(problem.start?.[op.id] ?? '');
    if (taken.has(tile) || !instance.candidates[i]?.includes(tile)) return -1;
    taken.add(tile);
    return tile;
  });
}
