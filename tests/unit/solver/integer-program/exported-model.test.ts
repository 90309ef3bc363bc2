import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { LinkId, TileId } from '@/lib/fabric/fabric';
import type { Kernel, OpId } from '@/lib/graph/kernel';
import type { Placement, Routes } from '@/lib/mapping/mapping';
import { verifyMapping } from '@/lib/mapping/verify';
import { exhaustiveOptimum } from '../../../property/solver/exhaustive';
import { type Case, cases, longName, random, randomWeighted, textOf } from './exported-cases';
import { type OutsideSolvers, outsideSolvers, textFormats } from './outside-solvers';

let solvers: OutsideSolvers;
beforeAll(async () => {
  solvers = await outsideSolvers();
});
afterAll(() => solvers.remove());

describe('the exported model, read by GLPK, CBC and HiGHS', { timeout: 30_000 }, () => {
  it.each([...cases, ...random])('%s: %s', async (...one) => {
    const [, expected, kernel, fabric, pins, objective, weights] = one;
    expect(exhaustiveOptimum(kernel, fabric, pins, objective, weights) ?? 'infeasible').toBe(expected);
    const runs = textFormats.map((format) => solvers.answers(textOf(one, format), format));
    const all = { glpk: expected, cbc: expected, highs: expected };
    expect(await Promise.all(runs)).toEqual([all, all]);
  });

  it.each(randomWeighted)('%s: %s', async (...one) => {
    const [, expected] = one;
    const runs = textFormats.map((format) => solvers.answers(textOf(one, format), format));
    for (const answer of (await Promise.all(runs)).flatMap((run) => Object.values(run))) {
      if (expected === 'infeasible') expect(answer).toBe(expected);
      else expect(answer).toBeCloseTo(expected, 6);
    }
  });

  it('meets both ends among the random cases', () => {
    const ends = random.map(([, expected]) => expected === 'infeasible');
    expect(ends.filter((end) => end).length).toBeGreaterThanOrEqual(3);
    expect(ends.filter((end) => !end).length).toBeGreaterThanOrEqual(3);
  });
});

describe('names in the exported model', () => {
  /** Rows with their sides, columns; from the MPS text, which lists them. */
  const namesIn = (text: string) => {
    const section = (from: string, to: string) =>
      text
        .slice(text.indexOf(`\n${from}\n`), text.indexOf(`\n${to}\n`))
        .split('\n')
        .slice(2);
    const columns = section('COLUMNS', 'RHS').flatMap((line) =>
      line.includes("'MARKER'") ? [] : [line.trim().split(' ')[0] ?? ''],
    );
    return {
      rows: section('ROWS', 'COLUMNS').map((line) => line.trim().split(' ')[1] ?? ''),
      // A column is listed once for each entry, in one run.
      columns: columns.filter((name, i) => name !== columns[i - 1]),
    };
  };

  it.each(cases)('are legal in LP and MPS, below 100 characters and unique: %s', (...one) => {
    const { rows, columns } = namesIn(textOf(one, 'mps'));
    for (const names of [rows, columns]) expect(new Set(names).size).toBe(names.length);
    // What LP text allows at a name's begin leaves out digits, a dot, and e, which may be taken for an exponent.
    const illegal = [...rows, ...columns].filter((name) => !/^[a-df-zA-Z][A-Za-z0-9_.~]{0,98}$/.test(name));
    expect(illegal).toEqual([]);
  });

  it('say which op, tile, net and link they are about', () => {
    const { rows, columns } = namesIn(textOf(cases[1] as Case, 'mps'));
    expect(columns).toEqual(
      expect.arrayContaining([
        'place.op_in.tile_r0c0',
        'use.net_op_in.link_r0c0_r0c1',
        'flow.net_op_in.op_abs.link_r1c1_r0c1',
      ]),
    );
    expect(columns).not.toContain('place.op_in.tile_r0c2');
    expect(rows).toEqual(
      expect.arrayContaining(['one_tile.op_in', 'channels.link_r0c0_r0c1', 'least.net_op_abs']),
    );
  });

  it('are explained at the head, with the whole id of a shortened one and its label in ASCII', () => {
    for (const [format, mark] of [
      ['lp', '\\'],
      ['mps', '*'],
    ] as const) {
      const head = textOf(cases.at(-1) as Case, format)
        .split('\n')
        .filter((line) => line.startsWith(mark));
      expect(head).toContain(
        `${mark}   op_a_name_that_is_as_long_a~1: op_${longName}2, absolute "Gr\\u00f6\\u00dfe \\"1\\""`,
      );
      expect(head.join('\n')).toMatch(/place\.<op>\.<tile>: .*\n[\s\S]*one_tile\.<op>: R1/);
    }
  });

  it('read back into a mapping that the verifier passes: the optimal points of CBC', async () => {
    const wire = [...cases, ...random].filter(
      ([, end, , , , goal, weights]) => end !== 'infeasible' && goal === 'wire' && !weights,
    );
    expect(wire.length).toBeGreaterThanOrEqual(5);
    for (const one of wire) {
      const [, expected, kernel, fabric, pins] = one;
      const { placement, routes } = mappingOf(await solvers.cbcPoint(textOf(one, 'mps'), 'mps'), kernel);
      expect(verifyMapping(kernel, fabric, { placement, routes, pins })).toEqual([]);
      expect(Object.values(routes).flat().length).toBe(expected);
    }
  }, 30_000);

  function mappingOf(point: Map<string, number>, kernel: Kernel): { placement: Placement; routes: Routes } {
    const idOf = (name: string): OpId => {
      const [head = '', index] = name.split('~');
      return (index === undefined ? head : kernel.ops[Number(index)]?.id) as OpId;
    };
    const placement: Placement = {};
    const routes: Routes = {};
    for (const [name, value] of point) {
      const [title, first = '', second = ''] = name.split('.');
      if (value < 0.5) continue;
      if (title === 'place') placement[idOf(first)] = second.replace('tile_', '') as TileId;
      if (title !== 'use') continue;
      const source = idOf(first.replace('net_', ''));
      routes[source] = [...(routes[source] ?? []), second.slice(5).replace('_', '>') as LinkId];
    }
    return { placement, routes };
  }
});
