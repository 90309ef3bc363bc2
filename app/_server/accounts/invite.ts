/** Inviting people to a workspace and accepting. */

import { hashPassword } from '@/db/password-hash';
import { createAccount } from '@/db/queries/accounts';
import { recordAudit } from '@/db/queries/audit';
import {
  acceptInvitation,
  createInvitation,
  findOpenInvitation,
  type OpenInvitation,
  renewInvitation,
  revokeInvitation,
} from '@/db/queries/invitations';
import { newToken, tokenDigest } from '@/db/tokens';
import type { Id } from '@/lib/ids';
import { err, ok } from '@/lib/result';
import type { Role } from '@/lib/roles';
import type { Member } from '../access';
import { type AppResult, appError, notFound, refuse } from '../errors';
import { takeAttempt } from '../rate-limit';
import type { SignedIn } from '../session-store';
import { type AccountContext, later, MINUTE_MS, notSent } from './context';
import { invitationLetter } from './letters';
import { inviteWorkspace, linkAddress } from './limits';
import { passwordProblem } from './password-rule';

const VALID_DAYS = 7;
const validUntil = (now: Date) => later(now, VALID_DAYS * 24 * 60 * MINUTE_MS);

const endedLink = appError(
  'not_found',
  'This invitation was accepted, withdrawn or has expired. Ask the workspace for a new one.',
);

type Inviter = Pick<Member, 'user' | 'workspace'>;

const letterFor = (context: AccountContext, by: Inviter, to: string, role: Role, token: string) =>
  invitationLetter({
    to,
    role,
    inviterName: by.user.name,
    workspaceName: by.workspace.name,
    link: context.link(`/invite/${token}`),
    validDays: VALID_DAYS,
  });

/** Invites an address and sends the letter. */
export async function invite(
  context: AccountContext,
  by: Inviter,
  input: { email: string; role: Role },
): Promise<AppResult<{ id: Id<'invitation'> }>> {
  const taken = await takeAttempt(context.db, inviteWorkspace, by.workspace.id);
  if (!taken.ok) return taken;
  const token = newToken();
  const made = await context.db.transaction(async (tx) => {
    const invitation = await createInvitation(tx, {
      workspaceId: by.workspace.id,
      ...input,
      tokenHash: tokenDigest(token),
      invitedBy: by.user.id,
      now: context.now,
      expiresAt: validUntil(context.now),
    });
    if (invitation.ok) {
      await recordAudit(tx, {
        workspaceId: by.workspace.id,
        actorId: by.user.id,
        action: 'member invited',
        subjectType: 'invitation',
        subjectId: invitation.value.id,
        detail: { ...input },
      });
    }
    return invitation;
  });
  if (!made.ok) {
    const message =
      made.error === 'member'
        ? 'This person is a member already. Change the role in the list instead.'
        : 'This address is invited already. Send that invitation again instead.';
    return err(appError('conflict', message, { fields: { email: message } }));
  }
  const sent = await context.send(letterFor(context, by, input.email, input.role, token));
  if (sent) return made;
  return err(
    appError(
      'unavailable',
      'The invitation is made, but its letter could not be sent. In a few minutes, reload this page and use "Send again".',
    ),
  );
}

/** Sends a pending invitation again, with a new link; the older link ends. */
export async function inviteAgain(
  context: AccountContext,
  by: Inviter,
  input: { invitationId: Id<'invitation'> },
): Promise<AppResult<null>> {
  const taken = await takeAttempt(context.db, inviteWorkspace, by.workspace.id);
  if (!taken.ok) return taken;
  const token = newToken();
  const renewed = await renewInvitation(context.db, {
    workspaceId: by.workspace.id,
    invitationId: input.invitationId,
    tokenHash: tokenDigest(token),
    expiresAt: validUntil(context.now),
  });
  if (!renewed.ok) return err(notFound('invitation'));
  const { email, role } = renewed.value;
  const sent = await context.send(letterFor(context, by, email, role, token));
  return sent ? ok(null) : err(notSent);
}

