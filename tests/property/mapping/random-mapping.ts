import fc from 'fast-check';
import { compileFabric, type FabricGraph } from '@/lib/fabric/compile';
import { type Fabric, topologies } from '@/lib/fabric/fabric';
import { edgeId, opId } from '@/lib/graph/ids';
import { emptyKernel, type Kernel, type OpId } from '@/lib/graph/kernel';
import type { Placement } from '@/lib/mapping/mapping';
import { plainFabric } from '../../unit/fabric/plain-fabric';

export interface RandomMapping {
  kernel: Kernel;
  fabric: Fabric;
  graph: FabricGraph;
  placement: Placement;
}

/** A kernel of additions with any edges at all: fan-out, several edges to one consumer, ops that feed themselves. */
export function additions(count: number, edges: readonly (readonly [from: number, to: number])[]): Kernel {
  const kernel = emptyKernel('Additions');
  for (let i = 0; i < count; i++) {
    kernel.ops.push({
      id: opId(`op_${i}`),
      kind: 'add',
      label: `sum ${i}`,
      widthBits: 32,
      params: {},
      immediates: {},
      positionPx: { x: 0, y: 0 },
    });
  }
  edges.forEach(([from, to], i) => {
    kernel.edges.push({
      id: edgeId(`edge_${i}`),
      from: opId(`op_${from}`),
      to: opId(`op_${to}`),
      port: 'a',
      distance: 1,
      initialValues: [],
    });
  });
  return kernel;
}

export const opAt = (index: number): OpId => opId(`op_${index}`);

/** Mappings without routes: a random kernel, all of it placed at random, on a small fabric of arithmetic PEs. */
export const randomMapping = (
  options: { ops?: number; channels?: number } = {},
): fc.Arbitrary<RandomMapping> =>
  fc
    .record({
      rows: fc.integer({ min: 2, max: 5 }),
      cols: fc.integer({ min: 2, max: 5 }),
      topology: fc.constantFrom(...topologies),
      channels:
        options.channels === undefined ? fc.integer({ min: 1, max: 3 }) : fc.constant(options.channels),
      maxHops: fc.option(fc.integer({ min: 2, max: 8 }), { nil: undefined }),
      wanted: fc.integer({ min: 2, max: options.ops ?? 10 }),
      edges: fc.array(fc.tuple(fc.nat(100), fc.nat(100)), { minLength: 1, maxLength: 14 }),
      order: fc.array(fc.nat(1000), { minLength: 25, maxLength: 25 }),
    })
    .map(({ rows, cols, topology, channels, maxHops, wanted, edges, order }) => {
      const fabric = plainFabric(rows, cols, topology, { channels, maxHops });
      const graph = compileFabric(fabric);
      const count = Math.min(wanted, graph.tileCount);
      const kernel = additions(
        count,
        edges.map(([from, to]) => [from % count, to % count] as const),
      );
      const tiles = [...graph.tiles]
        .map((tile, i) => ({ tile, key: order[i] ?? 0 }))
        .sort((a, b) => a.key - b.key)
        .map(({ tile }) => tile);
      const placement: Placement = {};
      kernel.ops.forEach((op, i) => {
        const tile = tiles[i];
        if (tile) placement[op.id] = tile;
      });
      return { kernel, fabric, graph, placement };
    });
