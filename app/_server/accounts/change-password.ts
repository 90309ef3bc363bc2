/** A new password for somebody who is signed in and knows the present one. */

import { hashPassword, verifyPassword } from '@/db/password-hash';
import { findPasswordHash, setPasswordHash } from '@/db/queries/accounts';
import { err, ok } from '@/lib/result';
import { type AppResult, appError } from '../errors';
import { takeAttempt } from '../rate-limit';
import { endAllSessions, type SignedIn } from '../session-store';
import type { AccountContext } from './context';
import { passwordChangedLetter } from './letters';
import { passwordChange } from './limits';
import { passwordProblem } from './password-rule';

/** Returns how many other sessions ended. The session that asks stays. */
export async function changePassword(
  context: AccountContext,
  who: SignedIn,
  input: { current: string; password: string; endOthers: boolean },
): Promise<AppResult<{ endedSessions: number }>> {
  const tries = await takeAttempt(context.db, passwordChange, who.user.id);
  if (!tries.ok) return tries;
  const stored = await findPasswordHash(context.db, { userId: who.user.id });
  if (!(await verifyPassword(stored, input.current))) {
    const wrong = 'This is not your present password.';
    return err(appError('invalid', wrong, { fields: { current: wrong } }));
  }
  const problem = passwordProblem(input.password, who.user);
  if (problem) return err(appError('invalid', problem, { fields: { password: problem } }));
  const passwordHash = await hashPassword(input.password);
  const endedSessions = await context.db.transaction(async (tx) => {
    await setPasswordHash(tx, { userId: who.user.id, passwordHash });
    return input.endOthers ? endAllSessions(tx, { userId: who.user.id, keepId: who.session.id }) : 0;
  });
  // The password is changed whether or not the letter goes out.
  await context.send(passwordChangedLetter({ to: who.user.email, resetLink: context.link('/forgotten') }));
  return ok({ endedSessions });
}
