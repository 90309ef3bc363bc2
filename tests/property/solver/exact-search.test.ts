import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import { exhaustiveOptimum } from './exhaustive';
import { type Answer, searched } from './searched';
import { type TinyCase, tinyCaseArb } from './tiny-cases';

describe('the exact search against trying everything, on 2,000 tiny cases', () => {
  const cases = fc.sample(tinyCaseArb, { seed: 30262, numRuns: 2000 });
  const answers: { tiny: TinyCase; answer: Answer; truth: number | null }[] = [];
  beforeAll(() => {
    for (const tiny of cases) {
      const { kernel, fabric, pins, objective } = tiny;
      answers.push({
        tiny,
        answer: searched(tiny),
        truth: exhaustiveOptimum(kernel, fabric, pins, objective),
      });
    }
  }, 240_000);

  it('finds the optimum and proves it, or proves that there is none', () => {
    const said = answers.map(({ answer: { result, best } }) =>
      result.kind === 'proved' && result.bound === best ? best : result.kind,
    );
    expect(said).toEqual(answers.map(({ truth }) => truth ?? 'infeasible'));
  });

  it('reports legal mappings only', () => {
    expect(answers.flatMap(({ answer }) => answer.broken)).toEqual([]);
  });

  it('reports bounds that rise and never cross the optimum', () => {
    const crossed = answers.filter(
      ({ answer: { bounds }, truth }) =>
        bounds.some((bound, i) => bound < (bounds[i - 1] ?? 0)) ||
        (truth !== null && bounds.some((bound) => bound > truth)),
    );
    expect(crossed).toEqual([]);
  });

  it('meets infeasible cases, congestion, and both objectives', () => {
    const kinds = answers.map(({ tiny, answer: { result } }) => `${tiny.objective} ${result.kind}`);
    for (const kind of ['wire proved', 'path proved', 'wire infeasible', 'path infeasible']) {
      expect(kinds).toContain(kind);
    }
    expect(answers.some(({ answer: { result } }) => result.isCongested)).toBe(true);
  });
});

describe('the exact search', () => {
  it('answers the same, node for node, when it is asked again', () => {
    fc.assert(
      fc.property(tinyCaseArb, (tiny) => {
        expect(searched(tiny)).toEqual(searched(tiny));
      }),
      { seed: 30263, numRuns: 100 },
    );
  });

  it('stopped at any moment, claims no more than it has proved', () => {
    fc.assert(
      fc.property(tinyCaseArb, fc.nat(6), (tiny, looks) => {
        const { kernel, fabric, pins, objective } = tiny;
        const truth = exhaustiveOptimum(kernel, fabric, pins, objective) ?? Number.POSITIVE_INFINITY;
        const { result, best, broken } = searched(tiny, looks);
        expect(broken).toEqual([]);
        expect(result.bound).toBeLessThanOrEqual(truth);
        expect(best ?? Number.POSITIVE_INFINITY).toBeGreaterThanOrEqual(truth);
      }),
      { seed: 30264, numRuns: 150 },
    );
  });
});
