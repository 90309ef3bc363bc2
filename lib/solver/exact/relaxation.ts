/**
 * The relaxation of one node of the exact search: what the ops that are not yet placed must at least cost.
 *
 * A tiling of the free ops costs
 *   constant + Σ residual[op, its tile] + Σ tables[pair, both tiles] + Σ tables[triple, each two of its tiles]
 *   + Σ emptyCost[tiles left over]
 * or more. All terms but the constant are never negative (of a triple's three tables, their sum), so the constant is a
 * bound. The dual ascent only moves cost between the terms. Infinity says that an op cannot stand on a tile, or two not
 * on theirs.
 *
 * Nodes are kept, one a depth, and written over: the search makes no garbage.
 */
import type { CostGraph } from './cost-graph';

/** Who holds a tile in the cheapest assignment of ops to tiles. */
export const NOBODY = -1;

export interface Relaxation {
  graph: CostGraph;
  /** Ops that are free, ascending; the first `freeCount` entries count. */
  free: Int32Array;
  freeCount: number;
  /** Tiles of each free op, ascending, from op · tileCount on. Some may have become impossible since (residual Infinity). */
  domain: Int32Array;
  domainSize: Int32Array;
  /** [op · tileCount + tile]; Infinity outside the domain. */
  residual: Float64Array;
  /** Where each table begins; −1 where one of its ops is placed. */
  tableAt: Int32Array;
  /** The entry for the p-th tile of the lower op and the q-th of the other is at tableAt + p · (tiles of the other) + q. */
  tables: Float64Array;
  /** What it costs to leave a tile empty; Infinity for tiles of placed ops. */
  emptyCost: Float64Array;
  /** The cheapest assignment: residuals there are 0, and so is the empty cost of tiles that nobody holds. */
  tileOf: Int32Array;
  holderOf: Int32Array;
  constant: number;
}

/** A relaxation to be written over. */
export function blankRelaxation(graph: CostGraph): Relaxation {
  const { opCount, tileCount, tableCount } = graph;
  return {
    graph,
    free: new Int32Array(opCount),
    freeCount: 0,
    domain: new Int32Array(opCount * tileCount),
    domainSize: new Int32Array(opCount),
    residual: new Float64Array(opCount * tileCount),
    tableAt: new Int32Array(tableCount),
    tables: new Float64Array(0),
    emptyCost: new Float64Array(tileCount),
    tileOf: new Int32Array(opCount),
    holderOf: new Int32Array(tileCount),
    constant: 0,
  };
}

export function copyInto(target: Relaxation, from: Relaxation): void {
  target.free.set(from.free);
  target.freeCount = from.freeCount;
  target.domain.set(from.domain);
  target.domainSize.set(from.domainSize);
  target.residual.set(from.residual);
  target.tableAt.set(from.tableAt);
  if (target.tables.length < from.tables.length) target.tables = new Float64Array(from.tables.length);
  target.tables.set(from.tables);
  target.emptyCost.set(from.emptyCost);
  target.tileOf.set(from.tileOf);
  target.holderOf.set(from.holderOf);
  target.constant = from.constant;
}

/** Whether the op can still stand on the tile. */
export const isPossible = ({ residual, graph }: Relaxation, op: number, tile: number): boolean =>
  residual[op * graph.tileCount + tile] !== Number.POSITIVE_INFINITY;

/**
 * Writes into `child` what is left of `from` when `op` stands on `tile`; false where no tiling is. Tiles that have become
 * impossible are left out of the domains. `kept` is a buffer of ops × tiles. Cost: the size of the tables.
 */
export function placeInto(
  child: Relaxation,
  from: Relaxation,
  op: number,
  tile: number,
  kept: Int32Array,
): boolean {
  const { tileCount } = from.graph;
  child.freeCount = 0;
  for (let f = 0; f < from.freeCount; f++) {
    const other = from.free[f] as number;
    if (other === op) continue;
    child.free[child.freeCount++] = other;
    if (!keepTiles(child, from, other, tile, kept)) return false;
  }
  child.domainSize[op] = 0;
  child.emptyCost.set(from.emptyCost);
  child.emptyCost[tile] = Number.POSITIVE_INFINITY;
  child.tileOf.set(from.tileOf);
  child.holderOf.set(from.holderOf);
  child.holderOf[tile] = NOBODY;
  child.constant = from.constant + (from.residual[op * tileCount + tile] as number);
  keepTables(child, from, op, kept);
  const place = placeOf(from, op, tile);
  settlePairs(child, from, op, place);
  settleTriples(child, from, op, place, kept);
  return true;
}

function placeOf({ domain, domainSize, graph }: Relaxation, op: number, tile: number): number {
  const base = op * graph.tileCount;
  for (let p = 0; p < (domainSize[op] as number); p++) if (domain[base + p] === tile) return p;
  throw new Error('An op is to be placed on a tile that is not in its domain.');
}

