import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { tileId } from '@/lib/fabric/tiles';
import type { OpId } from '@/lib/graph/kernel';
import type { Pins } from '@/lib/mapping/mapping';
import { weightsSchema } from '@/lib/mapping/weights';
import { type EarlierSolve, knownAnswer } from '@/lib/solver/known-answer';
import type { SolveOutcome } from '@/lib/solver/outcome';
import { type Answer, pinPrice } from '@/lib/solver/pin-price';
import { solve } from '@/lib/solver/solve';
import { everyPlacement } from './exhaustive';
import { type TinyCase, tinyCaseArb } from './tiny-cases';

/** A tiny case with one op to be pinned besides, on any tile that need not even suit it. */
interface PinCase {
  tiny: TinyCase;
  op: OpId;
  pins: Pins;
}

const pinCaseArb: fc.Arbitrary<PinCase> = fc
  .tuple(tinyCaseArb, fc.nat(4), fc.nat(5))
  .map(([tiny, opIndex, tileIndex]) => {
    const { kernel, fabric } = tiny;
    const op = kernel.ops[opIndex % kernel.ops.length]?.id as OpId;
    const at = tileIndex % fabric.units.length;
    const { [op]: _, ...without } = tiny.pins;
    return {
      tiny: { ...tiny, pins: without as Pins },
      op,
      pins: { ...without, [op]: tileId(Math.floor(at / fabric.cols), at % fabric.cols) } as Pins,
    };
  });

/** Stops after so many looks at the stop. */
function solved({ kernel, fabric, objective }: TinyCase, pins: Pins, looks: number): SolveOutcome {
  let left = looks;
  const result = solve(
    { kernel, fabric, pins, objective },
    { engine: 'auto', timeLimitMs: 20_000, seed: 1, nodeLimit: null, searchTries: null },
    {
      nowMs: () => performance.now(),
      shouldStop: () => left-- <= 0,
      onProgress: () => undefined,
      engines: [],
    },
  );
  if (!result.ok) throw new Error(result.error.messages.join('\n'));
  return result.value;
}

const all = Number.POSITIVE_INFINITY;

/** By trying everything; Infinity where there is no legal mapping. */
const truth = ({ kernel, fabric, objective }: TinyCase, pins: Pins): number =>
  Math.min(all, ...everyPlacement(kernel, fabric, pins, objective).map(({ cost }) => cost));

describe('the price of a pin against trying everything', () => {
  it('is exact where both solves have ended with a proof, and says where the pin leaves nothing', () => {
    const seen = new Map<string, number>();
    fc.assert(
      fc.property(pinCaseArb, ({ tiny, pins }) => {
        const price = pinPrice(solved(tiny, pins, all), solved(tiny, tiny.pins, all));
        const [withPin, withoutPin] = [truth(tiny, pins), truth(tiny, tiny.pins)];
        const name = price.kind === 'exact' && price.hops > 0 ? 'dear' : price.kind;
        seen.set(name, (seen.get(name) ?? 0) + 1);
        if (withoutPin === all) expect(price).toEqual({ kind: 'unknown' });
        else if (withPin === all) expect(price).toEqual({ kind: 'makes infeasible' });
        else expect(price).toEqual({ kind: 'exact', hops: withPin - withoutPin });
      }),
      { seed: 61_301, numRuns: 300 },
    );
    expect([...seen.keys()].sort()).toEqual(['dear', 'exact', 'makes infeasible', 'unknown']);
  });

  it('of solves that were stopped anywhere lies between the ends that are named', () => {
    const seen = new Set<string>();
    fc.assert(
      fc.property(pinCaseArb, fc.nat(40), fc.nat(40), ({ tiny, pins }, first, second) => {
        const price = pinPrice(solved(tiny, pins, first), solved(tiny, tiny.pins, second));
        const [withPin, withoutPin] = [truth(tiny, pins), truth(tiny, tiny.pins)];
        seen.add(price.kind);
        if (price.kind === 'makes infeasible') expect([withPin, withoutPin < all]).toEqual([all, true]);
        if (price.kind === 'exact') expect(price.hops).toBe(withPin - withoutPin);
        if (price.kind !== 'between') return;
        expect(price.leastHops).toBeLessThan(price.mostHops);
        expect(withPin - withoutPin).toBeGreaterThanOrEqual(price.leastHops);
        expect(withPin - withoutPin).toBeLessThanOrEqual(price.mostHops);
      }),
      { seed: 61_302, numRuns: 300 },
    );
    expect(seen).toContain('between');
  });
});

