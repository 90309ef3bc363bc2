import fc from 'fast-check';
import loadHighs from 'highs';
import { beforeAll, describe, expect, it } from 'vitest';
import { netTasks } from '@/lib/solver/routing/net-tasks';
import { routePlacement } from '@/lib/solver/routing/route-nets';
import { type RandomMapping, randomMapping } from '../../property/mapping/random-mapping';

/**
 * All nets at once as an integer program, in CPLEX-LP text: x(n, l) says that net n takes link l; a unit of flow
 * f(n, k, l) from its source to each consumer k runs on these links only; a link has its channels, a flow its hops.
 */
function jointProgram({ kernel, graph, placement }: RandomMapping): string {
  const rows: string[] = [];
  const nets: string[] = [];
  const linkSum = (name: (link: number) => string): string =>
    graph.links.map((_, link) => `+ ${name(link)}`).join(' ');
  const tasks = netTasks(kernel, graph, placement);
  tasks.forEach((task, n) => {
    graph.links.forEach((_, link) => {
      nets.push(`x${n}_${link}`);
    });
    task.targets.forEach((target, k) => {
      const flow = (link: number): string => `f${n}_${k}_${link}`;
      graph.links.forEach((_, link) => {
        rows.push(`${flow(link)} - x${n}_${link} <= 0`);
      });
      for (let tile = 0; tile < graph.tileCount; tile++) {
        const out = (graph.outLinks[tile] ?? []).map((link) => `+ ${flow(link)}`);
        const into = (graph.inLinks[tile] ?? []).map((link) => `- ${flow(link)}`);
        const balance = tile === task.sourceTile ? 1 : tile === target ? -1 : 0;
        rows.push(`${[...out, ...into].join(' ')} = ${balance}`);
      }
      if (graph.maxHops !== null) rows.push(`${linkSum(flow)} <= ${graph.maxHops}`);
    });
  });
  graph.links.forEach((link, i) => {
    rows.push(`${tasks.map((_, n) => `+ x${n}_${i}`).join(' ')} <= ${link.channels}`);
  });
  return [
    'Minimize',
    ` obj: ${nets.join(' + ')}`,
    'Subject To',
    ...rows.map((row, i) => ` c${i}: ${row}`),
    'Binary',
    ...nets.map((name) => ` ${name}`),
    'End',
    '',
  ].join('\n');
}

const crowded = fc
  .sample(randomMapping({ channels: 1, ops: 9 }), { seed: 33, numRuns: 120 })
  .filter(({ kernel, graph, placement }) =>
    netTasks(kernel, graph, placement).some((task) => task.targets.length > 1),
  );

describe('routing all nets at once, against an integer program solved by HiGHS', () => {
  const results: { legal: boolean; wireHops: number; optimum: number | null }[] = [];

  beforeAll(async () => {
    const highs = await loadHighs();
    for (const mapping of crowded) {
      const found = routePlacement(mapping.kernel, mapping.graph, mapping.placement);
      const solved = highs.solve(jointProgram(mapping));
      if (solved.Status !== 'Optimal' && solved.Status !== 'Infeasible') throw new Error(solved.Status);
      results.push({
        legal: found.overfullLinks.length + found.tooLongEdges.length === 0,
        wireHops: found.nets.reduce((sum, net) => sum + net.wireHops, 0),
        optimum: solved.Status === 'Optimal' ? Math.round(solved.ObjectiveValue) : null,
      });
    }
  }, 120_000);

  it('is never finished where no legal routing exists', () => {
    const hopeless = results.filter(({ optimum }) => optimum === null);
    expect(hopeless.length).toBeGreaterThan(5);
    expect(hopeless.filter(({ legal }) => legal)).toEqual([]);
  });

  it('finds a legal routing where one exists in at least 97 of 100 cases', () => {
    const possible = results.filter(({ optimum }) => optimum !== null);
    expect(possible.length).toBeGreaterThan(30);
    expect(possible.filter(({ legal }) => legal).length).toBeGreaterThanOrEqual(possible.length * 0.97);
  });

  it('is never below the optimum, and all together at most 2 % above', () => {
    const both = results.filter(({ legal, optimum }) => legal && optimum !== null);
    for (const { wireHops, optimum } of both) expect(wireHops).toBeGreaterThanOrEqual(optimum ?? 0);
    const sum = (values: number[]): number => values.reduce((a, b) => a + b, 0);
    const optimum = sum(both.map((each) => each.optimum ?? 0));
    expect(sum(both.map((each) => each.wireHops))).toBeLessThanOrEqual(optimum * 1.02);
  });
});
