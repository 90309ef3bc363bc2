/** The first reason found, most specific first, why no legal mapping can exist; null where none of these holds. */

import type { TileId } from '../../fabric/fabric';
import { tileLabel } from '../../fabric/tiles';
import { hostsOf } from '../../fabric/unit-library';
import type { OpId } from '../../graph/kernel';
import { opSpec } from '../../graph/op-catalog';
import { hopsBetween, type PlacementInstance, withinReach } from '../instance';
import type { InfeasibleReason } from '../outcome';
import { tileSets } from '../presolve/tile-sets';
import { tilesInReach } from '../presolve/tiles-in-reach';
import type { CheckedProblem } from '../problem';
import { opLabel } from '../problem';
import { explainCrowding } from './explain-crowding';
import { explainParts } from './explain-parts';

/** Cost: one matching, and for each connection its pairs of candidate tiles, or one spread from all of them at once. */
export function explainInfeasible(
  problem: CheckedProblem,
  instance: PlacementInstance,
): InfeasibleReason | null {
  return (
    pinConflict(problem) ??
    explainCrowding(problem, instance) ??
    unreachableConnection(problem, instance) ??
    explainParts(problem, instance)
  );
}

export const reason = (
  code: InfeasibleReason['code'],
  message: string,
  opIds: OpId[],
  tileIds: TileId[] = [],
  edgeIds: InfeasibleReason['edgeIds'] = [],
): InfeasibleReason => ({ code, message, opIds, tileIds, edgeIds });

function pinConflict(problem: CheckedProblem): InfeasibleReason | null {
  const byTile = new Map<TileId, OpId>();
  for (const op of problem.kernel.ops) {
    const tile = problem.pins[op.id];
    if (tile === undefined) continue;
    const name = opLabel(problem.kernel, op.id);
    const other = byTile.get(tile);
    if (other !== undefined) {
      const text = `${opLabel(problem.kernel, other)} and ${name} are both pinned to ${tileLabel(tile)}: a PE takes one op, so unpin one of them.`;
      return reason('pin conflict', text, [other, op.id], [tile]);
    }
    byTile.set(tile, op.id);
    const unit = problem.graph.units[problem.graph.tileIndex(tile)] ?? null;
    const spec = unit === null ? null : (problem.library.get(unit) ?? null);
    if (spec?.operations[op.kind] !== undefined) continue;
    const there = unit === null ? 'has a router but no PE' : `has a unit ${spec?.label ?? unit}`;
    const hosts = hostsOf(op.kind, problem.library).map((host) => host.label);
    const text = `${name} is pinned to ${tileLabel(tile)}, which ${there} and cannot do ${opSpec(op.kind).label}: pin it to ${hosts.join(' or ') || 'no unit'} or unpin it.`;
    return reason('pin conflict', text, [op.id], [tile]);
  }
  return null;
}

/** Pairs of tiles up to which they are looked at one by one. */
const PAIRS_LIMIT = 4096;

/** A connection whose ends have no two candidate tiles within reach. */
function unreachableConnection(
  problem: CheckedProblem,
  instance: PlacementInstance,
): InfeasibleReason | null {
  const { kernel, graph } = problem;
  const sets = tileSets(instance.tileCount);
  const reach = tilesInReach(sets, graph, graph.maxHops);
  const isReachable = (from: readonly number[], to: readonly number[]): boolean => {
    if (from.length * to.length > PAIRS_LIMIT) {
      const near = reach.of(sets.of(from), 'after');
      return sets.parted(sets.of(to), sets.bits(near)).within;
    }
    return from.some((p) => to.some((q) => q !== p && withinReach(instance, hopsBetween(instance, p, q))));
  };
  for (const { from, to } of instance.pairs) {
    const reachable = isReachable(instance.candidates[from] ?? [], instance.candidates[to] ?? []);
    if (reachable) continue;
    const [producer, consumer] = [kernel.ops[from]?.id as OpId, kernel.ops[to]?.id as OpId];
    const edges = kernel.edges.filter((edge) => edge.from === producer && edge.to === consumer);
    const names = `${opLabel(kernel, producer)} to ${opLabel(kernel, consumer)}`;
    const text =
      graph.maxHops === null
        ? `No two PEs that can hold the ends of the connection from ${names} are joined by links: add links or units, or move pins.`
        : `No two PEs that can hold the ends of the connection from ${names} are within the clock's ${graph.maxHops} hops: lengthen the clock period, or move units or pins nearer.`;
    const tiles = [...new Set([...(instance.candidates[from] ?? []), ...(instance.candidates[to] ?? [])])]
      .map((tile) => graph.tiles[tile] as TileId)
      .slice(0, 64);
    return reason(
      'out of reach',
      text,
      [producer, consumer],
      tiles,
      edges.map((edge) => edge.id),
    );
  }
  return null;
}
