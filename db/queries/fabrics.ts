/** Fabrics and their drafts. Versions: fabric-versions.ts. */
import { and, desc, eq, isNotNull, isNull, sql } from 'drizzle-orm';
import type { Fabric, Topology } from '../../lib/fabric/fabric';
import type { Id } from '../../lib/ids';
import { err, ok, type Result } from '../../lib/result';
import type { Tx } from '../client';
import { newId } from '../ids';
import { fabrics, fabricVersions, users } from '../schema';
import { type SaveProblem, whyNotSaved } from './save-problem';

interface OneFabric {
  workspaceId: Id<'workspace'>;
  fabricId: Id<'fabric'>;
}

export interface FabricListItem {
  id: Id<'fabric'>;
  name: string;
  rows: number;
  cols: number;
  topology: Topology;
  /** Tiles with a unit. */
  peCount: number;
  errorCount: number;
  /** Null: no version yet. */
  latestVersion: number | null;
  updatedByName: string;
  updatedAt: Date;
  archivedAt: Date | null;
}

export interface FabricDraft {
  id: Id<'fabric'>;
  name: string;
  document: Fabric;
  revision: number;
  latestVersion: number | null;
  updatedByName: string;
  updatedAt: Date;
  archivedAt: Date | null;
}

const latestVersion = sql<number | null>`(
  select max(v.number) from ${fabricVersions} v where v.fabric_id = ${fabrics.id})`;
const one = (f: OneFabric) => and(eq(fabrics.workspaceId, f.workspaceId), eq(fabrics.id, f.fabricId));

/** The one changed last first. */
export function listFabrics(
  tx: Tx,
  of: { workspaceId: Id<'workspace'>; archived: boolean },
): Promise<FabricListItem[]> {
  return tx
    .select({
      id: fabrics.id,
      name: fabrics.name,
      rows: fabrics.rows,
      cols: fabrics.cols,
      topology: fabrics.topology,
      peCount: fabrics.peCount,
      errorCount: fabrics.errorCount,
      latestVersion,
      updatedByName: users.name,
      updatedAt: fabrics.updatedAt,
      archivedAt: fabrics.archivedAt,
    })
    .from(fabrics)
    .innerJoin(users, eq(users.id, fabrics.updatedBy))
    .where(
      and(
        eq(fabrics.workspaceId, of.workspaceId),
        of.archived ? isNotNull(fabrics.archivedAt) : isNull(fabrics.archivedAt),
      ),
    )
    .orderBy(desc(fabrics.updatedAt), desc(fabrics.id));
}

export async function getFabricDraft(tx: Tx, fabric: OneFabric): Promise<FabricDraft | null> {
  const rows = await tx
    .select({
      id: fabrics.id,
      name: fabrics.name,
      document: fabrics.draft,
      revision: fabrics.revision,
      latestVersion,
      updatedByName: users.name,
      updatedAt: fabrics.updatedAt,
      archivedAt: fabrics.archivedAt,
    })
    .from(fabrics)
    .innerJoin(users, eq(users.id, fabrics.updatedBy))
    .where(one(fabric));
  return rows[0] ?? null;
}

/** What lists show of a document. */
const figures = (document: Fabric, errorCount: number) => ({
  name: document.name,
  rows: document.rows,
  cols: document.cols,
  topology: document.topology,
  peCount: document.units.filter((unit) => unit !== null).length,
  errorCount,
});

export async function createFabric(
  tx: Tx,
  fabric: { workspaceId: Id<'workspace'>; userId: Id<'user'>; document: Fabric; errorCount: number },
): Promise<{ id: Id<'fabric'>; revision: number }> {
  const id = newId('fabric');
  await tx.insert(fabrics).values({
    id,
    workspaceId: fabric.workspaceId,
    draft: fabric.document,
    ...figures(fabric.document, fabric.errorCount),
    createdBy: fabric.userId,
    updatedBy: fabric.userId,
  });
  return { id, revision: 1 };
}

/** Replaces the draft when `revision` is the stored one; the answer has the new revision. */
export async function saveFabricDraft(
  tx: Tx,
  save: OneFabric & { userId: Id<'user'>; revision: number; document: Fabric; errorCount: number },
): Promise<Result<{ revision: number; updatedAt: Date }, SaveProblem>> {
  const saved = await tx
    .update(fabrics)
    .set({
      draft: save.document,
      ...figures(save.document, save.errorCount),
      revision: sql`${fabrics.revision} + 1`,
      updatedBy: save.userId,
      updatedAt: sql`now()`,
    })
    .where(and(one(save), eq(fabrics.revision, save.revision), isNull(fabrics.archivedAt)))
    .returning({ revision: fabrics.revision, updatedAt: fabrics.updatedAt });
  if (saved[0]) return ok(saved[0]);
  return err(whyNotSaved((await getFabricDraft(tx, save)) ?? undefined));
}

/** Renames the fabric and its draft; an editor that is open learns of it by the revision. */
export async function renameFabric(
  tx: Tx,
  change: OneFabric & { userId: Id<'user'>; name: string },
): Promise<Result<{ revision: number }, 'not_found'>> {
  const rows = await tx
    .update(fabrics)
    .set({
      name: change.name,
      draft: sql`jsonb_set(${fabrics.draft}, '{name}', to_jsonb(${change.name}::text))`,
      revision: sql`${fabrics.revision} + 1`,
      updatedBy: change.userId,
      updatedAt: sql`now()`,
    })
    .where(and(one(change), isNull(fabrics.archivedAt)))
    .returning({ revision: fabrics.revision });
  return rows[0] ? ok(rows[0]) : err('not_found');
}

/** Puts a fabric away, or takes it back. Its versions and mappings stay as they are. */
export async function archiveFabric(
  tx: Tx,
  change: OneFabric & { archived: boolean },
): Promise<Result<{ name: string }, 'not_found'>> {
  const rows = await tx
    .update(fabrics)
    .set({ archivedAt: change.archived ? sql`now()` : null })
    .where(one(change))
    .returning({ name: fabrics.name });
  return rows[0] ? ok(rows[0]) : err('not_found');
}
