import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import { buildInstance, hopsBetween, type PlacementInstance, withinReach } from '@/lib/solver/instance';
import { filterCandidates, type LossRule } from '@/lib/solver/presolve/filter-candidates';
import { type Presolved, presolve } from '@/lib/solver/presolve/presolve';
import { tileSets } from '@/lib/solver/presolve/tile-sets';
import { tilesInReach } from '@/lib/solver/presolve/tiles-in-reach';
import { type CheckedProblem, checkProblem } from '@/lib/solver/problem';
import { everyPlacement } from './exhaustive';
import { oddCaseArb } from './odd-cases';
import { type TinyCase, tinyCaseArb } from './tiny-cases';

interface Tried {
  tiny: TinyCase;
  problem: CheckedProblem;
  instance: PlacementInstance;
  presolved: Presolved;
  /** Tiles of each op in every legal mapping. */
  used: Set<number>[];
  isLegal: boolean;
}

function checkedCase(tiny: TinyCase): { problem: CheckedProblem; instance: PlacementInstance } {
  const checked = checkProblem(tiny);
  if (!checked.ok) throw new Error(checked.error.messages.join('\n'));
  const { kernel, graph, pins, objective } = checked.value;
  return { problem: checked.value, instance: buildInstance(kernel, graph, pins, objective) };
}

function tried(tiny: TinyCase): Tried {
  const { problem, instance } = checkedCase(tiny);
  const { kernel, graph, pins, objective } = problem;
  const placements = everyPlacement(kernel, tiny.fabric, pins, objective);
  const used = kernel.ops.map(
    (op) => new Set(placements.map(({ placement }) => graph.tileIndex(placement[op.id] ?? ''))),
  );
  return {
    tiny,
    problem,
    instance,
    presolved: presolve(problem, instance),
    used,
    isLegal: placements.length > 0,
  };
}

/** Tiles that legal mappings use and that are not among the candidates. */
const lostTiles = (used: readonly Set<number>[], candidates: readonly (readonly number[])[]) =>
  used.flatMap((tiles, op) =>
    [...tiles].filter((tile) => !candidates[op]?.includes(tile)).map((tile) => [op, tile]),
  );

describe('presolve against trying everything, on 2,500 tiny cases', () => {
  const cases = [
    ...fc.sample(oddCaseArb, { seed: 40261, numRuns: 2000 }),
    ...fc.sample(tinyCaseArb, { seed: 40262, numRuns: 500 }),
  ];
  const all: Tried[] = [];
  beforeAll(() => {
    for (const tiny of cases) all.push(tried(tiny));
  }, 120_000);

  it('strikes out no tile that a legal mapping uses', () => {
    const wrong = all.flatMap(({ tiny, presolved, used }) =>
      presolved.kind === 'open' && lostTiles(used, presolved.instance.candidates).length > 0 ? [tiny] : [],
    );
    expect(wrong).toEqual([]);
  });

  it('says infeasible only where nothing is legal', () => {
    const wrong = all.filter(({ presolved, isLegal }) => presolved.kind === 'infeasible' && isLegal);
    expect(wrong.map(({ tiny, presolved }) => ({ tiny, presolved }))).toEqual([]);
  });

  it('names ops, tiles and connections of the problem, at least one of them, and says what to do', () => {
    for (const { problem, presolved } of all) {
      if (presolved.kind === 'open') continue;
      const { opIds, tileIds, edgeIds, message } = presolved.explanation;
      const { kernel, graph } = problem;
      expect(opIds.length).toBeGreaterThan(0);
      expect(opIds.filter((id) => !kernel.ops.some((op) => op.id === id))).toEqual([]);
      expect(tileIds.filter((id) => graph.tileIndex(id) < 0)).toEqual([]);
      expect(edgeIds.filter((id) => !kernel.edges.some((edge) => edge.id === id))).toEqual([]);
      expect(new Set(opIds).size + new Set(tileIds).size).toBe(opIds.length + tileIds.length);
      expect(message).toMatch(/ (add|Add|lengthen|Lengthen|join|unpin|pin|move)/);
    }
  });

  it('meets every rule and every reason often enough', () => {
    const struck = new Map<LossRule, number>();
    const said = new Map<string, number>();
    const count = <K>(tally: Map<K, number>, key: K) => tally.set(key, (tally.get(key) ?? 0) + 1);
    for (const { instance, problem, presolved } of all) {
      const { losses } = filterCandidates(instance, problem.graph);
      for (const rule of new Set([...losses.values()].flat().map((loss) => loss.rule))) count(struck, rule);
      if (presolved.kind === 'open') count(said, 'open');
      else count(said, wordsOf(presolved.explanation.message));
    }
    for (const rule of ['inputs', 'output', 'reach', 'taken'] as const) {
      expect(struck.get(rule) ?? 0, rule).toBeGreaterThan(50);
    }
    for (const [words, least] of [
      ['cannot stand', 40],
      ['as others', 40],
      ['have to lead', 10],
      ['are divided between', 5],
      ['open', 1000],
    ] as const) {
      expect(said.get(words) ?? 0, words).toBeGreaterThanOrEqual(least);
    }
  });
});

