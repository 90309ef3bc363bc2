import { beforeAll, describe, expect, it } from 'vitest';
import { demoFabrics } from '@/db/seed/fabrics';
import { demoKernels } from '@/db/seed/kernels';
import type { Fabric, TileId } from '@/lib/fabric/fabric';
import type { Kernel } from '@/lib/graph/kernel';
import { emptyKernel } from '@/lib/graph/kernel';
import { verifyMapping } from '@/lib/mapping/verify';
import type { Engine } from '@/lib/solver/engines/engine';
import { highsEngine } from '@/lib/solver/engines/highs';
import { simplexEngine } from '@/lib/solver/engines/simplex';
import type { SolveOptions } from '@/lib/solver/options';
import type { SolveOutcome, SolveProgress } from '@/lib/solver/outcome';
import type { PlacementProblem } from '@/lib/solver/problem';
import { solve } from '@/lib/solver/solve';

const kernel = (slug: string): Kernel => demoKernels.find((one) => one.slug === slug)?.kernel as Kernel;
const fabric = (key: string): Fabric => demoFabrics.find((one) => one.key === key)?.fabric as Fabric;

let engines: Engine[] = [];
beforeAll(async () => {
  engines = [simplexEngine, await highsEngine()];
});

function outcomeOf(
  problem: Partial<PlacementProblem> & Pick<PlacementProblem, 'kernel' | 'fabric'>,
  options: Partial<SolveOptions> = {},
  hooks: { shouldStop?: (elapsedMs: number) => boolean; onProgress?: (progress: SolveProgress) => void } = {},
): SolveOutcome {
  const startMs = performance.now();
  const result = solve(
    { pins: {}, objective: 'wire', ...problem },
    { engine: 'auto', timeLimitMs: 20_000, seed: 1, nodeLimit: null, searchTries: null, ...options },
    {
      nowMs: () => performance.now(),
      shouldStop: () => hooks.shouldStop?.(performance.now() - startMs) ?? false,
      onProgress: hooks.onProgress ?? (() => undefined),
      engines,
    },
  );
  if (!result.ok) throw new Error(result.error.messages.join('\n'));
  return result.value;
}

