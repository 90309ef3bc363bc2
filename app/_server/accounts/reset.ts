/** A forgotten password: a link by letter, good once and for a short time. */

import { hashPassword } from '@/db/password-hash';
import { createReset, findAccount, findReset, setPasswordHash, useReset } from '@/db/queries/accounts';
import { newToken, tokenDigest } from '@/db/tokens';
import type { Id } from '@/lib/ids';
import { err, ok } from '@/lib/result';
import { type AppResult, appError } from '../errors';
import { takeAttempt } from '../rate-limit';
import { endAllSessions } from '../session-store';
import { type AccountContext, later, MINUTE_MS, notSent } from './context';
import { noAccountLetter, passwordChangedLetter, resetLetter } from './letters';
import { linkAddress, resetAccount, resetAddress } from './limits';
import { passwordProblem } from './password-rule';

const VALID_MINUTES = 30;

const endedLink = appError('not_found', 'This link was used or has expired. Ask for a new one.');

/** Sends a letter to the address either way; the answer is the same. */
export async function requestReset(
  context: AccountContext,
  input: { email: string },
): Promise<AppResult<null>> {
  const byAddress = await takeAttempt(context.db, resetAddress, context.address);
  if (!byAddress.ok) return byAddress;
  // Beyond the limit nothing is sent, and nothing is said: the answer must not depend on earlier requests.
  if (!(await takeAttempt(context.db, resetAccount, input.email)).ok) return ok(null);
  const account = await findAccount(context.db, input);
  if (!account) {
    const told = await context.send(
      noAccountLetter({ to: input.email, signUpLink: context.link('/sign-up') }),
    );
    return told ? ok(null) : err(notSent);
  }
  const token = newToken();
  await context.db.transaction((tx) =>
    createReset(tx, {
      userId: account.id,
      tokenHash: tokenDigest(token),
      now: context.now,
      expiresAt: later(context.now, VALID_MINUTES * MINUTE_MS),
    }),
  );
  const sent = await context.send(
    resetLetter({ to: account.email, link: context.link(`/reset/${token}`), validMinutes: VALID_MINUTES }),
  );
  return sent ? ok(null) : err(notSent);
}

/** True while the link can be used. */
export const isResetOpen = async (context: Pick<AccountContext, 'db' | 'now'>, token: string) =>
  (await findReset(context.db, { tokenHash: tokenDigest(token), now: context.now })) !== null;

/** Sets the new password, uses the link up and ends every session of the account. */
export async function completeReset(
  context: AccountContext,
  input: { token: string; password: string },
): Promise<AppResult<{ userId: Id<'user'> }>> {
  const tries = await takeAttempt(context.db, linkAddress, context.address);
  if (!tries.ok) return tries;
  const tokenHash = tokenDigest(input.token);
  const account = await findReset(context.db, { tokenHash, now: context.now });
  if (!account) return err(endedLink);
  const problem = passwordProblem(input.password, account);
  if (problem) return err(appError('invalid', problem, { fields: { password: problem } }));
  const passwordHash = await hashPassword(input.password);
  const done = await context.db.transaction(async (tx) => {
    const userId = await useReset(tx, { tokenHash, now: context.now });
    if (!userId) return false;
    await setPasswordHash(tx, { userId, passwordHash });
    await endAllSessions(tx, { userId });
    return true;
  });
  if (!done) return err(endedLink);
  // The password is set whether or not the letter goes out.
  await context.send(passwordChangedLetter({ to: account.email, resetLink: context.link('/forgotten') }));
  return ok({ userId: account.id });
}
