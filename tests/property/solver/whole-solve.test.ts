import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import { verifyMapping } from '@/lib/mapping/verify';
import { defaultSolveOptions } from '@/lib/solver/options';
import type { SolveOutcome, SolveProgress } from '@/lib/solver/outcome';
import { solve } from '@/lib/solver/solve';
import { exhaustiveOptimum } from './exhaustive';
import { oddCaseArb } from './odd-cases';
import type { TinyCase } from './tiny-cases';

interface Solved {
  outcome: SolveOutcome;
  reports: SolveProgress[];
  /** How often the solve has asked whether it should stop. */
  looks: number;
}

/** All passes as they are by default. The clock stands still, so that nothing depends on the machine. */
function solved({ kernel, fabric, pins, objective }: TinyCase, stopAfter = Number.POSITIVE_INFINITY): Solved {
  const reports: SolveProgress[] = [];
  let looks = 0;
  const result = solve({ kernel, fabric, pins, objective }, defaultSolveOptions, {
    nowMs: () => 0,
    shouldStop: () => ++looks > stopAfter,
    onProgress: (progress) => reports.push(progress),
    engines: [],
  });
  if (!result.ok) throw new Error(result.error.messages.join('\n'));
  return { outcome: result.value, reports, looks };
}

const broken = ({ kernel, fabric, pins }: TinyCase, { placement, routes }: SolveOutcome) =>
  placement === null ? [] : verifyMapping(kernel, fabric, { placement, routes, pins });

const roomy = ({ kernel, fabric, pins, objective }: TinyCase): number | null =>
  exhaustiveOptimum(kernel, { ...fabric, channels: 16, linkChannels: {} }, pins, objective);

describe('the whole solve against trying everything, on 2,000 odd cases', () => {
  const cases = fc.sample(oddCaseArb, { seed: 60261, numRuns: 2000 });
  const all: { tiny: TinyCase; truth: number | null; answer: Solved }[] = [];
  beforeAll(() => {
    for (const tiny of cases) {
      const { kernel, fabric, pins, objective } = tiny;
      all.push({ tiny, truth: exhaustiveOptimum(kernel, fabric, pins, objective), answer: solved(tiny) });
    }
  }, 240_000);

  it('finds the optimum and proves it, or says infeasible where nothing is legal', () => {
    const said = all.map(({ answer: { outcome } }) =>
      outcome.status === 'optimal' ? outcome.objectiveValue : outcome.status,
    );
    expect(said).toEqual(all.map(({ truth }) => truth ?? 'infeasible'));
  });

  it('returns mappings that the verifier passes', () => {
    expect(all.flatMap(({ tiny, answer }) => broken(tiny, answer.outcome))).toEqual([]);
  });

  it('reports bounds that only rise and objectives that only fall, and neither passes the optimum', () => {
    let rises = 0;
    for (const { truth, answer } of all) {
      const bounds = answer.reports.map((report) => report.bound);
      const values = answer.reports.map((report) => report.best?.objectiveValue ?? Number.POSITIVE_INFINITY);
      expect(bounds).toEqual(bounds.toSorted((a, b) => a - b));
      expect(values).toEqual(values.toSorted((a, b) => b - a));
      if (truth === null) continue;
      expect(Math.max(...bounds)).toBeLessThanOrEqual(truth);
      expect(Math.min(...values)).toBeGreaterThanOrEqual(truth);
      if (new Set(bounds).size > 2) rises++;
    }
    expect(rises).toBeGreaterThan(50);
  });

  it('meets every sort of case, legal and not', () => {
    const sorts: Record<string, (tiny: TinyCase) => boolean> = {
      mesh: ({ fabric }) => fabric.topology === 'mesh',
      torus: ({ fabric }) => fabric.topology === 'torus',
      diagonal: ({ fabric }) => fabric.topology === 'diagonal',
      'links missing': ({ fabric }) => fabric.removedLinks.length > 0,
      'links added': ({ fabric }) => fabric.addedLinks.length > 0,
      'several channels': ({ fabric }) =>
        fabric.channels > 1 || Object.values(fabric.linkChannels).some((n) => n > 1),
      'a tile without a PE': ({ fabric }) => fabric.units.includes(null),
      pins: ({ pins }) => Object.keys(pins).length > 0,
      'a hop limit': ({ fabric }) => fabric.clock !== null,
      'values carried back': ({ kernel }) => kernel.edges.some((edge) => edge.distance > 0),
      wire: ({ objective }) => objective === 'wire',
      path: ({ objective }) => objective === 'path',
    };
    for (const [name, isOfIt] of Object.entries(sorts)) {
      const those = all.filter(({ tiny }) => isOfIt(tiny));
      expect(those.filter(({ truth }) => truth !== null).length, `${name}, legal`).toBeGreaterThan(50);
      expect(those.filter(({ truth }) => truth === null).length, `${name}, infeasible`).toBeGreaterThan(50);
    }
    const withRoom = all.map(({ tiny, truth }) => ({ truth, room: roomy(tiny) }));
    const lifted = withRoom.filter(({ truth, room }) => truth !== null && truth > (room ?? 0));
    const choked = withRoom.filter(({ truth, room }) => truth === null && room !== null);
    expect(lifted.length, 'congestion that lifts the optimum').toBeGreaterThan(20);
    expect(choked.length, 'congestion that leaves nothing').toBeGreaterThan(20);
    const codes = new Set(all.flatMap(({ answer }) => answer.outcome.explanation?.code ?? []));
    expect([...codes].sort()).toEqual([
      'out of reach',
      'proved by search',
      'too few channels',
      'too few tiles',
    ]);
  });
});

describe('the whole solve', () => {
  it('gives the same answer, to the route, for the same input and seed', () => {
    fc.assert(
      fc.property(oddCaseArb, (tiny) => {
        const [one, again] = [solved(tiny), solved(tiny)];
        expect(again).toEqual(one);
      }),
      { seed: 60262, numRuns: 100 },
    );
  });

  it('stopped after any look at the stop, has a legal best or none, and claims no more than is true', () => {
    const met = new Map<string, number>();
    const legal = fc.sample(oddCaseArb, { seed: 60263, numRuns: 200 }).flatMap((tiny) => {
      const { outcome, looks } = solved(tiny);
      return outcome.status === 'optimal' && looks > 40
        ? [{ tiny, looks, optimum: outcome.objectiveValue }]
        : [];
    });
    for (const { tiny, looks, optimum } of legal.slice(0, 12)) {
      // Every one of the first looks, then some all over the rest.
      const stops = [
        ...Array(40).keys(),
        ...Array.from({ length: 40 }, (_, i) => 40 + Math.floor(((looks - 40) * i) / 39)),
      ];
      for (const stopAfter of stops) {
        const { outcome } = solved(tiny, stopAfter);
        met.set(outcome.status, (met.get(outcome.status) ?? 0) + 1);
        expect(broken(tiny, outcome)).toEqual([]);
        expect(['optimal', 'feasible', 'unknown']).toContain(outcome.status);
        expect(outcome.bound).toBeLessThanOrEqual(optimum);
        expect(outcome.objectiveValue ?? optimum).toBeGreaterThanOrEqual(optimum);
        expect(outcome.placement === null).toBe(outcome.status === 'unknown');
        if (outcome.status !== 'optimal') expect(outcome.stopReason).toBe('stopped');
      }
    }
    for (const status of ['unknown', 'feasible', 'optimal'])
      expect(met.get(status) ?? 0, status).toBeGreaterThan(5);
  });
});
