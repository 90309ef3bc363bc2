import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import { verifyMapping } from '@/lib/mapping/verify';
import type { Engine } from '@/lib/solver/engines/engine';
import { highsEngine } from '@/lib/solver/engines/highs';
import { simplexEngine } from '@/lib/solver/engines/simplex';
import type { SolveOutcome } from '@/lib/solver/outcome';
import { solve } from '@/lib/solver/solve';
import { exhaustiveOptimum } from './exhaustive';
import { type TinyCase, tinyCaseArb } from './tiny-cases';

const cases = fc.sample(tinyCaseArb, { seed: 20261, numRuns: 400 });

function solved({ kernel, fabric, pins, objective }: TinyCase, engines: readonly Engine[]): SolveOutcome {
  const result = solve(
    { kernel, fabric, pins, objective },
    { engine: 'auto', timeLimitMs: 20_000, seed: 1 },
    { nowMs: () => performance.now(), shouldStop: () => false, onProgress: () => undefined, engines },
  );
  if (!result.ok) throw new Error(result.error.messages.join('\n'));
  return result.value;
}

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

  it('meets every kind of case: both objectives, infeasible ones, congestion that lifts the optimum', () => {
    const kinds = answers.map(
      ({ tiny, outcome }) => `${tiny.objective} ${outcome.explanation?.code ?? outcome.status}`,
    );
    for (const kind of ['wire optimal', 'path optimal', 'wire too few tiles', 'path out of reach']) {
      expect(kinds).toContain(kind);
    }
  });
});
