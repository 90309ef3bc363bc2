import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import { compileFabric } from '@/lib/fabric/compile';
import type { Placement } from '@/lib/mapping/mapping';
import { measureMapping, objectiveOf } from '@/lib/mapping/metrics';
import { verifyMapping } from '@/lib/mapping/verify';
import { buildInstance, type PlacementInstance, tilingOf } from '@/lib/solver/instance';
import { imageTest } from '@/lib/solver/mirror-images';
import type { EngineChoice } from '@/lib/solver/options';
import type { SolveOutcome } from '@/lib/solver/outcome';
import type { AnotherAsk } from '@/lib/solver/problem';
import { solve } from '@/lib/solver/solve';
import { everyPlacement } from './exhaustive';
import { type TinyCase, tinyCaseArb } from './tiny-cases';

function answer(
  { kernel, fabric, pins, objective }: TinyCase,
  another: AnotherAsk,
  engine: EngineChoice = 'auto',
  timeLimitMs = 20_000,
): SolveOutcome {
  const result = solve(
    { kernel, fabric, pins, objective, another },
    { engine, timeLimitMs, seed: 1, nodeLimit: null, searchTries: null },
    { nowMs: () => performance.now(), shouldStop: () => false, onProgress: () => undefined, engines: [] },
  );
  if (!result.ok) throw new Error(result.error.messages.join('\n'));
  return result.value;
}

const permutations = (count: number): number[][] =>
  count === 0
    ? [[]]
    : permutations(count - 1).flatMap((rest) =>
        Array.from({ length: count }, (_, at) => [...rest.slice(0, at), count - 1, ...rest.slice(at)]),
      );
const allOf = Array.from({ length: 7 }, (_, count) => permutations(count));

/** The definition word by word: distances, links with channels, and each op's tiles. */
function fabricGroup(tiny: TinyCase, { tileCount, distance, candidates }: PlacementInstance): number[][] {
  const { links } = compileFabric(tiny.fabric);
  const text = (name: (tile: number) => number): string =>
    [
      ...links.map(({ from, to, channels }) => `link ${name(from)} ${name(to)} ${channels}`),
      ...candidates.flatMap((tiles, op) => tiles.map((tile) => `op ${op} on ${name(tile)}`)),
      ...[...distance].map(
        (hops, i) => `${name(Math.floor(i / tileCount))} to ${name(i % tileCount)}: ${hops}`,
      ),
    ]
      .sort()
      .join('\n');
  const same = text((tile) => tile);
  return (allOf[tileCount] as number[][]).filter((image) => text((tile) => image[tile] as number) === same);
}

/** Ops that may stand on the same tiles and are connected alike: nets for `wire`, numbers of connections for `path`. */
function kernelGroup(tiny: TinyCase, { opCount, candidates, objective }: PlacementInstance): number[][] {
  const { ops, edges } = tiny.kernel;
  const index = new Map<string, number>(ops.map((op, i) => [op.id, i]));
  const ends = edges
    .map((edge) => [index.get(edge.from) as number, index.get(edge.to) as number] as const)
    .filter(([from, to]) => from !== to);
  const text = (name: (op: number) => number): string => {
    const lines = ends.map(([from, to]) => `${name(from)} to ${name(to)}`);
    return [
      ...(objective === 'wire' ? new Set(lines) : lines),
      ...candidates.map((tiles, op) => `${name(op)} on ${tiles.join()}`),
    ]
      .sort()
      .join('\n');
  };
  const same = text((op) => op);
  return (allOf[opCount] as number[][]).filter((image) => text((op) => image[op] as number) === same);
}

/** For each placement, as text of its tiles, the number of its orbit. */
function orbitsOf(tiny: TinyCase, placements: readonly Placement[]): Map<string, number> {
  const graph = compileFabric(tiny.fabric);
  const instance = buildInstance(tiny.kernel, graph, tiny.pins, tiny.objective);
  const [tileImages, opImages] = [fabricGroup(tiny, instance), kernelGroup(tiny, instance)];
  const orbits = new Map<string, number>();
  let count = 0;
  for (const placement of placements) {
    const tiling = tilingOf(tiny.kernel, graph, placement) as Int32Array;
    if (orbits.has(tiling.join())) continue;
    for (const tileImage of tileImages) {
      for (const opImage of opImages) {
        const image = Array.from(tiling, (_, op) => tileImage[tiling[opImage[op] as number] as number]);
        orbits.set(image.join(), count);
      }
    }
    count++;
  }
  return orbits;
}

const orbitCount = (orbits: ReadonlyMap<string, number>): number => new Set(orbits.values()).size;

/** Asks again and again, avoiding all answers so far, until the answer is that there is none. */
function everyAnswer(tiny: TinyCase, objectiveValue: number): { found: SolveOutcome[]; end: SolveOutcome } {
  const found: SolveOutcome[] = [];
  for (;;) {
    const than = found.flatMap(({ placement }) => placement ?? []);
    const outcome = answer(tiny, { objectiveValue, than });
    if (outcome.placement === null || found.length === 50) return { found, end: outcome };
    found.push(outcome);
  }
}

