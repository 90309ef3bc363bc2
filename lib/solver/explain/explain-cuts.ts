/**
 * A cut of the fabric with too few channels for the nets that have to cross it: because of where single ops can stand, or
 * however the ops are divided between its sides.
 * Cost: flows and divisions up to their work limits, together about 0.1 s; a few milliseconds on a usual problem.
 */
import { fabricCuts } from '../cuts/cut-sets';
import { type CutProblem, divideOps } from '../cuts/divide-ops';
import { forcedCrossings, INSIDE, OUTSIDE, sidesOf } from '../cuts/forced-crossings';
import { regionCuts } from '../cuts/region-cuts';
import type { PlacementInstance } from '../instance';
import type { InfeasibleReason } from '../outcome';
import { addTile, commonTiles, noTiles, type TileSetId, tileSets } from '../presolve/tile-sets';
import type { CheckedProblem } from '../problem';
import { divisionReason, forcedReason } from './cut-reasons';

/** Nets touched by the divisions of all cuts, and of one. */
const DIVISION_WORK = { inAll: 400_000, ofOneCut: 50_000 } as const;
/** Channels of a cut, both ways together, above which trying divisions is not seen to end within its work. */
const DIVISION_CHANNELS = 32;

export function explainCuts(
  problem: CheckedProblem,
  instance: PlacementInstance,
  sets = tileSets(instance.tileCount),
): InfeasibleReason | null {
  if (instance.nets.length === 0) return null;
  const regions = instance.candidates.map((tiles) => sets.of(tiles));
  const thinFirst = fabricCuts(problem.graph);
  for (const cut of [...thinFirst, ...regionCuts(instance, problem.graph, sets)]) {
    const sides = sidesOf(regions, cut, sets);
    for (const from of [INSIDE, OUTSIDE] as const) {
      const crossings = forcedCrossings(instance, sides, from);
      const channels = from === INSIDE ? cut.channelsOut : cut.channelsIn;
      if (crossings.length > channels) return forcedReason(problem, instance, { cut, from, crossings });
    }
  }
  const usable = noTiles(instance.tileCount);
  for (const set of new Set<TileSetId>(regions)) for (const tile of sets.tiles(set)) addTile(usable, tile);
  const usableCount = commonTiles(usable, usable);
  let spent = 0;
  for (const cut of thinFirst) {
    if (cut.channelsOut + cut.channelsIn > DIVISION_CHANNELS) break;
    const roomInside = commonTiles(usable, cut.inside);
    const sides = sidesOf(regions, cut, sets);
    const divided = { instance, cut, sides, roomInside, roomOutside: usableCount - roomInside };
    if (canAllCross(divided)) continue;
    const work = { left: Math.min(DIVISION_WORK.ofOneCut, DIVISION_WORK.inAll - spent) };
    const before = work.left;
    if (divideOps(divided, 0, work).kind === 'none') return divisionReason(problem, divided);
    spent += before - work.left;
    if (spent >= DIVISION_WORK.inAll) return null;
  }
  return null;
}

/** Whether there are channels for every net that could have to cross, so that no division can fail for them. */
function canAllCross({ instance, cut, sides }: CutProblem): boolean {
  const mayCross = (from: typeof INSIDE | typeof OUTSIDE) =>
    instance.nets.filter(
      ({ source, consumers }) =>
        sides[source] !== -from && consumers.some((consumer) => sides[consumer] !== from),
    ).length;
  return mayCross(INSIDE) <= cut.channelsOut && mayCross(OUTSIDE) <= cut.channelsIn;
}
