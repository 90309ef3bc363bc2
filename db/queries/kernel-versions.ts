/** Numbered states of kernels. They are only added. */
import { and, desc, eq, sql } from 'drizzle-orm';
import type { Kernel } from '../../lib/graph/kernel';
import type { Id } from '../../lib/ids';
import { err, ok, type Result } from '../../lib/result';
import type { Tx } from '../client';
import { newId } from '../ids';
import { kernels, kernelVersions, users } from '../schema';

export interface KernelVersionListItem {
  id: Id<'kernelversion'>;
  number: number;
  label: string;
  opCount: number;
  edgeCount: number;
  createdByName: string;
  createdAt: Date;
}

export interface KernelVersionView extends KernelVersionListItem {
  kernelId: Id<'kernel'>;
  document: Kernel;
}

const listColumns = {
  id: kernelVersions.id,
  number: kernelVersions.number,
  label: kernelVersions.label,
  opCount: kernelVersions.opCount,
  edgeCount: kernelVersions.edgeCount,
  createdByName: users.name,
  createdAt: kernelVersions.createdAt,
};
const viewColumns = { ...listColumns, kernelId: kernelVersions.kernelId, document: kernelVersions.document };

/**
 * Fixes the draft as the next version. When the newest version has the same content, that one is the answer and
 * `created` is false. `conflict`: the draft is not at `revision` any more.
 */
export function createKernelVersion(
  tx: Tx,
  of: {
    workspaceId: Id<'workspace'>;
    userId: Id<'user'>;
    kernelId: Id<'kernel'>;
    revision: number;
    label: string;
  },
): Promise<Result<{ id: Id<'kernelversion'>; number: number; created: boolean }, 'not_found' | 'conflict'>> {
  return tx.transaction(async (inner) => {
    // The lock makes two versions at the same moment take two numbers.
    const [draft] = await inner
      .select({
        document: kernels.draft,
        revision: kernels.revision,
        contentHash: sql<string>`encode(sha256(convert_to(${kernels.draft}::text, 'UTF8')), 'hex')`,
      })
      .from(kernels)
      .where(and(eq(kernels.workspaceId, of.workspaceId), eq(kernels.id, of.kernelId)))
      .for('update');
    if (!draft) return err('not_found');
    if (draft.revision !== of.revision) return err('conflict');
    const [newest] = await inner
      .select({
        id: kernelVersions.id,
        number: kernelVersions.number,
        contentHash: kernelVersions.contentHash,
      })
      .from(kernelVersions)
      .where(eq(kernelVersions.kernelId, of.kernelId))
      .orderBy(desc(kernelVersions.number))
      .limit(1);
    if (newest?.contentHash === draft.contentHash) {
      return ok({ id: newest.id, number: newest.number, created: false });
    }
    const version = { id: newId('kernelversion'), number: (newest?.number ?? 0) + 1 };
    await inner.insert(kernelVersions).values({
      ...version,
      workspaceId: of.workspaceId,
      kernelId: of.kernelId,
      label: of.label,
      document: draft.document,
      contentHash: draft.contentHash,
      opCount: draft.document.ops.length,
      edgeCount: draft.document.edges.length,
      createdBy: of.userId,
    });
    return ok({ ...version, created: true });
  });
}

/** Newest first. */
export function listKernelVersions(
  tx: Tx,
  of: { workspaceId: Id<'workspace'>; kernelId: Id<'kernel'> },
): Promise<KernelVersionListItem[]> {
  return tx
    .select(listColumns)
    .from(kernelVersions)
    .innerJoin(users, eq(users.id, kernelVersions.createdBy))
    .where(and(eq(kernelVersions.workspaceId, of.workspaceId), eq(kernelVersions.kernelId, of.kernelId)))
    .orderBy(desc(kernelVersions.number));
}

export async function getKernelVersionByNumber(
  tx: Tx,
  of: { workspaceId: Id<'workspace'>; kernelId: Id<'kernel'>; number: number },
): Promise<KernelVersionView | null> {
  const rows = await tx
    .select(viewColumns)
    .from(kernelVersions)
    .innerJoin(users, eq(users.id, kernelVersions.createdBy))
    .where(
      and(
        eq(kernelVersions.workspaceId, of.workspaceId),
        eq(kernelVersions.kernelId, of.kernelId),
        eq(kernelVersions.number, of.number),
      ),
    );
  return rows[0] ?? null;
}
