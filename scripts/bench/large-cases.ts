/** Kernels of 36 to 60 ops and the fabrics to place them on, the same at every call. */

import { demoKernels } from '../../db/seed/kernels';
import type { Fabric } from '../../lib/fabric/fabric';
import { type NewFabricForm, newFabric, unitMixPattern } from '../../lib/fabric/presets';
import { initialParams } from '../../lib/graph/edits';
import {
  type Edge,
  edgeIdSchema,
  emptyKernel,
  type Kernel,
  type Op,
  type OpId,
  opIdSchema,
} from '../../lib/graph/kernel';
import { seededRandom } from '../../lib/solver/search/random';

/** The loop body that many times over, as a compiler unrolls it; carried values stay within each copy. */
export function unrolled(kernel: Kernel, copies: number): Kernel {
  const all = Array.from({ length: copies }, (_, copy) => copy);
  const renamed = (id: OpId, copy: number) => opIdSchema.parse(`${id}_c${copy}`);
  return {
    ...kernel,
    name: `${kernel.name} × ${copies}`,
    ops: all.flatMap((copy) => kernel.ops.map((op) => ({ ...op, id: renamed(op.id, copy) }))),
    edges: all.flatMap((copy) =>
      kernel.edges.map((edge) => ({
        ...edge,
        id: edgeIdSchema.parse(`${edge.id}_c${copy}`),
        from: renamed(edge.from, copy),
        to: renamed(edge.to, copy),
      })),
    ),
  };
}

const arithmetic = ['add', 'subtract', 'max', 'min', 'multiply'] as const;

/**
 * A connected kernel: a quarter loads, then ops of two operands among the ten ops before them, each value used at least
 * once where an operand is free for it, and a store for each value that nobody uses.
 */
export function scrambledKernel(opCount: number, seed: number): Kernel {
  const random = seededRandom(seed);
  const ops: Op[] = [];
  const edges: Edge[] = [];
  const unused: OpId[] = [];
  const add = (kind: Op['kind'], operands: Readonly<Record<string, OpId>>) => {
    const id = opIdSchema.parse(`op_${ops.length}`);
    const isMemory = kind === 'load' || kind === 'store';
    ops.push({
      id,
      kind,
      label: `${kind} ${ops.length}`,
      widthBits: 32,
      params: isMemory ? { array: `x${ops.length}`, base: 0, stride: 1 } : initialParams(kind),
      immediates: {},
      positionPx: { x: 240 * (ops.length % 10), y: 120 * Math.floor(ops.length / 10) },
    });
    for (const [port, from] of Object.entries(operands)) {
      const edgeId = edgeIdSchema.parse(`edge_${ops.length}_${port}`);
      edges.push({ id: edgeId, from, to: id, port, distance: 0, initialValues: [] });
      const at = unused.indexOf(from);
      if (at >= 0) unused.splice(at, 1);
    }
    if (kind !== 'store') unused.push(id);
  };
  const loads = Math.round(opCount / 4);
  for (let i = 0; i < loads; i++) add('load', {});
  while (ops.length + unused.length < opCount) {
    const kind = arithmetic[random.below(10) < 9 ? random.below(4) : 4] ?? 'add';
    const recent = ops.slice(-10).map((op) => op.id);
    const a = unused[0] as OpId;
    const others = recent.filter((id) => id !== a);
    add(kind, { a, b: others[random.below(others.length)] as OpId });
  }
  for (const id of [...unused]) add('store', { value: id });
  return { ...emptyKernel(`Scrambled ${opCount}, seed ${seed}`), ops, edges };
}

/** The hive microphone's mix of units on more tiles, one channel a link. */
export function largeFabric(side: number): Fabric {
  const mix = unitMixPattern('memoryEdges');
  if (!mix) throw new Error('The pattern of units is missing.');
  const form: NewFabricForm = {
    name: `Mesh, ${side} × ${side}`,
    rows: side,
    cols: side,
    topology: 'mesh',
    channels: 1,
    bufferDepth: 4,
    clock: null,
    memoryBanks: 4,
    mix,
  };
  return newFabric(form);
}

export interface LargeCase {
  slug: string;
  kernel: Kernel;
  key: string;
  fabric: Fabric;
}

/** Unrolled demo kernels and scrambled ones of 40 to 60 ops, the larger ones on 12 × 12 tiles. */
export function largeCases(): LargeCase[] {
  const kernels = [
    ...demoKernels
      .filter(({ kernel }) => kernel.ops.length >= 20 && kernel.ops.length <= 30)
      .map(({ slug, kernel }) => ({ slug: `${slug} x 2`, kernel: unrolled(kernel, 2) })),
    ...([40, 50, 60] as const).map((opCount) => ({
      slug: `scrambled ${opCount}`,
      kernel: scrambledKernel(opCount, 1),
    })),
  ];
  return kernels.map(({ slug, kernel }) => {
    const side = kernel.ops.length <= 50 ? 10 : 12;
    return { slug, kernel, key: `${side}x${side}`, fabric: largeFabric(side) };
  });
}
