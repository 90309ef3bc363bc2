import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { compileFabric, type FabricGraph } from '@/lib/fabric/compile';
import { topologies } from '@/lib/fabric/fabric';
import { linkId, tileId } from '@/lib/fabric/tiles';
import { treeDepth, walkLinks } from '@/lib/solver/routing/link-tree';
import { minimumTreeHops, steinerTree } from '@/lib/solver/routing/steiner-tree';
import { plainFabric } from '../../unit/fabric/plain-fabric';

const SEED = 90210;

/** The cheapest set of links over which the source reaches every target within the limit, by trying all sets. */
function bruteForce(
  graph: FabricGraph,
  source: number,
  targets: readonly number[],
  cost: ArrayLike<number>,
  maxDepthHops: number,
): number {
  let best = Number.POSITIVE_INFINITY;
  for (let set = 0; set < 2 ** graph.links.length; set++) {
    const links = graph.links.flatMap((_, i) => ((set >> i) & 1 ? [i] : []));
    const sum = links.reduce((total, link) => total + (cost[link] ?? 0), 0);
    if (sum < best && treeDepth(graph, source, targets, links) <= maxDepthHops) best = sum;
  }
  return best;
}

/** 2 × 3 tiles with two links removed: 12 links, 4096 sets. */
const tiny = fc.record({
  removed: fc.uniqueArray(fc.nat(13), { minLength: 2, maxLength: 2 }),
  cost: fc.array(fc.integer({ min: 1, max: 9 }), { minLength: 12, maxLength: 12 }),
  source: fc.nat(5),
  targets: fc.uniqueArray(fc.nat(5), { minLength: 1, maxLength: 4 }),
  maxDepthHops: fc.integer({ min: 1, max: 6 }),
});

function tinyGraph(removed: readonly number[]): FabricGraph {
  const fabric = plainFabric(2, 3);
  const { links } = compileFabric(fabric);
  for (const index of removed) {
    const link = links[index];
    if (link) fabric.removedLinks.push(link.id);
  }
  return compileFabric(fabric);
}

describe('cheapest trees', () => {
  it('equal brute force over all sets of links on 2 × 3 tiles, with random costs', () => {
    fc.assert(
      fc.property(tiny, ({ removed, cost, source, targets }) => {
        const graph = tinyGraph(removed);
        const tree = steinerTree(graph, source, targets, cost);
        const ends = targets.filter((target) => target !== source);
        const best = bruteForce(graph, source, ends, cost, Number.MAX_SAFE_INTEGER);
        expect(tree?.cost ?? Number.POSITIVE_INFINITY).toBe(best);
        expect(tree?.exact ?? true).toBe(true);
      }),
      { seed: SEED, numRuns: 60 },
    );
  });

  it('equal brute force under a limit on the hops of a path', () => {
    fc.assert(
      fc.property(tiny, ({ removed, cost, source, targets, maxDepthHops }) => {
        const graph = tinyGraph(removed);
        const tree = steinerTree(graph, source, targets, cost, { maxDepthHops });
        const ends = targets.filter((target) => target !== source);
        expect(tree?.cost ?? Number.POSITIVE_INFINITY).toBe(
          bruteForce(graph, source, ends, cost, maxDepthHops),
        );
        expect(tree === null || treeDepth(graph, source, ends, tree.links) <= maxDepthHops).toBe(true);
      }),
      { seed: SEED, numRuns: 160 },
    );
  });

  const net = fc.record({
    topology: fc.constantFrom(...topologies),
    rows: fc.integer({ min: 2, max: 6 }),
    cols: fc.integer({ min: 2, max: 6 }),
    source: fc.nat(35),
    targets: fc.uniqueArray(fc.nat(35), { minLength: 1, maxLength: 6 }),
  });

  it('have as many hops on the mirrored and on the turned fabric', () => {
    fc.assert(
      fc.property(net, ({ topology, rows, cols, source, targets }) => {
        const plain = compileFabric(plainFabric(rows, cols, topology));
        const turned = compileFabric(plainFabric(cols, rows, topology));
        const own = (tile: number): number => tile % (rows * cols);
        const mirror = (tile: number): number =>
          Math.floor(own(tile) / cols) * cols + (cols - 1 - (own(tile) % cols));
        const turn = (tile: number): number => (own(tile) % cols) * rows + Math.floor(own(tile) / cols);
        const hops = minimumTreeHops(plain, own(source), targets.map(own))?.hops;
        expect(minimumTreeHops(plain, mirror(source), targets.map(mirror))?.hops).toBe(hops);
        expect(minimumTreeHops(turned, turn(source), targets.map(turn))?.hops).toBe(hops);
      }),
      { seed: SEED, numRuns: 150 },
    );
  });

  it('of two targets on a mesh have half the sum of the three pairwise distances', () => {
    fc.assert(
      fc.property(fc.nat(35), fc.nat(35), fc.nat(35), (a, b, c) => {
        const graph = compileFabric(plainFabric(6, 6));
        const between = (from: number, to: number): number => graph.distance[from * 36 + to] ?? 0;
        const half = (between(a, b) + between(b, c) + between(a, c)) / 2;
        expect(minimumTreeHops(graph, a, [b, c])?.hops).toBe(half);
      }),
      { seed: SEED, numRuns: 200 },
    );
  });

  it('attached paths are a tree that is never cheaper than the exact one', () => {
    fc.assert(
      fc.property(net, ({ topology, rows, cols, source, targets }) => {
        const graph = compileFabric(plainFabric(rows, cols, topology));
        const own = (tile: number): number => tile % graph.tileCount;
        const ends = [...new Set(targets.map(own))].filter((tile) => tile !== own(source));
        const attached = minimumTreeHops(graph, own(source), ends, { exactWork: 0 });
        const exact = minimumTreeHops(graph, own(source), ends);
        expect(attached?.hops).toBeGreaterThanOrEqual(exact?.hops ?? 0);
        expect(exact?.exact).toBe(true);
      }),
      { seed: SEED, numRuns: 150 },
    );
  });

  it('null where a target cannot be reached', () => {
    const fabric = plainFabric(1, 3);
    fabric.removedLinks.push(linkId(tileId(0, 1), tileId(0, 2)));
    expect(minimumTreeHops(compileFabric(fabric), 0, [1, 2])).toBeNull();
    expect(minimumTreeHops(compileFabric(fabric), 2, [0, 1])).toEqual({ hops: 2, exact: true });
  });

  it('no link for a net within one tile', () => {
    const graph = compileFabric(plainFabric(2, 2));
    expect(minimumTreeHops(graph, 1, [1])).toEqual({ hops: 0, exact: true });
    expect(walkLinks(graph, 1, []).hops.size).toBe(1);
  });
});
