import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { compileFabric } from '@/lib/fabric/compile';
import { fabricSymmetries, kernelSymmetries } from '@/lib/solver/exact/symmetry';
import { buildInstance, type PlacementInstance } from '@/lib/solver/instance';
import { tinyCaseArb } from './tiny-cases';

type Link = { from: number; to: number; channels: number };
type Image = readonly number[];

const FIXED = { seed: 4711, numRuns: 600 };

const permutations = (count: number): Image[] =>
  count === 0
    ? [[]]
    : permutations(count - 1).flatMap((rest) =>
        Array.from({ length: count }, (_, at) => [...rest.slice(0, at), count - 1, ...rest.slice(at)]),
      );
const allOf = Array.from({ length: 7 }, (_, count) => permutations(count));

/** The definition itself, word by word: distances, candidates and the links as sorted text. */
function keepsFabric(
  { tileCount, distance, candidates }: PlacementInstance,
  links: readonly Link[],
  image: Image,
): boolean {
  const at = (tile: number): number => image[tile] as number;
  for (let p = 0; p < tileCount; p++) {
    for (let q = 0; q < tileCount; q++) {
      if (distance[p * tileCount + q] !== distance[at(p) * tileCount + at(q)]) return false;
    }
  }
  if (!candidates.every((tiles) => tiles.every((tile) => tiles.includes(at(tile))))) return false;
  const text = (name: (tile: number) => number): string =>
    links
      .map(({ from, to, channels }) => `${name(from)} ${name(to)} ${channels}`)
      .sort()
      .join();
  return text(at) === text((tile) => tile);
}

function keepsKernel({ objective, pairs, nets, candidates }: PlacementInstance, image: Image): boolean {
  const text = (name: (op: number) => number): string => {
    const lines = candidates.map((tiles, op) => `candidates ${name(op)} ${tiles.join()}`);
    for (const { from, to, weight } of pairs) {
      lines.push(`pair ${name(from)} ${name(to)} ${objective === 'path' ? weight : ''}`);
    }
    for (const { source, consumers, weight } of objective === 'wire' ? nets : []) {
      lines.push(`net ${name(source)} ${[...new Set(consumers.map(name))].sort().join()} ${weight}`);
    }
    return lines.sort().join('\n');
  };
  return text((op) => image[op] as number) === text((op) => op);
}

const identity = (count: number): Image => Array.from({ length: count }, (_, i) => i);
const asText = (images: Iterable<ArrayLike<number>>): string[] =>
  [...images].map((image) => Array.from(image).join()).sort();

/** A random permutation, to make random data symmetric with: what is drawn for one pair holds for all its images. */
const turnArb = (count: number) => fc.shuffledSubarray([...identity(count)], { minLength: count });

function imagesUnder<T>(turn: Image, start: T, move: (value: T) => T): T[] {
  const found = new Map<string, T>();
  for (let at = start; !found.has(JSON.stringify(at)); at = move(at)) found.set(JSON.stringify(at), at);
  return turn.length === 0 ? [] : [...found.values()];
}

const nothing: PlacementInstance = {
  tileCount: 0,
  rows: 1,
  cols: 0,
  distance: new Uint16Array(),
  maxHops: null,
  objective: 'path',
  opCount: 0,
  candidates: [],
  pairs: [],
  nets: [],
  isPlainMesh: false,
};

