/**
 * The linear assignment problem: each row gets a column of its own at least total cost.
 * Method: shortest augmenting paths with potentials (Jonker and Volgenant 1987, in the short form with a virtual
 * column 0). rows ≤ columns; a cost of Infinity forbids. Cost: rows² × columns.
 */
export function leastAssignment(
  rowCount: number,
  columnCount: number,
  costAt: (row: number, column: number) => number,
): { cost: number; columnOf: Int32Array } | null {
  if (rowCount > columnCount) return null;
  const rowPotential = new Float64Array(rowCount + 1);
  const columnPotential = new Float64Array(columnCount + 1);
  const rowAt = new Int32Array(columnCount + 1);
  const way = new Int32Array(columnCount + 1);
  const slack = new Float64Array(columnCount + 1);
  const used = new Uint8Array(columnCount + 1);
  for (let row = 1; row <= rowCount; row++) {
    rowAt[0] = row;
    slack.fill(Number.POSITIVE_INFINITY);
    used.fill(0);
    let column = 0;
    while (rowAt[column] !== 0) {
      used[column] = 1;
      const at = rowAt[column] as number;
      let delta = Number.POSITIVE_INFINITY;
      let next = -1;
      for (let j = 1; j <= columnCount; j++) {
        if (used[j]) continue;
        const reduced = costAt(at - 1, j - 1) - (rowPotential[at] as number) - (columnPotential[j] as number);
        if (reduced < (slack[j] as number)) {
          slack[j] = reduced;
          way[j] = column;
        }
        if ((slack[j] as number) < delta) {
          delta = slack[j] as number;
          next = j;
        }
      }
      if (next < 0) return null;
      for (let j = 0; j <= columnCount; j++) {
        if (used[j]) {
          const holder = rowAt[j] as number;
          rowPotential[holder] = (rowPotential[holder] as number) + delta;
          columnPotential[j] = (columnPotential[j] as number) - delta;
        } else slack[j] = (slack[j] as number) - delta;
      }
      column = next;
    }
    while (column !== 0) {
      const previous = way[column] as number;
      rowAt[column] = rowAt[previous] as number;
      column = previous;
    }
  }
  const columnOf = new Int32Array(rowCount);
  let cost = 0;
  for (let j = 1; j <= columnCount; j++) {
    const row = rowAt[j] as number;
    if (row === 0) continue;
    columnOf[row - 1] = j - 1;
    cost += costAt(row - 1, j - 1);
  }
  return { cost, columnOf };
}
