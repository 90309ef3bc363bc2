import { lt, sql } from 'drizzle-orm';
import type { Tx } from '../client';
import { rateLimits } from '../schema';

/**
 * Counts one attempt in the key's window and returns how many there were in it, with the seconds until it ends.
 * One statement, so attempts at the same moment are all counted.
 */
export async function countAttempt(
  tx: Tx,
  attempt: { key: string; windowSeconds: number },
): Promise<{ hits: number; waitSeconds: number }> {
  const rows = await tx.execute<{ hits: number; wait: number }>(sql`
    insert into rate_limits as r (key, hits, resets_at)
    values (${attempt.key}, 1, now() + make_interval(secs => ${attempt.windowSeconds}))
    on conflict (key) do update set
      hits = case when r.resets_at <= now() then 1 else r.hits + 1 end,
      resets_at = case when r.resets_at <= now() then excluded.resets_at else r.resets_at end
    returning hits, greatest(1, ceil(extract(epoch from resets_at - now())))::int as wait`);
  const row = rows[0];
  if (!row) throw new Error('An upsert with returning gave no row');
  return { hits: row.hits, waitSeconds: row.wait };
}

/** Forgets a key's attempts, after the right password. */
export async function clearAttempts(tx: Tx, key: string): Promise<void> {
  await tx.delete(rateLimits).where(sql`${rateLimits.key} = ${key}`);
}

/** Removes windows that ended; the worker calls it now and then. */
export async function removeEndedWindows(tx: Tx, now: Date): Promise<void> {
  await tx.delete(rateLimits).where(lt(rateLimits.resetsAt, now));
}
