/** The binaries that say which op stands where, with the rows of R1 to R4 and R7: the core of every model. */
import { hopsBetween, type PlacementInstance, withinReach } from '../instance';
import type { ProgramBuilder } from './integer-program';

export interface AssignmentColumns {
  /** Column of x[op, tile], or −1 where the tile is no candidate (R3, R4). */
  at(op: number, tile: number): number;
  /** Σ value(tile) · x[op, tile] as entries, times a factor. */
  weigh(op: number, value: (tile: number) => number, factor?: number): [number, number][];
  decode(values: ArrayLike<number>): Int32Array | null;
  encode(tiling: ArrayLike<number>, values: Float64Array): void;
}

export function addAssignment(builder: ProgramBuilder, instance: PlacementInstance): AssignmentColumns {
  const { tileCount, opCount, cols, candidates } = instance;
  const column = new Int32Array(opCount * tileCount).fill(-1);
  candidates.forEach((tiles, op) => {
    for (const tile of tiles) {
      const name = `x_${op}_r${Math.floor(tile / cols)}c${tile % cols}`;
      column[op * tileCount + tile] = builder.column(name, { lower: 0, upper: 1, integer: true });
    }
  });
  const at = (op: number, tile: number): number => column[op * tileCount + tile] as number;
  candidates.forEach((tiles, op) => {
    builder.row(
      `place_${op}`,
      1,
      1,
      tiles.map((tile) => [at(op, tile), 1] as const),
    );
  });
  for (let tile = 0; tile < tileCount; tile++) {
    const ops = candidates.flatMap((_, op) => (at(op, tile) >= 0 ? [[at(op, tile), 1] as const] : []));
    if (ops.length > 1) builder.row(`tile_${tile}`, Number.NEGATIVE_INFINITY, 1, ops);
  }
  addReachRows(builder, instance, at);
  return {
    at,
    weigh: (op, value, factor = 1) =>
      (candidates[op] as readonly number[]).map((tile) => [at(op, tile), factor * value(tile)]),
    decode: (values) => decodeTiling(instance, at, values),
    encode: (tiling, values) => {
      for (let op = 0; op < opCount; op++) values[at(op, tiling[op] as number)] = 1;
    },
  };
}

/** R7: with the producer on p, the consumer is not where p cannot reach within the limit. */
function addReachRows(
  builder: ProgramBuilder,
  instance: PlacementInstance,
  at: (op: number, tile: number) => number,
): void {
  instance.pairs.forEach(({ from, to }, pair) => {
    for (const p of instance.candidates[from] ?? []) {
      const tooFar = (instance.candidates[to] ?? []).filter(
        (q) => q !== p && !withinReach(instance, hopsBetween(instance, p, q)),
      );
      if (tooFar.length === 0) continue;
      builder.row(`reach_${pair}_${p}`, Number.NEGATIVE_INFINITY, 1, [
        [at(from, p), 1],
        ...tooFar.map((q) => [at(to, q), 1] as const),
      ]);
    }
  });
}

function decodeTiling(
  instance: PlacementInstance,
  at: (op: number, tile: number) => number,
  values: ArrayLike<number>,
): Int32Array | null {
  const tiling = new Int32Array(instance.opCount).fill(-1);
  const taken = new Set<number>();
  for (let op = 0; op < instance.opCount; op++) {
    const tile = (instance.candidates[op] ?? []).find((t) => (values[at(op, t)] as number) > 0.5);
    if (tile === undefined || taken.has(tile)) return null;
    taken.add(tile);
    tiling[op] = tile;
  }
  return tiling;
}
