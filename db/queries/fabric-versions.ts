/** Numbered states of fabrics. They are only added. */
import { and, desc, eq, sql } from 'drizzle-orm';
import type { Fabric, Topology } from '../../lib/fabric/fabric';
import type { Id } from '../../lib/ids';
import { err, ok, type Result } from '../../lib/result';
import type { Tx } from '../client';
import { newId } from '../ids';
import { fabrics, fabricVersions, users } from '../schema';

export interface FabricVersionListItem {
  id: Id<'fabricversion'>;
  number: number;
  label: string;
  rows: number;
  cols: number;
  topology: Topology;
  peCount: number;
  createdByName: string;
  createdAt: Date;
}

export interface FabricVersionView extends FabricVersionListItem {
  fabricId: Id<'fabric'>;
  document: Fabric;
}

const listColumns = {
  id: fabricVersions.id,
  number: fabricVersions.number,
  label: fabricVersions.label,
  rows: fabricVersions.rows,
  cols: fabricVersions.cols,
  topology: fabricVersions.topology,
  peCount: fabricVersions.peCount,
  createdByName: users.name,
  createdAt: fabricVersions.createdAt,
};
const viewColumns = { ...listColumns, fabricId: fabricVersions.fabricId, document: fabricVersions.document };

/**
 * Fixes the draft as the next version. When the newest version has the same content, that one is the answer and
 * `created` is false. `conflict`: the draft is not at `revision` any more.
 */
export function createFabricVersion(
  tx: Tx,
  of: {
    workspaceId: Id<'workspace'>;
    userId: Id<'user'>;
    fabricId: Id<'fabric'>;
    revision: number;
    label: string;
  },
): Promise<Result<{ id: Id<'fabricversion'>; number: number; created: boolean }, 'not_found' | 'conflict'>> {
  return tx.transaction(async (inner) => {
    // The lock makes two versions at the same moment take two numbers.
    const [draft] = await inner
      .select({
        document: fabrics.draft,
        revision: fabrics.revision,
        contentHash: sql<string>`encode(sha256(convert_to(${fabrics.draft}::text, 'UTF8')), 'hex')`,
      })
      .from(fabrics)
      .where(and(eq(fabrics.workspaceId, of.workspaceId), eq(fabrics.id, of.fabricId)))
      .for('update');
    if (!draft) return err('not_found');
    if (draft.revision !== of.revision) return err('conflict');
    const [newest] = await inner
      .select({
        id: fabricVersions.id,
        number: fabricVersions.number,
        contentHash: fabricVersions.contentHash,
      })
      .from(fabricVersions)
      .where(eq(fabricVersions.fabricId, of.fabricId))
      .orderBy(desc(fabricVersions.number))
      .limit(1);
    if (newest?.contentHash === draft.contentHash) {
      return ok({ id: newest.id, number: newest.number, created: false });
    }
    const version = { id: newId('fabricversion'), number: (newest?.number ?? 0) + 1 };
    await inner.insert(fabricVersions).values({
      ...version,
      workspaceId: of.workspaceId,
      fabricId: of.fabricId,
      label: of.label,
      document: draft.document,
      contentHash: draft.contentHash,
      rows: draft.document.rows,
      cols: draft.document.cols,
      topology: draft.document.topology,
      peCount: draft.document.units.filter((unit) => unit !== null).length,
      createdBy: of.userId,
    });
    return ok({ ...version, created: true });
  });
}

/** Newest first. */
export function listFabricVersions(
  tx: Tx,
  of: { workspaceId: Id<'workspace'>; fabricId: Id<'fabric'> },
): Promise<FabricVersionListItem[]> {
  return tx
    .select(listColumns)
    .from(fabricVersions)
    .innerJoin(users, eq(users.id, fabricVersions.createdBy))
    .where(and(eq(fabricVersions.workspaceId, of.workspaceId), eq(fabricVersions.fabricId, of.fabricId)))
    .orderBy(desc(fabricVersions.number));
}

export async function getFabricVersionByNumber(
  tx: Tx,
  of: { workspaceId: Id<'workspace'>; fabricId: Id<'fabric'>; number: number },
): Promise<FabricVersionView | null> {
  const rows = await tx
    .select(viewColumns)
    .from(fabricVersions)
    .innerJoin(users, eq(users.id, fabricVersions.createdBy))
    .where(
      and(
        eq(fabricVersions.workspaceId, of.workspaceId),
        eq(fabricVersions.fabricId, of.fabricId),
        eq(fabricVersions.number, of.number),
      ),
    );
  return rows[0] ?? null;
}
