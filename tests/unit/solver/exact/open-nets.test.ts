import { describe, expect, it } from 'vitest';
import { demoFabrics } from '@/db/seed/fabrics';
import { compileFabric } from '@/lib/fabric/compile';
import type { Fabric } from '@/lib/fabric/fabric';
import { openNetCosts } from '@/lib/solver/exact/open-nets';
import { steinerTree } from '@/lib/solver/routing/steiner-tree';
import { seededRandom } from '@/lib/solver/search/random';

const fabricOf = (key: string) => demoFabrics.find((one) => one.key === key)?.fabric as Fabric;

/** Links of the least tree to both consumers without the barred links, by the router's own exact method. */
function treeLinks(
  graph: ReturnType<typeof compileFabric>,
  source: number,
  targets: number[],
  barred: readonly number[],
): number {
  const cost = Float64Array.from(graph.links, (_, link) =>
    barred.includes(link) ? Number.POSITIVE_INFINITY : 1,
  );
  const tree = steinerTree(graph, source, targets, cost, { maxDepthHops: null });
  return tree && Number.isFinite(tree.cost) ? tree.links.length : Number.POSITIVE_INFINITY;
}

describe('a net with one consumer free', () => {
  it.each(['gauge', 'slope'])(
    '%s: pays what the least trees say, over all tiles of the free consumer',
    (key) => {
      const graph = compileFabric({ ...fabricOf(key), removedLinks: fabricOf(key).removedLinks });
      const costs = openNetCosts(graph);
      const random = seededRandom(11);
      let paying = 0;
      for (let round = 0; round < 60; round++) {
        const source = random.below(graph.tileCount);
        const near = graph.outLinks[source] ?? [];
        const link = near[random.below(near.length)] as number;
        const consumer = graph.links[link]?.to as number;
        const openTiles = Array.from({ length: 4 }, () => random.below(graph.tileCount)).filter(
          (tile) => tile !== source && tile !== consumer,
        );
        if (openTiles.length === 0) continue;
        const rise = (barred: readonly number[]) =>
          Math.min(
            ...openTiles.map(
              (tile) =>
                treeLinks(graph, source, [consumer, tile], barred) -
                treeLinks(graph, source, [consumer, tile], []),
            ),
          );
        const found = costs(source, consumer, openTiles, [link]);
        expect(found?.moreLinks ?? Number.POSITIVE_INFINITY).toBe(rise([link]));
        if ((found?.moreLinks ?? 0) > 0) paying++;
        // The link to a neighbour is needed exactly where doing without it costs something.
        expect(costs(source, consumer, openTiles, [])?.neededLinks).toEqual(rise([link]) > 0 ? [link] : []);
      }
      expect(paying).toBeGreaterThan(10);
    },
  );

  it('a net that cannot reach its consumer without the links is null', () => {
    const graph = compileFabric(fabricOf('gauge'));
    const entering = graph.inLinks[5] as readonly number[];
    expect(openNetCosts(graph)(0, 5, [10], entering)).toBeNull();
  });
});
