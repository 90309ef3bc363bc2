/** What is said where no count explains it, but every possibility was tried. */
import type { InfeasibleReason } from '../outcome';
import type { CheckedProblem } from '../problem';

/** No placement exists, routes or not. */
export function noPlacementReason({ graph }: CheckedProblem): InfeasibleReason {
  const limit = graph.maxHops === null ? 'joined by links' : `within the clock's ${graph.maxHops} hops`;
  return {
    code: 'proved by search',
    message: `Proved by exhaustive search: no placement puts every op on a PE of its own that can hold it with all connections ${limit}. ${graph.maxHops === null ? 'Add links' : 'Lengthen the clock period'}, add units, or remove pins.`,
    opIds: [],
    tileIds: [],
    edgeIds: [],
  };
}
