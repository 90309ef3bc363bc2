/** Why a save of a draft was not carried out. */
export type SaveProblem =
  | { code: 'not_found' }
  | { code: 'archived' }
  /** Somebody saved in between: what is stored now has `revision`. The caller keeps its own state. */
  | { code: 'conflict'; revision: number; updatedByName: string; updatedAt: Date };

/** Tells apart why an update that names a revision changed no row. `current` is the row without the revision. */
export function whyNotSaved(
  current: { revision: number; archivedAt: Date | null; updatedByName: string; updatedAt: Date } | undefined,
): SaveProblem {
  if (!current) return { code: 'not_found' };
  if (current.archivedAt) return { code: 'archived' };
  const { revision, updatedByName, updatedAt } = current;
  return { code: 'conflict', revision, updatedByName, updatedAt };
}
