/**
 * Sets of tiles that as many ops need for themselves (Hall 1935). Looked at: the candidates of each op, and all only
 * tiles together. Cost: one comparison for every two different sets of candidates.
 */
import type { TileSetId, TileSets } from './tile-sets';

export interface FullSet {
  taken: TileSetId;
  owners: number[];
}

export function fullSets(
  sets: TileSets,
  opsBySet: ReadonlyMap<TileSetId, readonly number[]>,
  opCount: number,
): FullSet[] {
  const distinct = [...opsBySet.keys()];
  const single = distinct.filter((set) => sets.count(set) === 1);
  const onlyTiles = sets.of(single.flatMap((set) => sets.tiles(set)));
  const full: FullSet[] = [];
  for (const taken of new Set([onlyTiles, ...distinct.filter((set) => sets.count(set) > 1)])) {
    if (sets.count(taken) === 0 || sets.count(taken) > opCount) continue;
    const owners = distinct.flatMap((set) => (sets.isWithin(set, taken) ? (opsBySet.get(set) ?? []) : []));
    // More owners than tiles is for the matching of ops and tiles to tell.
    if (owners.length === sets.count(taken)) full.push({ taken, owners });
  }
  return full;
}
