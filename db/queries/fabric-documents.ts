import { and, eq, isNotNull, isNull } from 'drizzle-orm';
import type { Fabric } from '../../lib/fabric/fabric';
import type { Id } from '../../lib/ids';
import type { Tx } from '../client';
import { fabrics } from '../schema';

/** The drafts of a workspace's fabrics by id, for what a list works out of the documents themselves. */
export async function fabricDocuments(
  tx: Tx,
  of: { workspaceId: Id<'workspace'>; archived: boolean },
): Promise<Map<Id<'fabric'>, Fabric>> {
  const rows = await tx
    .select({ id: fabrics.id, document: fabrics.draft })
    .from(fabrics)
    .where(
      and(
        eq(fabrics.workspaceId, of.workspaceId),
        of.archived ? isNotNull(fabrics.archivedAt) : isNull(fabrics.archivedAt),
      ),
    );
  return new Map(rows.map((row) => [row.id, row.document]));
}