/** Up to six tiles with any table of distances, links that may run side by side, and three ops' candidates. */
const fabricArb = fc.integer({ min: 1, max: 6 }).chain((count) =>
  fc
    .record({
      turn: turnArb(count),
      isTurned: fc.integer({ min: 0, max: 3 }).map((n) => n > 0),
      hops: fc.array(fc.tuple(fc.nat(count - 1), fc.nat(count - 1), fc.nat(2)), { maxLength: 8 }),
      links: fc.array(fc.tuple(fc.nat(count - 1), fc.nat(count - 1), fc.integer({ min: 1, max: 2 })), {
        maxLength: 6,
      }),
      candidates: fc.array(fc.array(fc.nat(count - 1), { maxLength: 2 }), { maxLength: 3 }),
    })
    .map(({ turn, isTurned, hops, links, candidates }) => {
      const to = (tile: number): number => (isTurned ? (turn[tile] as number) : tile);
      const distance = new Uint16Array(count * count).fill(1);
      for (const [from, onto, value] of hops) {
        for (const [p, q] of imagesUnder(turn, [from, onto], ([a, b]) => [
          to(a as number),
          to(b as number),
        ])) {
          distance[(p as number) * count + (q as number)] = value;
        }
      }
      const allLinks = links.flatMap(([from, onto, channels]) =>
        imagesUnder<Link>(turn, { from, to: onto, channels }, (link) => ({
          ...link,
          from: to(link.from),
          to: to(link.to),
        })),
      );
      const tiles = candidates.map((some) =>
        [...new Set(some.flatMap((tile) => imagesUnder(turn, tile, to)))].sort((a, b) => a - b),
      );
      const instance: PlacementInstance = {
        ...nothing,
        tileCount: count,
        cols: count,
        distance,
        opCount: tiles.length,
        candidates: tiles,
      };
      return { instance, links: allLinks };
    }),
);

/** The problems that people have: meshes, tori and diagonal links, mixed units, missing links. */
const realFabricArb = tinyCaseArb.map(({ kernel, fabric, pins, objective }) => {
  const graph = compileFabric(fabric);
  return { instance: buildInstance(kernel, graph, pins, objective), links: [...graph.links] };
});

/** Up to six ops with weighted pairs and nets, also several nets of one source. */
const kernelArb: fc.Arbitrary<PlacementInstance> = fc.integer({ min: 1, max: 6 }).chain((count) =>
  fc
    .record({
      turn: turnArb(count),
      isTurned: fc.integer({ min: 0, max: 3 }).map((n) => n > 0),
      objective: fc.constantFrom('path' as const, 'wire' as const),
      pairs: fc.array(fc.tuple(fc.nat(count - 1), fc.nat(count - 1), fc.integer({ min: 1, max: 2 })), {
        maxLength: 4,
      }),
      nets: fc.array(
        fc.tuple(
          fc.nat(count - 1),
          fc.array(fc.nat(count - 1), { minLength: 1, maxLength: 3 }),
          fc.integer({ min: 1, max: 2 }),
        ),
        { maxLength: 4 },
      ),
      odd: fc.option(fc.nat(count - 1), { freq: 3 }),
    })
    .map(({ turn, isTurned, objective, pairs, nets, odd }) => {
      const to = (op: number): number => (isTurned ? (turn[op] as number) : op);
      const weightOf = new Map<string, number>();
      for (const [from, onto, weight] of pairs) {
        if (from === onto) continue;
        for (const ends of imagesUnder(turn, [from, onto], ([a, b]) => [to(a as number), to(b as number)])) {
          weightOf.set(ends.join(), weight);
        }
      }
      const oddOps = odd === null ? [] : imagesUnder(turn, odd, to);
      return {
        ...nothing,
        objective,
        opCount: count,
        tileCount: 2,
        candidates: [...identity(count)].map((op) => (oddOps.includes(op) ? [1] : [0, 1])),
        pairs: [...weightOf].map(([ends, weight]) => {
          const [from, onto] = ends.split(',').map(Number) as [number, number];
          return { from, to: onto, weight };
        }),
        nets: nets.flatMap(([source, some, weight]) =>
          imagesUnder(turn, { source, consumers: [...new Set(some)].sort() }, (net) => ({
            source: to(net.source),
            consumers: net.consumers.map(to).sort(),
          })).map((net) => ({ ...net, weight })),
        ),
      };
    }),
);

const realKernelArb = realFabricArb.map(({ instance }) => instance);

