import type { OpId } from '@/lib/graph/kernel';
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
}

/** A solve's best as it would look on the bench. */
export function previewView(
  store: BenchStore,
  best: Pick<BenchContent, 'placement' | 'routes'>,
  pins: BenchContent['pins'],
): BenchView {
  return {
    facts: benchFacts(store.setting, store.fabric, { ...best, pins }),
    byTile: opsByTile(store.setting.graph, best.placement),
    preview: true,
  };
}
