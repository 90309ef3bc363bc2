/** Benches: placements that are being worked on. Kept mappings: mappings.ts. */
import { and, desc, eq, isNotNull, isNull, sql } from 'drizzle-orm';
import type { Fabric } from '../../lib/fabric/fabric';
import type { Kernel } from '../../lib/graph/kernel';
import type { Id } from '../../lib/ids';
import { type BenchDocument, emptyBenchDocument } from '../../lib/mapping/bench-document';
import type { Provenance } from '../../lib/mapping/mapping';
import { err, ok, type Result } from '../../lib/result';
import type { Tx } from '../client';
import { newId } from '../ids';
import { fabrics, fabricVersions, kernels, kernelVersions, mappingDrafts, users } from '../schema';
import { type SaveProblem, whyNotSaved } from './save-problem';

interface OneDraft {
  workspaceId: Id<'workspace'>;
  draftId: Id<'draft'>;
}

/** Measured by the action from the document; columns for lists. */
export interface BenchFigures {
  placedOps: number;
  wireHops: number;
  pathHops: number;
  longestPathHops: number;
  linksUsed: number;
  fullestLinkNets: number;
}

export interface MappingDraftListItem extends BenchFigures {
  id: Id<'draft'>;
  name: string;
  kernelId: Id<'kernel'>;
  kernelName: string;
  kernelVersion: number;
  fabricId: Id<'fabric'>;
  fabricName: string;
  fabricVersion: number;
  opCount: number;
  provenance: Provenance;
  keptAs: Id<'mapping'> | null;
  updatedByName: string;
  updatedAt: Date;
  archivedAt: Date | null;
}

export interface MappingDraftView {
  id: Id<'draft'>;
  name: string;
  revision: number;
  document: BenchDocument;
  provenance: Provenance;
  keptAs: Id<'mapping'> | null;
  updatedByName: string;
  updatedAt: Date;
  archivedAt: Date | null;
  kernel: {
    id: Id<'kernel'>;
    versionId: Id<'kernelversion'>;
    name: string;
    number: number;
    document: Kernel;
  };
  fabric: {
    id: Id<'fabric'>;
    versionId: Id<'fabricversion'>;
    name: string;
    number: number;
    document: Fabric;
  };
}

const one = (d: OneDraft) =>
  and(eq(mappingDrafts.workspaceId, d.workspaceId), eq(mappingDrafts.id, d.draftId));

const figureColumns = {
  placedOps: mappingDrafts.placedOps,
  wireHops: mappingDrafts.wireHops,
  pathHops: mappingDrafts.pathHops,
  longestPathHops: mappingDrafts.longestPathHops,
  linksUsed: mappingDrafts.linksUsed,
  fullestLinkNets: mappingDrafts.fullestLinkNets,
};

/** By name: whatever else the caller's object carries stays out of the row. */
const namedFigures = (figures: BenchFigures): BenchFigures => ({
  placedOps: figures.placedOps,
  wireHops: figures.wireHops,
  pathHops: figures.pathHops,
  longestPathHops: figures.longestPathHops,
  linksUsed: figures.linksUsed,
  fullestLinkNets: figures.fullestLinkNets,
});

/** A bench for two versions of this workspace; `not_found` when either is not of it. Empty unless told otherwise. */
export async function createMappingDraft(
  tx: Tx,
  draft: {
    workspaceId: Id<'workspace'>;
    userId: Id<'user'>;
    name: string;
    kernelVersionId: Id<'kernelversion'>;
    fabricVersionId: Id<'fabricversion'>;
    start?: { document: BenchDocument; provenance: Provenance; figures: BenchFigures };
  },
): Promise<Result<{ id: Id<'draft'> }, 'not_found'>> {
  const [kernel] = await tx
    .select({ opCount: kernelVersions.opCount })
    .from(kernelVersions)
    .where(
      and(eq(kernelVersions.workspaceId, draft.workspaceId), eq(kernelVersions.id, draft.kernelVersionId)),
    );
  const [fabric] = await tx
    .select({ id: fabricVersions.id })
    .from(fabricVersions)
    .where(
      and(eq(fabricVersions.workspaceId, draft.workspaceId), eq(fabricVersions.id, draft.fabricVersionId)),
    );
  if (!kernel || !fabric) return err('not_found');
  const id = newId('draft');
  await tx.insert(mappingDrafts).values({
    id,
    workspaceId: draft.workspaceId,
    name: draft.name,
    kernelVersionId: draft.kernelVersionId,
    fabricVersionId: draft.fabricVersionId,
    document: draft.start?.document ?? emptyBenchDocument,
    provenance: draft.start?.provenance ?? { by: 'hand' },
    opCount: kernel.opCount,
    ...(draft.start ? namedFigures(draft.start.figures) : {}),
    createdBy: draft.userId,
    updatedBy: draft.userId,
  });
  return ok({ id });
}