describe('solve', () => {
  it('proves scale and clamp optimal on 6 × 6: five ops in a chain need 4 links', () => {
    const outcome = outcomeOf({ kernel: kernel('scale-and-clamp'), fabric: fabric('hive') });
    expect(outcome).toMatchObject({ status: 'optimal', objectiveValue: 4, bound: 4, gapRatio: 0 });
  });

  it('gives the same answer for the same seed, to the route', () => {
    const run = () =>
      outcomeOf(
        { kernel: kernel('wavelet-step'), fabric: fabric('hive') },
        { engine: 'search', timeLimitMs: 60_000 },
      );
    const [first, second] = [run(), run()];
    expect({ ...first, elapsedMs: 0 }).toEqual({ ...second, elapsedMs: 0 });
    expect(first.placement).not.toBeNull();
  }, 90_000);

  it('keeps a legal best when it is stopped at the first mapping', () => {
    let found = false;
    const problem = { kernel: kernel('gradient'), fabric: fabric('hive') };
    const outcome = outcomeOf(
      problem,
      {},
      {
        shouldStop: () => found,
        onProgress: ({ best }) => {
          found ||= best !== null;
        },
      },
    );
    expect(outcome).toMatchObject({ status: 'feasible', stopReason: 'stopped' });
    const { placement, routes } = outcome;
    expect(
      placement && routes && verifyMapping(problem.kernel, problem.fabric, { placement, routes, pins: {} }),
    ).toEqual([]);
  });

  it('reports bounds that rise and objectives that fall, never crossing', () => {
    const reports: SolveProgress[] = [];
    outcomeOf(
      { kernel: kernel('sort-four-readings'), fabric: fabric('hive') },
      { timeLimitMs: 4000 },
      { onProgress: (progress) => reports.push(progress) },
    );
    const bounds = reports.map((report) => report.bound);
    const values = reports.flatMap((report) => report.best?.objectiveValue ?? []);
    expect(bounds).toEqual([...bounds].sort((a, b) => a - b));
    expect(values).toEqual([...values].sort((a, b) => b - a));
    expect(Math.max(...bounds)).toBeLessThanOrEqual(Math.min(...values));
    expect(values.length).toBeGreaterThan(1);
  }, 20_000);

  it('starts from a given placement: the answer is never worse than it', () => {
    const problem = { kernel: kernel('wavelet-step'), fabric: fabric('hive') };
    const good = outcomeOf(problem, { engine: 'search', timeLimitMs: 3000 });
    const again = outcomeOf(
      { ...problem, start: good.placement ?? {} },
      { engine: 'search' },
      { shouldStop: (elapsedMs) => elapsedMs > 250 },
    );
    expect(again.objectiveValue).toBeLessThanOrEqual(good.objectiveValue ?? 0);
  }, 20_000);

  it('names seven ops and the four units that are too few', () => {
    const outcome = outcomeOf({ kernel: kernel('smoothing-filter'), fabric: fabric('hive') });
    expect(outcome.status).toBe('infeasible');
    expect(outcome.explanation).toMatchObject({ code: 'too few tiles' });
    expect([outcome.explanation?.opIds.length, outcome.explanation?.tileIds.length]).toEqual([5, 4]);
  });

  it('names both ops that are pinned to one PE', () => {
    const [first, second] = kernel('wavelet-step').ops.filter((op) => op.kind === 'load');
    const tile = 'r0c0' as TileId;
    const pins = { [first?.id ?? '']: tile, [second?.id ?? '']: tile };
    const outcome = outcomeOf({ kernel: kernel('wavelet-step'), fabric: fabric('hive'), pins });
    expect(outcome.explanation).toMatchObject({ code: 'pin conflict', opIds: [first?.id, second?.id] });
  });

  it('names a connection that no two PEs can make when the clock leaves no hop', () => {
    const still = { ...fabric('hive'), clock: { periodPs: 100, entryDelayPs: 90, hopDelayPs: 50 } };
    const outcome = outcomeOf({ kernel: kernel('scale-and-clamp'), fabric: still });
    expect(outcome.explanation).toMatchObject({ code: 'out of reach' });
    expect(outcome.explanation?.edgeIds.length).toBeGreaterThan(0);
  });

  it('takes a mapping as the best of the two objectives: path is at least wire', () => {
    const problem = { kernel: kernel('sparse-dot-product'), fabric: fabric('hive') };
    const wire = outcomeOf({ ...problem, objective: 'wire' });
    const path = outcomeOf({ ...problem, objective: 'path' });
    expect([wire.status, path.status]).toEqual(['optimal', 'optimal']);
    expect(path.objectiveValue).toBeGreaterThanOrEqual(wire.objectiveValue ?? 0);
  }, 60_000);
});

describe('bad input', () => {
  const refuse = (problem: Partial<PlacementProblem>) =>
    solve(
      { kernel: kernel('scale-and-clamp'), fabric: fabric('hive'), pins: {}, objective: 'wire', ...problem },
      { engine: 'search', timeLimitMs: 1000, seed: 1, nodeLimit: null, searchTries: null },
      { nowMs: () => 0, shouldStop: () => false, onProgress: () => undefined, engines: [] },
    );

  it.each<[string, Partial<PlacementProblem>, RegExp]>([
    ['a kernel without any op', { kernel: emptyKernel('nothing') }, /./],
    [
      'a pin of an op that does not exist',
      { pins: { op_ghost: 'r0c0' } as PlacementProblem['pins'] },
      /op_ghost/,
    ],
    [
      'a pin outside the fabric',
      { pins: { op_raw: 'r9c9' } as PlacementProblem['pins'] },
      /6 rows and 6 columns/,
    ],
    ['an objective of no such name', { objective: 'area' as 'wire' }, /objective/],
    ['a fabric with a missing unit', { fabric: { ...fabric('hive'), units: [] } }, /units/],
  ])('refuses %s as a value', (_, problem, message) => {
    const result = refuse(problem);
    expect(result.ok).toBe(false);
    expect(!result.ok && result.error.messages.join('\n')).toMatch(message);
  });
});
