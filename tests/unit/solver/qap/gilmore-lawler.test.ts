import { describe, expect, it } from 'vitest';
import { starBound } from '@/lib/solver/bounds/star-bound';
import { gilmoreLawlerBound } from '@/lib/solver/qap/gilmore-lawler';
import { valueBound } from '@/lib/solver/qap/qap-instance';
import { leastValue, modelOf, publishedJson, randomProblem, shapes, upToTwelve } from './qap-cases';

const boundOf = (model: ReturnType<typeof modelOf>): number =>
  valueBound(model, gilmoreLawlerBound(model.instance, model.isSymmetric));

describe('the Gilmore–Lawler bound by sorted products', () => {
  // The bounds in tests/reference/qaplib were computed by an independent program, rounded up to an even number.
  it.each(upToTwelve.flatMap(([name, read]) => (read === publishedJson ? [name] : [])))(
    'is the known one of %s',
    (name) => {
      const { problem, gilmoreLawlerBound: known } = publishedJson(name);
      expect(boundOf(modelOf(problem))).toBe(known);
    },
  );

  it.each(shapes)('is at most the least value of all assignments (%s)', (shape) => {
    let met = 0;
    for (let seed = 0; seed < 40; seed++) {
      const problem = randomProblem(1 + (seed % 6), shape, seed);
      const [bound, least] = [boundOf(modelOf(problem)), leastValue(problem)];
      expect(bound).toBeLessThanOrEqual(least);
      if (bound === least) met++;
    }
    // Not by being far below: up to three facilities it is often the optimum.
    expect(met).toBeGreaterThan(8);
  });

  it.each(['symmetric', 'one-sided'] as const)('equals the star bound without directions (%s)', (shape) => {
    for (let seed = 0; seed < 30; seed++) {
      const { instance, isSymmetric } = modelOf(randomProblem(2 + (seed % 7), shape, seed));
      expect(gilmoreLawlerBound(instance, isSymmetric)).toBeCloseTo(starBound(instance).bound, 6);
    }
  });
});