const wordsOf = (message: string): string =>
  ['cannot stand', 'have to lead', 'are divided between', 'as others'].find((words) =>
    message.includes(words),
  ) ?? 'another reason';

describe('the filter', () => {
  it('ended early, has struck out some of what it strikes out in the end', () => {
    let fewer = 0;
    fc.assert(
      fc.property(oddCaseArb, fc.nat(40), (tiny, workLimit) => {
        const { problem, instance } = checkedCase(tiny);
        const [early, late] = [workLimit, 1e7].map((limit) =>
          filterCandidates(instance, problem.graph, limit),
        );
        // Emptied, it ends at once, with more or less struck out.
        fc.pre(late?.emptied === null);
        expect(early?.emptied).toBeNull();
        late?.candidates.forEach((tiles, op) => {
          expect(tiles.filter((tile) => !early?.candidates[op]?.includes(tile))).toEqual([]);
        });
        if ((early?.struckOut ?? 0) < (late?.struckOut ?? 0)) fewer++;
      }),
      { seed: 40263, numRuns: 500 },
    );
    expect(fewer).toBeGreaterThan(20);
  });

  it('finds nothing more when it is asked again', () => {
    fc.assert(
      fc.property(oddCaseArb, (tiny) => {
        const { problem, instance } = checkedCase(tiny);
        const once = filterCandidates(instance, problem.graph);
        fc.pre(once.emptied === null);
        const twice = filterCandidates({ ...instance, candidates: once.candidates }, problem.graph);
        expect([twice.struckOut, twice.emptied]).toEqual([0, null]);
      }),
      { seed: 40264, numRuns: 500 },
    );
  });
});

describe('the tiles in reach of a set', () => {
  it('are those from which another tile of it is within the hops that distances allow', () => {
    fc.assert(
      fc.property(oddCaseArb, fc.integer({ min: 0, max: 63 }), (tiny, mask) => {
        const { problem, instance } = checkedCase(tiny);
        const tiles = Array.from({ length: instance.tileCount }, (_, tile) => tile);
        const set = tiles.filter((tile) => (mask >> tile) % 2 === 1);
        const sets = tileSets(instance.tileCount);
        const reach = tilesInReach(sets, problem.graph, instance.maxHops);
        const isJoined = (from: number, to: number) =>
          from !== to && withinReach(instance, hopsBetween(instance, from, to));
        expect(sets.tiles(reach.of(sets.of(set), 'after'))).toEqual(
          tiles.filter((tile) => set.some((other) => isJoined(other, tile))),
        );
        expect(sets.tiles(reach.of(sets.of(set), 'before'))).toEqual(
          tiles.filter((tile) => set.some((other) => isJoined(tile, other))),
        );
      }),
      { seed: 40265, numRuns: 1000 },
    );
  });
});
