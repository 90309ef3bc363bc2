import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { leastAssignment } from '@/lib/solver/bounds/assignment';
import { matchOps } from '@/lib/solver/search/matching';

const everyChoice = (rows: number, columns: number): number[][] =>
  rows === 0
    ? [[]]
    : everyChoice(rows - 1, columns).flatMap((head) =>
        Array.from({ length: columns }, (_, c) => c)
          .filter((c) => !head.includes(c))
          .map((c) => [...head, c]),
      );

const table = fc.integer({ min: 1, max: 4 }).chain((rows) =>
  fc.integer({ min: rows, max: 5 }).chain((columns) =>
    fc.array(
      fc.array(
        fc.oneof(
          { weight: 4, arbitrary: fc.nat(20) },
          { weight: 1, arbitrary: fc.constant(Number.POSITIVE_INFINITY) },
        ),
        {
          minLength: columns,
          maxLength: columns,
        },
      ),
      { minLength: rows, maxLength: rows },
    ),
  ),
);

describe('least assignment and matching against every choice', () => {
  it('finds the least cost, and null exactly where every choice is forbidden', () => {
    fc.assert(
      fc.property(table, (costs) => {
        const columns = costs[0]?.length ?? 0;
        const truth = Math.min(
          ...everyChoice(costs.length, columns).map((choice) =>
            choice.reduce((sum, c, r) => sum + (costs[r]?.[c] ?? 0), 0),
          ),
        );
        const found = leastAssignment(costs.length, columns, (r, c) => costs[r]?.[c] ?? 0);
        expect(found?.cost ?? Number.POSITIVE_INFINITY).toBe(truth);
      }),
      { seed: 5, numRuns: 300 },
    );
  });

  it('matches all ops, or names a set of ops with fewer tiles than ops', () => {
    fc.assert(
      fc.property(table, (costs) => {
        const candidates = costs.map((row) =>
          row.flatMap((cost, c) => (Number.isFinite(cost) && cost < 9 ? [c] : [])),
        );
        const found = matchOps(candidates, 5);
        const possible = everyChoice(candidates.length, 5).some((choice) =>
          choice.every((c, r) => candidates[r]?.includes(c)),
        );
        expect(found.ok).toBe(possible);
        const isProper = found.ok
          ? [...found.tiling].every((tile, op) => candidates[op]?.includes(tile)) &&
            new Set(found.tiling).size === candidates.length
          : new Set(found.ops.flatMap((op) => candidates[op] ?? [])).size < found.ops.length;
        expect(isProper).toBe(true);
      }),
      { seed: 6, numRuns: 300 },
    );
  });
});
