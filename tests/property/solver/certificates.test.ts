import fc from 'fast-check';
import { expect, it } from 'vitest';
import { certificateSchema, type ProofMethod } from '@/lib/mapping/certificate';
import { certificateDifferences, optionsAgain, problemAgain } from '@/lib/solver/certificate';
import { defaultSolveOptions, type SolveOptions } from '@/lib/solver/options';
import type { SolveOutcome } from '@/lib/solver/outcome';
import type { PlacementProblem } from '@/lib/solver/problem';
import { solve } from '@/lib/solver/solve';
import { tinyCaseArb, weightedCaseArb, weightKinds } from './tiny-cases';

const SEED = 20260412;
const LIMIT_MS = 3_600_000;

function outcomeOf(problem: PlacementProblem, options: SolveOptions, tickMs: number): SolveOutcome {
  let nowMs = 0;
  const tick = () => {
    nowMs += tickMs;
    return nowMs;
  };
  const hooks = { nowMs: tick, shouldStop: () => false, onProgress: () => undefined, engines: [] };
  const result = solve(problem, options, hooks);
  if (!result.ok) throw new Error(result.error.messages.join('\n'));
  return result.value;
}

it('whatever is proved carries a certificate, which agrees when its problem is solved again, however slow the clock', () => {
  const seen = new Map<ProofMethod, number>();
  fc.assert(
    fc.property(
      fc.oneof(tinyCaseArb, weightedCaseArb(fc.oneof(...Object.values(weightKinds)))),
      fc.nat(1000),
      fc.integer({ min: 0, max: 100_000 }),
      fc.boolean(),
      (tiny, seed, tickMs, hasStart) => {
        const first = tiny.kernel.ops[0]!.id;
        const problem = hasStart
          ? { ...tiny, start: { [first]: 'r0c0' } as PlacementProblem['start'] }
          : tiny;
        const outcome = outcomeOf(problem, { ...defaultSolveOptions, timeLimitMs: LIMIT_MS, seed }, tickMs);
        const isProved = outcome.status === 'optimal' || outcome.status === 'infeasible';
        expect(outcome.certificate !== null).toBe(isProved);
        if (!outcome.certificate) return;
        const certificate = certificateSchema.parse(outcome.certificate);
        expect(certificate).toEqual(outcome.certificate);
        seen.set(certificate.method, (seen.get(certificate.method) ?? 0) + 1);
        const again = outcomeOf(problemAgain(certificate, tiny), optionsAgain(certificate, LIMIT_MS), 0);
        expect(certificateDifferences(certificate, again)).toEqual([]);
      },
    ),
    { seed: SEED, numRuns: 400 },
  );
  expect([...seen.keys()].sort()).toEqual(['bound of the stars', 'counting', 'exact search']);
  expect(seen.get('exact search')).toBeGreaterThan(10);
}, 60_000);
