import type { OpId } from '@/lib/graph/kernel';
import type { Objective, Provenance } from '@/lib/mapping/mapping';
import { isWeighted, type Weights } from '@/lib/mapping/weights';
import type { BenchContent } from '../store/bench-content';
import { opsByTile } from '../store/bench-content';
import { type BenchFacts, benchFacts } from '../store/bench-facts';
import type { BenchStore } from '../store/bench-store';

/** What the fabric shows. */
export interface BenchView {
  facts: BenchFacts;
  byTile: ReadonlyMap<number, OpId>;
  /** Not the bench's content but a solve's best: looked at, not worked on. */
  preview: boolean;
  /** The weighted objective that the mapping was made for, if it was. */
  counted?: CountedObjective | null;
}

export interface CountedObjective {
  objective: Objective;
  weights: Weights;
}

/** Null where the plain figures say it all. */
export function countedIn(
  made: Provenance | { objective: Objective; weights?: Weights } | null,
): CountedObjective | null {
  if (made === null || !('objective' in made)) return null;
  const { objective, weights } = made;
  return weights && isWeighted(weights, objective) ? { objective, weights } : null;
}

/** A solve's best as it would look on the bench. */
export function previewView(
  store: BenchStore,
  best: Pick<BenchContent, 'placement' | 'routes'>,
  pins: BenchContent['pins'],
  counted: CountedObjective | null,
): BenchView {
  return {
    facts: benchFacts(store.setting, store.fabric, { ...best, pins }),
    byTile: opsByTile(store.setting.graph, best.placement),
    preview: true,
    counted,
  };
}
