import type { MappingDraftView } from '@/db/queries/mapping-drafts';
import type { SolveView } from '@/db/queries/solve-jobs';
import type { KnownMaking } from '@/lib/mapping/honest-provenance';
import type { Provenance } from '@/lib/mapping/mapping';
import { effectiveWeights } from '@/lib/mapping/weights';

/** What is known of a bench's making: its solves that ended with a mapping, and what was stored before. */
export function knownMakings(
  draft: Pick<MappingDraftView, 'provenance' | 'document'>,
  solves: readonly Pick<SolveView, 'settings' | 'outcome' | 'best'>[],
): KnownMaking[] {
  const fromSolves = solves.flatMap((solve) => {
    const provenance = solveProvenance(solve);
    return provenance && solve.best ? [{ provenance, placement: solve.best.placement }] : [];
  });
  return [...fromSolves, { provenance: draft.provenance, placement: draft.document.placement }];
}

/** The provenance of a solve's own result; null while it has none. */
export function solveProvenance({
  settings,
  outcome,
}: Pick<SolveView, 'settings' | 'outcome'>): Provenance | null {
  if (!outcome || outcome.objectiveValue === null || outcome.bound === null) return null;
  if (outcome.status !== 'optimal' && outcome.status !== 'feasible') return null;
  const weights = effectiveWeights(settings.weights, settings.objective);
  return {
    by: 'solver',
    engine: outcome.engine,
    objective: settings.objective,
    ...(weights && { weights }),
    timeLimitMs: settings.timeLimitMs,
    seed: settings.seed,
    status: outcome.status,
    objectiveValue: outcome.objectiveValue,
    bound: outcome.bound,
    elapsedMs: outcome.elapsedMs,
    changedByHand: false,
    ...(outcome.certificate && { certificate: outcome.certificate }),
  };
}
