/** Checks of an address and a password. The session is the caller's business. */

import { verifyPassword } from '@/db/password-hash';
import { findCredentials } from '@/db/queries/accounts';
import type { Id } from '@/lib/ids';
import { err, ok } from '@/lib/result';
import { type AppResult, appError } from '../errors';
import { forgetAttempts, takeAttempt } from '../rate-limit';
import type { AccountContext } from './context';
import { signInAccount, signInAddress, signInHere } from './limits';

/** The user when both are right. A wrong password and an unknown address give the same answer in the same time. */
export async function checkSignIn(
  context: AccountContext,
  input: { email: string; password: string },
): Promise<AppResult<{ userId: Id<'user'> }>> {
  const here = `${input.email}\n${context.address}`;
  for (const [limit, subject] of [
    [signInAddress, context.address],
    [signInHere, here],
    [signInAccount, input.email],
  ] as const) {
    const taken = await takeAttempt(context.db, limit, subject);
    if (!taken.ok) return taken;
  }
  const account = await findCredentials(context.db, { email: input.email });
  const right = await verifyPassword(account?.passwordHash ?? null, input.password);
  if (!account || !right) {
    return err(
      appError('invalid', 'Address and password do not match. Check both, or ask for a new password below.'),
    );
  }
  await forgetAttempts(context.db, signInHere, here);
  await forgetAttempts(context.db, signInAccount, input.email);
  return ok({ userId: account.id });
}
