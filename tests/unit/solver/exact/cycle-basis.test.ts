import { describe, expect, it } from 'vitest';
import { costGraph } from '@/lib/solver/exact/cost-graph';
import { shortCycleBasis } from '@/lib/solver/exact/cycle-basis';

const graphOf = (vertexCount: number, edges: readonly (readonly [number, number])[]) => {
  const neighbours = Array.from({ length: vertexCount }, () => new Set<number>());
  for (const [a, b] of edges) {
    neighbours[a]?.add(b);
    neighbours[b]?.add(a);
  }
  return neighbours;
};
const ring = (size: number) => Array.from({ length: size }, (_, i) => [i, (i + 1) % size] as const);
/** The 3-cube: 8 corners, 12 edges. */
const cube = Array.from({ length: 8 }, (_, a) =>
  [1, 2, 4].flatMap((bit) => (a & bit ? [] : [[a, a | bit] as const])),
).flat();
/** Petersen's graph: outer ring, inner star, spokes. Its shortest cycles have five vertices. */
const petersen = [
  ...ring(5),
  ...Array.from({ length: 5 }, (_, i) => [5 + i, 5 + ((i + 2) % 5)] as const),
  ...Array.from({ length: 5 }, (_, i) => [i, 5 + i] as const),
];

describe('a basis of short cycles', () => {
  // As many cycles as edges − vertices + parts (the graph's cycle space).
  it.each([
    [
      'a tree: 4 − 5 + 1 = 0',
      5,
      [
        [0, 1],
        [0, 2],
        [2, 3],
        [2, 4],
      ] as const,
      [],
    ],
    ['a ring of 7: 7 − 7 + 1 = 1', 7, ring(7), [7]],
    [
      'two triangles apart: 6 − 6 + 2 = 2',
      6,
      [
        [0, 1],
        [1, 2],
        [2, 0],
        [3, 4],
        [4, 5],
        [5, 3],
      ] as const,
      [3, 3],
    ],
    ['the cube: 12 − 8 + 1 = 5 squares', 8, cube, [4, 4, 4, 4, 4]],
    ['Petersen: 15 − 10 + 1 = 6 pentagons', 10, petersen, [5, 5, 5, 5, 5, 5]],
  ])('%s', (_, vertexCount, edges, lengths) => {
    const neighbours = graphOf(vertexCount, edges);
    const basis = shortCycleBasis(neighbours, 12);
    expect(basis.map((cycle) => cycle.length)).toEqual(lengths);
    for (const cycle of basis) {
      expect(new Set(cycle).size).toBe(cycle.length);
      cycle.forEach((a, i) => {
        expect(neighbours[a]?.has(cycle[(i + 1) % cycle.length] as number)).toBe(true);
      });
    }
  });

  it('leaves out cycles above the length', () => {
    expect(shortCycleBasis(graphOf(7, ring(7)), 6)).toEqual([]);
  });
});

describe('the triples of a cost graph', () => {
  const triplesOf = (opCount: number, pairs: readonly (readonly [number, number])[], work = 1e6) =>
    costGraph(opCount, 9, pairs, () => 9, work).triples.map(({ a, b, c }) => [a, b, c]);

  it('a triangle is one', () => {
    expect(triplesOf(3, ring(3))).toEqual([[0, 1, 2]]);
  });
  it('a square has two for each of its diagonals', () => {
    expect(triplesOf(4, ring(4))).toHaveLength(4);
  });
  it('a ring of six is a fan of four', () => {
    expect(triplesOf(6, ring(6))).toHaveLength(4);
  });
  it('a tree has none', () => {
    expect(
      triplesOf(4, [
        [0, 1],
        [0, 2],
        [0, 3],
      ]),
    ).toEqual([]);
  });
  it('ten ops that all cost something together have none: there they do not pay', () => {
    const all = Array.from({ length: 10 }, (_, a) =>
      Array.from({ length: a }, (_, b) => [b, a] as const),
    ).flat();
    expect(triplesOf(10, all)).toEqual([]);
  });
  it('what is beyond the work is left out: one pair of 81 entries leaves no room for a triple of 486', () => {
    expect(triplesOf(3, ring(3), 3 * 81 + 485)).toEqual([]);
    expect(triplesOf(3, ring(3), 3 * 81 + 486)).toEqual([[0, 1, 2]]);
  });
});

describe('large cost graphs are bounded', () => {
  it('a net of 300 terminals, each pinned: no triples of its 4,455,100 triangles', () => {
    const all = Array.from({ length: 300 }, (_, a) =>
      Array.from({ length: a }, (_, b) => [b, a] as const),
    ).flat();
    expect(costGraph(300, 300, all, () => 1, 1e6).triples).toEqual([]);
  });
  it('a grid of 20 × 20 ops: a basis of its 361 squares within the limit of ops', () => {
    const grid = Array.from({ length: 400 }, (_, at) => [
      ...(at % 20 < 19 ? [[at, at + 1] as const] : []),
      ...(at < 380 ? [[at, at + 20] as const] : []),
    ]).flat();
    expect(shortCycleBasis(graphOf(400, grid), 12)).toHaveLength(361);
  });
});
