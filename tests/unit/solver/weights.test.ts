import { describe, expect, it } from 'vitest';
import { compileFabric } from '@/lib/fabric/compile';
import { builtInLibrary } from '@/lib/fabric/unit-library';
import { measureMapping, objectiveOf } from '@/lib/mapping/metrics';
import { type Weights, weightsSchema } from '@/lib/mapping/weights';
import { buildInstance } from '@/lib/solver/instance';
import { defaultSolveOptions } from '@/lib/solver/options';
import { checkProblem, type PlacementProblem } from '@/lib/solver/problem';
import { routePlacement } from '@/lib/solver/routing/route-nets';
import { solve } from '@/lib/solver/solve';
import { costGrain, weightScale } from '@/lib/solver/weight-scale';
import { crossing, fabricOf, fan, kernelOf, noWayDown, twoWays } from './integer-program/exported-cases';

const weights = (given: object): Weights => weightsSchema.parse(given);

describe('an instance', () => {
  /** in feeds sum at both ports; sum feeds itself and out. */
  const kernel = kernelOf({ in: 'load', sum: 'add', out: 'store' }, [
    'in>sum:a',
    'in>sum:b',
    'sum>out:value',
  ]);
  const graph = compileFabric(fabricOf('mam'));
  const built = (objective: 'wire' | 'path', given: object) =>
    buildInstance(kernel, graph, {}, objective, builtInLibrary, weights(given));

  it('takes the weights of nets for wire, 1 where none is named', () => {
    const { nets, pairs } = built('wire', { nets: { op_sum: 0.5 }, edges: { edge_0: 9 } });
    expect(nets.map((net) => net.weight)).toEqual([1, 0.5]);
    expect(pairs.map((pair) => pair.weight)).toEqual([2, 1]);
  });

  it('sums the weights of connections with the same ends for path: 0.1 + 0.2 is 0.3', () => {
    const { nets, pairs } = built('path', { nets: { op_sum: 9 }, edges: { edge_0: 0.1, edge_1: 0.2 } });
    expect(pairs.map((pair) => pair.weight)).toEqual([0.3, 1]);
    expect(nets.map((net) => net.weight)).toEqual([1, 1]);
  });
});

describe('a problem with weights', () => {
  const problem: PlacementProblem = { kernel: fan, fabric: fabricOf('mmm'), pins: {}, objective: 'wire' };
  const faultsOf = (given: object) => {
    const checked = checkProblem({ ...problem, weights: given as Weights });
    return checked.ok ? [] : checked.error.faults;
  };

  it.each([
    ['a number that is none', { nets: { op_in: Number.NaN } }, 'op_in', /^weights\.nets\.op_in: /],
    ['no end', { nets: { op_in: Number.POSITIVE_INFINITY } }, 'op_in', /^weights\.nets\.op_in: /],
    ['less than nothing', { edges: { edge_1: -1 } }, 'edge_1', /^weights\.edges\.edge_1: /],
    [
      'more than a thousand million',
      { nets: { op_in: 2e9 } },
      'op_in',
      /^weights\.nets\.op_in: .*1000000000/,
    ],
    [
      'an op that is not there',
      { nets: { op_ghost: 1 } },
      'op_ghost',
      /op_ghost, an op that the kernel does not/,
    ],
    ['an op without a net', { nets: { op_left: 1 } }, 'op_left', /op_left, but that op feeds no other op/],
    [
      'a connection that is not there',
      { edges: { edge_7: 1 } },
      'edge_7',
      /edge_7, which the kernel does not/,
    ],
  ])('is refused at the place: %s', (_, given, id, message) => {
    const faults = faultsOf(given);
    expect(faults).toMatchObject([{ part: 'weights', id }]);
    expect(faults[0]?.message).toMatch(message);
  });

  it('is taken with 0 and with the most', () => {
    expect(faultsOf({ nets: { op_in: 0 }, edges: { edge_0: 1e9 } })).toEqual([]);
  });
});

describe('the unit of a solve', () => {
  const two = kernelOf({ a: 'load', b: 'absolute', c: 'store' }, ['a>b:a', 'b>c:value']);
  const scaleOf = (a: number, b: number) => weightScale(two, 'wire', weights({ nets: { op_a: a, op_b: b } }));

  it.each([
    ['1 where all weights are 1', 1, 1, { op_a: 1, op_b: 1 }, 1],
    ['5 for 10 and 15', 10, 15, { op_a: 2, op_b: 3 }, 5],
    ['0.05 for 0.1 and 0.25', 0.1, 0.25, { op_a: 2, op_b: 5 }, 0.05],
    ['the largest for it and 0', 0, 1e9, { op_a: 0, op_b: 1 }, 1e9],
    ['1 where nothing costs anything', 0, 0, { op_a: 0, op_b: 0 }, 1],
  ])('is %s', (_, a, b, nets, unit) => {
    const scale = scaleOf(a, b);
    expect(scale).toMatchObject({ kind: 'whole', step: 1, weights: { nets } });
    expect(scale.toValue(1)).toBe(unit);
    // A bound of 3.2 units is one of 4.
    expect(scale.roundUp(3.2)).toBe(4);
  });

  it('rounds nothing up where weights have no common unit', () => {
    const scale = scaleOf(1 / 3, 1);
    expect(scale.kind).toBe('real');
    expect(scale.roundUp(3.2)).toBe(3.2);
    expect(scale.toValue(scale.weights.nets?.[two.ops[0]?.id as never] ?? 0)).toBe(1 / 3);
  });

  it('tells weights apart that are seven digits apart, and owns up where they are too far apart', () => {
    const kindOf = (large: number, small: number) =>
      costGrain([
        { weight: large, leastHops: 1 },
        { weight: small, leastHops: 1 },
      ]).kind;
    expect([kindOf(1e7, 1), kindOf(1e9, 1), kindOf(1e9, 0.1)]).toEqual(['whole', 'whole', 'coarse']);
  });
});

