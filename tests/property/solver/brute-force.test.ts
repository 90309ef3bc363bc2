import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import { compileFabric } from '@/lib/fabric/compile';
import { verifyMapping } from '@/lib/mapping/verify';
import { starBound } from '@/lib/solver/bounds/star-bound';
import type { Engine } from '@/lib/solver/engines/engine';
import { highsEngine } from '@/lib/solver/engines/highs';
import { simplexEngine } from '@/lib/solver/engines/simplex';
import { buildInstance } from '@/lib/solver/instance';
import type { IntegerProgram } from '@/lib/solver/integer-program/integer-program';
import { placementProgram } from '@/lib/solver/integer-program/placement-program';
import { routedProgram } from '@/lib/solver/integer-program/routed-program';
import type { SolveOutcome } from '@/lib/solver/outcome';
import { solve } from '@/lib/solver/solve';
import { exhaustiveOptimum } from './exhaustive';
import { type TinyCase, tinyCaseArb } from './tiny-cases';

const cases = fc.sample(tinyCaseArb, { seed: 20261, numRuns: 400 });

function solved({ kernel, fabric, pins, objective }: TinyCase, engines: readonly Engine[]): SolveOutcome {
  const result = solve(
    { kernel, fabric, pins, objective },
    { engine: 'program', timeLimitMs: 20_000, seed: 1, nodeLimit: null, searchTries: null },
    { nowMs: () => performance.now(), shouldStop: () => false, onProgress: () => undefined, engines },
  );
  if (!result.ok) throw new Error(result.error.messages.join('\n'));
  return result.value;
}

const modelOptimum = (program: IntegerProgram, engines: readonly Engine[]): number => {
  const outcome = engines[0]?.solveModel(program, {
    timeLimitMs: 20_000,
    seed: 1,
    nowMs: () => performance.now(),
    shouldStop: () => false,
    warmStart: null,
  });
  return outcome?.status === 'optimal' ? outcome.objectiveValue : Number.NaN;
};

describe('the solver against trying everything, on 400 tiny cases', () => {
  let engines: Engine[] = [];
  const answers: { tiny: TinyCase; outcome: SolveOutcome; truth: number | null }[] = [];
  beforeAll(async () => {
    engines = [simplexEngine, await highsEngine()];
    for (const tiny of cases) {
      const { kernel, fabric, pins, objective } = tiny;
      answers.push({
        tiny,
        outcome: solved(tiny, engines),
        truth: exhaustiveOptimum(kernel, fabric, pins, objective),
      });
    }
  }, 240_000);

  it('says infeasible exactly where no legal mapping exists', () => {
    const saysNone = answers.map(({ outcome }) => outcome.status === 'infeasible');
    expect(saysNone).toEqual(answers.map(({ truth }) => truth === null));
  });

  it('reaches the optimum and proves it everywhere else', () => {
    const values = answers.map(({ outcome }) =>
      outcome.status === 'optimal' ? outcome.objectiveValue : outcome.status,
    );
    expect(values).toEqual(answers.map(({ truth }) => truth ?? 'infeasible'));
  });

  it('returns mappings that the verifier passes', () => {
    const broken = answers.flatMap(({ tiny, outcome }) =>
      outcome.placement === null
        ? []
        : verifyMapping(tiny.kernel, tiny.fabric, {
            placement: outcome.placement,
            routes: outcome.routes,
            pins: tiny.pins,
          }),
    );
    expect(broken).toEqual([]);
  });

  it('has bounds that never cross the optimum: stars, placement model; and a full model that equals it', () => {
    const highs = engines.filter((engine) => engine.name === 'highs');
    const wrong = answers.slice(0, 200).flatMap(({ tiny, truth }) => {
      if (truth === null) return [];
      const graph = compileFabric(tiny.fabric);
      const instance = buildInstance(tiny.kernel, graph, tiny.pins, tiny.objective);
      const stars = starBound(instance);
      const placement = modelOptimum(placementProgram(instance, stars.star).program, highs);
      const full = modelOptimum(routedProgram(instance, graph, 0).program, highs);
      return stars.bound <= truth && placement <= truth && full === truth
        ? []
        : [{ tiny, truth, stars: stars.bound, placement, full }];
    });
    expect(wrong).toEqual([]);
  });

  it('meets every kind of case: both objectives, infeasible ones, congestion that lifts the optimum', () => {
    const kinds = answers.map(
      ({ tiny, outcome }) => `${tiny.objective} ${outcome.explanation?.code ?? outcome.status}`,
    );
    for (const kind of [
      'wire optimal',
      'path optimal',
      'wire too few tiles',
      'path out of reach',
      'wire too few channels',
    ]) {
      expect(kinds).toContain(kind);
    }
  });
});
