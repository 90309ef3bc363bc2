/** An op that the filter has left without a tile, and what each rule took from it. */
import type { TileId } from '../../fabric/fabric';
import type { OpId } from '../../graph/kernel';
import type { PlacementInstance } from '../instance';
import type { InfeasibleCode, InfeasibleReason } from '../outcome';
import { channelCounts } from '../presolve/channel-counts';
import type { Loss, LossRule } from '../presolve/filter-candidates';
import { type CheckedProblem, opLabel } from '../problem';

export const lossCodes: Record<LossRule, InfeasibleCode> = {
  inputs: 'too few channels',
  output: 'too few channels',
  reach: 'out of reach',
  taken: 'too few tiles',
};

/** `instance` has the candidates from before the filter. */
export function explainLostOp(
  problem: CheckedProblem,
  instance: PlacementInstance,
  op: number,
  losses: readonly Loss[],
): InfeasibleReason {
  const { kernel, graph } = problem;
  const id = kernel.ops[op]?.id as OpId;
  const tiles = instance.candidates[op] ?? [];
  const rules = [...losses].sort((a, b) => b.tileCount - a.tileCount);
  const main = rules[0]?.rule ?? 'reach';
  const where =
    problem.pins[id] !== undefined
      ? 'where it is pinned'
      : `on ${tiles.length === 1 ? 'the only PE' : `any of the ${tiles.length} PEs`} with a unit for it`;
  const whys = rules.map((loss) => whyLost(problem, instance, op, loss));
  const near = rules.flatMap(({ rule, because }) =>
    rule === 'inputs' ? producersOf(instance, op) : because,
  );
  const opIds = [...new Set([op, ...near])].flatMap((other) => kernel.ops[other]?.id ?? []);
  const named = new Set<string>(opIds);
  return {
    code: lossCodes[main],
    message: `${opLabel(kernel, id)} cannot stand ${where}: ${whys.join(', ')}. ${remedy(main, graph.maxHops)}`,
    opIds,
    tileIds: tiles.slice(0, 64).map((tile) => graph.tiles[tile] as TileId),
    edgeIds: kernel.edges
      .filter(({ from, to }) => (from === id) !== (to === id) && named.has(from) && named.has(to))
      .map((edge) => edge.id),
  };
}

/** "2 have at most 1 incoming channel for the values of 3 ops". */
function whyLost(
  { kernel, graph }: CheckedProblem,
  instance: PlacementInstance,
  op: number,
  { rule, tileCount, because }: Loss,
): string {
  const tiles = instance.candidates[op] ?? [];
  const which = tiles.length === 1 ? 'it' : tileCount === tiles.length ? `all ${tileCount}` : `${tileCount}`;
  const [has, is] = tileCount === 1 ? ['has', 'is'] : ['have', 'are'];
  const names = because.map((other) => opLabel(kernel, kernel.ops[other]?.id as OpId));
  switch (rule) {
    case 'inputs': {
      const needed = producersOf(instance, op).length;
      const { into } = channelCounts(graph, instance.tileCount);
      const most = Math.max(...tiles.map((tile) => into[tile] as number).filter((count) => count < needed));
      const channels = most === 1 ? '1 incoming channel' : `${most} incoming channels`;
      return `${which} ${has} at most ${channels} for the values of ${needed} other ${needed === 1 ? 'op' : 'ops'}`;
    }
    case 'output':
      return `${which} ${has} no outgoing link for its value`;
    case 'reach': {
      const limit =
        graph.maxHops === null
          ? 'not joined by links'
          : `not within ${graph.maxHops} ${graph.maxHops === 1 ? 'hop' : 'hops'}`;
      return `${which} ${is} ${limit} ${graph.maxHops === null ? 'to' : 'of'} a PE for ${listed(names, 'or')}`;
    }
    case 'taken':
      return `${which} ${is} needed by ${listed(names, 'and')}, which can stand nowhere else`;
  }
}

const producersOf = (instance: PlacementInstance, op: number): number[] =>
  instance.nets.flatMap(({ source, consumers }) => (consumers.includes(op) ? [source] : []));

function remedy(rule: LossRule, maxHops: number | null): string {
  switch (rule) {
    case 'inputs':
    case 'output':
      return 'Add channels or links there, or units where there are more.';
    case 'reach':
      return maxHops === null
        ? 'Add links, or move pins or units to where links lead.'
        : 'Lengthen the clock period, or move pins or units nearer.';
    case 'taken':
      return 'Add units, or unpin ops that stand in the way.';
  }
}

const listed = (names: readonly string[], word: 'and' | 'or'): string => {
  const shown = names.length > 4 ? [...names.slice(0, 3), 'others'] : names;
  return shown.length < 2 ? shown.join() : `${shown.slice(0, -1).join(', ')} ${word} ${shown.at(-1)}`;
};
