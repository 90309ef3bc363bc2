/** Placements one step from a given one: an op on another tile, its holder on the tile left behind. */
import type { PlacementInstance, Tiling } from './instance';
import { placementCost } from './search/placement-cost';

/** Steps between two looks at `shouldStop`. */
const STEPS_PER_LOOK = 256;

/**
 * Those whose cost without congestion is at most `mostCost`, the cheapest first, at most `limit`. Nets of four and more
 * terminals are estimated, so that some may be missing. Cost: ops × candidates × terms of the cost; `shouldStop` ends it.
 */
export function nearPlacements(
  instance: PlacementInstance,
  tiling: Tiling,
  { mostCost, limit, shouldStop }: { mostCost: number; limit: number; shouldStop(): boolean },
): Tiling[] {
  const { total } = placementCost(instance);
  const candidates = instance.candidates.map((tiles) => new Set(tiles));
  const holderOf = new Map(Array.from(tiling, (tile, op) => [tile, op]));
  const found: { tiling: Tiling; cost: number }[] = [];
  let steps = 0;
  for (const [op, tiles] of candidates.entries()) {
    const from = tiling[op] as number;
    for (const tile of tiles) {
      const other = holderOf.get(tile);
      // An exchange is met from both of its ends.
      if (tile === from || (other !== undefined && (other < op || !candidates[other]?.has(from)))) continue;
      if (steps++ % STEPS_PER_LOOK === 0 && shouldStop()) return cheapest(found, limit);
      const moved = tiling.slice();
      moved[op] = tile;
      if (other !== undefined) moved[other] = from;
      const cost = total(moved);
      if (cost <= mostCost) found.push({ tiling: moved, cost });
    }
  }
  return cheapest(found, limit);
}

const cheapest = (found: readonly { tiling: Tiling; cost: number }[], limit: number): Tiling[] =>
  found
    .toSorted((a, b) => a.cost - b.cost)
    .slice(0, limit)
    .map((near) => near.tiling);
