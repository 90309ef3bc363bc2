/** Kept mappings: complete, verified by the caller before they come here, and unchanging afterwards. */
import { and, desc, eq, isNotNull, isNull, sql } from 'drizzle-orm';
import type { Fabric } from '../../lib/fabric/fabric';
import type { Kernel } from '../../lib/graph/kernel';
import type { Id } from '../../lib/ids';
import type { MappingDocument, Objective, Provenance } from '../../lib/mapping/mapping';
import { err, ok, type Result } from '../../lib/result';
import type { Tx } from '../client';
import { newId } from '../ids';
import { fabrics, fabricVersions, kernels, kernelVersions, mappingDrafts, mappings, users } from '../schema';
import type { SolveStatus } from '../schema/mappings';
import type { BenchFigures } from './mapping-drafts';
import { type SaveProblem, whyNotSaved } from './save-problem';

interface OneMapping {
  workspaceId: Id<'workspace'>;
  mappingId: Id<'mapping'>;
}

export type MappingFigures = Omit<BenchFigures, 'placedOps'>;

export interface MappingListItem extends MappingFigures {
  id: Id<'mapping'>;
  name: string;
  kernelId: Id<'kernel'>;
  kernelName: string;
  kernelVersion: number;
  fabricId: Id<'fabric'>;
  fabricName: string;
  fabricVersion: number;
  madeByName: string;
  solveStatus: SolveStatus;
  changedByHand: boolean;
  engine: string | null;
  objective: Objective | null;
  objectiveValue: number | null;
  bound: number | null;
  opCount: number;
  createdAt: Date;
  archivedAt: Date | null;
}

export interface MappingView extends MappingListItem {
  kernelVersionId: Id<'kernelversion'>;
  fabricVersionId: Id<'fabricversion'>;
  draftId: Id<'draft'> | null;
  seed: number | null;
  timeLimitMs: number | null;
  document: MappingDocument;
  kernel: Kernel;
  fabric: Fabric;
}

const listColumns = {
  id: mappings.id,
  name: mappings.name,
  kernelId: kernels.id,
  kernelName: kernels.name,
  kernelVersion: kernelVersions.number,
  fabricId: fabrics.id,
  fabricName: fabrics.name,
  fabricVersion: fabricVersions.number,
  madeByName: users.name,
  solveStatus: mappings.solveStatus,
  changedByHand: mappings.changedByHand,
  engine: mappings.engine,
  objective: mappings.objective,
  objectiveValue: mappings.objectiveValue,
  bound: mappings.bound,
  opCount: mappings.opCount,
  wireHops: mappings.wireHops,
  pathHops: mappings.pathHops,
  longestPathHops: mappings.longestPathHops,
  linksUsed: mappings.linksUsed,
  fullestLinkNets: mappings.fullestLinkNets,
  createdAt: mappings.createdAt,
  archivedAt: mappings.archivedAt,
};

/** The columns of a provenance that lists sort by. */
function provenanceColumns(provenance: Provenance) {
  if (provenance.by === 'hand') return { solveStatus: 'by hand' as const };
  const { engine, objective, seed, timeLimitMs, objectiveValue, bound, changedByHand, status } = provenance;
  return { solveStatus: status, engine, objective, seed, timeLimitMs, objectiveValue, bound, changedByHand };
}

/**
 * Keeps what the bench holds under a name. The caller has verified `document` against both versions and measured
 * it; `revision` makes sure that it is what the bench still holds.
 */
