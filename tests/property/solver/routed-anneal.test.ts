import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { netsOf } from '@/lib/graph/nets';
import { measureMapping, objectiveOf } from '@/lib/mapping/metrics';
import { verifyMapping } from '@/lib/mapping/verify';
import { buildInstance, placementOf, tilingOf } from '@/lib/solver/instance';
import { annealMoves } from '@/lib/solver/search/anneal';
import { placementCost } from '@/lib/solver/search/placement-cost';
import { seededRandom } from '@/lib/solver/search/random';
import { annealRouted } from '@/lib/solver/search/routed-anneal';
import { routedNets } from '@/lib/solver/search/routed-nets';
import { type RandomMapping, randomMapping } from '../mapping/random-mapping';

/** Anneals a random mapping and turns the trees into routes. */
function annealed({ kernel, graph, placement }: RandomMapping, objective: 'wire' | 'path', moves: number) {
  const instance = buildInstance(kernel, graph, {}, objective);
  const start = tilingOf(kernel, graph, placement);
  if (!start) throw new Error('not placed');
  const found = annealRouted(
    annealMoves(instance, placementCost(instance)),
    routedNets(instance, graph.links),
    start,
    {
      moves,
      startTemperature: 1,
      endTemperature: 0.5,
      startOverfull: 0.7,
      endOverfull: 2.5,
      shouldStop: () => false,
    },
    seededRandom(3),
  );
  const routes = Object.fromEntries(
    netsOf(kernel).map(({ source }, net) => [
      source,
      (found.trees[net] ?? []).map((link) => graph.links[link]?.id ?? ('' as never)),
    ]),
  );
  return { found, start, mapping: { placement: placementOf(kernel, graph, found.tiling), routes } };
}

// Verifier and metrics share no code with the search.
describe('annealing of ops and routes together', () => {
  it.each(['wire', 'path'] as const)(
    'for %s: its trees break no rule but R6 and R7, as often as it says, and cost what it says',
    (objective) => {
      let overfull = 0;
      fc.assert(
        fc.property(randomMapping({ ops: 9 }), fc.constantFrom(0, 30, 600), (mapping, moves) => {
          const { kernel, graph, fabric } = mapping;
          const result = annealed(mapping, objective, moves);
          const broken = verifyMapping(kernel, fabric, { ...result.mapping, pins: {} });
          expect(broken.filter(({ rule }) => rule !== 'R6' && rule !== 'R7')).toEqual([]);
          const metrics = measureMapping(kernel, graph, result.mapping);
          const excess = graph.links.reduce(
            (sum, link) => sum + Math.max(0, (metrics.linkLoads.get(link.id) ?? 0) - link.channels),
            0,
          );
          expect(result.found.overfull).toBe(excess);
          if (excess > 0) overfull++;
          const value = objectiveOf(metrics, objective);
          const isTooLong = broken.some(({ rule }) => rule === 'R7');
          if (isTooLong) expect(result.found.cost).toBeGreaterThan(value);
          else expect(result.found.cost).toBe(value);
        }),
        { seed: 5, numRuns: 150 },
      );
      expect(overfull).toBeGreaterThan(0);
    },
  );

  it('lowers the cost of random placements', () => {
    const mappings = fc.sample(randomMapping({ ops: 9, channels: 2 }), { seed: 8, numRuns: 30 });
    const costs = [0, 2000].map((moves) =>
      mappings.reduce((sum, mapping) => sum + annealed(mapping, 'wire', moves).found.cost, 0),
    );
    expect(costs[1]).toBeLessThan(0.8 * (costs[0] ?? 0));
  });
});
