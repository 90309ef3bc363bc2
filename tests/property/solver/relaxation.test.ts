import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ascentScratch, raiseConstant } from '@/lib/solver/exact/dual-ascent';
import { augment } from '@/lib/solver/exact/reassign';
import { blankRelaxation, placeInto, type Relaxation } from '@/lib/solver/exact/relaxation';
import { rootRelaxation } from '@/lib/solver/exact/root-relaxation';
import { passTriples } from '@/lib/solver/exact/triple-ascent';
import type { PlacementInstance } from '@/lib/solver/instance';

const ROWS = 3;
const COLS = 3;
const TILES = ROWS * COLS;

/** Grid hops; every op may stand on most tiles; pairs at random, so that triangles, squares and longer cycles occur. */
const instanceArb: fc.Arbitrary<{ instance: PlacementInstance; tilings: number[][] }> = fc
  .record({
    opCount: fc.integer({ min: 3, max: 7 }),
    pairs: fc.array(fc.tuple(fc.nat(6), fc.nat(6), fc.integer({ min: 1, max: 4 })), {
      minLength: 4,
      maxLength: 14,
    }),
    closed: fc.array(fc.nat(62), { maxLength: 4 }),
    tilings: fc.array(
      fc.shuffledSubarray(
        Array.from({ length: TILES }, (_, tile) => tile),
        { minLength: 7 },
      ),
      {
        minLength: 12,
        maxLength: 12,
      },
    ),
  })
  .map(({ opCount, pairs, closed, tilings }) => ({
    tilings,
    instance: {
      tileCount: TILES,
      rows: ROWS,
      cols: COLS,
      distance: Uint16Array.from({ length: TILES * TILES }, (_, at) => {
        const [p, q] = [Math.floor(at / TILES), at % TILES];
        return Math.abs(Math.floor(p / COLS) - Math.floor(q / COLS)) + Math.abs((p % COLS) - (q % COLS));
      }),
      maxHops: null,
      objective: 'path',
      opCount,
      candidates: Array.from({ length: opCount }, (_, op) =>
        Array.from({ length: TILES }, (_, tile) => tile).filter(
          (tile) => !closed.includes(op * TILES + tile),
        ),
      ),
      pairs: pairs.flatMap(([from, to, weight]) =>
        from !== to && from < opCount && to < opCount ? [{ from, to, weight }] : [],
      ),
      nets: [],
      isPlainMesh: true,
    },
  }));

/** What the relaxation says that a tiling of its free ops costs. */
function costOf(relaxation: Relaxation, tiling: readonly number[]): number {
  const { graph, residual, tables, tableAt, domain, domainSize, emptyCost } = relaxation;
  const free = [...relaxation.free.subarray(0, relaxation.freeCount)];
  const placeOf = (op: number) =>
    domain.subarray(op * TILES, op * TILES + (domainSize[op] as number)).indexOf(tiling[op] as number);
  let cost = relaxation.constant;
  for (const op of free) cost += residual[op * TILES + (tiling[op] as number)] as number;
  const entry = (table: number, a: number, b: number) => {
    const start = tableAt[table] as number;
    if (start === -1) return 0;
    if (placeOf(a) < 0 || placeOf(b) < 0) return Number.POSITIVE_INFINITY;
    return tables[start + placeOf(a) * (domainSize[b] as number) + placeOf(b)] as number;
  };
  graph.first.forEach((a, pair) => {
    cost += entry(pair, a, graph.second[pair] as number);
  });
  for (const { a, b, c, table } of graph.triples) {
    cost += entry(table, a, b) + entry(table + 1, a, c) + entry(table + 2, b, c);
  }
  for (let tile = 0; tile < TILES; tile++) {
    const isHeld = free.some((op) => tiling[op] === tile);
    const left = emptyCost[tile] as number;
    if (!isHeld && left !== Number.POSITIVE_INFINITY) cost += left;
  }
  return cost;
}

const trueCost = ({ pairs, distance, candidates }: PlacementInstance, tiling: readonly number[]): number =>
  candidates.every((tiles, op) => tiles.includes(tiling[op] as number))
    ? pairs.reduce(
        (sum, { from, to, weight }) =>
          sum + weight * (distance[(tiling[from] as number) * TILES + (tiling[to] as number)] as number),
        0,
      )
    : Number.POSITIVE_INFINITY;

function expectCost(relaxation: Relaxation, tiling: readonly number[], cost: number): void {
  const found = costOf(relaxation, tiling);
  expect(cost === Number.POSITIVE_INFINITY ? found === cost : Math.abs(found - cost) < 1e-6).toBe(true);
}

const limits = { cutoff: Number.POSITIVE_INFINITY, sweeps: 5, leastGain: 0 };

describe('the relaxation of the exact search', () => {
  it('triples move costs about and change the cost of no tiling', () => {
    let withTriples = 0;
    fc.assert(
      fc.property(instanceArb, ({ instance, tilings }) => {
        const root = rootRelaxation(instance);
        if (!root) return;
        if (root.graph.triples.length > 0) withTriples++;
        for (const backward of [false, true]) {
          passTriples(root, backward, { cutoff: Number.POSITIVE_INFINITY });
          for (const tiling of tilings) expectCost(root, tiling, trueCost(instance, tiling));
        }
      }),
      { seed: 4206, numRuns: 300 },
    );
    expect(withTriples).toBeGreaterThan(50);
  });

  it('the ascent raises the constant and makes no tiling dearer', () => {
    let raised = 0;
    fc.assert(
      fc.property(instanceArb, ({ instance, tilings }) => {
        const root = rootRelaxation(instance);
        if (!root) return;
        raiseConstant(root, limits, ascentScratch(instance.opCount, TILES));
        if (root.constant > 1) raised++;
        for (const tiling of tilings) {
          const cost = costOf(root, tiling);
          expect(cost).toBeLessThanOrEqual(trueCost(instance, tiling) + 1e-6);
          expect(root.constant).toBeLessThanOrEqual(cost + 1e-6);
        }
      }),
      { seed: 4207, numRuns: 300 },
    );
    expect(raised).toBeGreaterThan(200);
  });

  it('placing an op keeps the cost of every tiling that has it there', () => {
    fc.assert(
      fc.property(instanceArb, fc.nat(6), ({ instance, tilings }, which) => {
        const root = rootRelaxation(instance);
        if (!root) return;
        const scratch = ascentScratch(instance.opCount, TILES);
        raiseConstant(root, limits, scratch);
        const op = which % instance.opCount;
        for (const tiling of tilings) {
          const before = costOf(root, tiling);
          const tile = tiling[op] as number;
          if (before === Number.POSITIVE_INFINITY) continue;
          const child = blankRelaxation(root.graph);
          const kept = new Int32Array(instance.opCount * TILES);
          expect(placeInto(child, root, op, tile, kept)).toBe(true);
          const [mover, left] = [root.holderOf[tile] as number, root.tileOf[op] as number];
          if (left !== tile) {
            child.holderOf[left] = -1;
            expect(augment(child, mover, left, scratch)).toBe(true);
          }
          expectCost(child, tiling, before);
          expect(child.constant).toBeLessThanOrEqual(before + 1e-6);
        }
      }),
      { seed: 4208, numRuns: 150 },
    );
  });
});
