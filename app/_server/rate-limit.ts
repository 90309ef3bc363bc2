/** Limits on attempts, per account and per address. */
import 'server-only';
import type { Tx } from '@/db/client';
import { clearAttempts, countAttempt } from '@/db/queries/rate-limits';
import { tokenDigest } from '@/db/tokens';
import { err, ok } from '@/lib/result';
import { type AppResult, appError } from './errors';

export interface Limit {
  /** What is counted, such as "sign-in by account". */
  name: string;
  attempts: number;
  windowSeconds: number;
}

const keyOf = (limit: Limit, subject: string) => tokenDigest(`${limit.name}\n${subject}`);

/** Counts an attempt; refuses it when there were too many in the window. `subject` is stored as a digest only. */
export async function takeAttempt(tx: Tx, limit: Limit, subject: string): Promise<AppResult<null>> {
  const { hits, waitSeconds } = await countAttempt(tx, {
    key: keyOf(limit, subject),
    windowSeconds: limit.windowSeconds,
  });
  if (hits <= limit.attempts) return ok(null);
  return err(
    appError('rate_limited', `Too many attempts. Wait ${inWords(waitSeconds)} and try again.`, {
      waitSeconds,
    }),
  );
}

export const forgetAttempts = (tx: Tx, limit: Limit, subject: string): Promise<void> =>
  clearAttempts(tx, keyOf(limit, subject));

function inWords(seconds: number): string {
  if (seconds < 90) return `${seconds} seconds`;
  return `${Math.ceil(seconds / 60)} minutes`;
}
