import fc from 'fast-check';
import { DirectedGraph } from 'graphology';
import { singleSourceLength } from 'graphology-shortest-path';
import { describe, expect, it } from 'vitest';
import { compileFabric } from '@/lib/fabric/compile';
import { topologies } from '@/lib/fabric/fabric';
import { UNREACHABLE } from '@/lib/fabric/hop-distances';
import { linkId } from '@/lib/fabric/tiles';
import { linkTest } from '@/lib/mapping/verify-links';
import { plainFabric } from '../../unit/fabric/plain-fabric';

const SEED = 20240611;

/** A fabric with faulty and express links, some of them nonsense. */
const irregular = fc
  .record({
    rows: fc.integer({ min: 1, max: 6 }),
    cols: fc.integer({ min: 1, max: 6 }),
    topology: fc.constantFrom(...topologies),
    removed: fc.array(fc.nat(400), { maxLength: 40 }),
    added: fc.array(fc.tuple(fc.nat(50), fc.nat(50)), { maxLength: 5 }),
  })
  .map(({ rows, cols, topology, removed, added }) => {
    const fabric = plainFabric(rows, cols, topology);
    const { links, tiles } = compileFabric(fabric);
    for (const index of removed) {
      const link = links[index % Math.max(1, links.length)];
      if (link) fabric.removedLinks.push(link.id);
    }
    for (const [from, to] of added) {
      const ends = [tiles[from % tiles.length], tiles[to % tiles.length]];
      if (ends[0] && ends[1]) fabric.addedLinks.push(linkId(ends[0], ends[1]));
    }
    return fabric;
  });

describe('compiled fabrics', () => {
  it('distances equal those of graphology-shortest-path on irregular fabrics', () => {
    fc.assert(
      fc.property(irregular, (fabric) => {
        const graph = compileFabric(fabric);
        const other = new DirectedGraph();
        for (const tile of graph.tiles) other.addNode(tile);
        for (const link of graph.links) other.addDirectedEdge(graph.tiles[link.from], graph.tiles[link.to]);
        const expected = graph.tiles.flatMap((from) => {
          const lengths = singleSourceLength(other, from);
          return graph.tiles.map((to) => lengths[to] ?? UNREACHABLE);
        });
        expect([...graph.distance]).toEqual(expected);
      }),
      { seed: SEED, numRuns: 150 },
    );
  });

  it("have exactly the links of the verifier's own definition", () => {
    fc.assert(
      fc.property(irregular, (fabric) => {
        const graph = compileFabric(fabric);
        const test = linkTest(fabric);
        const byDefinition = graph.tiles.flatMap((from) =>
          graph.tiles.map((to) => linkId(from, to)).filter((id) => test.ends(id) !== null),
        );
        expect([...graph.linkIndex.keys()].sort()).toEqual(byDefinition.sort());
      }),
      { seed: SEED, numRuns: 150 },
    );
  });
});
