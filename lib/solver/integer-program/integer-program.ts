/**
 * A mixed-integer program in neutral form: minimise cost·x + offset, rows within bounds, columns within bounds.
 * Engines read it as it is; `writeLp` gives it as text. Names are legal in the LP format.
 */
export interface IntegerProgram {
  columnNames: readonly string[];
  /** Lower bounds are finite. */
  lower: Float64Array;
  /** May be Infinity. */
  upper: Float64Array;
  cost: Float64Array;
  /** 1 where the column is an integer. */
  isInteger: Uint8Array;
  offset: number;
  rowNames: readonly string[];
  /** May be −Infinity. */
  rowLower: Float64Array;
  /** May be Infinity. */
  rowUpper: Float64Array;
  /** Entries of row r: [rowStart[r], rowStart[r + 1]). No column twice in a row. */
  rowStart: Int32Array;
  entryColumn: Int32Array;
  entryValue: Float64Array;
  /** Every feasible point with integer columns has an integer objective, so a bound may be rounded up. */
  hasIntegerObjective: boolean;
}

export interface ProgramBuilder {
  /** Adds a column and gives its index. */
  column(name: string, spec: { lower: number; upper?: number; cost?: number; integer?: boolean }): number;
  /** Adds a row over (column, value) entries; entries of one column are summed, zeros left out. */
  row(name: string, lower: number, upper: number, entries: readonly (readonly [number, number])[]): void;
  columnCount(): number;
  entryCount(): number;
  finish(options: { hasIntegerObjective: boolean; offset?: number }): IntegerProgram;
}

export function programBuilder(): ProgramBuilder {
  const columnNames: string[] = [];
  const lower: number[] = [];
  const upper: number[] = [];
  const cost: number[] = [];
  const isInteger: number[] = [];
  const rowNames: string[] = [];
  const rowLower: number[] = [];
  const rowUpper: number[] = [];
  const rowStart: number[] = [0];
  const entryColumn: number[] = [];
  const entryValue: number[] = [];
  return {
    column: (name, spec) => {
      columnNames.push(name);
      lower.push(spec.lower);
      upper.push(spec.upper ?? Number.POSITIVE_INFINITY);
      cost.push(spec.cost ?? 0);
      isInteger.push(spec.integer ? 1 : 0);
      return columnNames.length - 1;
    },
    row: (name, low, high, entries) => {
      const sums = new Map<number, number>();
      for (const [column, value] of entries) sums.set(column, (sums.get(column) ?? 0) + value);
      for (const [column, value] of sums) {
        if (value === 0) continue;
        entryColumn.push(column);
        entryValue.push(value);
      }
      rowNames.push(name);
      rowLower.push(low);
      rowUpper.push(high);
      rowStart.push(entryColumn.length);
    },
    columnCount: () => columnNames.length,
    entryCount: () => entryColumn.length,
    finish: ({ hasIntegerObjective, offset = 0 }) => ({
      columnNames,
      lower: Float64Array.from(lower),
      upper: Float64Array.from(upper),
      cost: Float64Array.from(cost),
      isInteger: Uint8Array.from(isInteger),
      offset,
      rowNames,
      rowLower: Float64Array.from(rowLower),
      rowUpper: Float64Array.from(rowUpper),
      rowStart: Int32Array.from(rowStart),
      entryColumn: Int32Array.from(entryColumn),
      entryValue: Float64Array.from(entryValue),
      hasIntegerObjective,
    }),
  };
}

/** Fills the values of a family's own columns from a tiling. */
export type FillColumns = (tiling: ArrayLike<number>, values: Float64Array) => void;

export function objectiveAt(program: IntegerProgram, values: ArrayLike<number>): number {
  let sum = program.offset;
  program.cost.forEach((c, column) => {
    if (c !== 0) sum += c * (values[column] as number);
  });
  return sum;
}

/** The objective of a feasible point, without an engine's rounding error where it must be whole. */
export function wholeObjective(program: IntegerProgram, values: ArrayLike<number>): number {
  const value = objectiveAt(program, values);
  return program.hasIntegerObjective ? Math.round(value) : value;
}

/** The largest amount by which a point breaks a bound, a row or integrality; 0 for a feasible point. */
export function violationAt(program: IntegerProgram, values: ArrayLike<number>): number {
  let worst = 0;
  const miss = (amount: number) => {
    if (amount > worst) worst = amount;
  };
  program.lower.forEach((low, column) => {
    const value = values[column] as number;
    miss(low - value);
    miss(value - (program.upper[column] as number));
    if (program.isInteger[column]) miss(Math.abs(value - Math.round(value)));
  });
  for (let row = 0; row < program.rowNames.length; row++) {
    let sum = 0;
    const end = program.rowStart[row + 1] as number;
    for (let entry = program.rowStart[row] as number; entry < end; entry++) {
      sum += (program.entryValue[entry] as number) * (values[program.entryColumn[entry] as number] as number);
    }
    miss((program.rowLower[row] as number) - sum);
    miss(sum - (program.rowUpper[row] as number));
  }
  return worst;
}