/** The one changed last first. */
export function listMappingDrafts(
  tx: Tx,
  of: { workspaceId: Id<'workspace'>; archived: boolean },
): Promise<MappingDraftListItem[]> {
  return tx
    .select({
      id: mappingDrafts.id,
      name: mappingDrafts.name,
      kernelId: kernels.id,
      kernelName: kernels.name,
      kernelVersion: kernelVersions.number,
      fabricId: fabrics.id,
      fabricName: fabrics.name,
      fabricVersion: fabricVersions.number,
      opCount: mappingDrafts.opCount,
      ...figureColumns,
      provenance: mappingDrafts.provenance,
      keptAs: mappingDrafts.keptAs,
      updatedByName: users.name,
      updatedAt: mappingDrafts.updatedAt,
      archivedAt: mappingDrafts.archivedAt,
    })
    .from(mappingDrafts)
    .innerJoin(users, eq(users.id, mappingDrafts.updatedBy))
    .innerJoin(kernelVersions, eq(kernelVersions.id, mappingDrafts.kernelVersionId))
    .innerJoin(kernels, eq(kernels.id, kernelVersions.kernelId))
    .innerJoin(fabricVersions, eq(fabricVersions.id, mappingDrafts.fabricVersionId))
    .innerJoin(fabrics, eq(fabrics.id, fabricVersions.fabricId))
    .where(
      and(
        eq(mappingDrafts.workspaceId, of.workspaceId),
        of.archived ? isNotNull(mappingDrafts.archivedAt) : isNull(mappingDrafts.archivedAt),
      ),
    )
    .orderBy(desc(mappingDrafts.updatedAt), desc(mappingDrafts.id));
}

/** The bench with both documents. */
export async function getMappingDraft(tx: Tx, draft: OneDraft): Promise<MappingDraftView | null> {
  const rows = await tx
    .select({
      id: mappingDrafts.id,
      name: mappingDrafts.name,
      revision: mappingDrafts.revision,
      document: mappingDrafts.document,
      provenance: mappingDrafts.provenance,
      keptAs: mappingDrafts.keptAs,
      updatedByName: users.name,
      updatedAt: mappingDrafts.updatedAt,
      archivedAt: mappingDrafts.archivedAt,
      kernel: {
        id: kernels.id,
        versionId: kernelVersions.id,
        name: kernels.name,
        number: kernelVersions.number,
        document: kernelVersions.document,
      },
      fabric: {
        id: fabrics.id,
        versionId: fabricVersions.id,
        name: fabrics.name,
        number: fabricVersions.number,
        document: fabricVersions.document,
      },
    })
    .from(mappingDrafts)
    .innerJoin(users, eq(users.id, mappingDrafts.updatedBy))
    .innerJoin(kernelVersions, eq(kernelVersions.id, mappingDrafts.kernelVersionId))
    .innerJoin(kernels, eq(kernels.id, kernelVersions.kernelId))
    .innerJoin(fabricVersions, eq(fabricVersions.id, mappingDrafts.fabricVersionId))
    .innerJoin(fabrics, eq(fabrics.id, fabricVersions.fabricId))
    .where(one(draft));
  return rows[0] ?? null;
}

/** Replaces the bench's document when `revision` is the stored one; the answer has the new revision. */
export async function saveMappingDraft(
  tx: Tx,
  save: OneDraft & {
    userId: Id<'user'>;
    revision: number;
    document: BenchDocument;
    provenance: Provenance;
    figures: BenchFigures;
  },
): Promise<Result<{ revision: number; updatedAt: Date }, SaveProblem>> {
  const saved = await tx
    .update(mappingDrafts)
    .set({
      document: save.document,
      provenance: save.provenance,
      ...save.figures,
      revision: sql`${mappingDrafts.revision} + 1`,
      updatedBy: save.userId,
      updatedAt: sql`now()`,
    })
    .where(and(one(save), eq(mappingDrafts.revision, save.revision), isNull(mappingDrafts.archivedAt)))
    .returning({ revision: mappingDrafts.revision, updatedAt: mappingDrafts.updatedAt });
  if (saved[0]) return ok(saved[0]);
  return err(whyNotSaved((await getMappingDraft(tx, save)) ?? undefined));
}

export async function renameMappingDraft(
  tx: Tx,
  change: OneDraft & { userId: Id<'user'>; name: string },
): Promise<Result<null, 'not_found'>> {
  const rows = await tx
    .update(mappingDrafts)
    .set({ name: change.name, updatedBy: change.userId, updatedAt: sql`now()` })
    .where(one(change))
    .returning({ id: mappingDrafts.id });
  return rows[0] ? ok(null) : err('not_found');
}

export async function archiveMappingDraft(
  tx: Tx,
  change: OneDraft & { archived: boolean },
): Promise<Result<{ name: string }, 'not_found'>> {
  const rows = await tx
    .update(mappingDrafts)
    .set({ archivedAt: change.archived ? sql`now()` : null })
    .where(one(change))
    .returning({ name: mappingDrafts.name });
  return rows[0] ? ok(rows[0]) : err('not_found');
}
