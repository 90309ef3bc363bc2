import fc from 'fast-check';
import loadHighs, { type Highs } from 'highs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type IntegerProgram, programBuilder } from '@/lib/solver/integer-program/integer-program';
import { oneSidedRows, writeLp } from '@/lib/solver/integer-program/write-lp';
import { writeMps } from '@/lib/solver/integer-program/write-mps';
import { type Answer, type OutsideSolvers, outsideSolvers } from './outside-solvers';

let solvers: OutsideSolvers;
let highs: Highs;
beforeAll(async () => {
  solvers = await outsideSolvers();
  highs = await loadHighs();
});
afterAll(() => solvers.remove());

const INFINITE = Number.POSITIVE_INFINITY;

const answers = async (program: IntegerProgram) => ({
  mps: await solvers.answers(writeMps(program), 'mps'),
  lp: await solvers.answers(writeLp(program), 'lp'),
});
/** The same answer of every solver in both formats. */
const everywhere = (answer: Answer) => {
  const all = { glpk: answer, cbc: answer, highs: answer };
  return { mps: all, lp: all };
};

/** Two whole columns x (1 to 4, cost 1) and y (from 0, cost 2), one fixed at 3, a two-sided row, and an offset of 5. */
function smallProgram(): IntegerProgram {
  const builder = programBuilder();
  const x = builder.column('x', { lower: 1, upper: 4, cost: 1, integer: true });
  const y = builder.column('y', { lower: 0, cost: 2, integer: true });
  const fixed = builder.column('fixed', { lower: 3, upper: 3 });
  builder.column('unused', { lower: 0, upper: 1 });
  builder.row('range', 2, 6, [
    [x, 1],
    [y, 2],
  ]);
  builder.row('tie', 3.5, 3.5, [
    [x, 1],
    [y, 1],
    [fixed, 0.5],
  ]);
  return builder.finish({ hasIntegerObjective: true, offset: 5 });
}

describe('MPS text', () => {
  it('has rows by sense, integer markers, right-hand sides and bounds, line by line', () => {
    expect(writeMps(smallProgram(), ['two lines, “one”\ntext']).split('\n')).toEqual([
      '* two lines, \\u201cone\\u201d\\u000atext',
      'NAME pinloom FREE',
      'ROWS',
      ' N cost',
      ' G range_low',
      ' L range_high',
      ' E tie',
      'COLUMNS',
      " marker_1 'MARKER' 'INTORG'",
      ' x cost 1',
      ' x range_low 1',
      ' x range_high 1',
      ' x tie 1',
      ' y cost 2',
      ' y range_low 2',
      ' y range_high 2',
      ' y tie 1',
      " marker_2 'MARKER' 'INTEND'",
      ' fixed tie 0.5',
      ' unused cost 0',
      ' offset cost 5',
      'RHS',
      ' RHS range_low 2',
      ' RHS range_high 6',
      ' RHS tie 3.5',
      'BOUNDS',
      ' LO BND x 1',
      ' UP BND x 4',
      ' PL BND y',
      ' FX BND fixed 3',
      ' UP BND unused 1',
      ' FX BND offset 1',
      'ENDATA',
      '',
    ]);
  });

  it('counts the offset once: x + y = 2 at x + 2y + 5 gives 7, in both formats', async () => {
    expect(await answers(smallProgram())).toEqual(everywhere(7));
  });

  it('subtracts a negative offset: at least 3 of a column of cost 2, less 10, gives −4', async () => {
    const builder = programBuilder();
    const x = builder.column('x', { lower: 0, cost: 2, integer: true });
    builder.row('least', 3, INFINITE, [[x, 1]]);
    expect(await answers(builder.finish({ hasIntegerObjective: true, offset: -10 }))).toEqual(everywhere(-4));
  });

  it('lets a whole column without an upper bound pass 1: 2z ≥ 13 gives z = 7', async () => {
    const builder = programBuilder();
    const z = builder.column('z', { lower: 0, cost: 1, integer: true });
    builder.row('least', 13, INFINITE, [[z, 2]]);
    expect(await answers(builder.finish({ hasIntegerObjective: true }))).toEqual(everywhere(7));
  });

  it('keeps bounds below 0: −5 to −2, the least of x is −5 and of −x is 2', async () => {
    const least = (cost: number) => {
      const builder = programBuilder();
      const x = builder.column('x', { lower: -5, upper: -2, cost });
      // A row, as GLPK reads no problem without one.
      builder.row('loose', Number.NEGATIVE_INFINITY, 9, [[x, 1]]);
      return builder.finish({ hasIntegerObjective: true });
    };
    expect(await answers(least(1))).toEqual(everywhere(-5));
    expect(await answers(least(-1))).toEqual(everywhere(2));
  });

  it.each([
    ['no entries but a side of 1', 1, 1, []],
    ['its lower side above its upper one', 1, 0, [[0, 1]]],
  ] as [string, number, number, [number, number][]][])(
    'is infeasible with a row that has %s',
    async (_, low, high, entries) => {
      const builder = programBuilder();
      builder.column('x', { lower: 0, upper: 1, cost: 1, integer: true });
      builder.row('wrong', low, high, entries);
      expect(await answers(builder.finish({ hasIntegerObjective: true }))).toEqual(everywhere('infeasible'));
    },
  );

  it('loses nothing: HiGHS reads costs, bounds, kinds, rows and entries back as they are, 200 random programs', () => {
    fc.assert(
      fc.property(programArb, (program) => {
        expect(readBack(program)).toEqual(plain(program));
      }),
      { seed: 9, numRuns: 200 },
    );
  });
});

