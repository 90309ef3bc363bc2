import { describe, expect, it } from 'vitest';
import { compileFabric } from '@/lib/fabric/compile';
import { parseMappingJson, writeMappingJson } from '@/lib/formats/mapping-json';
import { parseWeightsJson, writeWeightsJson } from '@/lib/formats/weights-json';
import { honestProvenance } from '@/lib/mapping/honest-provenance';
import { type MappingDocument, placementSchema, routesSchema } from '@/lib/mapping/mapping';
import { measureMapping, objectiveOf } from '@/lib/mapping/metrics';
import { commonUnit, weightedSum } from '@/lib/mapping/weighted-sum';
import { isWeighted, sameWeights, weightFaults, weightsSchema } from '@/lib/mapping/weights';
import { handDocument } from '../../helpers/kept-mapping';
import { fabricOf, fan, kernelOf } from '../solver/integer-program/exported-cases';

describe('the common unit of weights', () => {
  it.each<[string, number[], number | null]>([
    ['of none is 1', [], 1],
    ['of nothing but 0 is 1', [0, 0], 1],
    ['of 6, 9 and 0 is 3', [6, 9, 0], 3],
    ['of 0.1 and 0.25 is 0.05', [0.1, 0.25], 0.05],
    ['of 0 and the largest is the largest', [0, 1e9], 1e9],
    ['of the largest and 0.1 is 0.1', [1e9, 0.1], 0.1],
    ['of a third is none', [1 / 3, 1], null],
  ])('%s', (_, weights, expected) => {
    const unit = commonUnit(weights);
    expect(unit && unit.numerator / unit.denominator).toBe(expected);
  });

  it('keeps sums free of rounding: 0.1 · 3 + 0.2 · 6 = 1.5, not 1.5000000000000002', () => {
    expect(0.1 * 3 + 0.2 * 6).not.toBe(1.5);
    expect(
      weightedSum([
        [0.1, 3],
        [0.2, 6],
      ]),
    ).toBe(1.5);
  });
});

describe('the objective of a mapping', () => {
  /** in at r0c0 feeds left beside it and right one farther on the same tree: 2 links, paths of 1 and 2 hops. */
  const metrics = measureMapping(fan, compileFabric(fabricOf('mmm')), {
    placement: placementSchema.parse({ op_in: 'r0c0', op_left: 'r0c1', op_right: 'r0c2' }),
    routes: routesSchema.parse({ op_in: ['r0c0>r0c1', 'r0c1>r0c2'] }),
  });
  it.each([
    ['wire without weights: 2 links', 'wire', undefined, 2],
    ['path without weights: 1 + 2', 'path', undefined, 3],
    ['wire with the net at 2.5: 2 · 2.5', 'wire', { nets: { op_in: 2.5 } }, 5],
    ['path with the second connection at 10: 1 + 2 · 10', 'path', { edges: { edge_1: 10 } }, 21],
    ['path with the first at 0: 0 + 2', 'path', { edges: { edge_0: 0 } }, 2],
    ['wire takes no notice of connections', 'wire', { edges: { edge_0: 7 } }, 2],
    ['path takes no notice of nets', 'path', { nets: { op_in: 7 } }, 3],
  ] as const)('%s', (_, objective, weights, expected) => {
    expect(objectiveOf(metrics, objective, weights && weightsSchema.parse(weights))).toBe(expected);
  });
});

describe('weights', () => {
  const twoNets = kernelOf({ a: 'load', b: 'absolute', c: 'store' }, ['a>b:a', 'b>c:value']);

  it.each([
    ['not a number', Number.NaN],
    ['infinity', Number.POSITIVE_INFINITY],
    ['below 0', -0.5],
    ['above a thousand million', 1e9 + 1],
    ['a text', '2'],
  ])('%s is refused', (_, weight) => {
    expect(weightsSchema.safeParse({ nets: { op_a: weight } }).success).toBe(false);
    expect(weightsSchema.safeParse({ edges: { edge_0: weight } }).success).toBe(false);
  });

  it('from 0 to a thousand million are taken', () => {
    const weights = { nets: { op_a: 0, op_b: 1e9 }, edges: { edge_0: 0.001 } };
    expect(weightsSchema.parse(weights)).toEqual(weights);
    expect(weightFaults(twoNets, weightsSchema.parse(weights))).toEqual([]);
  });

  it('name what is not there', () => {
    const named = weightsSchema.parse({ nets: { op_c: 2, op_x: 2 }, edges: { edge_9: 2, edge_1: 2 } });
    const faults = weightFaults(twoNets, named);
    expect(faults.map(({ id }) => id)).toEqual(['op_c', 'op_x', 'edge_9']);
    expect(faults[0]?.message).toMatch(/op_c, but that op feeds no other op/);
    expect(faults[2]?.message).toMatch(/the connection edge_9, which the kernel does not have/);
  });

  it('that are all 1 are no other objective', () => {
    const ones = weightsSchema.parse({ nets: { op_a: 1 }, edges: { edge_0: 2 } });
    expect([isWeighted(ones, 'wire'), isWeighted(ones, 'path')]).toEqual([false, true]);
    expect([sameWeights(ones, undefined, 'wire'), sameWeights(ones, undefined, 'path')]).toEqual([
      true,
      false,
    ]);
  });
});

describe('weights as JSON', () => {
  it('are read back as they are written, in the order of names', () => {
    const weights = weightsSchema.parse({ edges: { edge_0: 0.5 }, nets: { op_b: 2, op_a: 0 } });
    const text = writeWeightsJson(weights);
    expect(parseWeightsJson(text)).toEqual({ ok: true, value: weights });
    expect(text.indexOf('op_a')).toBeLessThan(text.indexOf('op_b'));
  });

  it('are refused at the very number', () => {
    const parsed = parseWeightsJson('{"format":"pinloom.weights","formatVersion":1,\n "nets":{"op_a":-1}}');
    expect(!parsed.ok && parsed.errors).toMatchObject([{ line: 2, column: 17, path: 'nets.op_a' }]);
  });

  it('stand in a mapping that was made with them, and older mappings stay as they were', () => {
    const made: MappingDocument = { ...handDocument('Weighted'), provenance };
    expect(parseMappingJson(writeMappingJson(made))).toEqual({ ok: true, value: made });
    const { weights: _, ...older } = provenance;
    const old: MappingDocument = { ...made, provenance: older };
    const text = writeMappingJson(old);
    expect(text).not.toContain('weights');
    expect(parseMappingJson(text)).toEqual({ ok: true, value: old });
  });
});

const provenance = {
  by: 'solver' as const,
  engine: 'search + exact',
  objective: 'wire' as const,
  weights: weightsSchema.parse({ nets: { op_load: 3 } }),
  timeLimitMs: 1000,
  seed: 1,
  status: 'optimal' as const,
  objectiveValue: 3,
  bound: 3,
  elapsedMs: 5,
  changedByHand: false,
};

it('a claim of the solver’s work with other weights is not believed', () => {
  const { placement } = handDocument();
  const known = [{ provenance, placement }];
  expect(honestProvenance(provenance, placement, known)).toEqual(provenance);
  const other = { ...provenance, weights: weightsSchema.parse({ nets: { op_load: 30 } }) };
  expect(honestProvenance(other, placement, known)).toEqual({ by: 'hand' });
});
