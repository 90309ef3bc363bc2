import { and, asc, count, desc, eq, sql } from 'drizzle-orm';
import type { Id } from '../../lib/ids';
import { err, ok, type Result } from '../../lib/result';
import type { Role } from '../../lib/roles';
import type { Tx } from '../client';
import { members, users, workspaces } from '../schema';

export interface WorkspaceView {
  id: Id<'workspace'>;
  slug: string;
  name: string;
}

export interface Membership {
  workspace: WorkspaceView;
  role: Role;
}

export interface MemberView {
  userId: Id<'user'>;
  name: string;
  email: string;
  role: Role;
  createdAt: Date;
}

const workspaceColumns = { id: workspaces.id, slug: workspaces.slug, name: workspaces.name };

/** Null when there is no such workspace or the user is no member of it: nobody can tell the two apart. */
export async function findMembership(
  tx: Tx,
  of: { slug: string; userId: Id<'user'> },
): Promise<Membership | null> {
  const rows = await tx
    .select({ workspace: workspaceColumns, role: members.role })
    .from(members)
    .innerJoin(workspaces, eq(workspaces.id, members.workspaceId))
    .where(and(eq(workspaces.slug, of.slug), eq(members.userId, of.userId)));
  return rows[0] ?? null;
}

/** The user's workspaces, the one opened last first. */
export function listMemberships(tx: Tx, of: { userId: Id<'user'> }): Promise<Membership[]> {
  return tx
    .select({ workspace: workspaceColumns, role: members.role })
    .from(members)
    .innerJoin(workspaces, eq(workspaces.id, members.workspaceId))
    .where(eq(members.userId, of.userId))
    .orderBy(sql`${members.lastOpenedAt} desc nulls last`, desc(members.createdAt));
}

/** Remembers that the workspace was opened; at most once a minute, so that reading stays cheap. */
export async function noteOpened(
  tx: Tx,
  of: { workspaceId: Id<'workspace'>; userId: Id<'user'>; now: Date },
): Promise<void> {
  const at = of.now.toISOString();
  await tx
    .update(members)
    .set({ lastOpenedAt: of.now })
    .where(
      and(
        eq(members.workspaceId, of.workspaceId),
        eq(members.userId, of.userId),
        sql`(${members.lastOpenedAt} is null or ${members.lastOpenedAt} < ${at}::timestamptz - interval '1 minute')`,
      ),
    );
}

export function listMembers(tx: Tx, of: { workspaceId: Id<'workspace'> }): Promise<MemberView[]> {
  return tx
    .select({
      userId: members.userId,
      name: users.name,
      email: users.email,
      role: members.role,
      createdAt: members.createdAt,
    })
    .from(members)
    .innerJoin(users, eq(users.id, members.userId))
    .where(eq(members.workspaceId, of.workspaceId))
    .orderBy(asc(users.name), asc(users.id));
}

export async function addMember(
  tx: Tx,
  member: { workspaceId: Id<'workspace'>; userId: Id<'user'>; role: Role },
): Promise<void> {
  await tx.insert(members).values(member).onConflictDoNothing();
}

export type MemberProblem = 'not_found' | 'last_owner';

/** Changes a role. Refuses to leave the workspace without an owner. */
export function changeRole(
  tx: Tx,
  change: { workspaceId: Id<'workspace'>; userId: Id<'user'>; role: Role },
): Promise<Result<{ name: string; before: Role }, MemberProblem>> {
  return tx.transaction(async (inner) => {
    const member = await lockMember(inner, change);
    if (!member) return err('not_found');
    if (member.before === 'owner' && change.role !== 'owner' && (await ownerCount(inner, change)) < 2) {
      return err('last_owner');
    }
    await inner.update(members).set({ role: change.role }).where(one(change));
    return ok(member);
  });
}

/** Removes a member, or lets one leave. Refuses to leave the workspace without an owner. */
export function removeMember(
  tx: Tx,
  member: { workspaceId: Id<'workspace'>; userId: Id<'user'> },
): Promise<Result<{ name: string; before: Role }, MemberProblem>> {
  return tx.transaction(async (inner) => {
    const found = await lockMember(inner, member);
    if (!found) return err('not_found');
    if (found.before === 'owner' && (await ownerCount(inner, member)) < 2) return err('last_owner');
    await inner.delete(members).where(one(member));
    return ok(found);
  });
}

const one = (m: { workspaceId: Id<'workspace'>; userId: Id<'user'> }) =>
  and(eq(members.workspaceId, m.workspaceId), eq(members.userId, m.userId));

/** The member's name and role, with the workspace locked: changes of members wait for one another. */
async function lockMember(
  tx: Tx,
  member: { workspaceId: Id<'workspace'>; userId: Id<'user'> },
): Promise<{ name: string; before: Role } | null> {
  await tx
    .select({ id: workspaces.id })
    .from(workspaces)
    .where(eq(workspaces.id, member.workspaceId))
    .for('update');
  const rows = await tx
    .select({ name: users.name, before: members.role })
    .from(members)
    .innerJoin(users, eq(users.id, members.userId))
    .where(one(member));
  return rows[0] ?? null;
}

async function ownerCount(tx: Tx, of: { workspaceId: Id<'workspace'> }): Promise<number> {
  const rows = await tx
    .select({ owners: count() })
    .from(members)
    .where(and(eq(members.workspaceId, of.workspaceId), eq(members.role, 'owner')));
  return rows[0]?.owners ?? 0;
}

export async function renameWorkspace(
  tx: Tx,
  change: { workspaceId: Id<'workspace'>; name: string },
): Promise<Result<null, 'not_found'>> {
  const rows = await tx
    .update(workspaces)
    .set({ name: change.name })
    .where(eq(workspaces.id, change.workspaceId))
    .returning({ id: workspaces.id });
  return rows.length === 1 ? ok(null) : err('not_found');
}
