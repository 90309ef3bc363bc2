import type { Metadata } from 'next';
import { openInvitation } from '@/app/_server/accounts/invite';
import { currentSession } from '@/app/_server/session';
import { Notice } from '@/components/ui/notice';
import { database } from '@/db/client';
import { findAccount } from '@/db/queries/accounts';
import { roleSummaries } from '@/lib/roles';
import { DoorHeading, EndedLink } from '../../door-heading';
import { SignInForm } from '../../sign-in/sign-in-form';
import { SignOutButton } from '../../sign-out-button';
import { AcceptAsNewForm, AcceptButton } from './accept-forms';

export const metadata: Metadata = { title: 'Invitation', referrer: 'no-referrer' };

export default async function InvitationPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const invitation = await openInvitation({ db: database(), now: new Date() }, token);
  if (!invitation) {
    return (
      <EndedLink>
        The invitation was accepted, withdrawn, sent again or has expired. Look for a newer letter, or ask the
        workspace for a new invitation.
      </EndedLink>
    );
  }
  const { email, role } = invitation;
  const signedIn = await currentSession();
  return (
    <>
      <DoorHeading title={`Join ${invitation.workspaceName}`}>
        {invitation.invitedByName} invites {email} as {role}: {roleSummaries[role]}.
      </DoorHeading>
      {signedIn?.user.email === email ? <AcceptButton token={token} /> : null}
      {signedIn && signedIn.user.email !== email ? (
        <div className="space-y-4">
          <Notice tone="warning">
            You are signed in as {signedIn.user.email}, but the invitation is for {email}. Sign out, then open
            the link again.
          </Notice>
          <SignOutButton to={`/invite/${token}`} />
        </div>
      ) : null}
      {signedIn ? null : <SignedOutDoor token={token} email={email} />}
    </>
  );
}

// Only who holds the link, which went to this address, learns whether the address has an account.
async function SignedOutDoor({ token, email }: { token: string; email: string }) {
  if (!(await findAccount(database(), { email }))) return <AcceptAsNewForm token={token} email={email} />;
  return (
    <>
      <p className="mb-4 text-sm">You have an account with this address. Sign in to accept.</p>
      <SignInForm next={`/invite/${token}`} email={email} />
    </>
  );
}
