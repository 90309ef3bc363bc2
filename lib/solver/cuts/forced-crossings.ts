/** Nets that have to get from one side of a cut to the other wherever the ops stand. Each needs a channel of its own (R6). */
import type { PlacementInstance } from '../instance';
import type { TileSetId, TileSets } from '../presolve/tile-sets';
import type { TileCut } from './tile-cut';

export const INSIDE = 1;
export const OUTSIDE = -1;
export const FREE = 0;

export interface Crossing {
  net: number;
  /** Consumers that stand on the other side. */
  consumers: number[];
}

/** For each op: on which side of the cut all of its candidates are. Cost: one comparison for each different set. */
export function sidesOf(regions: readonly TileSetId[], cut: TileCut, sets: TileSets): Int8Array {
  const known = new Map<TileSetId, number>();
  return Int8Array.from(regions, (region) => {
    const side = known.get(region) ?? sideOf(region, cut, sets);
    known.set(region, side);
    return side;
  });
}

function sideOf(region: TileSetId, cut: TileCut, sets: TileSets): number {
  const { within, beyond } = sets.parted(region, cut.inside);
  if (within && beyond) return FREE;
  return within ? INSIDE : OUTSIDE;
}

/** Nets whose source is all on the side `from`, with a consumer that is all on the other. */
export function forcedCrossings(
  { nets }: PlacementInstance,
  sides: Int8Array,
  from: typeof INSIDE | typeof OUTSIDE,
): Crossing[] {
  return nets.flatMap(({ source, consumers }, net) => {
    if (sides[source] !== from) return [];
    const beyond = consumers.filter((consumer) => sides[consumer] === -from);
    return beyond.length > 0 ? [{ net, consumers: beyond }] : [];
  });
}