describe('nets that compete for a link', () => {
  const graph = compileFabric(fabricOf('mmm mmm', noWayDown));
  // Both want r0c1>r0c2; either can go round with 4 links in place of 2.
  it.each([
    ['op_a', { op_a: 2, op_b: 4 }],
    ['op_b', { op_a: 4, op_b: 2 }],
  ])('leave it to the heavier one, %s', (heavy, hops) => {
    const given = weights({ nets: { [heavy]: 5 } });
    const { routes, overfullLinks } = routePlacement(twoWays, graph, crossing, { weights: given });
    const metrics = measureMapping(twoWays, graph, { placement: crossing, routes });
    expect(overfullLinks).toEqual([]);
    expect(Object.fromEntries(metrics.netWireHops)).toEqual(hops);
    // 5 · 2 + 1 · 4
    expect(objectiveOf(metrics, 'wire', given)).toBe(14);
  });
});

describe('a solve with weights', () => {
  /** a and b stand at the ends of a row and feed a sum between them, which feeds out, below b. */
  const kernel = kernelOf({ a: 'load', b: 'load', sum: 'add', out: 'store' }, [
    'a>sum:a',
    'b>sum:b',
    'sum>out:value',
  ]);
  const fabric = fabricOf('maaaam aaaamm');
  const pins = { op_a: 'r0c0', op_b: 'r0c5', op_out: 'r1c5' } as PlacementProblem['pins'];
  const solved = (
    given: object,
    more: Partial<PlacementProblem> = {},
    engine: 'auto' | 'search' = 'auto',
  ) => {
    const result = solve(
      { kernel, fabric, pins, objective: 'wire', weights: weights(given), ...more },
      { ...defaultSolveOptions, engine, timeLimitMs: engine === 'search' ? 800 : 20_000 },
      { nowMs: () => performance.now(), shouldStop: () => false, onProgress: () => undefined, engines: [] },
    );
    if (!result.ok) throw new Error(result.error.messages.join('\n'));
    return result.value;
  };

  it('puts the sum beside the dear net: at r0c1, 1 · 10 + 4 + (4 + 1)', () => {
    const outcome = solved({ nets: { op_a: 10 } });
    expect(outcome).toMatchObject({ status: 'optimal', objectiveValue: 19, bound: 19 });
    expect(outcome.placement).toMatchObject({ op_sum: 'r0c1' });
  });

  it('proves decimals without rounding: 1 · 0.3 + 4 · 0.1 + 5 · 0.1 = 1.2', () => {
    const outcome = solved({ nets: { op_a: 0.3, op_b: 0.1, op_sum: 0.1 } });
    expect(outcome).toMatchObject({ status: 'optimal', objectiveValue: 1.2, bound: 1.2 });
  });

  it('routes what weighs nothing, at the cost of nothing', () => {
    const outcome = solved({ nets: { op_a: 0, op_b: 0, op_sum: 0 } });
    expect(outcome).toMatchObject({ status: 'optimal', objectiveValue: 0, bound: 0, gapRatio: 0 });
    expect(Object.keys(outcome.routes ?? {})).toEqual(['op_a', 'op_b', 'op_sum']);
  });

  it('looks for another mapping by weighted cost, and says what it counted', () => {
    const tenth = { nets: { op_a: 0.1, op_b: 0.1, op_sum: 0.1 } };
    // Beside b: 4 + 1 + 2 tenths; one farther from it: 3 + 2 + 3; nothing else costs less than 9.
    const best = solved(tenth);
    expect(best).toMatchObject({ status: 'optimal', objectiveValue: 0.7, placement: { op_sum: 'r0c4' } });
    const than = [best.placement ?? {}];
    const ask = (objectiveValue: number) => solved(tenth, { another: { objectiveValue, than } });
    expect(ask(0.8)).toMatchObject({ objectiveValue: 0.8, placement: { op_sum: 'r0c3' } });
    expect(ask(0.7)).toMatchObject({
      status: 'infeasible',
      reason:
        'Proved by exhaustive search: no other placement of at most 0.7 weighted wire hops exists besides mirror images of the ones shown.',
    });
  });

  it('takes a bound that was proved before in its own unit: 1 · 1 + 4 · 0.1 + 5 · 0.1', () => {
    const given = { nets: { op_a: 1, op_b: 0.1, op_sum: 0.1 } };
    const searchedOnly = (more: Partial<PlacementProblem>) => solved(given, more, 'search');
    expect(searchedOnly({})).toMatchObject({ status: 'feasible', objectiveValue: 1.9 });
    expect(searchedOnly({ provenBound: 1.9 })).toMatchObject({ status: 'optimal', bound: 1.9 });
  });

  it('tells one of a thousand million beside 0: the sum beside b, 1 · 1e9', () => {
    const outcome = solved({ nets: { op_a: 0, op_b: 1e9, op_sum: 0 } });
    expect(outcome).toMatchObject({ status: 'optimal', objectiveValue: 1e9 });
  });
});
