/** Too few PEs for a set of ops: Hall's condition, with the smallest witness that augmenting paths give. */

import type { TileId } from '../../fabric/fabric';
import type { Op, OpId } from '../../graph/kernel';
import { opSpec } from '../../graph/op-catalog';
import type { PlacementInstance } from '../instance';
import type { InfeasibleReason } from '../outcome';
import type { Loss, LossRule } from '../presolve/filter-candidates';
import type { CheckedProblem } from '../problem';
import { opLabel } from '../problem';
import { matchOps } from '../search/matching';
import { lossCodes } from './explain-lost-op';

/** `losses`: what the filter has struck out of the candidates, which the reason then tells. */
export function explainCrowding(
  problem: CheckedProblem,
  instance: PlacementInstance,
  losses: ReadonlyMap<number, readonly Loss[]> = new Map(),
): InfeasibleReason | null {
  const matched = matchOps(instance.candidates, instance.tileCount);
  if (matched.ok) return null;
  const { kernel, graph } = problem;
  // The witness holds one op too many for its tiles; all other ops that need one of these tiles belong to the story.
  const tiles = new Set(matched.tiles);
  const ops = kernel.ops.flatMap((_, i) => {
    const own = instance.candidates[i] ?? [];
    return own.every((tile) => tiles.has(tile)) ? [i] : [];
  });
  const opIds = ops.map((i) => kernel.ops[i]?.id as OpId);
  const labels = [...new Set(ops.map((i) => opSpec((kernel.ops[i] as Op).kind).label))];
  const what = ops.length === 1 ? opLabel(kernel, opIds[0] as OpId) : `${ops.length} ops (${list(labels)})`;
  const units = [...new Set(matched.tiles.map((tile) => graph.units[tile] ?? null))].flatMap((unit) =>
    unit === null ? [] : [problem.library.get(unit)?.label ?? unit],
  );
  const holders =
    matched.tiles.length === 0
      ? 'no PE of the fabric can'
      : `only ${matched.tiles.length} ${matched.tiles.length === 1 ? 'PE' : 'PEs'} (${list(units)}) can`;
  const rules = new Set(ops.flatMap((i) => (losses.get(i) ?? []).map((loss) => loss.rule)));
  const whys = [...rules].map((rule) => lossWords[rule]);
  const left = whys.length === 0 ? '' : `, as others ${whys.join(' or ')}`;
  const message = `${what} need ${ops.length === 1 ? 'a PE' : 'PEs of their own'}, but ${holders} hold them${left}: add units that can, take ops out, or unpin ops that stand in the way.`;
  return {
    // One rule alone is the reason; several together leave too few tiles.
    code: rules.size === 1 ? lossCodes[[...rules][0] as LossRule] : 'too few tiles',
    message,
    opIds,
    tileIds: matched.tiles.map((tile) => graph.tiles[tile] as TileId),
    edgeIds: [],
  };
}

const lossWords: Record<LossRule, string> = {
  inputs: 'have too few incoming channels',
  output: 'have no outgoing link',
  reach: 'are out of reach of PEs for the ops they are connected with',
  taken: 'are needed by ops that can stand nowhere else',
};

const list = (names: readonly string[]): string =>
  names.length > 4 ? `${names.slice(0, 4).join(', ')} and others` : names.join(', ');