describe('the symmetries of a fabric against all permutations', () => {
  it.each([
    ['any table', fabricArb],
    ['real fabrics', realFabricArb],
  ])('%s of up to six tiles: the list is the group, the identity first', (_, arb) => {
    const orders = new Set<number>();
    fc.assert(
      fc.property(arb, ({ instance, links }) => {
        const { tileCount } = instance;
        const group = (allOf[tileCount] as Image[]).filter((image) => keepsFabric(instance, links, image));
        orders.add(group.length);
        const found = fabricSymmetries(instance, links, 720);
        expect(asText(found)).toEqual(asText(group));
        expect([...(found[0] as Int32Array)]).toEqual(identity(tileCount));
      }),
      FIXED,
    );
    // Asymmetric ones, mirrored ones and some with more.
    for (const order of [1, 2, 4]) expect(orders).toContain(order);
    expect(Math.max(...orders)).toBeGreaterThan(7);
  });

  it('any limit: a group of at most so many, each of which keeps everything', () => {
    let cutShort = 0;
    fc.assert(
      fc.property(fabricArb, fc.integer({ min: 1, max: 30 }), ({ instance, links }, limit) => {
        const found = fabricSymmetries(instance, links, limit);
        expect(found.length).toBeLessThanOrEqual(limit);
        const texts = asText(found);
        expect(new Set(texts).size).toBe(found.length);
        const products = found.flatMap((outer) => found.map((inner) => inner.map((t) => outer[t] as number)));
        expect([...new Set(asText(products))]).toEqual(texts);
        for (const image of found) expect(keepsFabric(instance, links, [...image])).toBe(true);
        if (found.length < fabricSymmetries(instance, links, 720).length) cutShort++;
      }),
      FIXED,
    );
    expect(cutShort).toBeGreaterThan(10);
  });
});

describe('the symmetries of a kernel against all permutations', () => {
  it.each([
    // Chains and rings that move as a whole; real kernels so small have none.
    ['any pairs and nets', kernelArb, ['path true true', 'wire true true']],
    ['real kernels', realKernelArb, []],
  ])(
    '%s of up to six ops: each op is taken wherever a symmetry can take it, by one that moves the fewest',
    (_, arb, more) => {
      const met = new Set<string>();
      fc.assert(
        fc.property(arb, (instance) => {
          const { opCount, objective } = instance;
          const group = (allOf[opCount] as Image[]).filter((image) => keepsKernel(instance, image));
          const found = kernelSymmetries(instance, 10_000);
          const groupTexts = new Set(asText(group));
          expect(asText(found).filter((text) => !groupTexts.has(text))).toEqual([]);
          expect(new Set(asText(found)).size).toBe(found.length);
          expect(asText(found)).not.toContain(identity(opCount).join());
          const ways = fewestMoved(found);
          const truth = fewestMoved(group);
          expect([...ways.keys()].sort()).toEqual([...truth.keys()].sort());
          expect([...ways].filter(([way, moved]) => moved !== truth.get(way))).toEqual([]);
          met.add(`${objective} ${group.length > 1} ${Math.max(0, ...ways.values()) > 2}`);
        }),
        FIXED,
      );
      const kinds = ['path false false', 'wire false false', 'path true false', 'wire true false', ...more];
      expect(kinds.filter((kind) => !met.has(kind))).toEqual([]);
    },
  );

  it('any limit: no more than that, and the orbits are whole if the limit allows for their joins', () => {
    fc.assert(
      fc.property(kernelArb, fc.nat(6), (instance, limit) => {
        const all = kernelSymmetries(instance, 10_000);
        const some = kernelSymmetries(instance, limit);
        expect(some.length).toBeLessThanOrEqual(limit);
        const orbits = orbitCount(instance.opCount, all);
        if (limit >= instance.opCount - orbits) {
          expect(orbitCount(instance.opCount, some)).toBe(orbits);
        }
      }),
      FIXED,
    );
  });
});

/** For each op and each other one that it is taken to: how many ops move at least. */
function fewestMoved(images: readonly ArrayLike<number>[]): Map<string, number> {
  const fewest = new Map<string, number>();
  for (const image of images) {
    const moved = Array.from(image, (to, op) => [op, to]).filter(([op, to]) => op !== to);
    for (const way of moved) {
      const key = way.join('>');
      fewest.set(key, Math.min(fewest.get(key) ?? Number.POSITIVE_INFINITY, moved.length));
    }
  }
  return fewest;
}

function orbitCount(opCount: number, images: readonly Int32Array[]): number {
  const orbit = [...identity(opCount)];
  for (const image of images) {
    image.forEach((to, op) => {
      const [old, kept] = [orbit[to], orbit[op] as number];
      for (let i = 0; i < opCount; i++) if (orbit[i] === old) orbit[i] = kept;
    });
  }
  return new Set(orbit).size;
}
