import { describe, expect, it } from 'vitest';
import { qapValue } from '@/lib/solver/qap/qap';
import { type QapProgress, qapState } from '@/lib/solver/qap/qap-state';
import { type QapHooks, solveQap } from '@/lib/solver/qap/solve-qap';
import { searchPlacements } from '@/lib/solver/search/search';
import {
  leastValue,
  modelOf,
  publishedJson,
  publishedText,
  randomProblem,
  shapes,
  upToTwelve,
} from './qap-cases';

const hooks = (more: Partial<QapHooks> = {}): QapHooks => ({
  nowMs: () => performance.now(),
  shouldStop: () => false,
  onProgress: () => undefined,
  ...more,
});
const solved = (
  problem: Parameters<typeof solveQap>[0],
  timeLimitMs = 60_000,
  more: Partial<QapHooks> = {},
) => {
  const result = solveQap(problem, { timeLimitMs, seed: 1 }, hooks(more));
  if (!result.ok) throw new Error(result.error);
  return result.value;
};

describe('the search of assignments', () => {
  // Optima: QAPLIB, by way of tests/reference/qaplib. No clock; 16 slices of at most 72,000 moves each.
  it.each(upToTwelve)('meets the optimum of %s in 16 slices, and nothing below', (name, read) => {
    const { problem, optimum } = read(name);
    const model = modelOf(problem);
    const values: number[] = [];
    searchPlacements(
      model.instance,
      null,
      { seed: 1, rounds: 16, staleRounds: 16, bound: (optimum - model.offset) / model.scale },
      {
        shouldStop: () => false,
        settle: (tiling) => {
          const value = qapValue(problem, model.locationsOf(tiling)) as number;
          values.push(value);
          return { ok: true, objectiveValue: (value - model.offset) / model.scale };
        },
      },
    );
    expect(Math.min(...values)).toBe(optimum);
  });
});

describe('solveQap', { timeout: 60_000 }, () => {
  it.each(shapes)('proves the optimum of small problems, as trying everything finds it (%s)', (shape) => {
    for (let seed = 0; seed < 18; seed++) {
      const problem = randomProblem(1 + (seed % 6), shape, seed);
      const least = leastValue(problem);
      const outcome = solved(problem);
      expect(outcome).toMatchObject({ status: 'optimal', objectiveValue: least, bound: least, gapRatio: 0 });
      expect(qapValue(problem, outcome.locationOf)).toBe(least);
    }
  });

  // Optima: QAPLIB, by way of tests/reference/qaplib.
  it.each([
    ['nug8', publishedJson],
    ['scr10', publishedJson],
    ['scr12', publishedJson],
    ['chr12a', publishedJson],
    ['chr12c', publishedJson],
    ['tai12a', publishedJson],
    ['had12', publishedJson],
    ['lipa20a', publishedText],
  ])('proves the published optimum of %s', (name, read) => {
    const { problem, optimum } = read(name);
    expect(solved(problem)).toMatchObject({ status: 'optimal', objectiveValue: optimum, bound: optimum });
  });

  it('ends bur26c, which no proof reaches so soon, with a bound below and a value not below the optimum', () => {
    const { problem, optimum } = publishedText('bur26c');
    const outcome = solved(problem, 1500);
    expect(outcome).toMatchObject({ status: 'feasible', stopReason: 'time limit' });
    expect(outcome.bound).toBeLessThan(optimum);
    expect(outcome.objectiveValue).toBeGreaterThanOrEqual(optimum);
    expect(outcome.gapRatio).toBeCloseTo(
      (outcome.objectiveValue - outcome.bound) / outcome.objectiveValue,
      12,
    );
  });

  it('reports bounds that only rise and values that only fall, and never crosses them', () => {
    const { problem } = publishedJson('nug8');
    const seen: QapProgress[] = [];
    solved(problem, 60_000, { onProgress: (progress) => seen.push(progress) });
    expect(seen.length).toBeGreaterThan(2);
    seen.slice(1).forEach((next, i) => {
      expect(next.bound).toBeGreaterThanOrEqual(seen[i]?.bound as number);
      expect(next.objectiveValue).toBeLessThanOrEqual(seen[i]?.objectiveValue as number);
    });
    expect(seen.every(({ bound, objectiveValue }) => bound <= objectiveValue)).toBe(true);
  });

  it('gives the same answer for the same seed', () => {
    const { problem } = publishedJson('scr12');
    expect(solved(problem).locationOf).toEqual(solved(problem).locationOf);
  });

  it('ends with the best so far when it is stopped, and says that it was', () => {
    const { problem, optimum } = publishedJson('nug12');
    let calls = 0;
    const outcome = solved(problem, 60_000, { shouldStop: () => ++calls > 3 });
    expect(outcome).toMatchObject({ status: 'feasible', stopReason: 'stopped' });
    expect(outcome.objectiveValue).toBeGreaterThanOrEqual(optimum);
    expect(qapValue(problem, outcome.locationOf)).toBe(outcome.objectiveValue);
  });

  it('answers at once for a time limit of 1 ms, with a bound and an assignment', () => {
    const outcome = solved(randomProblem(60, 'directed', 3), 1);
    expect(outcome).toMatchObject({ status: 'feasible', stopReason: 'time limit' });
    expect(outcome.elapsedMs).toBeLessThan(2000);
  });

  it('takes problems of 200 facilities', () => {
    const outcome = solved(randomProblem(200, 'directed', 4), 1500);
    expect(outcome.status).toBe('feasible');
    expect(outcome.elapsedMs).toBeLessThan(6000);
  });

  it('refuses with a sentence what fits no placement', () => {
    const wide = Float64Array.of(0, 1e6, 0, 0, 0, 1, 2, 0, 0);
    const result = solveQap({ n: 3, flow: wide, distance: wide }, { timeLimitMs: 100, seed: 1 }, hooks());
    expect(result).toMatchObject({ ok: false, error: expect.stringMatching(/too far apart/) });
  });
});

describe('the state of a solve', () => {
  const { problem, optimum, locationOf } = publishedJson('nug5');
  const fresh = () => qapState(problem, { timeLimitMs: 1000, seed: 1 }, hooks(), () => undefined);

  it('throws for an assignment that is not worth what the solver says, or none at all', () => {
    expect(() => fresh().offer(locationOf, optimum)).not.toThrow();
    expect(() => fresh().offer(locationOf, optimum - 2)).toThrow(/took an assignment/);
    expect(() => fresh().offer([0, 0, 1, 2, 3], optimum)).toThrow(/took an assignment/);
  });

  it('keeps the better assignment', () => {
    const state = fresh();
    state.offer(locationOf, optimum);
    const start = [0, 1, 2, 3, 4];
    expect(qapValue(problem, start)).toBeGreaterThan(optimum);
    state.offer(start, qapValue(problem, start) as number);
    expect(state.best()).toMatchObject({ objectiveValue: optimum, locationOf });
  });

  it('throws for a bound above a value, and for a value below the bound', () => {
    const state = fresh();
    state.offer(locationOf, optimum);
    expect(() => state.raise(optimum + 2)).toThrow(/bound/);
    const other = fresh();
    other.raise(optimum + 2);
    expect(() => other.offer(locationOf, optimum)).toThrow(/bound/);
  });
});
