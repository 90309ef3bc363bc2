import { describe, expect, it } from 'vitest';
import { demoFabrics } from '@/db/seed/fabrics';
import { demoKernels } from '@/db/seed/kernels';
import { compileFabric } from '@/lib/fabric/compile';
import type { Fabric, TileId } from '@/lib/fabric/fabric';
import type { Kernel } from '@/lib/graph/kernel';
import type { Pins, Placement } from '@/lib/mapping/mapping';
import { buildInstance, tilingOf } from '@/lib/solver/instance';
import { imageTest } from '@/lib/solver/mirror-images';
import { nearPlacements } from '@/lib/solver/near-placements';
import type { SolveOptions } from '@/lib/solver/options';
import type { SolveOutcome } from '@/lib/solver/outcome';
import { checkProblem, type PlacementProblem } from '@/lib/solver/problem';
import { placementCost } from '@/lib/solver/search/placement-cost';
import { solve } from '@/lib/solver/solve';

const kernel = (slug: string): Kernel => demoKernels.find((one) => one.slug === slug)?.kernel as Kernel;
const hive = demoFabrics.find((one) => one.key === 'hive')?.fabric as Fabric;

function outcomeOf(
  problem: Partial<PlacementProblem> & Pick<PlacementProblem, 'kernel'>,
  options: Partial<SolveOptions> = {},
  shouldStop: () => boolean = () => false,
): SolveOutcome {
  const result = solve(
    { fabric: hive, pins: {}, objective: 'wire', ...problem },
    { engine: 'auto', timeLimitMs: 20_000, seed: 1, nodeLimit: null, searchTries: null, ...options },
    { nowMs: () => performance.now(), shouldStop, onProgress: () => undefined, engines: [] },
  );
  if (!result.ok) throw new Error(result.error.messages.join('\n'));
  return result.value;
}

const surge = kernel('surge-detector');
const first = () => outcomeOf({ kernel: surge }).placement as Placement;

/** One of each orbit of the surge detector's placements of 14 wire hops. */
function everyOther(): Placement[] {
  const than = [first()];
  for (;;) {
    const outcome = outcomeOf({ kernel: surge, another: { objectiveValue: 14, than } });
    if (outcome.placement === null) return than;
    expect(outcome.objectiveValue).toBe(14);
    than.push(outcome.placement);
  }
}

