import { and, desc, eq, sql } from 'drizzle-orm';
import type { Id } from '../../lib/ids';
import type { Tx } from '../client';
import { newId } from '../ids';
import { auditEntries, users } from '../schema';

export interface AuditFact {
  workspaceId: Id<'workspace'>;
  actorId: Id<'user'>;
  /** `<noun> <past participle>`, such as "kernel created". */
  action: string;
  subjectType: string;
  subjectId: string;
  /** Names and small facts; never a document, an address of a session or a secret. */
  detail?: Record<string, string | number | boolean | null>;
}

export interface AuditEntry {
  id: Id<'audit'>;
  actorName: string;
  action: string;
  subjectType: string;
  subjectId: string;
  detail: Record<string, string | number | boolean | null>;
  createdAt: Date;
}

/** Adds an entry, in the transaction of what it tells of. */
export async function recordAudit(tx: Tx, fact: AuditFact): Promise<void> {
  await tx.insert(auditEntries).values({ ...fact, id: newId('audit'), detail: fact.detail ?? {} });
}

/** Newest first; `beforeId` continues after the last entry of an earlier page. */
export function listAudit(
  tx: Tx,
  of: { workspaceId: Id<'workspace'>; beforeId?: Id<'audit'>; limit?: number },
): Promise<AuditEntry[]> {
  return tx
    .select({
      id: auditEntries.id,
      actorName: users.name,
      action: auditEntries.action,
      subjectType: auditEntries.subjectType,
      subjectId: auditEntries.subjectId,
      detail: auditEntries.detail,
      createdAt: auditEntries.createdAt,
    })
    .from(auditEntries)
    .innerJoin(users, eq(users.id, auditEntries.actorId))
    .where(
      and(
        eq(auditEntries.workspaceId, of.workspaceId),
        of.beforeId
          ? sql`(${auditEntries.createdAt}, ${auditEntries.id}) <
              (select created_at, id from audit_entries where workspace_id = ${of.workspaceId} and id = ${of.beforeId})`
          : undefined,
      ),
    )
    .orderBy(desc(auditEntries.createdAt), desc(auditEntries.id))
    .limit(Math.min(of.limit ?? 50, 200));
}
