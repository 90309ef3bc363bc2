/** What owners do with members, and what members do with their own membership. */
import type { Database } from '@/db/client';
import { recordAudit } from '@/db/queries/audit';
import { changeRole, type MemberProblem, removeMember, renameWorkspace } from '@/db/queries/members';
import type { Id } from '@/lib/ids';
import { err, ok } from '@/lib/result';
import type { Role } from '@/lib/roles';
import type { Member } from '../access';
import { type AppError, type AppResult, appError, notFound } from '../errors';

type Actor = Pick<Member, 'user' | 'workspace'>;

const refusal: Record<MemberProblem, AppError> = {
  not_found: notFound('member'),
  last_owner: appError(
    'conflict',
    'A workspace keeps at least one owner. Make somebody else an owner first.',
  ),
};

export function setMemberRole(
  db: Database,
  by: Actor,
  input: { userId: Id<'user'>; role: Role },
): Promise<AppResult<null>> {
  return db.transaction(async (tx) => {
    const changed = await changeRole(tx, { workspaceId: by.workspace.id, ...input });
    if (!changed.ok) return err(refusal[changed.error]);
    await recordAudit(tx, {
      workspaceId: by.workspace.id,
      actorId: by.user.id,
      action: 'role changed',
      subjectType: 'user',
      subjectId: input.userId,
      detail: { name: changed.value.name, before: changed.value.before, after: input.role },
    });
    return ok(null);
  });
}

/** Removes another member, or the actor itself ("leave"). */
export function endMembership(
  db: Database,
  by: Actor,
  input: { userId: Id<'user'> },
): Promise<AppResult<null>> {
  return db.transaction(async (tx) => {
    const removed = await removeMember(tx, { workspaceId: by.workspace.id, ...input });
    if (!removed.ok) return err(refusal[removed.error]);
    await recordAudit(tx, {
      workspaceId: by.workspace.id,
      actorId: by.user.id,
      action: input.userId === by.user.id ? 'member left' : 'member removed',
      subjectType: 'user',
      subjectId: input.userId,
      detail: { name: removed.value.name, role: removed.value.before },
    });
    return ok(null);
  });
}

export function setWorkspaceName(db: Database, by: Actor, input: { name: string }): Promise<AppResult<null>> {
  return db.transaction(async (tx) => {
    const renamed = await renameWorkspace(tx, { workspaceId: by.workspace.id, name: input.name });
    if (!renamed.ok) return err(notFound('workspace'));
    await recordAudit(tx, {
      workspaceId: by.workspace.id,
      actorId: by.user.id,
      action: 'workspace renamed',
      subjectType: 'workspace',
      subjectId: by.workspace.id,
      detail: { before: by.workspace.name, after: input.name },
    });
    return ok(null);
  });
}
