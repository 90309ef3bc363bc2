/**
 * Sessions. The only module that knows the session library (docs/decisions/0001-sessions-behind-one-module.md);
 * cookies are session.ts's business.
 *
 * A token of 256 random bits travels in the cookie; the database has only its digest. A session ends after at most
 * 7 days without use and at the latest 30 days after it began (NIST SP 800-63B: at most 30 days at the first level).
 */
import { DrizzlePostgreSQLAdapter } from '@lucia-auth/adapter-drizzle';
import { Lucia, TimeSpan } from 'lucia';
import type { Tx } from '@/db/client';
import { endSessionsOf, touchSession } from '@/db/queries/sessions';
import { sessions, users } from '@/db/schema';
import { newToken, tokenDigest } from '@/db/tokens';
import type { Id } from '@/lib/ids';

export const IDLE_DAYS = 7;
export const ABSOLUTE_DAYS = 30;
const DAY_MS = 86_400_000;
/** `lastSeenAt` is written at most this often. */
const SEEN_STEP_MS = 60_000;

export interface SignedIn {
  user: { id: Id<'user'>; name: string; email: string };
  session: { id: string; createdAt: Date };
}

export interface Client {
  userAgent: string;
  addressPrefix: string;
}

function make(tx: Tx) {
  return new Lucia(new DrizzlePostgreSQLAdapter(tx, sessions, users), {
    sessionExpiresIn: new TimeSpan(IDLE_DAYS, 'd'),
    getUserAttributes: (row) => ({ name: row.name, email: row.email }),
    getSessionAttributes: (row) => ({ createdAt: row.createdAt, lastSeenAt: row.lastSeenAt }),
  });
}

declare module 'lucia' {
  interface Register {
    Lucia: ReturnType<typeof make>;
    UserId: Id<'user'>;
    DatabaseUserAttributes: { name: string; email: string };
    DatabaseSessionAttributes: {
      createdAt: Date;
      lastSeenAt: Date;
      userAgent: string;
      addressPrefix: string;
    };
  }
}

/** Begins a session and returns the token for the cookie. Each sign-in begins a new one. */
export async function beginSession(
  tx: Tx,
  of: { userId: Id<'user'>; client: Client; now: Date },
): Promise<string> {
  const token = newToken();
  await make(tx).createSession(
    of.userId,
    {
      createdAt: of.now,
      lastSeenAt: of.now,
      userAgent: of.client.userAgent.slice(0, 300),
      addressPrefix: of.client.addressPrefix.slice(0, 60),
    },
    { sessionId: tokenDigest(token) },
  );
  return token;
}

/** Who the token belongs to, or null when it is unknown or expired. Use moves the inactivity limit ahead. */
export async function findSession(tx: Tx, of: { token: string; now: Date }): Promise<SignedIn | null> {
  const lucia = make(tx);
  const { session, user } = await lucia.validateSession(tokenDigest(of.token));
  if (!session) return null;
  if (of.now.getTime() - session.createdAt.getTime() >= ABSOLUTE_DAYS * DAY_MS) {
    await lucia.invalidateSession(session.id);
    return null;
  }
  if (of.now.getTime() - session.lastSeenAt.getTime() >= SEEN_STEP_MS) {
    await touchSession(tx, { id: session.id, now: of.now });
  }
  return {
    user: { id: user.id, name: user.name, email: user.email },
    session: { id: session.id, createdAt: session.createdAt },
  };
}

export async function endSession(tx: Tx, token: string): Promise<void> {
  await make(tx).invalidateSession(tokenDigest(token));
}

/** After a password was set anew: nobody who knew the old one stays signed in. */
export const endAllSessions = endSessionsOf;
