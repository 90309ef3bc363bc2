import { describe, expect, it } from 'vitest';
import { compileFabric, type FabricGraph } from '@/lib/fabric/compile';
import type { Fabric, LinkId, Topology, UnitId } from '@/lib/fabric/fabric';
import { initialParams } from '@/lib/graph/edits';
import { edgeId, opId } from '@/lib/graph/ids';
import { emptyKernel, type Kernel } from '@/lib/graph/kernel';
import { type OpKind, portsOf } from '@/lib/graph/op-catalog';
import type { Objective, Pins } from '@/lib/mapping/mapping';
import { fabricSymmetries, kernelSymmetries, LARGEST_FABRIC_TILES } from '@/lib/solver/exact/symmetry';
import { buildInstance, type PlacementInstance } from '@/lib/solver/instance';
import { qapAsInstance, readQap } from '../../../helpers/integer-programs';

const arithmetic = 'unit_arithmetic' as UnitId;
const memory = 'unit_memory' as UnitId;

function fabric(rows: number, cols: number, topology: Topology, more: Partial<Fabric> = {}): FabricGraph {
  return compileFabric({
    format: 'pinloom.fabric',
    formatVersion: 1,
    name: 'symmetric',
    description: '',
    rows,
    cols,
    topology,
    units: new Array(rows * cols).fill(arithmetic),
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

/** Ops with their kinds and the ops they read, port by port: `x=load size=absolute:x out=store:size`. */
function kernel(plan: string): Kernel {
  const parts = plan.split(' ').map((part) => {
    const [name = '', kind = '', operands = ''] = part.split(/[=:]/);
    return { name, kind: kind as OpKind, operands: operands === '' ? [] : operands.split(',') };
  });
  const ops = parts.map(({ name, kind }) => ({
    id: opId(`op_${name}`),
    kind,
    label: '',
    widthBits: 32 as const,
    params: initialParams(kind),
    immediates: {},
    positionPx: { x: 0, y: 0 },
  }));
  const edges = parts.flatMap(({ name, kind, operands }) =>
    operands.map((operand, i) => ({
      id: edgeId(`edge_${name}_${i}`),
      from: opId(`op_${operand}`),
      to: opId(`op_${name}`),
      port: portsOf(kind)[i]?.name ?? '',
      distance: 0,
      initialValues: [],
    })),
  );
  return { ...emptyKernel('symmetric'), ops, edges };
}

const oneAdd = kernel('sum=add');

const fabricCount = (graph: FabricGraph, limit = 10_000, pins: Pins = {}): number =>
  fabricSymmetries(buildInstance(oneAdd, graph, pins, 'path'), graph.links, limit).length;

/** A table of ones and twos: 1 where two vertices are adjacent. */
function adjacency(count: number, isEdge: (v: number, u: number) => boolean): PlacementInstance {
  const all = Array.from({ length: count }, (_, v) => v);
  const edges = all.flatMap((v) => all.filter((u) => u !== v && isEdge(v, u)).map((u) => [v, u] as const));
  const distance = new Uint16Array(count * count);
  for (const v of all) for (const u of all) distance[v * count + u] = v === u ? 0 : 2;
  for (const [v, u] of edges) distance[v * count + u] = 1;
  return {
    tileCount: count,
    rows: 1,
    cols: count,
    distance,
    maxHops: null,
    objective: 'path',
    opCount: count,
    candidates: all.map(() => all),
    pairs: edges.map(([from, to]) => ({ from, to, weight: 1 })),
    nets: [],
    isPlainMesh: false,
  };
}

/** Petersen's graph: the ten pairs out of five things, adjacent where they have none in common. */
const petersen = (() => {
  const pairs = [0, 1, 2, 3].flatMap((a) => [1, 2, 3, 4].filter((b) => b > a).map((b) => [a, b]));
  return adjacency(10, (v, u) => !(pairs[v] as number[]).some((thing) => pairs[u]?.includes(thing)));
})();

/** A hexagon (even) and two triangles (odd): each vertex has two neighbours, so refinement tells nothing apart. */
const rings = adjacency(12, (v, u) => {
  const follows = (at: number): number =>
    at % 2 === 0 ? (at + 2) % 12 : at < 6 ? (at + 2) % 6 : 6 + ((at + 2) % 6);
  return follows(v) === u || follows(u) === v;
});

describe('symmetries of a fabric', () => {
  // The groups' orders are textbook figures: the square's 8, the rectangle's 4; C3 × C3 is the rook's graph with
  // 3!² · 2, C4 × C4 the cube in four dimensions with 2⁴ · 4!; other tori n × n have n² shifts times 8.
  it.each<[number, number, Topology, number]>([
    [5, 5, 'mesh', 8],
    [8, 8, 'mesh', 8],
    [3, 5, 'mesh', 4],
    [1, 6, 'mesh', 2],
    [4, 4, 'diagonal', 8],
    [3, 3, 'torus', 72],
    [4, 4, 'torus', 384],
    [5, 5, 'torus', 200],
    [8, 8, 'torus', 512],
    [3, 5, 'torus', 60],
    [1, 1, 'mesh', 1],
  ])('%i × %i %s with one kind of unit: %i', (rows, cols, topology, order) => {
    expect(fabricCount(fabric(rows, cols, topology))).toBe(order);
  });

  it.each(['nug6', 'nug12'])('finds the 4 of the grid in QAPLIB %s without being told of links', (name) => {
    expect(fabricSymmetries(qapAsInstance(readQap(name)), [], 100)).toHaveLength(4);
  });

  it('finds the 120 of Petersen’s graph, whose vertices no refinement tells apart', () => {
    expect(fabricSymmetries(petersen, [], 1000)).toHaveLength(120);
  });

  it('finds the 12 · 72 of a hexagon beside two triangles, which look alike to refinement', () => {
    expect(fabricSymmetries(rings, [], 1000)).toHaveLength(864);
  });

  it('finds the 78 of Paley’s graph of 13: shifts, times multiplication by squares (Carlitz 1960)', () => {
    const squares = [1, 3, 4, 9, 10, 12];
    const paley = adjacency(13, (v, u) => squares.includes((v - u + 13) % 13));
    expect(fabricSymmetries(paley, [], 1000)).toHaveLength(78);
  });

  it('one odd unit leaves what keeps its tile: a corner 2, a tile off every axis none', () => {
    const withOddAt = (tile: number) => {
      const units = Array.from({ length: 25 }, (_, i) => (i === tile ? memory : arithmetic));
      return fabricCount(fabric(5, 5, 'mesh', { units }));
    };
    expect([withOddAt(12), withOddAt(0), withOddAt(1)]).toEqual([8, 2, 1]);
  });

  it('a unit that no op needs counts as any other tile without one', () => {
    const units = Array.from({ length: 9 }, (_, i) => (i === 0 ? memory : i === 8 ? null : arithmetic));
    // Corners 0 and 8: half turn, both diagonals.
    expect(fabricCount(fabric(3, 3, 'mesh', { units }))).toBe(4);
  });

  it('a pin counts: only what leaves its tile in place', () => {
    expect(fabricCount(fabric(5, 5, 'mesh'), 100, { [opId('op_sum')]: 'r0c2' as never })).toBe(2);
  });

  it('a link removed one way leaves the mirror along it only', () => {
    const removedLinks = ['r1c0>r1c1' as LinkId];
    expect(fabricCount(fabric(3, 3, 'mesh', { removedLinks }))).toBe(2);
  });

  it('links count even where no distance tells of them, and so do their channels', () => {
    const mesh = fabric(3, 3, 'mesh', { linkChannels: { ['r1c0>r1c1' as LinkId]: 2 } });
    const instance = buildInstance(oneAdd, mesh, {}, 'path');
    expect(fabricSymmetries(instance, mesh.links, 100)).toHaveLength(2);
    expect(fabricSymmetries(instance, mesh.links.slice(1), 100).length).toBeLessThan(8);
    expect(fabricSymmetries(instance, [], 100)).toHaveLength(8);
  });

  it('gives a smaller group where the limit is hit: a torus keeps one tile in place', () => {
    const torus = fabric(5, 5, 'torus');
    const found = fabricSymmetries(buildInstance(oneAdd, torus, {}, 'path'), torus.links, 199);
    expect(found).toHaveLength(8);
    expect(new Set(found.map((image) => image[0]))).toEqual(new Set([0]));
    expect(fabricCount(torus, 200)).toBe(200);
    expect(fabricCount(torus, 7)).toBeLessThanOrEqual(7);
  });

  it('still gives a group where a level of the search is too large and the next one would fit', () => {
    // Two stars with three leaves each: 3! · 3! · 2 = 72. 30 allows for no group but of those that keep a leaf.
    const stars = adjacency(8, (v, u) => v % 4 === 0 && u > v && u < v + 4);
    expect(fabricSymmetries(stars, [], 72)).toHaveLength(72);
    const found = fabricSymmetries(stars, [], 30);
    const texts = new Set(found.map(String));
    const products = found.flatMap((outer) => found.map((inner) => inner.map((v) => outer[v] as number)));
    expect(new Set(products.map(String))).toEqual(texts);
    expect(found).toHaveLength(12);
  });

  it('is quick on 12 × 12 tiles of a torus', { timeout: 2000 }, () => {
    expect(fabricCount(fabric(12, 12, 'torus'))).toBe(1152);
  });

  it('looks at 24 × 24 tiles and gives the identity only above', () => {
    expect(LARGEST_FABRIC_TILES).toBe(24 * 24);
    expect(fabricCount(fabric(24, 24, 'mesh'))).toBe(8);
    expect(fabricCount(fabric(24, 25, 'mesh'))).toBe(1);
  });

  it('gives the identity of 64 × 64 tiles at once', { timeout: 20_000 }, () => {
    const large = fabric(64, 64, 'mesh');
    const found = fabricSymmetries(buildInstance(oneAdd, large, {}, 'path'), large.links, 100);
    expect(found).toEqual([Int32Array.from({ length: 64 * 64 }, (_, tile) => tile)]);
  });
});

const mixed = fabric(4, 4, 'mesh', {
  units: Array.from({ length: 16 }, (_, i) => (i % 4 === 0 ? memory : arithmetic)),
});

/** Each symmetry as the ops it moves: `a>b b>a`. */
function moves(of: Kernel, objective: Objective, limit = 1000, pins: Pins = {}): string[] {
  const name = (op: number): string => of.ops[op]?.id.slice(3) ?? '';
  return kernelSymmetries(buildInstance(of, mixed, pins, objective), limit).map((image) =>
    [...image.entries()].flatMap(([op, to]) => (op === to ? [] : [`${name(op)}>${name(to)}`])).join(' '),
  );
}

const twoReaders = kernel('x=load y=load sum=add:x,y out=store:sum');
const twoChains = kernel('x=load y=load xSize=absolute:x ySize=absolute:y xOut=store:xSize yOut=store:ySize');

describe.each<Objective>(['path', 'wire'])('symmetries of a kernel for %s', (objective) => {
  it('exchanges the loads of one add; which operand is which makes no difference to a placement', () => {
    expect(moves(twoReaders, objective)).toEqual(['x>y y>x']);
    const subtract = kernel('x=load y=load less=subtract:x,y');
    expect(moves(subtract, objective)).toEqual(['x>y y>x']);
  });

  it('exchanges two chains as a whole, and nothing less', () => {
    expect(moves(twoChains, objective)).toEqual(['x>y y>x xSize>ySize ySize>xSize xOut>yOut yOut>xOut']);
  });

  it('finds none where each op has a part of its own, such as being read twice', () => {
    const chain = kernel('x=load size=absolute:x out=store:size');
    expect(moves(chain, objective)).toEqual([]);
    const uneven = kernel('x=load y=load sum=add:x,y twice=add:sum,x');
    expect(moves(uneven, objective)).toEqual([]);
  });

  it('does not exchange a pinned op with a free one', () => {
    expect(moves(twoReaders, objective, 1000, { [opId('op_x')]: 'r0c0' as never })).toEqual([]);
  });

  it('has an exchange for each pair of four equal stores, and with a limit of 3 what joins them all', () => {
    const four = kernel('x=load a=store:x b=store:x c=store:x d=store:x');
    expect(new Set(moves(four, objective))).toEqual(
      new Set(['a>b b>a', 'a>c c>a', 'a>d d>a', 'b>c c>b', 'b>d d>b', 'c>d d>c']),
    );
    expect(moves(four, objective, 3)).toEqual(['a>b b>a', 'a>c c>a', 'a>d d>a']);
    expect(moves(four, objective, 0)).toEqual([]);
  });

  it('puts exchanges of two ops before the exchange of the halves that have them', () => {
    const halves = kernel('a=load b=load c=load d=load ab=add:a,b cd=add:c,d');
    const found = moves(halves, objective);
    expect(found.slice(0, 2)).toEqual(['a>b b>a', 'c>d d>c']);
    expect(found).toContain('a>c b>d c>a d>b ab>cd cd>ab');
  });

  it('answers 2000 ops at once, with an empty list', { timeout: 2000 }, () => {
    const plan = Array.from({ length: 2000 }, (_, i) => `load${i}=load`).join(' ');
    expect(moves(kernel(plan), objective)).toEqual([]);
  });
});

describe('symmetries of kernels that go round', () => {
  it('turns three ops that feed each other in a ring, as no exchange keeps the directions', () => {
    const ring = {
      ...petersen,
      opCount: 3,
      candidates: [
        [0, 1, 2],
        [0, 1, 2],
        [0, 1, 2],
      ],
    };
    const pairs = [0, 1, 2].map((from) => ({ from, to: (from + 1) % 3, weight: 1 }));
    const found = kernelSymmetries({ ...ring, pairs }, 10).map((image) => [...image].join(''));
    expect(found.sort()).toEqual(['120', '201']);
    const heavier = pairs.map((pair) => ({ ...pair, weight: 1 + pair.from }));
    expect(kernelSymmetries({ ...ring, pairs: heavier }, 10)).toEqual([]);
  });

  it('keeps a hexagon and two triangles apart, and takes each op to each other one of its own', () => {
    const found = kernelSymmetries(rings, 1000);
    const ways = new Set(found.flatMap((image) => [...image.entries()].map(([op, to]) => `${op} ${to}`)));
    const between = [...ways].map((way) => way.split(' ').map(Number) as [number, number]);
    expect(between.filter(([op, to]) => op % 2 !== to % 2)).toEqual([]);
    expect(between.filter(([op, to]) => op !== to)).toHaveLength(60);
  });

  it('takes every vertex of Petersen’s graph to every other', () => {
    const found = kernelSymmetries(petersen, 1000);
    const taken = new Set(found.flatMap((image) => [...image.entries()].map(([op, to]) => `${op}>${to}`)));
    expect([...taken].filter((way) => way[0] !== way[2])).toHaveLength(90);
  });
});
