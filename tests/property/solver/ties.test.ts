import fc from 'fast-check';
import { expect, it } from 'vitest';
import { compileFabric } from '@/lib/fabric/compile';
import { measureMapping } from '@/lib/mapping/metrics';
import { defaultSolveOptions } from '@/lib/solver/options';
import { solve } from '@/lib/solver/solve';
import { exhaustiveOptimum } from './exhaustive';
import { oddCaseArb } from './odd-cases';

/** A clock that lets a value cross that many hops and no more. */
const clockFor = (hops: number) => ({ periodPs: 100 * hops, entryDelayPs: 0, hopDelayPs: 100 });

it('of mappings of least cost, the one with the shortest longest path is the answer, by trying everything on 800 odd cases', () => {
  let settled = 0;
  let shorterButDearer = 0;
  for (const { kernel, fabric, pins, objective } of fc.sample(oddCaseArb, { seed: 7121, numRuns: 800 })) {
    const result = solve({ kernel, fabric, pins, objective }, defaultSolveOptions, {
      nowMs: () => 0,
      shouldStop: () => false,
      onProgress: () => undefined,
      engines: [],
    });
    if (!result.ok) throw new Error(result.error.messages.join('\n'));
    const { status, objectiveValue, placement, routes } = result.value;
    if (status !== 'optimal') continue;
    const { longestPathHops } = measureMapping(kernel, compileFabric(fabric), { placement, routes });
    if (longestPathHops < 2) continue;
    settled++;
    const shorter = { ...fabric, clock: clockFor(longestPathHops - 1) };
    const bestShorter = exhaustiveOptimum(kernel, shorter, pins, objective);
    expect(bestShorter === null || bestShorter > objectiveValue).toBe(true);
    if (bestShorter !== null) shorterButDearer++;
  }
  expect(settled).toBeGreaterThan(50);
  expect(shorterButDearer).toBeGreaterThan(3);
}, 120_000);
