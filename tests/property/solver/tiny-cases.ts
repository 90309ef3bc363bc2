/** Random tiny problems: up to five ops on up to six tiles, odd links, pins, hop limits; legal kernels always. */
import fc from 'fast-check';
import type { Fabric, LinkId, TileId, UnitId } from '@/lib/fabric/fabric';
import { initialParams } from '@/lib/graph/edits';
import { edgeId, opId } from '@/lib/graph/ids';
import { type Edge, emptyKernel, type Kernel, type Op } from '@/lib/graph/kernel';
import type { OpKind } from '@/lib/graph/op-catalog';
import type { Objective, Pins } from '@/lib/mapping/mapping';
import type { Weights } from '@/lib/mapping/weights';

export interface TinyCase {
  kernel: Kernel;
  fabric: Fabric;
  pins: Pins;
  objective: Objective;
  weights?: Weights;
}

const kindOf: Record<number, readonly OpKind[]> = {
  0: ['load'],
  1: ['absolute', 'pass'],
  2: ['add', 'subtract', 'max', 'subtract', 'add', 'max', 'multiply'],
};

/** A load, then ops that read earlier ones or take constants, then a store of each value that nothing reads. */
const kernelArb: fc.Arbitrary<Kernel> = fc
  .array(fc.record({ operands: fc.array(fc.nat(20), { maxLength: 2 }), kind: fc.nat(20) }), {
    minLength: 1,
    maxLength: 3,
  })
  .map((plans) => {
    const ops: Op[] = [];
    const edges: Edge[] = [];
    const add = (kind: OpKind, sources: readonly number[], ports: readonly string[]) => {
      const id = opId(`op_${ops.length}`);
      const constants = Object.fromEntries(ports.slice(sources.length).map((port) => [port, 3]));
      for (const [i, source] of sources.entries()) {
        const port = ports[i];
        const from = ops[source];
        if (!port || !from) continue;
        edges.push({
          id: edgeId(`edge_${edges.length}`),
          from: from.id,
          to: id,
          port,
          distance: 0,
          initialValues: [],
        });
      }
      ops.push({
        id,
        kind,
        label: '',
        widthBits: 32,
        params: initialParams(kind),
        immediates: constants,
        positionPx: { x: 0, y: 0 },
      });
    };
    add('load', [], []);
    for (const plan of plans) {
      const sources = [plan.operands[0] ?? 0, ...plan.operands.slice(1)].map((n) => n % ops.length);
      const kinds = kindOf[sources.length] ?? ['add'];
      const kind = kinds[plan.kind % kinds.length] as OpKind;
      const ports =
        kind === 'add' || kind === 'multiply' || kind === 'subtract' || kind === 'max'
          ? ['a', 'b']
          : kind === 'absolute'
            ? ['a']
            : ['value'];
      add(kind, sources, ports);
    }
    add('store', [ops.length - 1], ['value']);
    return { ...emptyKernel('tiny'), ops, edges };
  });

const units = ['unit_memory', 'unit_arithmetic', 'unit_multiplier', null] as unknown as (UnitId | null)[];

const fabricArb: fc.Arbitrary<Fabric> = fc
  .record({
    size: fc.constantFrom([2, 3], [2, 3], [3, 2], [2, 3], [1, 6], [1, 5], [2, 2]),
    topology: fc.constantFrom('mesh', 'torus', 'diagonal'),
    mix: fc.oneof(
      { weight: 6, arbitrary: fc.shuffledSubarray([0, 0, 1, 1, 1, 2], { minLength: 6 }) },
      { weight: 1, arbitrary: fc.shuffledSubarray([0, 0, 1, 1, 1, 1, 2, 2, 3], { minLength: 6 }) },
    ),
    channels: fc.constantFrom(1, 1, 2),
    removed: fc.array(fc.tuple(fc.nat(5), fc.nat(5)), { maxLength: 3 }),
    added: fc.array(fc.tuple(fc.nat(5), fc.nat(5)), { maxLength: 1 }),
    limit: fc.constantFrom(null, null, null, 1, 2, 3),
  })
  .map(({ size, topology, mix, channels, removed, added, limit }) => {
    const [rows, cols] = size as [number, number];
    const name = (i: number) => `r${Math.floor(i / cols)}c${i % cols}` as TileId;
    const count = rows * cols;
    const link = ([a, b]: [number, number]) => `${name(a % count)}>${name(b % count)}` as LinkId;
    return {
      format: 'pinloom.fabric',
      formatVersion: 1,
      name: 'tiny',
      description: '',
      rows,
      cols,
      topology,
      units: Array.from({ length: count }, (_, i) => units[mix[i] ?? 3] ?? null),
      channels,
      removedLinks: removed.map(link),
      addedLinks: added.filter(([a, b]) => a % count !== b % count).map(link),
      linkChannels: {},
      bufferDepth: 4,
      clock: limit === null ? null : { periodPs: 100 * limit + 50, entryDelayPs: 0, hopDelayPs: 100 },
      memoryBanks: 1,
    };
  });

export const tinyCaseArb: fc.Arbitrary<TinyCase> = fc
  .record({
    kernel: kernelArb,
    fabric: fabricArb,
    pin: fc.oneof(
      { weight: 4, arbitrary: fc.constant(null) },
      { weight: 1, arbitrary: fc.tuple(fc.nat(4), fc.nat(5)) },
    ),
    objective: fc.constantFrom<Objective>('wire', 'path'),
  })
  .map(({ kernel, fabric, pin, objective }) => {
    const pins: Pins = {};
    const op = pin ? kernel.ops[pin[0] % kernel.ops.length] : undefined;
    const at = (pin?.[1] ?? 0) % fabric.units.length;
    if (op) pins[op.id] = `r${Math.floor(at / fabric.cols)}c${at % fabric.cols}` as TileId;
    return { kernel, fabric, pins, objective };
  });

/** Weights of one kind: whole, decimal, any number, far apart; 0 among all of them. */
export const weightKinds: Record<string, fc.Arbitrary<number>> = {
  whole: fc.nat(9),
  decimal: fc.oneof(
    fc.nat(40).map((n) => n / 10),
    fc.nat(300).map((n) => n / 100),
  ),
  real: fc.oneof(
    { weight: 1, arbitrary: fc.constant(0) },
    { weight: 6, arbitrary: fc.double({ min: 0.01, max: 9, noNaN: true }) },
  ),
  'far apart': fc.constantFrom(0, 1, 3, 1e6, 2e6),
  'nothing or most': fc.constantFrom(0, 1e9),
};

/** A tiny case with weights, some of them left at 1. */
export const weightedCaseArb = (
  weight: fc.Arbitrary<number>,
): fc.Arbitrary<TinyCase & { weights: Weights }> =>
  fc
    .record({
      tiny: tinyCaseArb,
      values: fc.array(fc.option(weight, { freq: 5 }), { minLength: 8, maxLength: 8 }),
    })
    .map(({ tiny, values }) => {
      const named = (ids: readonly string[]) =>
        Object.fromEntries(ids.flatMap((id, i) => (values[i] == null ? [] : [[id, values[i]]])));
      const sources = tiny.kernel.ops
        .map((op) => op.id)
        .filter((id) => tiny.kernel.edges.some((e) => e.from === id));
      const weights: Weights =
        tiny.objective === 'wire'
          ? { nets: named(sources) }
          : { edges: named(tiny.kernel.edges.map((edge) => edge.id)) };
      return { ...tiny, weights };
    });