export function keepMapping(
  tx: Tx,
  keep: {
    workspaceId: Id<'workspace'>;
    userId: Id<'user'>;
    draftId: Id<'draft'>;
    revision: number;
    document: MappingDocument;
    figures: MappingFigures;
  },
): Promise<Result<{ id: Id<'mapping'> }, SaveProblem>> {
  return tx.transaction(async (inner) => {
    const [draft] = await inner
      .select({
        revision: mappingDrafts.revision,
        kernelVersionId: mappingDrafts.kernelVersionId,
        fabricVersionId: mappingDrafts.fabricVersionId,
        opCount: mappingDrafts.opCount,
        archivedAt: mappingDrafts.archivedAt,
        updatedAt: mappingDrafts.updatedAt,
        updatedByName: users.name,
      })
      .from(mappingDrafts)
      .innerJoin(users, eq(users.id, mappingDrafts.updatedBy))
      .where(and(eq(mappingDrafts.workspaceId, keep.workspaceId), eq(mappingDrafts.id, keep.draftId)))
      .for('update', { of: mappingDrafts });
    if (!draft || draft.archivedAt || draft.revision !== keep.revision) return err(whyNotSaved(draft));
    const id = newId('mapping');
    await inner.insert(mappings).values({
      id,
      workspaceId: keep.workspaceId,
      name: keep.document.name,
      kernelVersionId: draft.kernelVersionId,
      fabricVersionId: draft.fabricVersionId,
      mappingDraftId: keep.draftId,
      document: keep.document,
      madeBy: keep.userId,
      ...provenanceColumns(keep.document.provenance),
      opCount: draft.opCount,
      ...keep.figures,
    });
    await inner
      .update(mappingDrafts)
      .set({ keptAs: id })
      .where(and(eq(mappingDrafts.workspaceId, keep.workspaceId), eq(mappingDrafts.id, keep.draftId)));
    return ok({ id });
  });
}

/** Newest first. */
export function listMappings(
  tx: Tx,
  of: {
    workspaceId: Id<'workspace'>;
    archived: boolean;
    kernelId?: Id<'kernel'>;
    fabricId?: Id<'fabric'>;
  },
): Promise<MappingListItem[]> {
  return tx
    .select(listColumns)
    .from(mappings)
    .innerJoin(users, eq(users.id, mappings.madeBy))
    .innerJoin(kernelVersions, eq(kernelVersions.id, mappings.kernelVersionId))
    .innerJoin(kernels, eq(kernels.id, kernelVersions.kernelId))
    .innerJoin(fabricVersions, eq(fabricVersions.id, mappings.fabricVersionId))
    .innerJoin(fabrics, eq(fabrics.id, fabricVersions.fabricId))
    .where(
      and(
        eq(mappings.workspaceId, of.workspaceId),
        of.archived ? isNotNull(mappings.archivedAt) : isNull(mappings.archivedAt),
        of.kernelId ? eq(kernels.id, of.kernelId) : undefined,
        of.fabricId ? eq(fabrics.id, of.fabricId) : undefined,
      ),
    )
    .orderBy(desc(mappings.createdAt), desc(mappings.id));
}

/** The mapping with the documents of both versions. */
export async function getMapping(tx: Tx, mapping: OneMapping): Promise<MappingView | null> {
  const rows = await tx
    .select({
      ...listColumns,
      kernelVersionId: mappings.kernelVersionId,
      fabricVersionId: mappings.fabricVersionId,
      draftId: mappings.mappingDraftId,
      seed: mappings.seed,
      timeLimitMs: mappings.timeLimitMs,
      document: mappings.document,
      kernel: kernelVersions.document,
      fabric: fabricVersions.document,
    })
    .from(mappings)
    .innerJoin(users, eq(users.id, mappings.madeBy))
    .innerJoin(kernelVersions, eq(kernelVersions.id, mappings.kernelVersionId))
    .innerJoin(kernels, eq(kernels.id, kernelVersions.kernelId))
    .innerJoin(fabricVersions, eq(fabricVersions.id, mappings.fabricVersionId))
    .innerJoin(fabrics, eq(fabrics.id, fabricVersions.fabricId))
    .where(one(mapping));
  return rows[0] ?? null;
}

const one = (m: OneMapping) => and(eq(mappings.workspaceId, m.workspaceId), eq(mappings.id, m.mappingId));

export async function renameMapping(
  tx: Tx,
  change: OneMapping & { name: string },
): Promise<Result<null, 'not_found'>> {
  const rows = await tx
    .update(mappings)
    .set({ name: change.name })
    .where(one(change))
    .returning({ id: mappings.id });
  return rows[0] ? ok(null) : err('not_found');
}

export async function archiveMapping(
  tx: Tx,
  change: OneMapping & { archived: boolean },
): Promise<Result<{ name: string }, 'not_found'>> {
  const rows = await tx
    .update(mappings)
    .set({ archivedAt: change.archived ? sql`now()` : null })
    .where(one(change))
    .returning({ name: mappings.name });
  return rows[0] ? ok(rows[0]) : err('not_found');
}
