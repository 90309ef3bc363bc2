import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import type { Weights } from '@/lib/mapping/weights';
import type { Engine } from '@/lib/solver/engines/engine';
import { highsEngine } from '@/lib/solver/engines/highs';
import { simplexEngine } from '@/lib/solver/engines/simplex';
import { defaultSolveOptions, type EngineChoice } from '@/lib/solver/options';
import type { SolveOutcome } from '@/lib/solver/outcome';
import { solve } from '@/lib/solver/solve';
import { exhaustiveOptimum } from './exhaustive';
import { searched } from './searched';
import { type TinyCase, weightedCaseArb, weightKinds } from './tiny-cases';

let engines: Engine[] = [];
beforeAll(async () => {
  engines = [simplexEngine, await highsEngine()];
});

function solved(tiny: TinyCase, engine: EngineChoice = 'auto'): SolveOutcome {
  const { kernel, fabric, pins, objective, weights } = tiny;
  const result = solve(
    { kernel, fabric, pins, objective, weights },
    { ...defaultSolveOptions, engine, timeLimitMs: 20_000 },
    { nowMs: () => performance.now(), shouldStop: () => false, onProgress: () => undefined, engines },
  );
  if (!result.ok) throw new Error(result.error.messages.join('\n'));
  return result.value;
}

const truthOf = ({ kernel, fabric, pins, objective, weights }: TinyCase): number =>
  exhaustiveOptimum(kernel, fabric, pins, objective, weights) ?? Number.POSITIVE_INFINITY;

/** As near as sums of doubles in another order can be. */
const EXACT = 1e-12;
/** What is told apart between weights of many digits (lib/solver/weight-scale.ts). */
const toleranceOf = (kind: string): number => (kind === 'real' ? 1e-9 : EXACT);
const near = (a: number, b: number, ratio = EXACT): boolean =>
  a === b || Math.abs(a - b) <= ratio * Math.max(a, b);
const notAbove = (a: number, b: number, ratio = EXACT): boolean => a <= b || near(a, b, ratio);

const kinds = Object.entries(weightKinds);

describe('with weights, the exact search against trying everything', () => {
  it.each(kinds)('finds the optimum and proves it, %s, in 200 cases', (kind, weight) => {
    const ratio = toleranceOf(kind);
    const wrong = fc.sample(weightedCaseArb(weight), { seed: 61803, numRuns: 200 }).flatMap((tiny) => {
      const truth = truthOf(tiny);
      const { result, best, bounds, broken } = searched(tiny);
      const found = result.kind === 'infeasible' ? Number.POSITIVE_INFINITY : (best ?? Number.NaN);
      const isProved = result.kind === (truth === Number.POSITIVE_INFINITY ? 'infeasible' : 'proved');
      const isRight =
        isProved && near(found, truth, ratio) && bounds.every((bound) => notAbove(bound, truth, ratio));
      return isRight && broken.length === 0 ? [] : [{ tiny, truth, found, kind: result.kind, bounds }];
    });
    expect(wrong).toEqual([]);
  });
});

