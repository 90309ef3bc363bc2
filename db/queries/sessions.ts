import { and, desc, eq, gt, lte, ne } from 'drizzle-orm';
import type { Id } from '../../lib/ids';
import type { Tx } from '../client';
import { sessions } from '../schema';

export interface SessionView {
  /** The digest of the token, which opens nothing. */
  id: string;
  userAgent: string;
  addressPrefix: string;
  createdAt: Date;
  lastSeenAt: Date;
}

export function listSessions(tx: Tx, of: { userId: Id<'user'>; now: Date }): Promise<SessionView[]> {
  return tx
    .select({
      id: sessions.id,
      userAgent: sessions.userAgent,
      addressPrefix: sessions.addressPrefix,
      createdAt: sessions.createdAt,
      lastSeenAt: sessions.lastSeenAt,
    })
    .from(sessions)
    .where(and(eq(sessions.userId, of.userId), gt(sessions.expiresAt, of.now)))
    .orderBy(desc(sessions.lastSeenAt));
}

export async function touchSession(tx: Tx, session: { id: string; now: Date }): Promise<void> {
  await tx.update(sessions).set({ lastSeenAt: session.now }).where(eq(sessions.id, session.id));
}

/** Ends one session of the user's own; false when there is none of that id. */
export async function endSessionOf(tx: Tx, session: { userId: Id<'user'>; id: string }): Promise<boolean> {
  const ended = await tx
    .delete(sessions)
    .where(and(eq(sessions.id, session.id), eq(sessions.userId, session.userId)))
    .returning({ id: sessions.id });
  return ended.length === 1;
}

/** Ends all sessions of the user but `keepId`; returns how many. */
export async function endSessionsOf(tx: Tx, of: { userId: Id<'user'>; keepId?: string }): Promise<number> {
  const ended = await tx
    .delete(sessions)
    .where(and(eq(sessions.userId, of.userId), of.keepId ? ne(sessions.id, of.keepId) : undefined))
    .returning({ id: sessions.id });
  return ended.length;
}

/** The worker calls it now and then; an expired session opens nothing even before. */
export async function removeExpiredSessions(tx: Tx, now: Date): Promise<void> {
  await tx.delete(sessions).where(lte(sessions.expiresAt, now));
}
