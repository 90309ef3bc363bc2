/** Small problems whose optimum is known by hand or by trying everything, and their exported text. */
import fc from 'fast-check';
import { type Fabric, fabricSchema, type LinkId } from '@/lib/fabric/fabric';
import { initialParams } from '@/lib/graph/edits';
import { emptyKernel, type Kernel, kernelSchema } from '@/lib/graph/kernel';
import type { OpKind } from '@/lib/graph/op-catalog';
import type { Objective } from '@/lib/mapping/mapping';
import { type Weights, weightsSchema } from '@/lib/mapping/weights';
import { modelText } from '@/scripts/pinloom-model';
import { exhaustiveOptimum } from '../../../property/solver/exhaustive';
import {
  type TinyCase,
  tinyCaseArb,
  weightedCaseArb,
  weightKinds,
} from '../../../property/solver/tiny-cases';
import type { Answer, TextFormat } from './outside-solvers';

/** Ops by name and kind; connections as `from>to:port`. */
export function kernelOf(ops: Record<string, OpKind>, connections: readonly string[], label = ''): Kernel {
  return kernelSchema.parse({
    ...emptyKernel('case'),
    ops: Object.entries(ops).map(([name, kind]) => ({
      id: `op_${name}`,
      kind,
      label,
      widthBits: 32,
      params: initialParams(kind),
      immediates: {},
      positionPx: { x: 0, y: 0 },
    })),
    edges: connections.map((text, i) => {
      const [from, to, port] = text.split(/[>:]/);
      return { id: `edge_${i}`, from: `op_${from}`, to: `op_${to}`, port, distance: 0, initialValues: [] };
    }),
  });
}

/** A mesh of memory (m), arithmetic (a) and empty (-) tiles, a word a row. */
export function fabricOf(grid: string, more: Partial<Fabric> = {}): Fabric {
  const rows = grid.split(' ');
  const unitOf: Record<string, string> = { m: 'unit_memory', a: 'unit_arithmetic' };
  return fabricSchema.parse({
    format: 'pinloom.fabric',
    formatVersion: 1,
    name: 'case',
    description: '',
    rows: rows.length,
    cols: rows[0]?.length,
    topology: 'mesh',
    units: [...rows.join('')].map((letter) => unitOf[letter] ?? null),
    channels: 1,
    removedLinks: [],
    addedLinks: [],
    linkChannels: {},
    bufferDepth: 4,
    clock: null,
    memoryBanks: 1,
    ...more,
  });
}

export const hopLimit = (hops: number) => ({
  clock: { periodPs: 100 * hops + 50, entryDelayPs: 0, hopDelayPs: 100 },
});
const pinsOf = (pins: Record<string, string>) =>
  Object.fromEntries(Object.entries(pins).map(([op, tile]) => [`op_${op}`, tile])) as TinyCase['pins'];

export const chain = kernelOf({ in: 'load', abs: 'absolute', out: 'store' }, ['in>abs:a', 'abs>out:value']);
export const apart = pinsOf({ in: 'r0c0', out: 'r1c2' });
export const fan = kernelOf({ in: 'load', left: 'store', right: 'store' }, [
  'in>left:value',
  'in>right:value',
]);
export const twoWays = kernelOf({ a: 'load', b: 'load', x: 'store', y: 'store' }, ['a>x:value', 'b>y:value']);
export const crossing = pinsOf({ a: 'r0c0', x: 'r0c2', b: 'r0c1', y: 'r1c2' });
export const noWayDown = { removedLinks: ['r0c1>r1c1'] as LinkId[] };
export const longName = 'a_name_that_is_as_long_as_the_ids_of_ops_may_become_at_last';
const longNames = kernelOf(
  { [`${longName}1`]: 'load', [`${longName}2`]: 'absolute', [`${longName}3`]: 'store' },
  [`${longName}1>${longName}2:a`, `${longName}2>${longName}3:value`],
  'Größe "1"',
);

