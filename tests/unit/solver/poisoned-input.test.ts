import { rmSync } from 'node:fs';
import { join } from 'node:path';
import { build } from 'esbuild';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Fabric } from '@/lib/fabric/fabric';
import { emptyKernel, type Kernel } from '@/lib/graph/kernel';
import { verifyMapping } from '@/lib/mapping/verify';
import { defaultSolveOptions, SOLVE_LIMITS, type SolveOptions } from '@/lib/solver/options';
import type { SolveOutcome } from '@/lib/solver/outcome';
import type { PlacementProblem } from '@/lib/solver/problem';
import { solve } from '@/lib/solver/solve';
import { isBadInputError, runSolve } from '@/lib/solver/worker/client';
import { fabricSketch, kernelSketch } from '../../helpers/sketches';
import { chain, largePoisons, type Poisoned, smallPoisons, square } from './poisoned-problems';

// Beside the packages, which the bundle does not hold.
const threadFolder = join(process.cwd(), '.out', `poisoned-thread-${process.pid}`);
const threadPath = join(threadFolder, 'solver.mjs');
beforeAll(async () => {
  await build({
    entryPoints: ['lib/solver/worker/thread.ts'],
    outfile: threadPath,
    bundle: true,
    platform: 'node',
    target: 'node20',
    format: 'esm',
    packages: 'external',
    tsconfig: 'tsconfig.json',
  });
});
afterAll(() => rmSync(threadFolder, { recursive: true }));

/** How much later than its limit an answer may come; the thread is ended from outside after 3 s. The rest is for a busy machine. */
const LATE_MS = 15_000;
const MEMORY_LIMIT_MB = 1024;

const whole = (problem: Poisoned['problem']): PlacementProblem => ({
  pins: {},
  objective: 'wire',
  ...problem,
});
const optionsOf = (options: Partial<SolveOptions>): SolveOptions => ({
  ...defaultSolveOptions,
  timeLimitMs: 1000,
  ...options,
});
/** What ends with a reason does so before any limit; a busy machine may take some time to see it. */
const limitFor = ({ answers }: Poisoned): number => (answers.includes('unknown') ? 1000 : 30_000);

function solvedHere(problem: Poisoned['problem'], options: Partial<SolveOptions> = {}): SolveOutcome {
  const result = solve(whole(problem), optionsOf(options), {
    nowMs: () => performance.now(),
    shouldStop: () => false,
    onProgress: () => undefined,
    engines: [],
  });
  if (!result.ok) throw new Error(result.error.messages.join('\n'));
  return result.value;
}

async function solvedInThread(
  problem: Poisoned['problem'],
  options: Partial<SolveOptions> = {},
): Promise<SolveOutcome> {
  const before = process.memoryUsage.rss();
  let most = 0;
  const watch = setInterval(() => {
    most = Math.max(most, (process.memoryUsage.rss() - before) / 2 ** 20);
  }, 50);
  const outcome = await runSolve(whole(problem), optionsOf(options), {
    threadPath,
    memoryLimitMb: MEMORY_LIMIT_MB,
  });
  clearInterval(watch);
  expect(most).toBeLessThan(MEMORY_LIMIT_MB);
  return outcome;
}

/** One of the right answers, with all that belongs to it. */
function expectClear(outcome: SolveOutcome, { problem, answers, code, words }: Omit<Poisoned, 'name'>): void {
  expect(answers).toContain(outcome.status);
  if (outcome.status === 'infeasible') {
    if (code) expect(outcome.explanation.code).toBe(code);
    if (words) expect(outcome.reason).toMatch(words);
    expect(outcome.reason).toMatch(/^\S.*[.]$/s);
    return;
  }
  expect(outcome.bound).toBeGreaterThanOrEqual(0);
  expect(Number.isFinite(outcome.bound)).toBe(true);
  if (outcome.placement === null) {
    expect(outcome.reason).toMatch(/^\S.*[.]$/);
    return;
  }
  const { placement, routes } = outcome;
  const { kernel, fabric, pins = {} } = problem;
  expect(verifyMapping(kernel, fabric, { placement, routes, pins })).toEqual([]);
  expect(outcome.objectiveValue).toBeGreaterThanOrEqual(outcome.bound);
}

async function expectOnTime<T>(limitMs: number, run: () => T | Promise<T>): Promise<T> {
  const startMs = performance.now();
  const answer = await run();
  expect(performance.now() - startMs).toBeLessThan(limitMs + LATE_MS);
  return answer;
}

