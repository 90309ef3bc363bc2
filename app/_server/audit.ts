/** The workspace's record of who did what. Called inside the transaction of the change itself. */
import 'server-only';
import type { Tx } from '@/db/client';
import { type AuditFact, recordAudit } from '@/db/queries/audit';
import type { Member } from './access';

/** Adds an entry in the member's name. */
export const audit = (
  tx: Tx,
  member: Pick<Member, 'user' | 'workspace'>,
  fact: Omit<AuditFact, 'workspaceId' | 'actorId'>,
): Promise<void> => recordAudit(tx, { ...fact, workspaceId: member.workspace.id, actorId: member.user.id });
