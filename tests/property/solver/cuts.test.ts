import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { compileFabric } from '@/lib/fabric/compile';
import { fabricCuts } from '@/lib/solver/cuts/cut-sets';
import { type CutProblem, divideOps } from '@/lib/solver/cuts/divide-ops';
import { forcedCrossings, INSIDE, OUTSIDE, sidesOf } from '@/lib/solver/cuts/forced-crossings';
import { flowNetwork } from '@/lib/solver/cuts/max-flow';
import { regionCuts } from '@/lib/solver/cuts/region-cuts';
import { tileCut } from '@/lib/solver/cuts/tile-cut';
import { buildInstance } from '@/lib/solver/instance';
import { addTile, commonTiles, hasTile, noTiles, tileSets } from '@/lib/solver/presolve/tile-sets';
import { oddCaseArb } from './odd-cases';
import type { TinyCase } from './tiny-cases';

const NODES = 6;
const networkArb = fc.array(
  fc.tuple(
    fc.nat(NODES - 1),
    fc.nat(NODES - 1),
    fc.integer({ min: 0, max: 4 }),
    fc.integer({ min: 0, max: 2 }),
  ),
  { maxLength: 14 },
);

/** The least capacity over all sets of nodes with node 0 and without the last one. */
function leastCut(arcs: readonly (readonly [number, number, number, number])[]): number {
  let least = Number.POSITIVE_INFINITY;
  for (let side = 1; side < 1 << (NODES - 1); side += 2) {
    const has = (node: number) => (side >> node) % 2 === 1;
    const across = arcs.reduce((sum, [from, to, there, back]) => {
      if (has(from) === has(to)) return sum;
      return sum + (has(from) ? there : back);
    }, 0);
    least = Math.min(least, across);
  }
  return least;
}

describe('the greatest flow', () => {
  it('equals the least cut over all sets of nodes, and shows one, on 1,000 networks of six nodes', () => {
    const values = new Set<number>();
    fc.assert(
      fc.property(networkArb, (arcs) => {
        const network = flowNetwork(NODES);
        for (const [from, to, there, back] of arcs) network.join(from, to, there, back);
        const flow = network.maxFlow(0, NODES - 1);
        values.add(flow);
        expect(flow).toBe(leastCut(arcs));
        const side = network.sourceSide();
        const across = arcs.reduce((sum, [from, to, there, back]) => {
          if (side[from] === side[to]) return sum;
          return sum + (side[from] === 1 ? there : back);
        }, 0);
        expect([side[0], side[NODES - 1], across]).toEqual([1, 0, flow]);
        // Limited, it stops there; asked again, it starts anew.
        expect(network.maxFlow(0, NODES - 1, 2)).toBe(Math.min(flow, 2));
        expect(network.maxFlow(0, NODES - 1)).toBe(flow);
      }),
      { seed: 51, numRuns: 1000 },
    );
    expect(values.size).toBeGreaterThan(6);
  });
});

function instanceOf({ kernel, fabric, pins, objective }: TinyCase) {
  const graph = compileFabric(fabric);
  const instance = buildInstance(kernel, graph, pins, objective);
  const sets = tileSets(instance.tileCount);
  const regions = instance.candidates.map((tiles) => sets.of(tiles));
  return { graph, instance, sets, regions };
}

/** The cut with these tiles inside, one bit each. */
function cutProblem(tiny: TinyCase, mask: number): CutProblem {
  const { graph, instance, sets, regions } = instanceOf(tiny);
  const inside = noTiles(instance.tileCount);
  for (let tile = 0; tile < instance.tileCount; tile++) if ((mask >> tile) % 2 === 1) addTile(inside, tile);
  const cut = tileCut(inside, graph.links);
  const usable = noTiles(instance.tileCount);
  for (const tile of instance.candidates.flat()) addTile(usable, tile);
  const roomInside = commonTiles(usable, inside);
  const roomOutside = commonTiles(usable, usable) - roomInside;
  return { instance, cut, sides: sidesOf(regions, cut, sets), roomInside, roomOutside };
}

/** Channels that are missing at the best of all placements, counted by trying each of them; null where there is none. */
function leastMissing({ instance, cut }: CutProblem): number | null {
  const { candidates, nets } = instance;
  let least: number | null = null;
  const tiles: number[] = [];
  const place = (op: number): void => {
    if (op === candidates.length) {
      const isIn = (at: number) => hasTile(cut.inside, tiles[at] as number);
      const out = nets.filter(
        ({ source, consumers }) => isIn(source) && consumers.some((c) => !isIn(c)),
      ).length;
      const back = nets.filter(({ source, consumers }) => !isIn(source) && consumers.some(isIn)).length;
      const missing = Math.max(0, out - cut.channelsOut) + Math.max(0, back - cut.channelsIn);
      least = Math.min(least ?? missing, missing);
      return;
    }
    for (const tile of candidates[op] ?? []) {
      if (tiles.includes(tile)) continue;
      tiles.push(tile);
      place(op + 1);
      tiles.pop();
    }
  };
  place(0);
  return least;
}

