/** Rows that tie an op's costs to its tile: Gilmore–Lawler stars for paths, nearest consumers for nets. */
import {
  hopsBetween,
  type PlacedPair,
  type PlacementInstance,
  UNREACHABLE_HOPS,
  withinReach,
} from '../instance';
import type { AssignmentColumns } from './assignment-columns';
import type { ProgramBuilder } from './integer-program';

export interface HopColumn {
  from: number;
  to: number;
  weight: number;
  hops: number;
}

/** Pairs of both directions joined; only where hops are the same both ways. */
export function undirectedPairs(pairs: readonly PlacedPair[]): PlacedPair[] {
  const joined = new Map<string, PlacedPair>();
  for (const { from, to, weight } of pairs) {
    const [a, b] = from < to ? [from, to] : [to, from];
    const known = joined.get(`${a},${b}`);
    if (known) known.weight += weight;
    else joined.set(`${a},${b}`, { from: a, to: b, weight });
  }
  return [...joined.values()];
}

/**
 * For each op: Σ weight · hops of its pairs ≥ Σ star[tile] · x[op, tile]. On a whole placement the right side is
 * the star of the op's own tile, which bounds the left side. Tiles whose star is infinite are struck out.
 */
export function addStarRows(
  builder: ProgramBuilder,
  instance: PlacementInstance,
  x: AssignmentColumns,
  star: Float64Array | null,
  pairs: readonly HopColumn[],
): void {
  if (!star) return;
  for (let op = 0; op < instance.opCount; op++) {
    const own = pairs.filter((pair) => pair.from === op || pair.to === op);
    if (own.length < 2) continue;
    const starAt = (tile: number) => star[op * instance.tileCount + tile] as number;
    builder.row(`star_${op}`, 0, Number.POSITIVE_INFINITY, [
      ...own.map((pair) => [pair.hops, pair.weight] as const),
      ...x.weigh(op, (tile) => (Number.isFinite(starAt(tile)) ? starAt(tile) : 0), -1),
    ]);
  }
  const struck = (instance.candidates as readonly (readonly number[])[]).flatMap((tiles, op) =>
    tiles
      .filter((tile) => star[op * instance.tileCount + tile] === Number.POSITIVE_INFINITY)
      .map((tile) => [x.at(op, tile), 1] as const),
  );
  if (struck.length > 0) builder.row('struck', 0, 0, struck);
}

/**
 * A net's links ≥ Σ least[tile] · x[source, tile], where least[tile] is the larger of: the consumers' number; the
 * way to the consumer whose nearest candidate is farthest. Left out where that is the column's own bound.
 */
export function leastTreeRow(
  builder: ProgramBuilder,
  instance: PlacementInstance,
  x: AssignmentColumns,
  net: number,
  links: number,
): void {
  const placed = instance.nets[net];
  if (!placed) return;
  const { source, consumers } = placed;
  const nearest = (tile: number, consumer: number): number => {
    let least = UNREACHABLE_HOPS;
    for (const q of instance.candidates[consumer] ?? []) {
      const hops = hopsBetween(instance, tile, q);
      if (q !== tile && hops < least && withinReach(instance, hops)) least = hops;
    }
    return least === UNREACHABLE_HOPS ? 0 : least;
  };
  const least = new Map<number, number>();
  for (const tile of instance.candidates[source] ?? []) {
    const farthest = Math.max(...consumers.map((consumer) => nearest(tile, consumer)));
    // `farthest` goes to one consumer; each other one needs at least a link of its own only when it is not on the way.
    least.set(tile, Math.max(consumers.length, farthest));
  }
  if ([...least.values()].every((value) => value === consumers.length)) return;
  builder.row(`least_${net}`, 0, Number.POSITIVE_INFINITY, [
    [links, 1],
    ...x.weigh(source, (tile) => least.get(tile) ?? 0, -1),
  ]);
}