describe.each([
  ['small', smallPoisons],
  ['large', largePoisons],
])('%s problems that nobody would draw', { timeout: 120_000 }, (_, poisons) => {
  it.each(poisons)('solve: $name', async (poisoned) => {
    const timeLimitMs = limitFor(poisoned);
    const answer = () => solvedHere(poisoned.problem, { timeLimitMs });
    expectClear(await expectOnTime(timeLimitMs, answer), poisoned);
  });

  it.each(poisons)('the thread: $name', async (poisoned) => {
    const timeLimitMs = limitFor(poisoned);
    const answer = () => solvedInThread(poisoned.problem, { timeLimitMs });
    expectClear(await expectOnTime(timeLimitMs, answer), poisoned);
  });
});

describe('settings at their limits', { timeout: 120_000 }, () => {
  const roomy = { problem: { kernel: chain(12), fabric: square(6) }, answers: ['optimal'] } as const;

  it.each([0, SOLVE_LIMITS.seed])('seed %d', async (seed) => {
    expectClear(solvedHere(roomy.problem, { seed, timeLimitMs: 60_000 }), roomy);
    expectClear(await solvedInThread(roomy.problem, { seed, timeLimitMs: 60_000 }), roomy);
  });

  it.each([
    ['12 ops', roomy.problem],
    ['2,000 ops', { kernel: chain(2000), fabric: square(48) }],
  ])('a time limit of 1 ms, %s', async (_, problem) => {
    const answers = ['unknown', 'feasible', 'optimal'] as const;
    expectClear(await expectOnTime(1, () => solvedHere(problem, { timeLimitMs: 1 })), { problem, answers });
    expectClear(await expectOnTime(1, () => solvedInThread(problem, { timeLimitMs: 1 })), {
      problem,
      answers,
    });
  });

  it('the longest time limit, of a problem that needs none of it', async () => {
    const options = { timeLimitMs: SOLVE_LIMITS.timeLimitMs };
    expectClear(await expectOnTime(20_000, () => solvedInThread(roomy.problem, options)), roomy);
  });

  it.each(['program', 'highs', 'simplex', 'search'] as const)(
    '2,000 ops with the engine %s',
    async (engine) => {
      const problem = { kernel: chain(2000), fabric: square(48) };
      const answers = ['unknown', 'feasible'] as const;
      expectClear(await expectOnTime(500, () => solvedInThread(problem, { engine, timeLimitMs: 500 })), {
        problem,
        answers,
      });
    },
  );
});

describe('input that is no problem at all is refused in sentences', () => {
  const kernel = kernelSketch('x=load out=store:x');
  const fabric = fabricSketch(['mm']);
  const tooMany = chain(2001);
  it.each<[string, unknown, RegExp]>([
    ['a kernel without ops', { kernel: emptyKernel('nothing'), fabric }, /writes nothing: add a store/],
    ['2,001 ops', { kernel: tooMany, fabric }, /kernel.ops/],
    ['no kernel', { kernel: null, fabric }, /kernel/],
    ['no fabric', { kernel, fabric: undefined }, /fabric/],
    ['no pins', { kernel, fabric, pins: null }, /pins/],
    ['a fabric without rows', { kernel, fabric: { ...fabric, rows: 0 } as Fabric }, /fabric.rows/],
    ['65 rows', { kernel, fabric: { ...fabric, rows: 65 } as Fabric }, /fabric.rows/],
    [
      'units for other tiles',
      { kernel, fabric: { ...fabric, units: [] } as Fabric },
      /1 rows of 2 need 2 entries/,
    ],
    [
      'a clock that is no number',
      {
        kernel,
        fabric: { ...fabric, clock: { periodPs: Number.NaN, entryDelayPs: 0, hopDelayPs: 1 } } as Fabric,
      },
      /fabric.clock.periodPs/,
    ],
    [
      'a connection from nowhere',
      {
        kernel: { ...kernel, edges: kernel.edges.map((edge) => ({ ...edge, from: 'op_ghost' })) } as Kernel,
        fabric,
      },
      /ghost/,
    ],
    ['a pin of no op', { kernel, fabric, pins: { op_ghost: 'r0c0' } }, /op_ghost/],
    ['a pin to no tile', { kernel, fabric, pins: { op_x: 'r5c5' } }, /r5c5/],
    ['a pin to nothing like a tile', { kernel, fabric, pins: { op_x: 'here' } }, /pins.op_x/],
  ])('%s', async (_, problem, words) => {
    const given = { pins: {}, objective: 'wire', ...(problem as object) } as PlacementProblem;
    const hooks = { nowMs: () => 0, shouldStop: () => false, onProgress: () => undefined, engines: [] };
    const result = solve(given, optionsOf({}), hooks);
    const messages = result.ok ? [] : result.error.messages;
    expect(messages.join('\n')).toMatch(words);
    const error: unknown = await runSolve(given, optionsOf({}), { threadPath }).catch(
      (thrown: unknown) => thrown,
    );
    expect(isBadInputError(error) && error.badInput.messages).toEqual(messages);
  });
});
