/** Who may say what of a mapping: a bench's claim about its making, held against what is known of it. */
import type { Placement, Provenance } from './mapping';
import { sameWeights } from './weights';

/** A state that is known to be true: a solve's end, or what the server stored before. */
export interface KnownMaking {
  provenance: Provenance;
  placement: Placement;
}

/**
 * The provenance to store for a placement. A claim of the solver's work stands only where a known making has the same
 * figures; `changedByHand` is false only where that one's very placement is there. Anything else is by hand.
 */
export function honestProvenance(
  claimed: Provenance,
  placement: Placement,
  known: readonly KnownMaking[],
): Provenance {
  if (claimed.by === 'hand') return claimed;
  const same = known.filter(({ provenance }) => provenance.by === 'solver' && sameSolve(provenance, claimed));
  // Solves of other pins may have ended with the same figures; their certificates tell them apart.
  const meant = same.find(({ provenance }) => digestOf(provenance) === digestOf(claimed)) ?? same[0];
  if (meant?.provenance.by !== 'solver') return { by: 'hand' };
  const untouched = same.some(
    (making) =>
      making.provenance.by === 'solver' &&
      !making.provenance.changedByHand &&
      samePlacement(making.placement, placement),
  );
  return { ...meant.provenance, changedByHand: !untouched };
}

type BySolver = Extract<Provenance, { by: 'solver' }>;

const digestOf = (provenance: Provenance): string | undefined =>
  provenance.by === 'solver' ? provenance.certificate?.problemDigest : undefined;

const sameSolve = (a: BySolver, b: BySolver): boolean =>
  a.engine === b.engine &&
  a.objective === b.objective &&
  sameWeights(a.weights, b.weights, a.objective) &&
  a.timeLimitMs === b.timeLimitMs &&
  a.seed === b.seed &&
  a.status === b.status &&
  a.objectiveValue === b.objectiveValue &&
  a.bound === b.bound;

export function samePlacement(a: Placement, b: Placement): boolean {
  const [left, right] = [Object.entries(a), new Map(Object.entries(b))];
  return left.length === right.size && left.every(([op, tile]) => right.get(op) === tile);
}
