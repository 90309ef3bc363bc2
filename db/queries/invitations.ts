/** Invitations to a workspace. */
import { and, desc, eq, gt, isNull, sql } from 'drizzle-orm';
import type { Id } from '../../lib/ids';
import { err, ok, type Result } from '../../lib/result';
import type { Role } from '../../lib/roles';
import type { Tx } from '../client';
import { newId } from '../ids';
import { invitations, members, users, workspaces } from '../schema';

export interface InvitationView {
  id: Id<'invitation'>;
  email: string;
  role: Role;
  invitedByName: string;
  createdAt: Date;
  /** May lie in the past: the owner can send it again. */
  expiresAt: Date;
}

/** What the holder of a link may know. */
export interface OpenInvitation {
  id: Id<'invitation'>;
  workspaceId: Id<'workspace'>;
  workspaceName: string;
  workspaceSlug: string;
  email: string;
  role: Role;
  invitedByName: string;
}

const pending = and(isNull(invitations.acceptedAt), isNull(invitations.revokedAt));

/** `member`: the address belongs to a member. `pending`: it is invited already. */
export async function createInvitation(
  tx: Tx,
  invitation: {
    workspaceId: Id<'workspace'>;
    email: string;
    role: Role;
    tokenHash: string;
    invitedBy: Id<'user'>;
    now: Date;
    expiresAt: Date;
  },
): Promise<Result<{ id: Id<'invitation'> }, 'member' | 'pending'>> {
  const { now, ...values } = invitation;
  const [member] = await tx
    .select({ id: users.id })
    .from(members)
    .innerJoin(users, eq(users.id, members.userId))
    .where(and(eq(members.workspaceId, invitation.workspaceId), eq(users.email, invitation.email)));
  if (member) return err('member');
  const rows = await tx
    .insert(invitations)
    .values({ id: newId('invitation'), createdAt: now, ...values })
    .onConflictDoNothing()
    .returning({ id: invitations.id });
  return rows[0] ? ok(rows[0]) : err('pending');
}

/** Those neither accepted nor revoked, newest first. */
export function listPendingInvitations(
  tx: Tx,
  of: { workspaceId: Id<'workspace'> },
): Promise<InvitationView[]> {
  return tx
    .select({
      id: invitations.id,
      email: invitations.email,
      role: invitations.role,
      invitedByName: users.name,
      createdAt: invitations.createdAt,
      expiresAt: invitations.expiresAt,
    })
    .from(invitations)
    .innerJoin(users, eq(users.id, invitations.invitedBy))
    .where(and(eq(invitations.workspaceId, of.workspaceId), pending))
    .orderBy(desc(invitations.createdAt));
}

interface OneInvitation {
  workspaceId: Id<'workspace'>;
  invitationId: Id<'invitation'>;
}
const onePending = (i: OneInvitation) =>
  and(eq(invitations.workspaceId, i.workspaceId), eq(invitations.id, i.invitationId), pending);

/** A new link for a pending invitation; the older link ends. */
export async function renewInvitation(
  tx: Tx,
  change: OneInvitation & { tokenHash: string; expiresAt: Date },
): Promise<Result<{ email: string; role: Role }, 'not_found'>> {
  const rows = await tx
    .update(invitations)
    .set({ tokenHash: change.tokenHash, expiresAt: change.expiresAt })
    .where(onePending(change))
    .returning({ email: invitations.email, role: invitations.role });
  return rows[0] ? ok(rows[0]) : err('not_found');
}

export async function revokeInvitation(
  tx: Tx,
  change: OneInvitation & { now: Date },
): Promise<Result<{ email: string }, 'not_found'>> {
  const rows = await tx
    .update(invitations)
    .set({ revokedAt: change.now })
    .where(onePending(change))
    .returning({ email: invitations.email });
  return rows[0] ? ok(rows[0]) : err('not_found');
}

/** The invitation behind a link while it can be accepted, else null. */
export async function findOpenInvitation(
  tx: Tx,
  of: { tokenHash: string; now: Date },
): Promise<OpenInvitation | null> {
  const rows = await tx
    .select({
      id: invitations.id,
      workspaceId: invitations.workspaceId,
      workspaceName: workspaces.name,
      workspaceSlug: workspaces.slug,
      email: invitations.email,
      role: invitations.role,
      invitedByName: users.name,
    })
    .from(invitations)
    .innerJoin(workspaces, eq(workspaces.id, invitations.workspaceId))
    .innerJoin(users, eq(users.id, invitations.invitedBy))
    .where(and(eq(invitations.tokenHash, of.tokenHash), pending, gt(invitations.expiresAt, of.now)));
  return rows[0] ?? null;
}

/** Makes the user a member and uses the link up, in the caller's transaction. Of two at once one succeeds. */
export async function acceptInvitation(
  tx: Tx,
  of: { tokenHash: string; userId: Id<'user'>; now: Date },
): Promise<Result<{ workspaceId: Id<'workspace'>; role: Role }, 'not_found'>> {
  const rows = await tx
    .update(invitations)
    .set({ acceptedAt: of.now })
    .where(and(eq(invitations.tokenHash, of.tokenHash), pending, gt(invitations.expiresAt, of.now)))
    .returning({ workspaceId: invitations.workspaceId, role: invitations.role });
  const accepted = rows[0];
  if (!accepted) return err('not_found');
  // A member already keeps the role that it has.
  await tx
    .insert(members)
    .values({ workspaceId: accepted.workspaceId, userId: of.userId, role: accepted.role })
    .onConflictDoNothing();
  return ok(accepted);
}

/** Removes what ended long ago; the worker calls it now and then. */
export async function removeEndedInvitations(tx: Tx, now: Date): Promise<void> {
  const at = now.toISOString();
  await tx
    .delete(invitations)
    .where(
      sql`${invitations.acceptedAt} is null and ${invitations.expiresAt} < ${at}::timestamptz - interval '90 days'`,
    );
}
