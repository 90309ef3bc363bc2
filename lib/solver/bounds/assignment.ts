/**
 * The linear assignment problem: each row gets a column of its own at least total cost.
 * Method: shortest augmenting paths with duals (Jonker and Volgenant 1987). rows ≤ columns; a cost of Infinity forbids.
 * Cost: rows² × columns.
 */

/** A solver whose buffers are kept: no allocation in a call. */
export interface AssignmentSolver {
  /** [row · columnCount + column]: to be filled by the caller; Infinity forbids. */
  cost: Float64Array;
  /** Dual of each row. */
  rowDual: Float64Array;
  /** Dual of each column, never above 0. */
  columnDual: Float64Array;
  /** The row that holds each column, −1 for none. */
  rowAt: Int32Array;
  /** The least cost (Σ duals) for the first `rows` rows; Infinity where there is no assignment. */
  solve(rows: number): number;
}

export function assignmentSolver(maxRows: number, columnCount: number): AssignmentSolver {
  const cost = new Float64Array(maxRows * columnCount);
  const rowDual = new Float64Array(maxRows);
  const columnDual = new Float64Array(columnCount);
  const rowAt = new Int32Array(columnCount);
  const way = new Int32Array(columnCount);
  const slack = new Float64Array(columnCount);
  const settled = new Uint8Array(columnCount);

  /** Finds the row a column; false where it has none. */
  const place = (row: number): boolean => {
    slack.fill(Number.POSITIVE_INFINITY);
    settled.fill(0);
    let at = row;
    let from = -1;
    let reached = 0;
    for (;;) {
      const base = at * columnCount;
      const shift = reached - (rowDual[at] as number);
      let least = Number.POSITIVE_INFINITY;
      let column = -1;
      for (let j = 0; j < columnCount; j++) {
        if (settled[j]) continue;
        const through = (cost[base + j] as number) + shift - (columnDual[j] as number);
        if (through < (slack[j] as number)) {
          slack[j] = through;
          way[j] = from;
        }
        if ((slack[j] as number) < least) {
          least = slack[j] as number;
          column = j;
        }
      }
      if (column < 0) return false;
      reached = least;
      from = column;
      if (rowAt[column] === -1) break;
      settled[column] = 1;
      at = rowAt[column] as number;
    }
    rowDual[row] = (rowDual[row] as number) + reached;
    for (let j = 0; j < columnCount; j++) {
      if (!settled[j]) continue;
      const by = reached - (slack[j] as number);
      const holder = rowAt[j] as number;
      rowDual[holder] = (rowDual[holder] as number) + by;
      columnDual[j] = (columnDual[j] as number) - by;
    }
    for (let column = from; ; ) {
      const before = way[column] as number;
      rowAt[column] = before < 0 ? row : (rowAt[before] as number);
      if (before < 0) return true;
      column = before;
    }
  };

  const solve = (rows: number): number => {
    rowDual.fill(0, 0, rows);
    columnDual.fill(0);
    rowAt.fill(-1);
    for (let row = 0; row < rows; row++) if (!place(row)) return Number.POSITIVE_INFINITY;
    let total = 0;
    for (let row = 0; row < rows; row++) total += rowDual[row] as number;
    for (let j = 0; j < columnCount; j++) total += columnDual[j] as number;
    return total;
  };
  return { cost, rowDual, columnDual, rowAt, solve };
}

/** The least assignment where costs come from a function; null where there is none. */
export function leastAssignment(
  rowCount: number,
  columnCount: number,
  costAt: (row: number, column: number) => number,
): { cost: number; columnOf: Int32Array } | null {
  if (rowCount > columnCount) return null;
  const solver = assignmentSolver(rowCount, columnCount);
  for (let row = 0, entry = 0; row < rowCount; row++) {
    for (let column = 0; column < columnCount; column++) solver.cost[entry++] = costAt(row, column);
  }
  if (solver.solve(rowCount) === Number.POSITIVE_INFINITY) return null;
  const columnOf = new Int32Array(rowCount);
  let cost = 0;
  solver.rowAt.forEach((row, column) => {
    if (row < 0) return;
    columnOf[row] = column;
    cost += costAt(row, column);
  });
  return { cost, columnOf };
}
