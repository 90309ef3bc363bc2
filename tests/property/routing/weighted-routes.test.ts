import fc from 'fast-check';
import { expect, it } from 'vitest';
import { netsOf } from '@/lib/graph/nets';
import { measureMapping, objectiveOf } from '@/lib/mapping/metrics';
import { type Weights, weightsSchema } from '@/lib/mapping/weights';
import { routePlacement } from '@/lib/solver/routing/route-nets';
import { type RandomMapping, randomMapping } from '../mapping/random-mapping';

const crowded = fc.record({
  mapping: randomMapping({ ops: 20, channels: 1 }),
  values: fc.array(fc.constantFrom(0, 1, 1, 1, 4, 16), { minLength: 20, maxLength: 20 }),
});

const weightsOf = ({ kernel }: RandomMapping, objective: 'wire' | 'path', values: number[]): Weights =>
  weightsSchema.parse(
    objective === 'wire'
      ? { nets: Object.fromEntries(netsOf(kernel).map(({ source }, i) => [source, values[i]])) }
      : { edges: Object.fromEntries(kernel.edges.map(({ id }, i) => [id, values[i]])) },
  );

it.each(['wire', 'path'] as const)(
  'for %s: routes by weights are never dearer than routes without, some are cheaper, and as many find room',
  (objective) => {
    let cheaper = 0;
    for (const { mapping, values } of fc.sample(crowded, { seed: 5153, numRuns: 800 })) {
      const { kernel, graph, placement } = mapping;
      const weights = weightsOf(mapping, objective, values);
      const by = routePlacement(kernel, graph, placement, { objective, weights });
      const without = routePlacement(kernel, graph, placement, { objective });
      expect(by.overfullLinks.length).toBe(without.overfullLinks.length);
      if (by.overfullLinks.length > 0) continue;
      const [own, plain] = [by, without].map(({ routes }) =>
        objectiveOf(measureMapping(kernel, graph, { placement, routes }), objective, weights),
      ) as [number, number];
      expect(own).toBeLessThanOrEqual(plain);
      if (own < plain) cheaper++;
    }
    expect(cheaper).toBeGreaterThan(5);
  },
  60_000,
);
