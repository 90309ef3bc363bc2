/** The signed-in person of a request: cookies on one side, session-store.ts on the other. */
import 'server-only';
import { cookies, headers } from 'next/headers';
import { cache } from 'react';
import { database } from '@/db/client';
import type { Id } from '@/lib/ids';
import { addressPrefix, clientAddress } from './address';
import {
  ABSOLUTE_DAYS,
  beginSession,
  type Client,
  endSession,
  findSession,
  type SignedIn,
} from './session-store';
import { proxyHops, secureCookies } from './settings';

export type { SignedIn };

/** `__Host-`: the browser takes it only with Secure, from this very host and for the whole of it. */
const cookieName = () => (secureCookies() ? '__Host-pinloom' : 'pinloom');

const cookieAttributes = () =>
  ({ httpOnly: true, secure: secureCookies(), sameSite: 'lax', path: '/' }) as const;

/** The person signed in, or null. Asked once per request however often it is called. */
export const currentSession = cache(async (): Promise<SignedIn | null> => {
  const token = (await cookies()).get(cookieName())?.value;
  if (!token || token.length > 200) return null;
  return findSession(database(), { token, now: new Date() });
});

/** The browser and the network part of its address, as the list of sessions shows them. */
export async function currentClient(): Promise<Client & { address: string }> {
  const h = await headers();
  const address = clientAddress(h.get('x-forwarded-for'), proxyHops());
  return { userAgent: h.get('user-agent') ?? '', address, addressPrefix: addressPrefix(address) };
}

/** Signs in: a new session and its cookie; an older session of this browser ends. Only in actions and routes. */
export async function signInAs(userId: Id<'user'>): Promise<void> {
  const jar = await cookies();
  const older = jar.get(cookieName())?.value;
  if (older) await endSession(database(), older);
  const token = await beginSession(database(), { userId, client: await currentClient(), now: new Date() });
  jar.set(cookieName(), token, { ...cookieAttributes(), maxAge: ABSOLUTE_DAYS * 86_400 });
}

/** Ends the session in the database and forgets the cookie. Only in actions and routes. */
export async function signOut(): Promise<void> {
  const jar = await cookies();
  const token = jar.get(cookieName())?.value;
  if (token) await endSession(database(), token);
  jar.set(cookieName(), '', { ...cookieAttributes(), maxAge: 0 });
}
