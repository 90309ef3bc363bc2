import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { FabricGraph } from '@/lib/fabric/compile';
import type { Fabric, LinkId, TileId } from '@/lib/fabric/fabric';
import { memoryUnit } from '@/lib/fabric/unit-library';
import type { OpId } from '@/lib/graph/kernel';
import { netsOf } from '@/lib/graph/nets';
import type { Pins, Placement, Routes } from '@/lib/mapping/mapping';
import { measureMapping } from '@/lib/mapping/metrics';
import { verifyMapping } from '@/lib/mapping/verify';
import { routePlacement } from '@/lib/solver/routing/route-nets';
import { type RandomMapping, randomMapping } from './random-mapping';

const SEED = 7130;

interface Legal extends RandomMapping {
  routes: Routes;
  pins: Pins;
}

/** Mappings that the router could finish, with every op pinned. */
const legal: fc.Arbitrary<Legal> = randomMapping()
  .map((mapping): { mapping: Legal; finished: boolean } => {
    const result = routePlacement(mapping.kernel, mapping.graph, mapping.placement);
    const open = [...result.overfullLinks, ...result.tooLongEdges, ...result.unreachable];
    return {
      mapping: { ...mapping, routes: result.routes, pins: { ...mapping.placement } },
      finished: open.length === 0 && netsOf(mapping.kernel).length > 0,
    };
  })
  .filter(({ finished }) => finished)
  .map(({ mapping }) => mapping);

const rulesOf = (mapping: Legal, change: Partial<Legal>): string[] => {
  const changed = { ...mapping, ...change };
  return verifyMapping(changed.kernel, changed.fabric, changed).map(({ rule }) => rule);
};

/** Any item of a list by a random number. */
const pick = <T>(items: readonly T[], number: number): T => {
  const item = items[number % items.length];
  if (item === undefined) throw new Error('Nothing to pick from');
  return item;
};
const routeEntries = (routes: Routes) => Object.entries(routes) as [OpId, LinkId[]][];
const tileOf = (graph: FabricGraph, index: number): TileId => pick(graph.tiles, index);

const check = (law: (mapping: Legal, number: number) => void, numRuns = 120) =>
  fc.assert(fc.property(legal, fc.nat(100000), law), { seed: SEED, numRuns });

