/**
 * The least assignment of a few rows (the neighbours of an op) to tiles, with its dual: what an op on a tile at least
 * pays to neighbours that need tiles of their own (Gilmore 1962, Lawler 1963), and what is left of each cost.
 * Method: shortest augmenting paths (Jonker and Volgenant 1987). Buffers are kept; no allocation in a call.
 */
export interface StarAssignment {
  /** [row · tileCount + tile]: to be filled by the caller; Infinity forbids. */
  cost: Float64Array;
  /** Dual of each row. */
  rowDual: Float64Array;
  /** Dual of each tile, never above 0. */
  tileDual: Float64Array;
  /** The least cost (Σ duals) for the first `rows` rows; Infinity where there is no assignment. */
  solve(rows: number): number;
}

export function starAssignment(maxRows: number, tileCount: number): StarAssignment {
  const cost = new Float64Array(maxRows * tileCount);
  const rowDual = new Float64Array(maxRows);
  const tileDual = new Float64Array(tileCount);
  const rowAt = new Int32Array(tileCount);
  const way = new Int32Array(tileCount);
  const slack = new Float64Array(tileCount);
  const settled = new Uint8Array(tileCount);

  /** Finds the row a tile; false where it has none. */
  const place = (row: number): boolean => {
    slack.fill(Number.POSITIVE_INFINITY);
    settled.fill(0);
    let at = row;
    let from = -1;
    let reached = 0;
    for (;;) {
      const base = at * tileCount;
      const shift = reached - (rowDual[at] as number);
      let least = Number.POSITIVE_INFINITY;
      let tile = -1;
      for (let t = 0; t < tileCount; t++) {
        if (settled[t]) continue;
        const through = (cost[base + t] as number) + shift - (tileDual[t] as number);
        if (through < (slack[t] as number)) {
          slack[t] = through;
          way[t] = from;
        }
        if ((slack[t] as number) < least) {
          least = slack[t] as number;
          tile = t;
        }
      }
      if (tile < 0) return false;
      reached = least;
      from = tile;
      if (rowAt[tile] === -1) break;
      settled[tile] = 1;
      at = rowAt[tile] as number;
    }
    rowDual[row] = (rowDual[row] as number) + reached;
    for (let t = 0; t < tileCount; t++) {
      if (!settled[t]) continue;
      const by = reached - (slack[t] as number);
      const holder = rowAt[t] as number;
      rowDual[holder] = (rowDual[holder] as number) + by;
      tileDual[t] = (tileDual[t] as number) - by;
    }
    for (let tile = from; ; ) {
      const before = way[tile] as number;
      rowAt[tile] = before < 0 ? row : (rowAt[before] as number);
      if (before < 0) return true;
      tile = before;
    }
  };

  const solve = (rows: number): number => {
    rowDual.fill(0, 0, rows);
    tileDual.fill(0);
    rowAt.fill(-1);
    for (let row = 0; row < rows; row++) if (!place(row)) return Number.POSITIVE_INFINITY;
    let total = 0;
    for (let row = 0; row < rows; row++) total += rowDual[row] as number;
    for (let t = 0; t < tileCount; t++) total += tileDual[t] as number;
    return total;
  };
  return { cost, rowDual, tileDual, solve };
}
