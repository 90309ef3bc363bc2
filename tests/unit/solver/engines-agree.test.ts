import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { compileFabric } from '@/lib/fabric/compile';
import { starBound } from '@/lib/solver/bounds/star-bound';
import type { Engine } from '@/lib/solver/engines/engine';
import { highsEngine } from '@/lib/solver/engines/highs';
import { simplexEngine } from '@/lib/solver/engines/simplex';
import { buildInstance } from '@/lib/solver/instance';
import { programBuilder } from '@/lib/solver/integer-program/integer-program';
import { placementProgram } from '@/lib/solver/integer-program/placement-program';
import { writeLp } from '@/lib/solver/integer-program/write-lp';
import { limits } from '../../helpers/integer-programs';
import { tinyCaseArb } from '../../property/solver/tiny-cases';

const programs = fc
  .sample(tinyCaseArb, { seed: 77, numRuns: 60 })
  .filter(({ kernel }) => kernel.ops.length <= 4)
  .map(({ kernel, fabric, objective }) => buildInstance(kernel, compileFabric(fabric), {}, objective))
  .filter((instance) => instance.candidates.every((tiles) => tiles.length > 0))
  .map((instance) => placementProgram(instance, starBound(instance).star).program)
  .slice(0, 25);

let highs: Engine;
const folder = mkdtempSync(join(tmpdir(), 'pinloom-lp-'));
beforeAll(async () => {
  highs = await highsEngine();
});
afterAll(() => rmSync(folder, { recursive: true }));

/** GLPK 5 (Debian glpk-utils): the objective, or null for an infeasible model. */
function glpkOptimum(text: string): number | null {
  const [model, solution] = ['model.lp', 'model.out'].map((name) => join(folder, name)) as [string, string];
  writeFileSync(model, text);
  execFileSync('glpsol', ['--lp', model, '--tmlim', '60', '-o', solution], { stdio: 'pipe' });
  const report = readFileSync(solution, 'utf8');
  const objective = /^Objective: +cost = ([-\d.e+]+)/m.exec(report)?.[1];
  return /^Status: +INTEGER OPTIMAL/m.test(report) ? Number(objective) : null;
}

describe('engines on the same models', () => {
  const value = (engine: Engine) =>
    programs.map((program) => {
      const outcome = engine.solveModel(program, limits(20_000));
      return outcome.status === 'optimal' ? outcome.objectiveValue : outcome.status;
    });

  it('HiGHS, javascript-lp-solver and GLPK (reading our LP text) find the same optima', () => {
    const expected = value(highs);
    expect(expected.filter((one) => typeof one === 'number').length).toBeGreaterThan(10);
    expect(value(simplexEngine)).toEqual(expected);
    expect(programs.map((program) => glpkOptimum(writeLp(program)) ?? 'infeasible')).toEqual(expected);
  }, 120_000);

  it('HiGHS stops when asked, and keeps the warm start as its best', () => {
    const builder = programBuilder();
    const columns = Array.from({ length: 40 }, (_, i) =>
      builder.column(`b_${i}`, { lower: 0, upper: 1, cost: -((i * 37) % 19) - 1, integer: true }),
    );
    for (let row = 0; row < 12; row++) {
      builder.row(
        `r_${row}`,
        Number.NEGATIVE_INFINITY,
        97,
        columns.map((c) => [c, ((c * 31 + row * 17) % 23) + 2]),
      );
    }
    const program = builder.finish({ hasIntegerObjective: true });
    const outcome = highs.solveModel(
      program,
      limits(60_000, { shouldStop: () => true, warmStart: new Float64Array(40) }),
    );
    expect(outcome.status).toBe('unfinished');
    expect('stop' in outcome && outcome.stop).toBe('stopped');
  });

  it('javascript-lp-solver ends at its deadline within a pivot, and its prototype is left as it was', () => {
    let clockMs = 0;
    const outcome = simplexEngine.solveModel(
      programs[0] as (typeof programs)[number],
      limits(2, { nowMs: () => clockMs++ }),
    );
    expect(outcome).toMatchObject({ status: 'unfinished', stop: 'time limit' });
    expect(simplexEngine.solveModel(programs[0] as (typeof programs)[number], limits(20_000)).status).toBe(
      'optimal',
    );
  });
});

describe('LP text', () => {
  it('writes bounds, senses, two-sided rows, fixed columns and an offset as GLPK reads them: x + y = 2 at x + 2y + 5 gives 7', () => {
    const builder = programBuilder();
    const x = builder.column('x', { lower: 1, upper: 4, cost: 1, integer: true });
    const y = builder.column('y', { lower: 0, cost: 2 });
    const fixed = builder.column('fixed', { lower: 3, upper: 3 });
    builder.row('range', 2, 6, [
      [x, 1],
      [y, 2],
    ]);
    builder.row('tie', 3.5, 3.5, [
      [x, 1],
      [y, 1],
      [fixed, 0.5],
    ]);
    const text = writeLp(builder.finish({ hasIntegerObjective: false, offset: 5 }));
    // x + y = 2, x whole: x = 2, y = 0 costs 2; so 7. With x ≤ 1 it would be 1 + 2 + 5.
    expect(glpkOptimum(text)).toBe(7);
  });
});