describe('another mapping', { timeout: 40_000 }, () => {
  it('of the surge detector, at most 14 wire hops, is found again and again, and then there is none', () => {
    const graph = compileFabric(hive);
    const instance = buildInstance(surge, graph, {}, 'wire');
    const than = everyOther();
    expect(outcomeOf({ kernel: surge, another: { objectiveValue: 14, than } })).toMatchObject({
      status: 'infeasible',
      reason:
        'Proved by exhaustive search: no other placement of at most 14 wire hops exists besides mirror images of the ones shown.',
      explanation: { code: 'no other' },
    });
    expect(than.length).toBeGreaterThan(3);
    const tilings = than.map((placement) => tilingOf(surge, graph, placement) as Int32Array);
    const repeated = tilings.filter((tiling, i) =>
      imageTest(instance, graph.links, tilings.slice(0, i))(tiling),
    );
    expect(repeated).toEqual([]);
  });

  it('is optimal where the bound was proved before', () => {
    const another = { objectiveValue: 14, than: [first()] };
    expect(outcomeOf({ kernel: surge, another, provenBound: 14 })).toMatchObject({
      status: 'optimal',
      objectiveValue: 14,
      bound: 14,
    });
  });

  it('may be the given start, where that is none of the avoided', () => {
    const start = first();
    const other = outcomeOf({ kernel: surge, another: { objectiveValue: 14, than: [start] } })
      .placement as Placement;
    const again = outcomeOf({ kernel: surge, start, another: { objectiveValue: 14, than: [other] } });
    expect(again.placement).toEqual(start);
  });

  it('of at most 13 does not exist; with nothing to avoid the sentence speaks of no other', () => {
    const outcome = outcomeOf({ kernel: surge, another: { objectiveValue: 13, than: [] } });
    expect(outcome.reason).toBe('Proved by exhaustive search: no placement of at most 13 wire hops exists.');
  });

  it('is unknown where it was stopped before one was found', () => {
    let looks = 0;
    const another = { objectiveValue: 13, than: [first()] };
    const outcome = outcomeOf({ kernel: surge, another }, {}, () => ++looks > 3);
    expect(outcome).toMatchObject({
      status: 'unknown',
      stopReason: 'stopped',
      reason: 'No other placement of at most 13 wire hops had been found when the solve was stopped.',
    });
  });

  it('is unknown where the node limit comes before the end of the search', () => {
    const whole = everyOther();
    const another = { objectiveValue: 14, than: whole };
    expect(outcomeOf({ kernel: surge, another }).nodes).toBeGreaterThan(16);
    expect(outcomeOf({ kernel: surge, another }, { nodeLimit: 16 })).toMatchObject({
      status: 'unknown',
      stopReason: 'node limit',
      reason: 'No other placement of at most 14 wire hops was found within the node limit: allow more nodes.',
    });
  });

  it('avoids whole placements of this kernel on this fabric only', () => {
    const whole = first();
    const [op] = surge.ops;
    const faultsOf = (than: Placement[]) => {
      const problem = { kernel: surge, fabric: hive, pins: {}, objective: 'wire' as const };
      const checked = checkProblem({ ...problem, another: { objectiveValue: 14, than } });
      return checked.ok ? [] : checked.error.messages;
    };
    const { [op?.id as keyof Placement]: _, ...part } = whole;
    expect(faultsOf([whole])).toEqual([]);
    expect(faultsOf([whole, part as Placement])).toEqual([
      `${op?.id}: placement 2 of those to avoid gives it no tile: give whole placements of this kernel on this fabric.`,
    ]);
    expect(faultsOf([{ ...whole, [op?.id ?? '']: 'r9c9' as TileId }])[0]).toMatch(/puts it on r9c9, which/);
    expect(faultsOf(Array.from({ length: 51 }, () => whole))[0]).toMatch(/^another\.than: /);
  });
});

describe('placements one step away', () => {
  const scale = kernel('scale-and-clamp');
  const placement = outcomeOf({ kernel: scale }).placement as Placement;
  // The store, the last op, is pinned: the load may stand there too, but not exchange with it.
  const store = scale.ops.at(-1)?.id as keyof Placement;
  const pins = { [store]: placement[store] } as Pins;
  const instance = buildInstance(scale, compileFabric(hive), pins, 'wire');
  const tiling = tilingOf(scale, compileFabric(hive), placement) as Int32Array;
  const { total } = placementCost(instance);
  const near = (mostCost: number, limit = Number.POSITIVE_INFINITY) =>
    nearPlacements(instance, tiling, { mostCost, limit, shouldStop: () => false });

  it('are all moves and exchanges that keep the candidates and cost no more', () => {
    const expected = new Set<string>();
    for (const [op, from] of tiling.entries()) {
      for (const to of Array.from({ length: instance.tileCount }, (_, tile) => tile)) {
        const moved = tiling.map((tile) => (tile === to ? from : tile));
        moved[op] = to;
        const fits = moved.every((tile, i) => instance.candidates[i]?.includes(tile));
        if (to !== from && fits && total(moved) <= 12) expected.add(moved.join());
      }
    }
    expect(expected.size).toBeGreaterThan(5);
    const found = near(12).map((one) => one.join());
    expect(found.sort()).toEqual([...expected].sort());
  });

  it('come with the cheapest first, as many as are wanted, and end at a stop', () => {
    const costs = near(18).map(total);
    expect(costs).toEqual([...costs].sort((a, b) => a - b));
    expect(near(18, 3)).toEqual(near(18).slice(0, 3));
    expect(nearPlacements(instance, tiling, { mostCost: 18, limit: 9, shouldStop: () => true })).toEqual([]);
  });
});