// Within what HiGHS keeps: above 1e-9 and below 1e15.
const numberArb = fc.constantFrom(-7, -1.25, -1, 0.1, 1, 2, 1e-7, 123456.75, 2.5e11);
const programArb = fc
  .record({
    columns: fc.array(
      fc.record({
        lower: fc.constantFrom(-4, -0.5, 0, 2),
        width: fc.constantFrom(0, 1, 3.5, INFINITE),
        cost: fc.oneof(fc.constant(0), numberArb),
        integer: fc.boolean(),
      }),
      { minLength: 1, maxLength: 6 },
    ),
    rows: fc.array(
      fc.record({
        low: fc.constantFrom(Number.NEGATIVE_INFINITY, -2, 0, 3.5),
        high: fc.constantFrom(-2, 0, 3.5, INFINITE),
        entries: fc.array(fc.tuple(fc.nat(5), numberArb), { maxLength: 5 }),
      }),
      { minLength: 1, maxLength: 5 },
    ),
  })
  .map(({ columns, rows }) => {
    const builder = programBuilder();
    columns.forEach(({ lower, width, ...rest }, i) => {
      builder.column(`x.${i}`, { lower, upper: lower + width, ...rest });
    });
    rows.forEach(({ low, high, entries }, i) => {
      const own = new Map(entries.map(([column, value]) => [column % columns.length, value]));
      builder.row(`r.${i}`, low, high, [...own]);
    });
    return builder.finish({ hasIntegerObjective: false });
  });

const sortedEntries = (
  start: ArrayLike<number>,
  column: ArrayLike<number>,
  value: ArrayLike<number>,
  row: number,
) => {
  const entries: [number, number][] = [];
  for (let e = start[row] as number; e < (start[row + 1] as number); e++) {
    entries.push([column[e] as number, value[e] as number]);
  }
  return entries.sort((a, b) => a[0] - b[0]);
};

/** The program with its rows as the text has them. */
function plain(program: IntegerProgram) {
  return {
    cost: [...program.cost],
    lower: [...program.lower],
    upper: [...program.upper],
    integer: [...program.isInteger],
    rows: oneSidedRows(program).map(({ row, sense, side }) => ({
      low: sense === '<=' ? Number.NEGATIVE_INFINITY : side,
      high: sense === '>=' ? INFINITE : side,
      entries: sortedEntries(program.rowStart, program.entryColumn, program.entryValue, row),
    })),
  };
}

function readBack(program: IntegerProgram): ReturnType<typeof plain> {
  return highs.withModel({ format: 'mps', data: writeMps(program) }, (model) => {
    const data = model.getModel('csr');
    const { starts, indices, values } = data.matrix;
    return {
      cost: [...data.colCost],
      lower: [...data.colLower],
      upper: [...data.colUpper],
      integer: Array.from({ length: data.numCols }, (_, i) => data.integrality[i] ?? 0),
      rows: Array.from({ length: data.numRows }, (_, row) => ({
        low: data.rowLower[row] as number,
        high: data.rowUpper[row] as number,
        entries: sortedEntries(starts, indices, values, row),
      })),
    };
  });
}
