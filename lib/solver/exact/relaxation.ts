/**
 * The relaxation of one node of the exact search: what the ops that are not yet placed must at least cost.
 *
 * A tiling of the free ops costs
 *   constant + Σ residual[op, its tile] + Σ tables[pair, both tiles] + Σ emptyCost[tiles left over]
 * or more; all terms but the constant are never negative, so the constant is a bound. The dual ascent only moves cost
 * between the terms. Infinity says that an op cannot stand on a tile, or two not on theirs.
 */

/** Who holds a tile in the cheapest assignment of ops to tiles. */
export const NOBODY = -1;

/** Two free ops whose tiles cost something together. */
export interface PairTable {
  /** Free ops, a < b, as positions in `ops`. */
  a: number;
  b: number;
  /** In `tables`: the entry for the p-th tile of a and the q-th of b is at offset + p · (tiles of b) + q. */
  offset: number;
}

export interface Relaxation {
  tileCount: number;
  /** Instance ops that are free. */
  ops: Int32Array;
  /** Tiles of each free op, ascending. Some may have become impossible since (residual Infinity). */
  domains: Int32Array[];
  /** [op · tileCount + tile]; Infinity outside the domain. */
  residual: Float64Array;
  pairs: PairTable[];
  tables: Float64Array;
  /** Pairs of each free op. */
  pairsOf: PairTable[][];
  /** What it costs to leave a tile empty; Infinity for tiles of placed ops. */
  emptyCost: Float64Array;
  /** The cheapest assignment: residuals there are 0, and so is the empty cost of tiles that nobody holds. */
  tileOf: Int32Array;
  holderOf: Int32Array;
  constant: number;
}

/** Lists each op's pairs; call after `pairs` has changed. */
export function listPairs(pairs: readonly PairTable[], opCount: number): PairTable[][] {
  const lists: PairTable[][] = Array.from({ length: opCount }, () => []);
  for (const pair of pairs) {
    lists[pair.a]?.push(pair);
    lists[pair.b]?.push(pair);
  }
  return lists;
}

/**
 * Places the op at position `op` on `tile` and returns the relaxation of the rest; null where no tiling is left.
 * Tiles that have become impossible are left out of the domains. Cost: the size of the tables.
 */
export function placeOp(from: Relaxation, op: number, tile: number): Relaxation | null {
  const kept = keptTiles(from, op, tile);
  if (!kept) return null;
  const { tileCount } = from;
  const count = from.ops.length - 1;
  const was = Int32Array.from({ length: count }, (_, i) => (i < op ? i : i + 1));
  const now = (position: number) => (position < op ? position : position - 1);
  const ops = was.map((i) => from.ops[i] as number);
  const domains = Array.from(was, (i) => {
    const domain = from.domains[i] as Int32Array;
    return (kept[i] as Int32Array).map((p) => domain[p] as number);
  });
  const residual = new Float64Array(count * tileCount).fill(Number.POSITIVE_INFINITY);
  domains.forEach((domain, i) => {
    const base = (was[i] as number) * tileCount;
    for (let p = 0; p < domain.length; p++) {
      const at = domain[p] as number;
      residual[i * tileCount + at] = from.residual[base + at] as number;
    }
  });
  const { pairs, tables } = remainingTables(from, op, kept, now);
  const emptyCost = from.emptyCost.slice();
  emptyCost[tile] = Number.POSITIVE_INFINITY;
  const child: Relaxation = {
    tileCount,
    ops,
    domains,
    residual,
    pairs,
    tables,
    pairsOf: listPairs(pairs, count),
    emptyCost,
    tileOf: was.map((i) => from.tileOf[i] as number),
    holderOf: from.holderOf.map((holder) => (holder > op ? holder - 1 : holder)),
    constant: from.constant + (from.residual[op * tileCount + tile] as number),
  };
  child.holderOf[tile] = NOBODY;
  takeRow(from, child, op, tile, now);
  return child;
}

/** Positions in each domain that stay possible; null where an op has none. */
function keptTiles(from: Relaxation, op: number, tile: number): Int32Array[] | null {
  const kept: Int32Array[] = [];
  for (let i = 0; i < from.ops.length; i++) {
    const domain = from.domains[i] as Int32Array;
    const list = new Int32Array(domain.length);
    let length = 0;
    if (i !== op) {
      for (let p = 0; p < domain.length; p++) {
        const at = domain[p] as number;
        if (at === tile || from.residual[i * from.tileCount + at] === Number.POSITIVE_INFINITY) continue;
        list[length++] = p;
      }
      if (length === 0) return null;
    }
    kept.push(list.subarray(0, length));
  }
  return kept;
}

function remainingTables(
  from: Relaxation,
  op: number,
  kept: readonly Int32Array[],
  now: (position: number) => number,
): { pairs: PairTable[]; tables: Float64Array } {
  const pairs: PairTable[] = [];
  const stay = from.pairs.filter(({ a, b }) => a !== op && b !== op);
  let size = 0;
  for (const { a, b } of stay) size += (kept[a] as Int32Array).length * (kept[b] as Int32Array).length;
  const tables = new Float64Array(size);
  let at = 0;
  for (const { a, b, offset } of stay) {
    const rows = kept[a] as Int32Array;
    const columns = kept[b] as Int32Array;
    const width = (from.domains[b] as Int32Array).length;
    pairs.push({ a: now(a), b: now(b), offset: at });
    for (let p = 0; p < rows.length; p++) {
      const base = offset + (rows[p] as number) * width;
      for (let q = 0; q < columns.length; q++) {
        tables[at++] = from.tables[base + (columns[q] as number)] as number;
      }
    }
  }
  return { pairs, tables };
}

/** The costs of the placed op with its neighbours become costs of the neighbours alone. */
function takeRow(
  from: Relaxation,
  child: Relaxation,
  op: number,
  tile: number,
  now: (position: number) => number,
): void {
  const place = (from.domains[op] as Int32Array).indexOf(tile);
  const { tileCount } = from;
  for (const { a, b, offset } of from.pairsOf[op] as PairTable[]) {
    const other = a === op ? b : a;
    const domain = from.domains[other] as Int32Array;
    const width = (from.domains[b] as Int32Array).length;
    const base = now(other) * tileCount;
    for (let q = 0; q < domain.length; q++) {
      const entry = a === op ? offset + place * width + q : offset + q * width + place;
      const at = base + (domain[q] as number);
      child.residual[at] = (child.residual[at] as number) + (from.tables[entry] as number);
    }
  }
}
