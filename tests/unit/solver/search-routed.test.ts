import { describe, expect, it } from 'vitest';
import { demoFabrics } from '@/db/seed/fabrics';
import { demoKernels } from '@/db/seed/kernels';
import { verifyMapping } from '@/lib/mapping/verify';
import { buildInstance } from '@/lib/solver/instance';
import { legalMapping } from '@/lib/solver/legal-mapping';
import { checkProblem } from '@/lib/solver/problem';
import { searchPlacements } from '@/lib/solver/search/search';

/** Legal mappings that the search finds within a number of slices, each verified. It ends at `bound`. */
function searched(slug: string, seed: number, rounds: number, bound = 0) {
  const kernel = demoKernels.find((one) => one.slug === slug)?.kernel;
  const fabric = demoFabrics.find((one) => one.key === 'hive')?.fabric;
  if (!kernel || !fabric) throw new Error(slug);
  const checked = checkProblem({ kernel, fabric, pins: {}, objective: 'wire' });
  if (!checked.ok) throw new Error(checked.error.messages.join('\n'));
  const problem = checked.value;
  const values: number[] = [];
  let withTrees = 0;
  searchPlacements(
    buildInstance(kernel, problem.graph, {}, 'wire'),
    null,
    { seed, rounds, staleRounds: rounds, bound, links: problem.graph.links },
    {
      shouldStop: () => false,
      settle: (tiling, round, trees) => {
        const legal = legalMapping(problem, tiling, round, () => false, trees);
        if (trees) {
          withTrees++;
          expect(legal.ok).toBe(true);
        }
        if (!legal.ok) return legal;
        const { placement, routes, objectiveValue } = legal.mapping;
        expect(verifyMapping(kernel, fabric, { placement, routes, pins: {} })).toEqual([]);
        values.push(objectiveValue);
        return { ok: true, objectiveValue };
      },
    },
  );
  return { least: Math.min(...values), values, withTrees };
}

describe('the search on the hive fabric, one channel a link', { timeout: 60_000 }, () => {
  // Least values: proved by exhaustive search over placements and routes. Without regard to congestion the placements
  // of these kernels cost 13, 16, 31 and 30.
  it.each([
    ['surge-detector', 14],
    ['wavelet-step', 16],
    ['sort-four-readings', 32],
    ['fourier-butterfly', 30],
  ])('finds the least legal mapping of %s, of value %d, within 16 slices for three seeds', (slug, least) => {
    for (const seed of [1, 2, 3]) expect(searched(slug, seed, 16, least).least).toBe(least);
  });

  it('hands on trees, always legal ones, and meets the same mappings with the same seed', () => {
    const [one, again] = [5, 5].map((seed) => searched('gradient', seed, 6));
    expect(one?.withTrees).toBeGreaterThan(0);
    expect(again).toEqual(one);
  });
});
