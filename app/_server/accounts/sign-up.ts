/**
 * Making an account and a workspace in two steps: a link to the address first, everything else behind the link.
 * So the screen says the same whether the address has an account or not.
 */

import { hashPassword } from '@/db/password-hash';
import { createAccount, createWorkspace, findAccount } from '@/db/queries/accounts';
import { recordAudit } from '@/db/queries/audit';
import { createSignUp, findSignUp, useSignUp } from '@/db/queries/sign-ups';
import { newToken, tokenDigest } from '@/db/tokens';
import type { Id } from '@/lib/ids';
import { err, ok } from '@/lib/result';
import { type AppResult, appError, refuse } from '../errors';
import { takeAttempt } from '../rate-limit';
import { type AccountContext, later, MINUTE_MS, notSent } from './context';
import { alreadyHereLetter, confirmSignUpLetter } from './letters';
import { linkAddress, resetAccount, signUpAddress } from './limits';
import { passwordProblem } from './password-rule';
import { slugOf } from './slug';

const VALID_HOURS = 24;

const endedLink = appError(
  'not_found',
  'This link was used or has expired. Ask for a new one on the sign-up page.',
);

/** Sends a link to the address, or word that there is an account already. The answer is the same. */
export async function requestSignUp(
  context: AccountContext,
  input: { email: string },
): Promise<AppResult<null>> {
  const byAddress = await takeAttempt(context.db, signUpAddress, context.address);
  if (!byAddress.ok) return byAddress;
  // The same counter as for resets: letters to one person. Beyond it nothing is sent, and nothing is said.
  if (!(await takeAttempt(context.db, resetAccount, input.email)).ok) return ok(null);
  const account = await findAccount(context.db, input);
  if (account) {
    const told = await context.send(
      alreadyHereLetter({
        to: input.email,
        signInLink: context.link('/sign-in'),
        resetLink: context.link('/forgotten'),
      }),
    );
    return told ? ok(null) : err(notSent);
  }
  const token = newToken();
  await createSignUp(context.db, {
    email: input.email,
    tokenHash: tokenDigest(token),
    now: context.now,
    expiresAt: later(context.now, VALID_HOURS * 60 * MINUTE_MS),
  });
  const sent = await context.send(
    confirmSignUpLetter({
      to: input.email,
      link: context.link(`/sign-up/${token}`),
      validHours: VALID_HOURS,
    }),
  );
  return sent ? ok(null) : err(notSent);
}

/** The address that a sign-up link was sent to, or null when the link has ended. */
export const signUpAddressOf = (context: Pick<AccountContext, 'db' | 'now'>, token: string) =>
  findSignUp(context.db, { tokenHash: tokenDigest(token), now: context.now });

/** Makes the account and its workspace and uses the link up, all in one transaction. */
export async function completeSignUp(
  context: AccountContext,
  input: { token: string; name: string; workspaceName: string; password: string },
): Promise<AppResult<{ userId: Id<'user'>; workspaceSlug: string }>> {
  const tries = await takeAttempt(context.db, linkAddress, context.address);
  if (!tries.ok) return tries;
  const tokenHash = tokenDigest(input.token);
  const email = await findSignUp(context.db, { tokenHash, now: context.now });
  if (!email) return err(endedLink);
  const problem = passwordProblem(input.password, {
    email,
    name: input.name,
    workspaceName: input.workspaceName,
  });
  if (problem) return err(appError('invalid', problem, { fields: { password: problem } }));
  const passwordHash = await hashPassword(input.password);
  return context.db.transaction(async (tx) => {
    if (!(await useSignUp(tx, { tokenHash, now: context.now }))) return err(endedLink);
    const account = await createAccount(tx, { email, name: input.name, passwordHash });
    if (!account.ok) {
      return refuse(appError('conflict', 'This address has an account by now. Sign in with it.'));
    }
    const userId = account.value.id;
    const workspace = await createWorkspace(tx, {
      name: input.workspaceName,
      wantedSlug: slugOf(input.workspaceName),
      ownerId: userId,
    });
    await recordAudit(tx, {
      workspaceId: workspace.id,
      actorId: userId,
      action: 'workspace created',
      subjectType: 'workspace',
      subjectId: workspace.id,
      detail: { name: input.workspaceName },
    });
    return ok({ userId, workspaceSlug: workspace.slug });
  });
}
