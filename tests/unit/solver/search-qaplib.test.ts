import { describe, expect, it } from 'vitest';
import { placementCost } from '@/lib/solver/search/placement-cost';
import { searchPlacements } from '@/lib/solver/search/search';
import { qapAsInstance, readQap } from '../../helpers/integer-programs';

/** The cheapest tiling that the search meets within a number of slices; congestion plays no part. */
function searched(name: string, seed: number, rounds: number) {
  const qap = readQap(name);
  const instance = qapAsInstance(qap);
  const cost = placementCost(instance);
  let least = Number.POSITIVE_INFINITY;
  const tilings: string[] = [];
  searchPlacements(
    instance,
    null,
    { seed, rounds, staleRounds: rounds, bound: qap.optimumCountingEachPairOnce },
    {
      shouldStop: () => false,
      settle: (tiling) => {
        const objectiveValue = cost.total(tiling);
        least = Math.min(least, objectiveValue);
        tilings.push(tiling.join());
        return { ok: true, objectiveValue };
      },
    },
  );
  return { least, tilings, optimum: qap.optimumCountingEachPairOnce };
}

// Optima: tests/reference/qaplib, published in QAPLIB.
describe('the search alone on QAPLIB', { timeout: 60_000 }, () => {
  it.each(['nug15', 'nug20', 'nug25', 'nug30', 'had20', 'rou15', 'scr20', 'chr15b', 'ste36a'])(
    'finds the published optimum of %s, and nothing below it',
    (name) => {
      const { least, optimum } = searched(name, 1, 150);
      expect(least).toBe(optimum);
    },
  );

  it('meets the same tilings in the same order with the same seed, and others with another', () => {
    const [one, again, other] = [1, 1, 2].map((seed) => searched('nug20', seed, 4).tilings);
    expect(again).toEqual(one);
    expect(other).not.toEqual(one);
  });
});
