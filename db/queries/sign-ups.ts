/** Links that make accounts. */
import { and, eq, gt, isNull, lte } from 'drizzle-orm';
import type { Tx } from '../client';
import { newId } from '../ids';
import { signUps } from '../schema';

export async function createSignUp(
  tx: Tx,
  signUp: { email: string; tokenHash: string; now: Date; expiresAt: Date },
): Promise<void> {
  const { now, ...values } = signUp;
  await tx.insert(signUps).values({ id: newId('signup'), createdAt: now, ...values });
}

const usable = (of: { tokenHash: string; now: Date }) =>
  and(eq(signUps.tokenHash, of.tokenHash), isNull(signUps.usedAt), gt(signUps.expiresAt, of.now));

/** The address behind a link while it can be used, else null. */
export async function findSignUp(tx: Tx, of: { tokenHash: string; now: Date }): Promise<string | null> {
  const rows = await tx.select({ email: signUps.email }).from(signUps).where(usable(of));
  return rows[0]?.email ?? null;
}

/** Uses the link up and returns its address; null when it was used or expired. Of two at once one succeeds. */
export async function useSignUp(tx: Tx, of: { tokenHash: string; now: Date }): Promise<string | null> {
  const rows = await tx
    .update(signUps)
    .set({ usedAt: of.now })
    .where(usable(of))
    .returning({ email: signUps.email });
  return rows[0]?.email ?? null;
}

/** Removes links that ended; the worker calls it now and then. */
export async function removeEndedSignUps(tx: Tx, now: Date): Promise<void> {
  await tx.delete(signUps).where(lte(signUps.expiresAt, now));
}