describe('the price of a pin', () => {
  const answer = (status: Answer['status'], objectiveValue: number | null, bound: number | null): Answer => ({
    status,
    objective: 'wire',
    objectiveValue,
    bound,
  });
  it.each([
    ['41 − 38 = 3 where both are proved', answer('optimal', 41, 41), answer('optimal', 38, 38), [3, 3]],
    ['40 or 41 − 38: from 2 to 3', answer('feasible', 41, 40), answer('optimal', 38, 38), [2, 3]],
    [
      'at most 41, at least 38 without it: up to 3',
      answer('feasible', 41, 30),
      answer('feasible', 40, 38),
      [0, 3],
    ],
    [
      'nothing: 38 with it reaches the bound without it',
      answer('feasible', 38, 30),
      answer('feasible', 39, 38),
      [0, 0],
    ],
    [
      '41 − 38 where nothing is found without it, but 38 is its bound',
      answer('optimal', 41, 41),
      answer('unknown', null, 38),
      [0, 3],
    ],
  ])('%s', (_, withPin, withoutPin, [least, most]) => {
    const price = pinPrice(withPin, withoutPin);
    const ends = price.kind === 'exact' ? [price.hops, price.hops] : Object.values(price).slice(1);
    expect(ends).toEqual([least, most]);
    expect(price.kind).toBe(least === most ? 'exact' : 'between');
  });

  it('is unknown where nothing is found with the pin, or the objectives differ', () => {
    const optimal = answer('optimal', 38, 38);
    expect(pinPrice(answer('unknown', null, 30), optimal).kind).toBe('unknown');
    expect(pinPrice({ ...optimal, objective: 'path' }, optimal).kind).toBe('unknown');
  });
});

describe('what earlier solves have shown for other pins', () => {
  const pinsArb = (tiny: TinyCase) =>
    fc
      .array(fc.tuple(fc.nat(tiny.kernel.ops.length - 1), fc.nat(tiny.fabric.units.length - 1)), {
        maxLength: 2,
      })
      .map((pairs) => {
        const pins: Pins = {};
        for (const [op, at] of pairs) {
          pins[tiny.kernel.ops[op]?.id as OpId] = tileId(
            Math.floor(at / tiny.fabric.cols),
            at % tiny.fabric.cols,
          );
        }
        return pins;
      });
  const earlier = (tiny: TinyCase, pins: Pins, looks: number): EarlierSolve => {
    const { placement, objectiveValue, bound, status, objective } = solved(tiny, pins, looks);
    return {
      pins,
      objective,
      weights: undefined,
      isInfeasible: status === 'infeasible',
      bound,
      best: placement && { placement, objectiveValue },
    };
  };

  it('never contradicts what trying everything says', () => {
    const seen = new Set<string>();
    const scene = tinyCaseArb.chain((tiny) =>
      fc.record({
        tiny: fc.constant(tiny),
        pins: pinsArb(tiny),
        others: fc.array(fc.tuple(pinsArb(tiny), fc.constantFrom(8, 30, all)), {
          minLength: 1,
          maxLength: 4,
        }),
      }),
    );
    fc.assert(
      fc.property(scene, ({ tiny, pins, others }) => {
        const solves = others.map(([own, looks]) => earlier(tiny, own, looks));
        const known = knownAnswer(pins, tiny.objective, solves);
        const least = truth(tiny, pins);
        seen.add(known.status);
        if (known.status === 'infeasible') {
          expect(least).toBe(all);
          return;
        }
        expect(known.bound).toBeLessThanOrEqual(least);
        expect(known.objectiveValue ?? all).toBeGreaterThanOrEqual(least);
        if (known.status === 'optimal') expect(known.objectiveValue).toBe(least);
        expect(known.from?.best?.objectiveValue ?? null).toBe(known.objectiveValue);
      }),
      { seed: 61_303, numRuns: 400 },
    );
    expect([...seen].sort()).toEqual(['feasible', 'infeasible', 'optimal', 'unknown']);
  });

  it('takes nothing from solves of another objective or with other weights', () => {
    const other = { pins: {}, isInfeasible: false, bound: 7, best: null };
    const solves: EarlierSolve[] = [
      { ...other, objective: 'path', weights: undefined },
      { ...other, objective: 'wire', weights: weightsSchema.parse({ nets: { op_0: 3 } }) },
    ];
    expect(knownAnswer({}, 'wire', solves)).toMatchObject({ status: 'unknown', bound: 0, from: null });
    const same = weightsSchema.parse({ nets: { op_0: 3, op_1: 1 } });
    expect(knownAnswer({}, 'wire', solves, same)).toMatchObject({ status: 'unknown', bound: 7 });
  });
});
