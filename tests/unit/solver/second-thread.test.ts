import { expect, it } from 'vitest';
import { demoFabrics } from '@/db/seed/fabrics';
import { demoKernels } from '@/db/seed/kernels';
import type { Fabric } from '@/lib/fabric/fabric';
import type { Kernel } from '@/lib/graph/kernel';
import { verifyMapping } from '@/lib/mapping/verify';
import { defaultSolveOptions, SOLVE_LIMITS } from '@/lib/solver/options';
import type { BestMapping } from '@/lib/solver/outcome';
import { solve } from '@/lib/solver/solve';
import { runSolve } from '@/lib/solver/worker/client';
import { largeFabric, unrolled } from '@/scripts/bench/large-cases';

const kernelOf = (slug: string) => demoKernels.find((one) => one.slug === slug)?.kernel as Kernel;
const hive = demoFabrics.find((one) => one.key === 'hive')?.fabric as Fabric;

function solveWith(news: () => BestMapping | null) {
  let nowMs = 0;
  const kernel = kernelOf('sort-four-readings');
  const options = { ...defaultSolveOptions, timeLimitMs: SOLVE_LIMITS.timeLimitMs };
  const result = solve({ kernel, fabric: hive, pins: {}, objective: 'wire' }, options, {
    // Each look at the clock is a tick, so that news is looked for now and then.
    nowMs: () => nowMs++,
    shouldStop: () => false,
    onProgress: () => undefined,
    engines: [],
    news,
  });
  if (!result.ok) throw new Error(result.error.messages.join('\n'));
  return result.value;
}

it('a mapping from another thread counts as found, and the solve no longer as one that can be repeated', () => {
  const alone = solveWith(() => null);
  expect(alone).toMatchObject({ status: 'optimal', objectiveValue: 32, engine: 'search + exact' });
  expect(alone.certificate?.isRepeatable).toBe(true);
  if (alone.status !== 'optimal') throw new Error('no mapping');
  const { objectiveValue, placement, routes } = alone;
  const told: BestMapping[] = [{ objectiveValue, placement, routes, longestPathHops: 1 }];
  const helped = solveWith(() => told.pop() ?? null);
  expect(helped).toMatchObject({ status: 'optimal', objectiveValue: 32, placement });
  expect(helped.engine).toContain('second thread');
  expect(helped.certificate?.isRepeatable).toBe(false);
});

it('two threads end with a legal mapping and a bound below it, within the time limit', async () => {
  const kernel = unrolled(kernelOf('gradient'), 2);
  const fabric = largeFabric(10);
  const { status, placement, routes, bound, objectiveValue } = await runSolve(
    { kernel, fabric, pins: {}, objective: 'wire' },
    { ...defaultSolveOptions, timeLimitMs: 8000 },
    { threads: 2 },
  );
  expect(status).toBe('feasible');
  expect(
    verifyMapping(kernel, fabric, { placement: placement ?? {}, routes: routes ?? {}, pins: {} }),
  ).toEqual([]);
  expect(bound).toBeLessThan(objectiveValue as number);
}, 20_000);

it('two threads give the objective of one where it is proved', async () => {
  const outcomes = await Promise.all(
    ([1, 2] as const).map((threads) =>
      runSolve(
        { kernel: kernelOf('fourier-butterfly'), fabric: hive, pins: {}, objective: 'wire' },
        defaultSolveOptions,
        { threads },
      ),
    ),
  );
  expect(outcomes.map(({ status, objectiveValue }) => [status, objectiveValue])).toEqual([
    ['optimal', 30],
    ['optimal', 30],
  ]);
}, 60_000);