interface Asked {
  tiny: TinyCase;
  /** The least objective, and half of the time one more. */
  objectiveValue: number;
  found: SolveOutcome[];
  end: SolveOutcome;
  /** Of all placements of at most that objective: every one, and each one's orbit. */
  orbits: Map<string, number>;
  optimum: number;
}

describe('another of at most that cost, against trying everything, on tiny cases', () => {
  const all: Asked[] = [];
  beforeAll(() => {
    for (const [i, tiny] of fc.sample(tinyCaseArb, { seed: 51_201, numRuns: 250 }).entries()) {
      const { kernel, fabric, pins, objective } = tiny;
      const every = everyPlacement(kernel, fabric, pins, objective);
      if (every.length === 0) continue;
      const optimum = Math.min(...every.map(({ cost }) => cost));
      const objectiveValue = optimum + (i % 2);
      const cheap = every.filter(({ cost }) => cost <= objectiveValue);
      const orbits = orbitsOf(
        tiny,
        cheap.map(({ placement }) => placement),
      );
      // More than 50 placements are not taken as ones to avoid.
      if (orbitCount(orbits) > 50) continue;
      all.push({ tiny, objectiveValue, ...everyAnswer(tiny, objectiveValue), orbits, optimum });
    }
  }, 240_000);

  it('finds one of each orbit, and then proves that there is no other', () => {
    const said = all.map(({ found, end }) => [found.length, end.explanation?.code ?? end.status]);
    expect(said).toEqual(all.map(({ orbits }) => [orbitCount(orbits), 'no other']));
  });

  it('never answers with an image of one that is to be avoided', () => {
    const repeated = all.flatMap(({ tiny, found, orbits }) => {
      const graph = compileFabric(tiny.fabric);
      const numbers = found.map(({ placement }) =>
        orbits.get(tilingOf(tiny.kernel, graph, placement ?? {})?.join() ?? ''),
      );
      return new Set(numbers).size === numbers.length ? [] : [{ tiny, numbers }];
    });
    expect(repeated).toEqual([]);
  });

  it('answers with legal mappings of at most that cost, and with bounds that hold', () => {
    const wrong = all.flatMap(({ tiny, found, objectiveValue, optimum }) => {
      const { kernel, fabric, pins, objective } = tiny;
      return found.filter(({ placement, routes, objectiveValue: value, bound, status }) => {
        if (!placement || !routes || value === null || bound === null) return true;
        const measured = objectiveOf(
          measureMapping(kernel, compileFabric(fabric), { placement, routes }),
          objective,
        );
        const isLegal = verifyMapping(kernel, fabric, { placement, routes, pins }).length === 0;
        const isHonest = bound <= optimum && (status === 'optimal') === (value === bound);
        return !(isLegal && isHonest && value === measured && value <= objectiveValue);
      });
    });
    expect(wrong).toEqual([]);
  });

  it('meets cases with one orbit, with many, with pins and with both objectives', () => {
    const counts = all.map(({ orbits }) => orbitCount(orbits));
    expect(counts).toContain(1);
    expect(Math.max(...counts)).toBeGreaterThan(8);
    expect(all.length).toBeGreaterThan(100);
    for (const objective of ['wire', 'path']) {
      const some = all.filter(({ tiny }) => tiny.objective === objective);
      expect(some.some(({ tiny }) => Object.keys(tiny.pins).length > 0)).toBe(true);
      expect(some.some(({ found }) => found.some(({ status }) => status === 'optimal'))).toBe(true);
    }
  });
});

describe('the image test', () => {
  it('says of every two cheap placements what the permutations of all tiles and ops say', () => {
    fc.assert(
      fc.property(tinyCaseArb, fc.nat(1000), fc.nat(1000), (tiny, first, second) => {
        const { kernel, fabric, pins, objective } = tiny;
        const every = everyPlacement(kernel, fabric, pins, objective);
        fc.pre(every.length > 0);
        const [a, b] = [first, second].map((n) => every[n % every.length]?.placement as Placement) as [
          Placement,
          Placement,
        ];
        const graph = compileFabric(fabric);
        const instance = buildInstance(kernel, graph, pins, objective);
        const [from, to] = [a, b].map((one) => tilingOf(kernel, graph, one) as Int32Array) as [
          Int32Array,
          Int32Array,
        ];
        expect(imageTest(instance, graph.links, [from])(to)).toBe(orbitsOf(tiny, [a]).has(to.join()));
      }),
      { seed: 51_202, numRuns: 300 },
    );
  });
});

it('the search alone never claims that there is no other', () => {
  const seen = new Set<string>();
  fc.assert(
    fc.property(tinyCaseArb, (tiny) => {
      const { kernel, fabric, pins, objective } = tiny;
      const every = everyPlacement(kernel, fabric, pins, objective);
      fc.pre(every.length > 0);
      const objectiveValue = Math.min(...every.map(({ cost }) => cost));
      const than = every.filter(({ cost }) => cost === objectiveValue).slice(0, 50);
      const outcome = answer(
        tiny,
        { objectiveValue, than: than.map(({ placement }) => placement) },
        'search',
        200,
      );
      seen.add(outcome.status);
      expect(outcome.explanation).toBeNull();
    }),
    { seed: 51_203, numRuns: 15 },
  );
  expect(seen).toContain('unknown');
});