export type Case = [
  title: string,
  expected: Answer,
  Kernel,
  Fabric,
  TinyCase['pins'],
  Objective,
  weights?: Weights,
];
export const cases: Case[] = [
  ['a chain of three side by side', 2, chain, fabricOf('mam aaa'), {}, 'wire'],
  ['its ends pinned 3 hops apart', 3, chain, fabricOf('mam aam'), apart, 'wire'],
  ['the same within 2 hops a path', 3, chain, fabricOf('mam aam', hopLimit(2)), apart, 'wire'],
  ['the same within 1 hop a path', 'infeasible', chain, fabricOf('mam aam', hopLimit(1)), apart, 'wire'],
  ['a clock that allows no hop', 'infeasible', chain, fabricOf('mam aam', hopLimit(0)), {}, 'path'],
  ['links of a net counted once', 2, fan, fabricOf('mmm'), pinsOf({ in: 'r0c0' }), 'wire'],
  ['paths of a net counted each, 1 + 2', 3, fan, fabricOf('mmm'), pinsOf({ in: 'r0c0' }), 'path'],
  [
    'two ways of 2, room for both',
    4,
    twoWays,
    fabricOf('mmm mmm', { ...noWayDown, channels: 2 }),
    crossing,
    'wire',
  ],
  ['one of them has to go round, 2 + 4', 6, twoWays, fabricOf('mmm mmm', noWayDown), crossing, 'path'],
  [
    'the same within 3 hops a path, of which there is only one',
    'infeasible',
    twoWays,
    fabricOf('mmm mmm', { ...noWayDown, ...hopLimit(3) }),
    crossing,
    'wire',
  ],
  [
    'a bridge with one channel for two nets',
    'infeasible',
    twoWays,
    fabricOf('mmmm'),
    pinsOf({ a: 'r0c0', x: 'r0c2', b: 'r0c1', y: 'r0c3' }),
    'wire',
  ],
  ['an op that no tile implements', 'infeasible', chain, fabricOf('mmm mmm'), {}, 'wire'],
  ['no tile for any op and no link', 'infeasible', fan, fabricOf('a'), {}, 'wire'],
  [
    'the dear one of two goes straight, 5 · 2 + 4',
    14,
    twoWays,
    fabricOf('mmm mmm', noWayDown),
    crossing,
    'wire',
    weightsSchema.parse({ nets: { op_b: 5 } }),
  ],
  [
    'the near consumer is the one that counts, 1 · 2.5 + 2 · 0.5',
    3.5,
    fan,
    fabricOf('mmm'),
    pinsOf({ in: 'r0c0' }),
    'path',
    weightsSchema.parse({ edges: { edge_0: 0.5, edge_1: 2.5 } }),
  ],
  [
    'a net that counts nothing, beside one of a thousand million',
    1e9,
    chain,
    fabricOf('mam aam'),
    apart,
    'wire',
    weightsSchema.parse({ nets: { op_in: 0, op_abs: 1e9 } }),
  ],
  ['ids of the greatest length', 2, longNames, fabricOf('mam aaa'), {}, 'wire'],
];

/** Weights of which every reader prints the sum whole. */
export const randomWeighted: Case[] = fc
  .sample(weightedCaseArb(weightKinds.decimal as fc.Arbitrary<number>), { seed: 4712, numRuns: 6 })
  .map(({ kernel, fabric, pins, objective, weights }, i) => [
    `random case ${i} with weights`,
    exhaustiveOptimum(kernel, fabric, pins, objective, weights) ?? 'infeasible',
    kernel,
    fabric,
    pins,
    objective,
    weights,
  ]);

export const random: Case[] = fc
  .sample(tinyCaseArb, { seed: 4711, numRuns: 6 })
  .map(({ kernel, fabric, pins, objective }, i) => [
    `random case ${i}`,
    exhaustiveOptimum(kernel, fabric, pins, objective) ?? 'infeasible',
    kernel,
    fabric,
    pins,
    objective,
  ]);

export function textOf([, , kernel, fabric, pins, objective, weights]: Case, format: TextFormat): string {
  const text = modelText({ kernel, fabric, pins, objective, weights }, format);
  if (!text.ok) throw new Error(JSON.stringify(text.error));
  return text.value;
}
