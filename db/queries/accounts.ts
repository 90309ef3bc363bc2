/** Accounts, their passwords and the links that reset them. */
import { and, eq, gt, isNull, sql } from 'drizzle-orm';
import type { Id } from '../../lib/ids';
import { err, ok, type Result } from '../../lib/result';
import type { Tx } from '../client';
import { newId } from '../ids';
import { members, passwordResets, users, workspaces } from '../schema';

export interface AccountView {
  id: Id<'user'>;
  name: string;
  email: string;
}

/** The stored hash leaves the database through these two only, for a comparison. */
export async function findCredentials(
  tx: Tx,
  of: { email: string },
): Promise<(AccountView & { passwordHash: string }) | null> {
  const rows = await tx
    .select({ id: users.id, name: users.name, email: users.email, passwordHash: users.passwordHash })
    .from(users)
    .where(eq(users.email, of.email));
  return rows[0] ?? null;
}

export async function findPasswordHash(tx: Tx, of: { userId: Id<'user'> }): Promise<string | null> {
  const rows = await tx
    .select({ passwordHash: users.passwordHash })
    .from(users)
    .where(eq(users.id, of.userId));
  return rows[0]?.passwordHash ?? null;
}

export async function findAccount(tx: Tx, of: { email: string }): Promise<AccountView | null> {
  const rows = await tx
    .select({ id: users.id, name: users.name, email: users.email })
    .from(users)
    .where(eq(users.email, of.email));
  return rows[0] ?? null;
}

/** `taken`: the address has an account already. Nothing is written then. */
export async function createAccount(
  tx: Tx,
  account: { email: string; name: string; passwordHash: string },
): Promise<Result<AccountView, 'taken'>> {
  const rows = await tx
    .insert(users)
    .values({ id: newId('user'), ...account })
    .onConflictDoNothing({ target: users.email })
    .returning({ id: users.id, name: users.name, email: users.email });
  return rows[0] ? ok(rows[0]) : err('taken');
}

export async function setPasswordHash(
  tx: Tx,
  change: { userId: Id<'user'>; passwordHash: string },
): Promise<void> {
  await tx.update(users).set({ passwordHash: change.passwordHash }).where(eq(users.id, change.userId));
}

export async function renameAccount(tx: Tx, change: { userId: Id<'user'>; name: string }): Promise<void> {
  await tx.update(users).set({ name: change.name }).where(eq(users.id, change.userId));
}

/** A workspace with its first owner. The slug is `wanted`, or `wanted-2`, `wanted-3` … when that is taken. */
export async function createWorkspace(
  tx: Tx,
  workspace: { name: string; wantedSlug: string; ownerId: Id<'user'> },
): Promise<{ id: Id<'workspace'>; slug: string }> {
  const id = newId('workspace');
  for (let n = 1; ; n++) {
    const slug = n === 1 ? workspace.wantedSlug : `${workspace.wantedSlug.slice(0, 40)}-${n}`;
    const rows = await tx
      .insert(workspaces)
      .values({ id, name: workspace.name, slug })
      .onConflictDoNothing({ target: workspaces.slug })
      .returning({ slug: workspaces.slug });
    if (rows[0]) {
      await tx.insert(members).values({ workspaceId: id, userId: workspace.ownerId, role: 'owner' });
      return { id, slug };
    }
  }
}

/** Stores a reset link; older ones of the account end. */
export async function createReset(
  tx: Tx,
  reset: { userId: Id<'user'>; tokenHash: string; now: Date; expiresAt: Date },
): Promise<void> {
  await tx
    .update(passwordResets)
    .set({ usedAt: reset.now })
    .where(and(eq(passwordResets.userId, reset.userId), isNull(passwordResets.usedAt)));
  await tx.insert(passwordResets).values({
    id: newId('reset'),
    userId: reset.userId,
    tokenHash: reset.tokenHash,
    createdAt: reset.now,
    expiresAt: reset.expiresAt,
  });
}

const usable = (of: { tokenHash: string; now: Date }) =>
  and(
    eq(passwordResets.tokenHash, of.tokenHash),
    isNull(passwordResets.usedAt),
    gt(passwordResets.expiresAt, of.now),
  );

/** Whose link it is while it can be used, else null. */
export async function findReset(tx: Tx, of: { tokenHash: string; now: Date }): Promise<AccountView | null> {
  const rows = await tx
    .select({ id: users.id, name: users.name, email: users.email })
    .from(passwordResets)
    .innerJoin(users, eq(users.id, passwordResets.userId))
    .where(usable(of));
  return rows[0] ?? null;
}

/** Uses the link up; null when it was used, replaced or expired. Of two at once one succeeds. */
export async function useReset(tx: Tx, of: { tokenHash: string; now: Date }): Promise<Id<'user'> | null> {
  const rows = await tx
    .update(passwordResets)
    .set({ usedAt: of.now })
    .where(usable(of))
    .returning({ userId: passwordResets.userId });
  return rows[0]?.userId ?? null;
}

/** Removes links that ended; the worker calls it now and then. */
export async function removeEndedResets(tx: Tx, now: Date): Promise<void> {
  const at = now.toISOString();
  await tx
    .delete(passwordResets)
    .where(sql`${passwordResets.expiresAt} < ${at}::timestamptz - interval '1 day'`);
}