describe('with weights, the solver against trying everything', () => {
  it.each(kinds)('proves the optimum, %s', (kind, weight) => {
    const wrong = fc.sample(weightedCaseArb(weight), { seed: 14142, numRuns: 40 }).flatMap((tiny) => {
      const truth = truthOf(tiny);
      const { status, objectiveValue, bound } = solved(tiny);
      const isRight =
        truth === Number.POSITIVE_INFINITY
          ? status === 'infeasible'
          : status === 'optimal' &&
            near(objectiveValue, truth, toleranceOf(kind)) &&
            bound === objectiveValue;
      return isRight ? [] : [{ tiny, truth, status, objectiveValue, bound }];
    });
    expect(wrong).toEqual([]);
  });

  it.each(kinds)('never claims more than is true by integer programs, %s', (kind, weight) => {
    const statuses = new Set<string>();
    const wrong = fc
      .sample(weightedCaseArb(weight), { seed: 27182, numRuns: 25 })
      .flatMap((tiny): object[] => {
        const truth = truthOf(tiny);
        const outcome = solved(tiny, 'program');
        statuses.add(outcome.status);
        if (outcome.status === 'infeasible')
          return truth === Number.POSITIVE_INFINITY ? [] : [{ tiny, outcome }];
        const value = outcome.objectiveValue ?? Number.POSITIVE_INFINITY;
        return notAbove(outcome.bound, truth) && notAbove(truth, value) ? [] : [{ tiny, truth, outcome }];
      });
    expect(wrong).toEqual([]);
    // The engines' own tolerances stay open with weights of many digits, and below the digits of a large value.
    expect(statuses.has('feasible')).toBe(kind === 'real' || kind === 'nothing or most');
  });

  it('claims no proof where 0.1 drowns in the rounding of a thousand million', () => {
    const statuses = new Set<string>();
    const weight = fc.constantFrom(0.1, 0.3, 1e9);
    const wrong = fc.sample(weightedCaseArb(weight), { seed: 57721, numRuns: 60 }).flatMap((tiny) => {
      const truth = truthOf(tiny);
      const { status, objectiveValue, bound } = solved(tiny);
      statuses.add(status);
      if (status === 'infeasible') return truth === Number.POSITIVE_INFINITY ? [] : [{ tiny, truth }];
      const isHonest = notAbove(bound ?? 0, truth) && (status !== 'optimal' || near(objectiveValue, truth));
      return isHonest && near(objectiveValue ?? 0, truth, 1e-9)
        ? []
        : [{ tiny, truth, status, objectiveValue, bound }];
    });
    expect(wrong).toEqual([]);
    expect([...statuses].sort()).toEqual(['feasible', 'infeasible', 'optimal']);
  });
});

describe('laws of weights', () => {
  const anyCase = fc.oneof(...kinds.slice(0, 3).map(([, weight]) => weightedCaseArb(weight)));
  /** The proved objective, Infinity where nothing is legal. */
  const optimum = (tiny: TinyCase): number => {
    const outcome = solved(tiny);
    if (outcome.status === 'infeasible') return Number.POSITIVE_INFINITY;
    expect(outcome.status).toBe('optimal');
    return outcome.objectiveValue ?? Number.NaN;
  };
  const changed = (tiny: TinyCase, change: (weight: number, index: number) => number): TinyCase => {
    const ids =
      tiny.objective === 'wire'
        ? [...new Set<string>(tiny.kernel.edges.map((edge) => edge.from))]
        : tiny.kernel.edges.map((edge) => edge.id as string);
    const named: Record<string, number> =
      (tiny.objective === 'wire' ? tiny.weights?.nets : tiny.weights?.edges) ?? {};
    const record = Object.fromEntries(ids.map((id, i) => [id, change(named[id] ?? 1, i)]));
    const weights: Weights = tiny.objective === 'wire' ? { nets: record } : { edges: record };
    return { ...tiny, weights };
  };

  it('all weights times a factor, the optimum times the factor', () => {
    fc.assert(
      fc.property(anyCase, fc.constantFrom(0.1, 0.5, 3, 1000), (tiny, factor) => {
        const scaled = optimum(changed(tiny, (weight) => weight * factor));
        const once = optimum(tiny);
        expect(near(scaled, once * factor, 1e-9)).toBe(true);
      }),
      { seed: 16180, numRuns: 60 },
    );
  });

  it('one weight more never lowers the optimum', () => {
    fc.assert(
      fc.property(anyCase, fc.nat(5), fc.constantFrom(0.25, 1, 7), (tiny, which, more) => {
        const count = Math.max(1, tiny.kernel.edges.length);
        const raised = optimum(changed(tiny, (weight, i) => (i === which % count ? weight + more : weight)));
        expect(notAbove(optimum(tiny), raised, 1e-9)).toBe(true);
      }),
      { seed: 16181, numRuns: 60 },
    );
  });

  it('weights of 1 are none', () => {
    fc.assert(
      fc.property(anyCase, (tiny) => {
        const { weights: _, ...plain } = tiny;
        const one = solved(changed(tiny, () => 1));
        const none = solved(plain);
        expect({ ...one, elapsedMs: 0 }).toEqual({ ...none, elapsedMs: 0 });
      }),
      { seed: 16182, numRuns: 30 },
    );
  });
});