/** The op's domain without the tile and what is impossible; false where nothing is left. */
function keepTiles(
  child: Relaxation,
  { domain, domainSize, residual, graph: { tileCount } }: Relaxation,
  op: number,
  tile: number,
  kept: Int32Array,
): boolean {
  const base = op * tileCount;
  child.residual.fill(Number.POSITIVE_INFINITY, base, base + tileCount);
  let size = 0;
  for (let p = 0; p < (domainSize[op] as number); p++) {
    const at = domain[base + p] as number;
    const cost = residual[base + at] as number;
    if (at === tile || cost === Number.POSITIVE_INFINITY) continue;
    child.residual[base + at] = cost;
    child.domain[base + size] = at;
    kept[base + size++] = p;
  }
  child.domainSize[op] = size;
  return size > 0;
}

/** Lays out the tables that stay, for the domains as they are; returns the entries of all of them. */
export function layTables(relaxation: Relaxation, stays: (table: number) => boolean): number {
  const { graph, domainSize, tableAt } = relaxation;
  let size = 0;
  for (let table = 0; table < graph.tableCount; table++) {
    if (!stays(table)) {
      tableAt[table] = -1;
      continue;
    }
    tableAt[table] = size;
    size +=
      (domainSize[graph.tableA[table] as number] as number) *
      (domainSize[graph.tableB[table] as number] as number);
  }
  return size;
}

/** Copies the tables between free ops, for the tiles that they keep. */
function keepTables(child: Relaxation, from: Relaxation, op: number, kept: Int32Array): void {
  const { tableCount, tableA, tableB, tableThird } = child.graph;
  const size = layTables(
    child,
    (table) =>
      from.tableAt[table] !== -1 && tableA[table] !== op && tableB[table] !== op && tableThird[table] !== op,
  );
  if (child.tables.length < size) child.tables = new Float64Array(Math.ceil(1.25 * size));
  for (let table = 0; table < tableCount; table++) {
    if (child.tableAt[table] !== -1) copyTable(child, from, table, kept);
  }
}

function copyTable(child: Relaxation, from: Relaxation, table: number, kept: Int32Array): void {
  const { tileCount, tableA, tableB } = child.graph;
  const a = tableA[table] as number;
  const b = tableB[table] as number;
  const source = from.tables;
  const target = child.tables;
  const rows = child.domainSize[a] as number;
  const columns = child.domainSize[b] as number;
  const width = from.domainSize[b] as number;
  const start = from.tableAt[table] as number;
  const keptA = a * tileCount;
  const keptB = b * tileCount;
  let at = child.tableAt[table] as number;
  for (let p = 0; p < rows; p++) {
    const base = start + (kept[keptA + p] as number) * width;
    for (let q = 0; q < columns; q++) target[at++] = source[base + (kept[keptB + q] as number)] as number;
  }
}

/** The costs of the placed op with its neighbours become costs of the neighbours alone. */
function settlePairs(child: Relaxation, from: Relaxation, op: number, place: number): void {
  const { first, second, pairsOf, tileCount } = from.graph;
  for (const pair of pairsOf[op] as Int32Array) {
    const start = from.tableAt[pair] as number;
    if (start === -1) continue;
    const isFirst = first[pair] === op;
    const other = (isFirst ? second[pair] : first[pair]) as number;
    const width = from.domainSize[second[pair] as number] as number;
    const base = other * tileCount;
    for (let q = 0; q < (from.domainSize[other] as number); q++) {
      const at = base + (from.domain[base + q] as number);
      const entry = isFirst ? start + place * width + q : start + q * width + place;
      child.residual[at] = (child.residual[at] as number) + (from.tables[entry] as number);
    }
  }
}

/** The costs of a triple with the placed op become costs of the pair of the other two. */
function settleTriples(
  child: Relaxation,
  from: Relaxation,
  op: number,
  place: number,
  kept: Int32Array,
): void {
  const { tileCount } = from.graph;
  const { tables, tableAt, domainSize } = from;
  for (const { a, b, c, ab, ac, bc, table } of from.graph.triples) {
    if ((a !== op && b !== op && c !== op) || tableAt[table] === -1) continue;
    const sizeB = domainSize[b] as number;
    const sizeC = domainSize[c] as number;
    const atAB = tableAt[table] as number;
    const atAC = tableAt[table + 1] as number;
    const atBC = tableAt[table + 2] as number;
    const x = op === a ? b : a;
    const y = op === c ? b : c;
    // The entries of the op's tables with x and y step by these, and the table of x and y has this width.
    const [fromX, stepX] =
      op === a ? [atAB + place * sizeB, 1] : op === b ? [atAB + place, sizeB] : [atAC + place, sizeC];
    const [fromY, stepY] =
      op === a ? [atAC + place * sizeC, 1] : op === b ? [atBC + place * sizeC, 1] : [atBC + place, sizeC];
    const own = op === a ? atBC : op === b ? atAC : atAB;
    const width = domainSize[y] as number;
    let entry = child.tableAt[op === a ? bc : op === b ? ac : ab] as number;
    for (let p = 0; p < (child.domainSize[x] as number); p++) {
      const atX = kept[x * tileCount + p] as number;
      const costX = tables[fromX + atX * stepX] as number;
      for (let q = 0; q < (child.domainSize[y] as number); q++, entry++) {
        const atY = kept[y * tileCount + q] as number;
        const cost =
          (tables[own + atX * width + atY] as number) + costX + (tables[fromY + atY * stepY] as number);
        // A sum of the three is never negative, but for rounding.
        if (cost > 0) child.tables[entry] = (child.tables[entry] as number) + cost;
      }
    }
  }
}
