import fc from 'fast-check';
import { beforeAll, expect, test } from 'vitest';
import type { Fabric } from '@/lib/fabric/fabric';
import { opId } from '@/lib/graph/ids';
import type { Kernel, OpId } from '@/lib/graph/kernel';
import type { Pins } from '@/lib/mapping/mapping';
import { verifyMapping } from '@/lib/mapping/verify';
import type { Engine } from '@/lib/solver/engines/engine';
import { highsEngine } from '@/lib/solver/engines/highs';
import { simplexEngine } from '@/lib/solver/engines/simplex';
import type { SolveOutcome } from '@/lib/solver/outcome';
import { solve } from '@/lib/solver/solve';
import { type TinyCase, tinyCaseArb } from './tiny-cases';

const FIXED = { seed: 90125, numRuns: 40 };

let engines: Engine[] = [];
beforeAll(async () => {
  engines = [simplexEngine, await highsEngine()];
});

function solved(
  { kernel, fabric, pins, objective }: TinyCase,
  hooks: { shouldStop?: () => boolean } = {},
): SolveOutcome {
  const result = solve(
    { kernel, fabric, pins, objective },
    { engine: 'auto', timeLimitMs: 20_000, seed: 1, nodeLimit: null, searchTries: null },
    {
      nowMs: () => performance.now(),
      shouldStop: hooks.shouldStop ?? (() => false),
      onProgress: () => undefined,
      engines,
    },
  );
  if (!result.ok) throw new Error(result.error.messages.join('\n'));
  return result.value;
}

/** The proved objective, Infinity where nothing is legal. */
function optimum(tiny: TinyCase): number {
  const outcome = solved(tiny);
  if (outcome.status === 'infeasible') return Number.POSITIVE_INFINITY;
  expect(outcome.status).toBe('optimal');
  return outcome.objectiveValue ?? Number.NaN;
}

/** Other names, and ops and edges in the opposite order. */
function renamed({ kernel, pins, ...rest }: TinyCase): TinyCase {
  const name = new Map<OpId, OpId>(kernel.ops.map((op, i) => [op.id, opId(`op_other_${97 - i}`)]));
  const other = (id: OpId): OpId => name.get(id) ?? id;
  const renamedKernel: Kernel = {
    ...kernel,
    ops: kernel.ops.map((op) => ({ ...op, id: other(op.id) })).reverse(),
    edges: kernel.edges.map((edge) => ({ ...edge, from: other(edge.from), to: other(edge.to) })).reverse(),
  };
  const renamedPins: Pins = Object.fromEntries(
    Object.entries(pins).map(([id, tile]) => [other(id as OpId), tile]),
  );
  return { ...rest, kernel: renamedKernel, pins: renamedPins };
}

test('renaming and reordering ops and edges keeps the optimum', () => {
  fc.assert(
    fc.property(tinyCaseArb, (tiny) => {
      expect(optimum(renamed(tiny))).toBe(optimum(tiny));
    }),
    FIXED,
  );
});

test('more never hurts: a channel more, a link back, a unit for a bare router, no clock, no pin', () => {
  const richer: ((tiny: TinyCase) => TinyCase)[] = [
    (tiny) => withFabric(tiny, { channels: tiny.fabric.channels + 1 }),
    (tiny) => withFabric(tiny, { removedLinks: tiny.fabric.removedLinks.slice(1) }),
    (tiny) => {
      const free = tiny.fabric.units.find((unit) => unit !== null) ?? null;
      return withFabric(tiny, { units: tiny.fabric.units.map((unit) => unit ?? free) });
    },
    (tiny) => withFabric(tiny, { clock: null }),
    (tiny) => ({ ...tiny, pins: {} }),
  ];
  fc.assert(
    fc.property(tinyCaseArb, fc.constantFrom(...richer), (tiny, enrich) => {
      expect(optimum(enrich(tiny))).toBeLessThanOrEqual(optimum(tiny));
    }),
    { ...FIXED, numRuns: 80 },
  );
});

const withFabric = (tiny: TinyCase, change: Partial<Fabric>): TinyCase => ({
  ...tiny,
  fabric: { ...tiny.fabric, ...change },
});

test('a solve that is stopped after any number of looks at the stop ends with a legal best, a proof or none', () => {
  const seen = new Set<string>();
  fc.assert(
    fc.property(tinyCaseArb, fc.nat(60), (tiny, looks) => {
      let left = looks;
      const outcome = solved(tiny, { shouldStop: () => left-- <= 0 });
      seen.add(outcome.status);
      const { placement, routes } = outcome;
      expect(placement === null).toBe(routes === null);
      if (placement === null || routes === null) return;
      expect(verifyMapping(tiny.kernel, tiny.fabric, { placement, routes, pins: tiny.pins })).toEqual([]);
      expect(outcome.bound).toBeLessThanOrEqual(outcome.objectiveValue ?? Number.NaN);
    }),
    { ...FIXED, numRuns: 150 },
  );
  // Stopped at once there is nothing yet, a little later something: both were met.
  expect(seen).toContain('unknown');
  expect(seen).toContain('optimal');
}, 60_000);