export function withdrawInvitation(
  context: Pick<AccountContext, 'db' | 'now'>,
  by: Inviter,
  input: { invitationId: Id<'invitation'> },
): Promise<AppResult<null>> {
  return context.db.transaction(async (tx) => {
    const revoked = await revokeInvitation(tx, {
      workspaceId: by.workspace.id,
      invitationId: input.invitationId,
      now: context.now,
    });
    if (!revoked.ok) return err(notFound('invitation'));
    await recordAudit(tx, {
      workspaceId: by.workspace.id,
      actorId: by.user.id,
      action: 'invitation withdrawn',
      subjectType: 'invitation',
      subjectId: input.invitationId,
      detail: { email: revoked.value.email },
    });
    return ok(null);
  });
}

/** The invitation behind a link, or null when it has ended. */
export const openInvitation = (
  context: Pick<AccountContext, 'db' | 'now'>,
  token: string,
): Promise<OpenInvitation | null> =>
  findOpenInvitation(context.db, { tokenHash: tokenDigest(token), now: context.now });

/** Accepts for somebody who is signed in. The invitation must be for this person's address. */
export async function acceptAs(
  context: AccountContext,
  who: Pick<SignedIn, 'user'>,
  input: { token: string },
): Promise<AppResult<{ workspaceSlug: string }>> {
  const tries = await takeAttempt(context.db, linkAddress, context.address);
  if (!tries.ok) return tries;
  const invitation = await openInvitation(context, input.token);
  if (!invitation) return err(endedLink);
  if (invitation.email !== who.user.email) {
    return err(
      appError(
        'forbidden',
        `This invitation is for ${invitation.email}. Sign out, then sign in with that address.`,
      ),
    );
  }
  return context.db.transaction(async (tx) => {
    await join(tx, context, invitation, who.user.id, input.token);
    return ok({ workspaceSlug: invitation.workspaceSlug });
  });
}

/** Accepts for somebody new: makes the account for the invited address and joins. */
export async function acceptAsNew(
  context: AccountContext,
  input: { token: string; name: string; password: string },
): Promise<AppResult<{ userId: Id<'user'>; workspaceSlug: string }>> {
  const tries = await takeAttempt(context.db, linkAddress, context.address);
  if (!tries.ok) return tries;
  const invitation = await openInvitation(context, input.token);
  if (!invitation) return err(endedLink);
  const { email, workspaceName } = invitation;
  const problem = passwordProblem(input.password, { email, name: input.name, workspaceName });
  if (problem) return err(appError('invalid', problem, { fields: { password: problem } }));
  const passwordHash = await hashPassword(input.password);
  return context.db.transaction(async (tx) => {
    const account = await createAccount(tx, { email, name: input.name, passwordHash });
    if (!account.ok) {
      return err(
        appError('conflict', 'This address has an account. Sign in with it, then open the link again.'),
      );
    }
    await join(tx, context, invitation, account.value.id, input.token);
    return ok({ userId: account.value.id, workspaceSlug: invitation.workspaceSlug });
  });
}

async function join(
  tx: Parameters<typeof acceptInvitation>[0],
  context: Pick<AccountContext, 'now'>,
  invitation: OpenInvitation,
  userId: Id<'user'>,
  token: string,
): Promise<void> {
  const accepted = await acceptInvitation(tx, { tokenHash: tokenDigest(token), userId, now: context.now });
  // Somebody else was quicker with the same link: the account made in this transaction goes too.
  if (!accepted.ok) refuse(endedLink);
  await recordAudit(tx, {
    workspaceId: invitation.workspaceId,
    actorId: userId,
    action: 'member joined',
    subjectType: 'user',
    subjectId: userId,
    detail: { role: invitation.role },
  });
}
