/**
 * Random tiny problems that are seldom easy: values carried back, unequal channels, missing and extra links on every
 * topology, bare routers, several pins, clocks. Most have enough units, so that what fails, fails for want of links.
 */
import fc from 'fast-check';
import type { Fabric, LinkId, TileId, UnitId } from '@/lib/fabric/fabric';
import { canHost } from '@/lib/fabric/unit-library';
import { initialParams } from '@/lib/graph/edits';
import { edgeId, opId } from '@/lib/graph/ids';
import { type Edge, emptyKernel, type Kernel, type Op } from '@/lib/graph/kernel';
import type { OpKind } from '@/lib/graph/op-catalog';
import type { Pins } from '@/lib/mapping/mapping';
import type { TinyCase } from './tiny-cases';

const kinds: readonly (readonly [OpKind, readonly string[]])[] = [
  ['add', ['a', 'b']],
  ['subtract', ['a', 'b']],
  ['max', ['a', 'b']],
  ['multiply', ['a', 'b']],
  ['absolute', ['a']],
  ['pass', ['value']],
];

interface OperandPlan {
  from: 'earlier' | 'constant' | 'any op, carried';
  pick: number;
}

const operandArb = fc.record({
  from: fc.constantFrom<OperandPlan['from']>('earlier', 'earlier', 'constant', 'any op, carried'),
  pick: fc.nat(20),
});
const opArb = fc.record({
  kind: fc.constantFrom(0, 0, 0, 0, 1, 1, 2, 2, 4, 5, 0, 1, 2, 3),
  first: fc.nat(20),
  second: operandArb,
});

/** Loads, ops that read earlier or (carried) any ops, a store of the last value. At most five ops. */
const kernelArb: fc.Arbitrary<Kernel> = fc
  .record({ loads: fc.constantFrom(1, 1, 2), plans: fc.array(opArb, { minLength: 1, maxLength: 3 }) })
  .map(({ loads, plans }) => {
    const middle = plans.slice(0, 4 - loads);
    const ops: Op[] = [];
    const edges: Edge[] = [];
    const addOp = (kind: OpKind, immediates: Record<string, number> = {}) => {
      const id = opId(`op_${ops.length}`);
      ops.push({
        id,
        kind,
        label: '',
        widthBits: 32,
        params: initialParams(kind),
        immediates,
        positionPx: { x: 0, y: 0 },
      });
      return id;
    };
    const name = (i: number) => opId(`op_${i}`);
    const join = (from: number, to: number, port: string, distance: number) =>
      edges.push({
        id: edgeId(`edge_${edges.length}`),
        from: name(from),
        to: name(to),
        port,
        distance,
        initialValues: [],
      });
    for (let i = 0; i < loads; i++) addOp('load');
    middle.forEach(({ kind, first, second }, i) => {
      const at = loads + i;
      const [opKind, ports] = kinds[kind] ?? ['add', ['a', 'b']];
      const isConstant = ports.length === 2 && second.from === 'constant';
      addOp(opKind, isConstant ? { b: 3 } : {});
      join(first % at, at, ports[0] as string, 0);
      if (ports.length < 2 || isConstant) return;
      if (second.from === 'earlier') join(second.pick % at, at, 'b', 0);
      else join(loads + (second.pick % middle.length), at, 'b', 1);
    });
    addOp('store');
    join(ops.length - 2, ops.length - 1, 'value', 0);
    return { ...emptyKernel('odd'), ops, edges };
  });

const unitMixes: readonly (readonly (UnitId | null)[])[] = (
  [
    ['memory', 'memory', 'memory', 'arithmetic', 'arithmetic', 'arithmetic'],
    ['memory', 'memory', 'memory', 'arithmetic', 'arithmetic', 'arithmetic'],
    ['memory', 'memory', 'memory', 'arithmetic', 'arithmetic', 'arithmetic'],
    ['memory', 'memory', 'arithmetic', 'arithmetic', 'multiplier', 'multiplier'],
    ['memory', 'memory', 'arithmetic', 'arithmetic', 'arithmetic', null],
    ['memory', 'memory', 'memory', 'arithmetic', 'multiplier', null],
  ] as const
).map((mix) => mix.map((unit) => (unit === null ? null : (`unit_${unit}` as UnitId))));

const fabricArb: fc.Arbitrary<Fabric> = fc
  .record({
    size: fc.constantFrom([2, 3], [3, 2], [2, 3], [3, 2], [1, 6], [6, 1], [1, 5]),
    topology: fc.constantFrom('mesh', 'mesh', 'torus', 'diagonal'),
    units: fc.constantFrom(...unitMixes).chain((mix) => fc.shuffledSubarray([...mix], { minLength: 6 })),
    channels: fc.constantFrom(1, 1, 1, 2),
    removed: fc.array(fc.tuple(fc.nat(5), fc.constantFrom(1, 2, 3, 5)), { maxLength: 5 }),
    added: fc.array(fc.tuple(fc.nat(5), fc.nat(5)), { maxLength: 2 }),
    thicker: fc.array(fc.tuple(fc.nat(5), fc.constantFrom(1, 2, 3, 5), fc.integer({ min: 1, max: 3 })), {
      maxLength: 2,
    }),
    limit: fc.constantFrom(null, null, null, null, 1, 2, 3),
  })
  .map(({ size, topology, units, channels, removed, added, thicker, limit }) => {
    const [rows, cols] = size as [number, number];
    const count = rows * cols;
    const name = (i: number) => `r${Math.floor((i % count) / cols)}c${(i % count) % cols}` as TileId;
    const link = (a: number, b: number) => `${name(a)}>${name(b)}` as LinkId;
    return {
      format: 'pinloom.fabric',
      formatVersion: 1,
      name: 'odd',
      description: '',
      rows,
      cols,
      topology,
      units: units.slice(0, count),
      channels,
      removedLinks: removed.map(([a, step]) => link(a, a + step)),
      addedLinks: added.filter(([a, b]) => a % count !== b % count).map(([a, b]) => link(a, b)),
      linkChannels: Object.fromEntries(thicker.map(([a, step, n]) => [link(a, a + step), n])),
      bufferDepth: 4,
      clock: limit === null ? null : { periodPs: 100 * limit + 50, entryDelayPs: 0, hopDelayPs: 100 },
      memoryBanks: 1,
    };
  });

export const oddCaseArb: fc.Arbitrary<TinyCase> = fc
  .record({
    kernel: kernelArb,
    fabric: fabricArb,
    pinned: fc.array(fc.tuple(fc.nat(4), fc.nat(5)), { maxLength: 3 }),
    objective: fc.constantFrom('wire' as const, 'path' as const),
  })
  .map(({ kernel, fabric, pinned, objective }) => {
    const pins: Pins = {};
    for (const [at, pick] of pinned) {
      const op = kernel.ops[at % kernel.ops.length] as Op;
      const taken = new Set<string>(Object.values(pins));
      const tiles = fabric.units.flatMap((unit, i) => {
        const tile = `r${Math.floor(i / fabric.cols)}c${i % fabric.cols}` as TileId;
        return canHost(unit, op.kind) && !taken.has(tile) ? [tile] : [];
      });
      const tile = tiles[pick % Math.max(1, tiles.length)];
      if (tile !== undefined && pins[op.id] === undefined) pins[op.id] = tile;
    }
    return { kernel, fabric, pins, objective };
  });