describe('dividing the ops between the sides of a cut', () => {
  it('finds a division for as many missing channels as the best placement has, and none for fewer', () => {
    const met = new Map<number | null, number>();
    fc.assert(
      fc.property(
        oddCaseArb,
        fc.integer({ min: 1, max: 62 }),
        fc.nat(2),
        fc.nat(1),
        (tiny, mask, out, back) => {
          const given = cutProblem(tiny, mask);
          const problem = { ...given, cut: { ...given.cut, channelsOut: out, channelsIn: back } };
          const truth = leastMissing(problem);
          met.set(truth, (met.get(truth) ?? 0) + 1);
          const kinds = [0, 1, 2, 3, 4, 5].map((missing) => divideOps(problem, missing, { left: 1e6 }).kind);
          expect(kinds).toEqual(
            [0, 1, 2, 3, 4, 5].map((missing) => (truth !== null && truth <= missing ? 'found' : 'none')),
          );
        },
      ),
      { seed: 52, numRuns: 1000 },
    );
    for (const missing of [0, 1, 2]) expect(met.get(missing) ?? 0, `${missing} missing`).toBeGreaterThan(20);
    expect(met.get(null) ?? 0).toBeGreaterThan(20);
  });

  it('does not know where its work ends before', () => {
    const problem = cutProblem(fc.sample(oddCaseArb, { seed: 3, numRuns: 1 })[0] as TinyCase, 7);
    expect(divideOps(problem, 0, { left: 1 }).kind).toBe('unknown');
  });
});

describe('the cuts that are looked at', () => {
  it('between two tiles of the fabric are least ones: no set of tiles parts more of them more cheaply', () => {
    fc.assert(
      fc.property(oddCaseArb, (tiny) => {
        const { graph } = instanceOf(tiny);
        const { tileCount, links } = graph;
        const sizeOf = (mask: number) => mask.toString(2).replaceAll('0', '').length;
        const both = (mask: number) => {
          const has = (tile: number) => (mask >> tile) % 2 === 1;
          return links.reduce(
            (sum, { from, to, channels }) => sum + (has(from) === has(to) ? 0 : channels),
            0,
          );
        };
        const looked = fabricCuts(graph);
        for (let a = 0; a < tileCount; a++) {
          for (let b = 0; b < a; b++) {
            const parting = Array.from({ length: 2 ** tileCount }, (_, mask) => mask).filter(
              (mask) => (mask >> a) % 2 !== (mask >> b) % 2,
            );
            const least = Math.min(...parting.map(both));
            // A tile alone is not looked at; where that is the only least cut, nothing is missed.
            const isAlone = parting
              .filter((mask) => both(mask) === least)
              .some((mask) => [1, tileCount - 1].includes(sizeOf(mask)));
            const best = looked
              .filter(({ inside }) => hasTile(inside, a) !== hasTile(inside, b))
              .map(({ channelsOut, channelsIn }) => channelsOut + channelsIn);
            if (!isAlone) expect(Math.min(...best)).toBe(least);
            expect(Math.min(...best, Number.POSITIVE_INFINITY)).toBeGreaterThanOrEqual(least);
          }
        }
      }),
      { seed: 53, numRuns: 100 },
    );
  });

  it('between the regions of ops have more nets that must cross than channels, each of them', () => {
    let found = 0;
    fc.assert(
      fc.property(oddCaseArb, (tiny) => {
        const { graph, instance, sets, regions } = instanceOf(tiny);
        fc.pre(instance.candidates.every((tiles) => tiles.length > 0));
        for (const cut of regionCuts(instance, graph, sets)) {
          const sides = sidesOf(regions, cut, sets);
          expect(forcedCrossings(instance, sides, INSIDE).length).toBeGreaterThan(cut.channelsOut);
          found++;
        }
      }),
      { seed: 54, numRuns: 2000 },
    );
    expect(found).toBeGreaterThan(50);
  });

  it('has a cut between regions wherever one of all sets of tiles parts all nets into one op from it', () => {
    let narrow = 0;
    fc.assert(
      fc.property(oddCaseArb, (tiny) => {
        const { graph, instance, sets, regions } = instanceOf(tiny);
        const isFound = regionCuts(instance, graph, sets).length > 0;
        for (let op = 0; op < instance.opCount; op++) {
          const nets = instance.nets.filter(({ consumers }) => consumers.includes(op));
          if (nets.length < 2) continue;
          const isNarrow = Array.from({ length: 2 ** instance.tileCount }, (_, mask) => mask).some((mask) => {
            const { cut } = cutProblem(tiny, mask);
            const sides = sidesOf(regions, cut, sets);
            const parted = nets.filter(({ source }) => sides[source] === INSIDE && sides[op] === OUTSIDE);
            return parted.length === nets.length && parted.length > cut.channelsOut;
          });
          if (isNarrow) {
            narrow++;
            expect(isFound).toBe(true);
          }
        }
      }),
      { seed: 55, numRuns: 300 },
    );
    expect(narrow).toBeGreaterThan(10);
  });
});
