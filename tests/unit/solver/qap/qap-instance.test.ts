import { describe, expect, it } from 'vitest';
import { qapValue } from '@/lib/solver/qap/qap';
import { qapInstance } from '@/lib/solver/qap/qap-instance';
import { placementCost } from '@/lib/solver/search/placement-cost';
import {
  modelOf,
  permutations,
  publishedJson,
  publishedText,
  randomProblem,
  shapes,
  upToTwelve,
} from './qap-cases';

// Values and permutations: QAPLIB (Burkard, Karisch and Rendl 1997), by way of tests/reference/qaplib.
describe('the value of published permutations', () => {
  const larger = ['chr15b', 'nug15', 'rou15', 'had20', 'nug20', 'scr20', 'nug25', 'nug30', 'ste36a'];
  it.each([
    ...upToTwelve,
    ...larger.map((name): (typeof upToTwelve)[number] => [name, publishedJson]),
    ...['bur26c', 'esc16a', 'lipa20a'].map((name): (typeof upToTwelve)[number] => [name, publishedText]),
  ])('is the published one: %s', (name, read) => {
    const { problem, optimum, locationOf } = read(name);
    expect(qapValue(problem, locationOf)).toBe(optimum);
  });

  it('is null for what is no permutation', () => {
    const { problem } = publishedJson('nug5');
    for (const wrong of [
      [0, 1, 2, 3],
      [0, 1, 2, 3, 4, 0],
      [0, 1, 2, 3, 3],
      [0, 1, 2, 3, 5],
      [0, 1, 2, 3, -1],
      [0, 1, 2, 3, 1.5],
    ]) {
      expect(qapValue(problem, wrong)).toBeNull();
    }
  });

  it('counts the diagonal and both directions: 1·5 + 2·6 + 3·7 + 4·8 = 70, swapped 1·8 + 2·7 + 3·6 + 4·5 = 60', () => {
    const problem = { n: 2, flow: Float64Array.of(1, 2, 3, 4), distance: Float64Array.of(5, 6, 7, 8) };
    expect([qapValue(problem, [0, 1]), qapValue(problem, [1, 0])]).toEqual([70, 60]);
  });
});

describe('an assignment problem as a placement', () => {
  it.each(shapes)('has scale · cost + offset = value for every assignment (%s)', (shape) => {
    for (let seed = 0; seed < 40; seed++) {
      const problem = randomProblem(1 + (seed % 5), shape, seed);
      const model = modelOf(problem);
      const cost = placementCost(model.instance);
      for (const permutation of permutations(problem.n)) {
        const tiling = model.tilingOf(permutation);
        expect([...model.locationsOf(tiling)]).toEqual(permutation);
        const value = qapValue(problem, permutation);
        expect(model.scale * cost.total(tiling) + model.offset).toBe(value);
        expect(model.modelValue(tiling)).toBe(value);
      }
    }
  });

  it.each(shapes)('has hops of 1 or more, a whole 1 among them, and weights above 0 (%s)', (shape) => {
    for (let seed = 0; seed < 40; seed++) {
      const { instance } = modelOf(randomProblem(2 + (seed % 5), shape, seed));
      const { tileCount, distance, pairs } = instance;
      const apart = [...distance].filter((_, at) => Math.floor(at / tileCount) !== at % tileCount);
      expect(Math.min(...apart)).toBe(1);
      expect(pairs.every(({ weight }) => weight > 0 && Number.isInteger(weight))).toBe(true);
    }
  });

  it.each(upToTwelve)('prices %s as published', (name, read) => {
    const { problem, optimum, locationOf } = read(name);
    const model = modelOf(problem);
    expect(model.modelValue(model.tilingOf(locationOf))).toBe(optimum);
  });

  it('fits a matrix of any numbers where the other one fits 16 bits', () => {
    const wide = Float64Array.of(0, 9e9, 1, 0, 0, 7, 2e9 + 1, 5, 0);
    const narrow = Float64Array.of(0, 3, 1, 2, 0, 65_000, 4, 9, 0);
    for (const problem of [
      { n: 3, flow: wide, distance: narrow },
      { n: 3, flow: narrow, distance: wide },
    ]) {
      const model = modelOf(problem);
      for (const permutation of permutations(3)) {
        const tiling = model.tilingOf(permutation);
        expect(model.modelValue(tiling)).toBe(qapValue(problem, permutation));
      }
    }
  });

  it('refuses two matrices with entries too far apart, and says how far', () => {
    const wide = Float64Array.of(0, 65_534, 0, 0, 0, 1, 2, 0, 0);
    expect(qapInstance({ n: 3, flow: wide, distance: wide })).toMatchObject({
      ok: false,
      error: expect.stringContaining('65533'),
    });
    const fits = Float64Array.of(0, 65_533, 0, 0, 0, 1, 2, 0, 0);
    expect(qapInstance({ n: 3, flow: wide, distance: fits }).ok).toBe(true);
  });
});
