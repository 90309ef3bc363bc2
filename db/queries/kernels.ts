/** Kernels and their drafts. Versions: kernel-versions.ts. */
import { and, desc, eq, isNotNull, isNull, sql } from 'drizzle-orm';
import type { Kernel } from '../../lib/graph/kernel';
import type { Id } from '../../lib/ids';
import { err, ok, type Result } from '../../lib/result';
import type { Tx } from '../client';
import { newId } from '../ids';
import { kernels, kernelVersions, users } from '../schema';
import { type SaveProblem, whyNotSaved } from './save-problem';

interface OneKernel {
  workspaceId: Id<'workspace'>;
  kernelId: Id<'kernel'>;
}

export interface KernelListItem {
  id: Id<'kernel'>;
  name: string;
  opCount: number;
  edgeCount: number;
  errorCount: number;
  /** Null: no version yet. */
  latestVersion: number | null;
  updatedByName: string;
  updatedAt: Date;
  archivedAt: Date | null;
}

export interface KernelDraft {
  id: Id<'kernel'>;
  name: string;
  document: Kernel;
  revision: number;
  latestVersion: number | null;
  updatedByName: string;
  updatedAt: Date;
  archivedAt: Date | null;
}

const latestVersion = sql<number | null>`(
  select max(v.number) from ${kernelVersions} v where v.kernel_id = ${kernels.id})`;
const one = (k: OneKernel) => and(eq(kernels.workspaceId, k.workspaceId), eq(kernels.id, k.kernelId));

/** The one changed last first. */
export function listKernels(
  tx: Tx,
  of: { workspaceId: Id<'workspace'>; archived: boolean },
): Promise<KernelListItem[]> {
  return tx
    .select({
      id: kernels.id,
      name: kernels.name,
      opCount: kernels.opCount,
      edgeCount: kernels.edgeCount,
      errorCount: kernels.errorCount,
      latestVersion,
      updatedByName: users.name,
      updatedAt: kernels.updatedAt,
      archivedAt: kernels.archivedAt,
    })
    .from(kernels)
    .innerJoin(users, eq(users.id, kernels.updatedBy))
    .where(
      and(
        eq(kernels.workspaceId, of.workspaceId),
        of.archived ? isNotNull(kernels.archivedAt) : isNull(kernels.archivedAt),
      ),
    )
    .orderBy(desc(kernels.updatedAt), desc(kernels.id));
}

export async function getKernelDraft(tx: Tx, kernel: OneKernel): Promise<KernelDraft | null> {
  const rows = await tx
    .select({
      id: kernels.id,
      name: kernels.name,
      document: kernels.draft,
      revision: kernels.revision,
      latestVersion,
      updatedByName: users.name,
      updatedAt: kernels.updatedAt,
      archivedAt: kernels.archivedAt,
    })
    .from(kernels)
    .innerJoin(users, eq(users.id, kernels.updatedBy))
    .where(one(kernel));
  return rows[0] ?? null;
}

/** What lists show of a document. */
const figures = (document: Kernel, errorCount: number) => ({
  name: document.name,
  opCount: document.ops.length,
  edgeCount: document.edges.length,
  errorCount,
});

export async function createKernel(
  tx: Tx,
  kernel: { workspaceId: Id<'workspace'>; userId: Id<'user'>; document: Kernel; errorCount: number },
): Promise<{ id: Id<'kernel'>; revision: number }> {
  const id = newId('kernel');
  await tx.insert(kernels).values({
    id,
    workspaceId: kernel.workspaceId,
    draft: kernel.document,
    ...figures(kernel.document, kernel.errorCount),
    createdBy: kernel.userId,
    updatedBy: kernel.userId,
  });
  return { id, revision: 1 };
}

/** Replaces the draft when `revision` is the stored one; the answer has the new revision. */
export async function saveKernelDraft(
  tx: Tx,
  save: OneKernel & { userId: Id<'user'>; revision: number; document: Kernel; errorCount: number },
): Promise<Result<{ revision: number; updatedAt: Date }, SaveProblem>> {
  const saved = await tx
    .update(kernels)
    .set({
      draft: save.document,
      ...figures(save.document, save.errorCount),
      revision: sql`${kernels.revision} + 1`,
      updatedBy: save.userId,
      updatedAt: sql`now()`,
    })
    .where(and(one(save), eq(kernels.revision, save.revision), isNull(kernels.archivedAt)))
    .returning({ revision: kernels.revision, updatedAt: kernels.updatedAt });
  if (saved[0]) return ok(saved[0]);
  return err(whyNotSaved((await getKernelDraft(tx, save)) ?? undefined));
}

/** Puts a kernel away, or takes it back. Its versions and mappings stay as they are. */
export async function archiveKernel(
  tx: Tx,
  change: OneKernel & { archived: boolean },
): Promise<Result<{ name: string }, 'not_found'>> {
  const rows = await tx
    .update(kernels)
    .set({ archivedAt: change.archived ? sql`now()` : null })
    .where(one(change))
    .returning({ name: kernels.name });
  return rows[0] ? ok(rows[0]) : err('not_found');
}
