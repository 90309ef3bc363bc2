import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { compileFabric } from '@/lib/fabric/compile';
import { netsOf } from '@/lib/graph/nets';
import { measureMapping } from '@/lib/mapping/metrics';
import { verifyMapping } from '@/lib/mapping/verify';
import { type RoutingResult, routePlacement } from '@/lib/solver/routing/route-nets';
import { type RandomMapping, randomMapping } from '../mapping/random-mapping';

const SEED = 5150;
const finished = (result: RoutingResult): boolean =>
  result.overfullLinks.length + result.tooLongEdges.length + result.unreachable.length === 0;
const rules = (mapping: RandomMapping, result: RoutingResult): Set<string> =>
  new Set(
    verifyMapping(mapping.kernel, mapping.fabric, {
      placement: mapping.placement,
      routes: result.routes,
      pins: {},
    }).map(({ rule }) => rule),
  );

describe('routes of random placements', () => {
  it('are trees always; overfull and too long exactly where the verifier says so', () => {
    fc.assert(
      fc.property(randomMapping({ ops: 20 }), fc.constantFrom('wire', 'path'), (mapping, objective) => {
        const result = routePlacement(mapping.kernel, mapping.graph, mapping.placement, { objective });
        const expected = new Set<string>();
        if (result.overfullLinks.length > 0) expected.add('R6');
        if (result.tooLongEdges.length > 0) expected.add('R7');
        expect(rules(mapping, result)).toEqual(expected);
      }),
      { seed: SEED, numRuns: 400 },
    );
  });

  it('wire hops are never fewer than the nets need alone, and equal that where there is room enough', () => {
    fc.assert(
      fc.property(randomMapping({ channels: 16 }), (mapping) => {
        const { nets } = routePlacement(mapping.kernel, mapping.graph, mapping.placement);
        for (const net of nets) expect(net.wireHops).toBe(net.aloneHops);
      }),
      { seed: SEED, numRuns: 150 },
    );
    fc.assert(
      fc.property(randomMapping({ channels: 1 }), (mapping) => {
        const { nets } = routePlacement(mapping.kernel, mapping.graph, mapping.placement);
        for (const net of nets) expect(net.wireHops).toBeGreaterThanOrEqual(net.aloneHops);
      }),
      { seed: SEED, numRuns: 150 },
    );
  });

  it('more channels never hurt', () => {
    fc.assert(
      fc.property(randomMapping({ channels: 1 }), (mapping) => {
        const narrow = routePlacement(mapping.kernel, mapping.graph, mapping.placement);
        const wider = compileFabric({ ...mapping.fabric, channels: 2 });
        const wide = routePlacement(mapping.kernel, wider, mapping.placement);
        const hops = (result: RoutingResult) => result.nets.reduce((sum, net) => sum + net.wireHops, 0);
        expect(wide.overfullLinks.length).toBeLessThanOrEqual(narrow.overfullLinks.length);
        fc.pre(finished(narrow));
        expect(finished(wide)).toBe(true);
        expect(hops(wide)).toBeLessThanOrEqual(hops(narrow));
      }),
      { seed: SEED, numRuns: 200 },
    );
  });

  it('`path` gives every connection its shortest path where links have room', () => {
    fc.assert(
      fc.property(randomMapping({ channels: 16 }), (mapping) => {
        const { kernel, graph, placement } = mapping;
        const { routes } = routePlacement(kernel, graph, placement, { objective: 'path' });
        const { connectionHops } = measureMapping(kernel, graph, { placement, routes });
        for (const edge of kernel.edges) {
          const from = graph.tileIndex(placement[edge.from] ?? '');
          const to = graph.tileIndex(placement[edge.to] ?? '');
          expect(connectionHops.get(edge.id)).toBe(graph.distance[from * graph.tileCount + to]);
        }
      }),
      { seed: SEED, numRuns: 150 },
    );
  });

  it('are the same for the same seed, and stay as they are when they are given back', () => {
    fc.assert(
      fc.property(randomMapping(), fc.nat(5), (mapping, seed) => {
        const first = routePlacement(mapping.kernel, mapping.graph, mapping.placement, { seed });
        const again = routePlacement(mapping.kernel, mapping.graph, mapping.placement, { seed });
        expect(again).toEqual(first);
        fc.pre(finished(first) && first.nets.every((net) => net.wireHops === net.aloneHops));
        const kept = routePlacement(mapping.kernel, mapping.graph, mapping.placement, {
          seed,
          previous: first.routes,
        });
        const asSets = ({ routes }: RoutingResult) =>
          Object.entries(routes).map(([op, route]) => [op, [...route].sort()]);
        expect(asSets(kept)).toEqual(asSets(first));
      }),
      { seed: SEED, numRuns: 150 },
    );
  });

  it('partial placements: nets among the placed ops only', () => {
    fc.assert(
      fc.property(randomMapping(), (mapping) => {
        const placement = Object.fromEntries(
          Object.entries(mapping.placement).filter((_, i) => i % 2 === 0),
        ) as typeof mapping.placement;
        const result = routePlacement(mapping.kernel, mapping.graph, placement);
        const found = verifyMapping(
          mapping.kernel,
          mapping.fabric,
          { placement, routes: result.routes, pins: {} },
          { partial: true },
        );
        expect(found.filter(({ rule }) => rule !== 'R6' && rule !== 'R7')).toEqual([]);
        expect(result.nets.length).toBeLessThanOrEqual(netsOf(mapping.kernel).length);
      }),
      { seed: SEED, numRuns: 150 },
    );
  });
});
