import { readFileSync } from 'node:fs';
import { beforeAll, describe, expect, it } from 'vitest';
import { starBound } from '@/lib/solver/bounds/star-bound';
import type { Engine } from '@/lib/solver/engines/engine';
import { highsEngine } from '@/lib/solver/engines/highs';
import { modelObjective, placementProgram } from '@/lib/solver/integer-program/placement-program';
import { writeLp } from '@/lib/solver/integer-program/write-lp';
import { placementCost } from '@/lib/solver/search/placement-cost';
import { searchPlacements } from '@/lib/solver/search/search';
import { limits, qapAsInstance, readLpText, readQap } from '../../helpers/integer-programs';

let highs: Engine;
beforeAll(async () => {
  highs = await highsEngine();
});

// Optima and permutations: tests/reference/qaplib, published in QAPLIB.
describe('QAPLIB through the placement core', () => {
  it.each(['nug5', 'nug6', 'nug7', 'nug12', 'scr10', 'had12'])(
    'prices the published permutation of %s at the published optimum, in the search and in the model',
    (name) => {
      const qap = readQap(name);
      const instance = qapAsInstance(qap);
      const tiling = Int32Array.from(qap.locationOfFacility);
      expect(placementCost(instance).total(tiling)).toBe(qap.optimumCountingEachPairOnce);
      expect(modelObjective(placementProgram(instance, null), tiling)).toBe(qap.optimumCountingEachPairOnce);
    },
  );

  it.each(['nug5', 'nug6', 'nug7', 'nug12', 'scr10', 'had12'])(
    'has the Gilmore–Lawler bound of %s as its star bound (rounded to the next even double count)',
    (name) => {
      const qap = readQap(name);
      const bound = starBound(qapAsInstance(qap)).bound;
      expect(Math.ceil(2 * bound - 1e-9) + (Math.ceil(2 * bound - 1e-9) % 2)).toBe(
        qap.gilmoreLawlerRootBound,
      );
    },
  );

  it.each(['nug5', 'nug6', 'nug7'])(
    'proves the optimum of %s by the cone model in HiGHS',
    (name) => {
      const qap = readQap(name);
      const instance = qapAsInstance(qap);
      const outcome = highs.solveModel(
        placementProgram(instance, starBound(instance).star).program,
        limits(60_000),
      );
      expect(outcome).toMatchObject({ status: 'optimal', objectiveValue: qap.optimumCountingEachPairOnce });
    },
    90_000,
  );

  it.each(['nug12', 'scr10', 'had12'])(
    'reaches the optimum of %s by search, and never goes below',
    (name) => {
      const qap = readQap(name);
      const instance = qapAsInstance(qap);
      const cost = placementCost(instance);
      const met: number[] = [];
      searchPlacements(
        instance,
        null,
        { seed: 1, rounds: 80, staleRounds: 80, bound: qap.optimumCountingEachPairOnce },
        {
          shouldStop: () => false,
          settle: (tiling) => {
            met.push(cost.total(tiling));
            return { ok: true, objectiveValue: cost.total(tiling) };
          },
        },
      );
      expect(Math.min(...met)).toBe(qap.optimumCountingEachPairOnce);
    },
    30_000,
  );
});

// Optima: tests/reference/miplib/README.md, catalogue of MIPLIB 3.0.
describe('MIPLIB through the neutral form and back through LP text', () => {
  it.each([
    ['flugpl', 1201500],
    ['p0033', 3089],
    ['lseu', 1120],
    ['gt2', 21166],
  ])(
    'solves %s to %d, read as LP and after writing it again',
    async (name, optimum) => {
      const program = await readLpText(readFileSync(`tests/reference/miplib/${name}.lp`, 'utf8'), false);
      const again = await readLpText(writeLp(program), false);
      for (const one of [program, again]) {
        const outcome = highs.solveModel(one, limits(60_000));
        expect(outcome.status).toBe('optimal');
        expect('objectiveValue' in outcome && outcome.objectiveValue).toBeCloseTo(optimum, 4);
      }
    },
    60_000,
  );

  it('finds infeasible-mip0 infeasible', async () => {
    const program = await readLpText(
      readFileSync('tests/reference/miplib/infeasible-mip0.lp', 'utf8'),
      false,
    );
    expect(highs.solveModel(program, limits(20_000))).toEqual({ status: 'infeasible' });
  });
});
