/**
 * Gives each op a tile of its own, or names a set of ops that has too few tiles.
 * Method: augmenting paths (Kuhn 1955, Berge 1957); the witness is Hall's (1935). Cost: ops × candidate entries.
 */
export type Matching =
  | { ok: true; tiling: Int32Array }
  /** The ops' candidate tiles together are fewer than the ops. */
  | { ok: false; ops: number[]; tiles: number[] };

export function matchOps(
  candidates: readonly (readonly number[])[],
  tileCount: number,
  order: readonly number[] = candidates.map((_, i) => i),
): Matching {
  const opAt = new Int32Array(tileCount).fill(-1);
  for (const op of order) {
    const failed = augment(op, candidates, opAt);
    if (failed) return { ok: false, ...failed };
  }
  const tiling = new Int32Array(candidates.length).fill(-1);
  opAt.forEach((op, tile) => {
    if (op >= 0) tiling[op] = tile;
  });
  return { ok: true, tiling };
}

/** Breadth-first from one free op. Without a free tile, the ops and tiles reached are the witness. */
function augment(
  start: number,
  candidates: readonly (readonly number[])[],
  opAt: Int32Array,
): { ops: number[]; tiles: number[] } | null {
  const cameFrom = new Map<number, number>();
  const ops = [start];
  for (let next = 0; next < ops.length; next++) {
    const op = ops[next] as number;
    for (const tile of candidates[op] ?? []) {
      if (cameFrom.has(tile)) continue;
      cameFrom.set(tile, op);
      const holder = opAt[tile] as number;
      if (holder >= 0) {
        ops.push(holder);
        continue;
      }
      flip(tile, start, cameFrom, candidates, opAt);
      return null;
    }
  }
  return { ops: ops.sort((a, b) => a - b), tiles: [...cameFrom.keys()].sort((a, b) => a - b) };
}

function flip(
  freeTile: number,
  start: number,
  cameFrom: ReadonlyMap<number, number>,
  candidates: readonly (readonly number[])[],
  opAt: Int32Array,
): void {
  let tile = freeTile;
  for (;;) {
    const op = cameFrom.get(tile) as number;
    const previous = op === start ? -1 : (candidates[op] ?? []).find((t) => opAt[t] === op);
    opAt[tile] = op;
    if (previous === undefined || previous < 0) return;
    tile = previous;
  }
}
