import { describe, expect, it } from 'vitest';
import { demoFabrics } from '@/db/seed/fabrics';
import { demoKernels } from '@/db/seed/kernels';
import type { Fabric } from '@/lib/fabric/fabric';
import type { Kernel } from '@/lib/graph/kernel';
import type { Objective } from '@/lib/mapping/mapping';
import { defaultSolveOptions, solveOptionsSchema } from '@/lib/solver/options';
import type { SolveOutcome } from '@/lib/solver/outcome';
import { solve } from '@/lib/solver/solve';

const kernel = (slug: string): Kernel => demoKernels.find((one) => one.slug === slug)?.kernel as Kernel;
const fabric = (key: string): Fabric => demoFabrics.find((one) => one.key === key)?.fabric as Fabric;

const LIMIT_MS = 3_600_000;

interface Run {
  slug: string;
  on?: 'hive' | 'slope';
  objective?: Objective;
  seed?: number;
  nodeLimit: number;
}

/** Each look at the clock takes `tickMs`, as if the machine were that slow. */
function outcomeOf({ slug, on, objective, seed, nodeLimit }: Run, tickMs: number): SolveOutcome {
  let nowMs = 0;
  const result = solve(
    { kernel: kernel(slug), fabric: fabric(on ?? 'hive'), pins: {}, objective: objective ?? 'wire' },
    { ...defaultSolveOptions, timeLimitMs: LIMIT_MS, nodeLimit, seed: seed ?? 1 },
    {
      nowMs: () => {
        nowMs += tickMs;
        return nowMs;
      },
      shouldStop: () => false,
      onProgress: () => undefined,
      engines: [],
    },
  );
  if (!result.ok) throw new Error(result.error.messages.join('\n'));
  return result.value;
}

describe('a solve with a node limit', () => {
  // In each case a search that is cut off after a tenth of the hour ends with another answer or other nodes.
  it.each([
    ['wavelet-step', 'hive', 'wire', 1],
    ['sort-four-readings', 'hive', 'path', 2],
    ['gradient', 'slope', 'wire', 1],
    ['fourier-butterfly', 'slope', 'wire', 2],
  ] as const)(
    'gives the same answer to the route on a fast machine and on a slow one: %s on %s, %s, seed %d',
    (slug, on, objective, seed) => {
      const run = { slug, on, objective, seed, nodeLimit: 100 };
      const fast = outcomeOf(run, 1);
      // So slow that more than half of the hour goes by.
      const slow = outcomeOf(run, (0.6 * LIMIT_MS) / fast.elapsedMs);
      expect({ ...slow, elapsedMs: 0 }).toEqual({ ...fast, elapsedMs: 0 });
      expect(slow.elapsedMs).toBeGreaterThan(0.5 * LIMIT_MS);
      expect(slow.elapsedMs).toBeLessThan(LIMIT_MS);
      expect(fast.placement).not.toBeNull();
    },
    30_000,
  );

  it('ends within 16 nodes of its limit and says so', () => {
    const outcome = outcomeOf({ slug: 'gradient', nodeLimit: 200 }, 0);
    expect(outcome).toMatchObject({ status: 'feasible', stopReason: 'node limit' });
    expect(outcome.nodes).toBeGreaterThanOrEqual(200);
    expect(outcome.nodes).toBeLessThan(216);
  }, 30_000);

  it('proves as ever where the proof needs fewer nodes', () => {
    expect(outcomeOf({ slug: 'wavelet-step', nodeLimit: 100_000 }, 0)).toMatchObject({
      status: 'optimal',
      objectiveValue: 16,
    });
  }, 30_000);
});

describe('the node limit of the options', () => {
  const parse = (more: object) =>
    solveOptionsSchema.safeParse({ engine: 'auto', timeLimitMs: 1000, seed: 1, ...more });

  it('is none where a document lacks it', () => {
    expect(parse({}).data?.nodeLimit).toBeNull();
  });

  it.each([0, 1.5, 1e9 + 1, Number.NaN])('is a whole number from 1 to 1e9, not %d', (nodeLimit) => {
    expect(parse({ nodeLimit }).success).toBe(false);
  });

  it('needs the exact search', () => {
    expect(parse({ nodeLimit: 1e9 }).success).toBe(true);
    expect(parse({ nodeLimit: 1e9, engine: 'program' }).error?.issues[0]?.path).toEqual(['nodeLimit']);
  });
});