describe('the verifier and one-step corruptions of legal mappings', () => {
  it('accepts what the router reports as finished', () => {
    check((mapping) => {
      expect(rulesOf(mapping, {})).toEqual([]);
    });
  });

  it('R1: an op taken away', () => {
    check((mapping, number) => {
      const { [pick(mapping.kernel.ops, number).id]: _, ...placement } = mapping.placement;
      expect(rulesOf(mapping, { placement, pins: {} })).toContain('R1');
    });
  });

  it('R1: a PE taken from under an op', () => {
    check((mapping, number) => {
      const op = pick(mapping.kernel.ops, number).id;
      const units = [...mapping.fabric.units];
      units[mapping.graph.tileIndex(mapping.placement[op] ?? '')] = null;
      expect(rulesOf(mapping, { fabric: { ...mapping.fabric, units } })).toEqual(['R1']);
    });
  });

  it('R2: an op moved onto another', () => {
    check((mapping, number) => {
      const [first, second] = [0, 1].map((i) => pick(mapping.kernel.ops, number + i).id);
      if (!first || !second) throw new Error('Two ops at least');
      const placement: Placement = {
        ...mapping.placement,
        [first]: mapping.placement[second] ?? tileOf(mapping.graph, 0),
      };
      expect(rulesOf(mapping, { placement, pins: {} })).toContain('R2');
    });
  });

  it('R3: a unit swapped for one that cannot add', () => {
    check((mapping, number) => {
      const op = pick(mapping.kernel.ops, number).id;
      const units = [...mapping.fabric.units];
      units[mapping.graph.tileIndex(mapping.placement[op] ?? '')] = memoryUnit.id;
      expect(rulesOf(mapping, { fabric: { ...mapping.fabric, units } })).toEqual(['R3']);
    });
  });

  it('R4: a pin put elsewhere', () => {
    check((mapping, number) => {
      const op = pick(mapping.kernel.ops, number).id;
      const own = mapping.graph.tileIndex(mapping.placement[op] ?? '');
      const elsewhere = tileOf(mapping.graph, own + 1);
      expect(rulesOf(mapping, { pins: { ...mapping.pins, [op]: elsewhere } })).toEqual(['R4']);
    });
  });

  it('R5: a link left out, for any link of any route', () => {
    check((mapping) => {
      for (const [op, route] of routeEntries(mapping.routes)) {
        for (const link of route) {
          const routes = { ...mapping.routes, [op]: route.filter((other) => other !== link) };
          expect(rulesOf(mapping, { routes })).toContain('R5');
        }
      }
    });
  });

  it('R5: any other link of the fabric added to a route', () => {
    check((mapping, number) => {
      const [op, route] = pick(routeEntries(mapping.routes), number);
      for (const { id } of mapping.graph.links) {
        if (route.includes(id)) continue;
        expect(rulesOf(mapping, { routes: { ...mapping.routes, [op]: [...route, id] } })).toContain('R5');
      }
    }, 60);
  });

  it("R5 alone: a route's link named twice", () => {
    check((mapping, number) => {
      const [op, route] = pick(routeEntries(mapping.routes), number);
      const routes = { ...mapping.routes, [op]: [...route, pick(route, number)] };
      expect(rulesOf(mapping, { routes })).toEqual(['R5']);
    });
  });

  it('R5: a link in use taken from the fabric', () => {
    check((mapping, number) => {
      const [, route] = pick(routeEntries(mapping.routes), number);
      const removedLinks = [...mapping.fabric.removedLinks, pick(route, number)];
      expect(rulesOf(mapping, { fabric: { ...mapping.fabric, removedLinks } })).toContain('R5');
    });
  });

  it('R5: an op with a connection moved to a free PE', () => {
    check((mapping, number) => {
      const taken = new Set<string>(Object.values(mapping.placement));
      const free = mapping.graph.tiles.filter((tile) => !taken.has(tile));
      fc.pre(free.length > 0);
      const source = pick(netsOf(mapping.kernel), number).source;
      const placement = { ...mapping.placement, [source]: pick(free, number) };
      expect(rulesOf(mapping, { placement, pins: {} })).toContain('R5');
    });
  });

  it('R6 exactly where the fullest link loses a channel too many', () => {
    check((mapping) => {
      const metrics = measureMapping(mapping.kernel, mapping.graph, mapping);
      const [link, nets] = [...metrics.linkLoads].reduce((a, b) => (b[1] > a[1] ? b : a));
      const narrow = (channels: number): Fabric => ({
        ...mapping.fabric,
        linkChannels: { ...mapping.fabric.linkChannels, [link]: channels },
      });
      fc.pre(nets > 1);
      expect(rulesOf(mapping, { fabric: narrow(nets) })).toEqual([]);
      expect(rulesOf(mapping, { fabric: narrow(nets - 1) })).toEqual(['R6']);
    }, 60);
  });

  it('R7 alone, once the clock allows one hop less than the longest path', () => {
    check((mapping) => {
      const { longestPathHops } = measureMapping(mapping.kernel, mapping.graph, mapping);
      const allow = (hops: number): Fabric => ({
        ...mapping.fabric,
        clock: { periodPs: hops * 100 + 50, entryDelayPs: 0, hopDelayPs: 100 },
      });
      expect(rulesOf(mapping, { fabric: allow(longestPathHops) })).toEqual([]);
      expect(new Set(rulesOf(mapping, { fabric: allow(longestPathHops - 1) }))).toEqual(new Set(['R7']));
    });
  });
});
