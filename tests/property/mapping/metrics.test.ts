import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { compileFabric } from '@/lib/fabric/compile';
import type { LinkId } from '@/lib/fabric/fabric';
import { linkEnds } from '@/lib/fabric/tiles';
import { measureMapping } from '@/lib/mapping/metrics';
import { routePlacement } from '@/lib/solver/routing/route-nets';
import { plainFabric } from '../../unit/fabric/plain-fabric';
import { additions, opAt, randomMapping } from './random-mapping';

/** Hops to a tile by walking back along the route's links: each tile of a tree is entered once. */
function hopsBack(route: readonly LinkId[], from: string, to: string): number {
  let hops = 0;
  for (let tile = to; tile !== from; hops++) {
    const link = route.find((id) => linkEnds(id).to === tile);
    if (link === undefined) throw new Error(`No way back from ${tile}`);
    tile = linkEnds(link).from;
  }
  return hops;
}

describe('the figures of a mapping', () => {
  it('equal a recount from the document, walking each path back from its consumer', () => {
    fc.assert(
      fc.property(randomMapping({ ops: 16 }), ({ kernel, graph, placement }) => {
        const { routes } = routePlacement(kernel, graph, placement);
        const metrics = measureMapping(kernel, graph, { placement, routes });
        const hops = new Map(
          kernel.edges.map((edge) => [
            edge.id,
            hopsBack(routes[edge.from] ?? [], placement[edge.from] ?? '', placement[edge.to] ?? ''),
          ]),
        );
        const carried = Object.values(routes).flat();
        expect(metrics.connectionHops).toEqual(hops);
        expect(metrics.totalPathHops).toBe([...hops.values()].reduce((a, b) => a + b, 0));
        expect(metrics.longestPathHops).toBe(Math.max(...hops.values()));
        expect(metrics.totalWireHops).toBe(carried.length);
        expect(metrics.linksUsed).toBe(new Set(carried).size);
        const loads = [...new Set(carried)].map((id) => carried.filter((other) => other === id).length);
        expect(metrics.fullestLink?.nets ?? 0).toBe(loads.length === 0 ? 0 : Math.max(...loads));
        expect(metrics.unitUse).toEqual([
          { unit: 'unit_arithmetic', used: kernel.ops.length, available: graph.tileCount },
        ]);
        expect(metrics.placedOps).toBe(kernel.ops.length);
      }),
      { seed: 411, numRuns: 200 },
    );
  });

  it('a partial mapping: what is missing is left out, a self-connection has 0 hops', () => {
    const graph = compileFabric(plainFabric(2, 2));
    const kernel = additions(3, [
      [0, 1],
      [0, 2],
      [1, 1],
    ]);
    const tile = graph.tiles[0];
    const other = graph.tiles[1];
    if (!tile || !other) throw new Error('Four tiles');
    const placement = { [opAt(0)]: tile, [opAt(1)]: other };
    const empty = measureMapping(kernel, graph, { placement, routes: {} });
    expect([...empty.connectionHops]).toEqual([['edge_2', 0]]);
    expect([empty.totalWireHops, empty.placedOps, empty.totalOps, empty.fullestLink]).toEqual([
      0,
      2,
      3,
      null,
    ]);
    const routed = measureMapping(kernel, graph, {
      placement,
      routes: { [opAt(0)]: [`${tile}>${other}` as LinkId] },
    });
    expect([...routed.connectionHops].sort()).toEqual([
      ['edge_0', 1],
      ['edge_2', 0],
    ]);
    expect([routed.totalWireHops, routed.totalPathHops, routed.longestPathHops]).toEqual([1, 1, 1]);
  });
});
