import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { currentSession } from '@/app/_server/session';
import { DoorHeading } from '../door-heading';
import { SignOutButton } from '../sign-out-button';
import { MakeWorkspaceForm } from './make-workspace-form';

export const metadata: Metadata = { title: 'New workspace' };

/** For somebody who is in no workspace, or wants a further one. */
export default async function WelcomePage() {
  const signedIn = await currentSession();
  if (!signedIn) redirect('/sign-in?next=/welcome');
  return (
    <>
      <DoorHeading title="Make a workspace">
        Kernels, fabrics and mappings live in a workspace, and you decide who else may see them. To join one
        that is there already, ask its owner to invite {signedIn.user.email}.
      </DoorHeading>
      <MakeWorkspaceForm />
      <div className="mt-6 border-t border-rule pt-4">
        <SignOutButton />
      </div>
    </>
  );
}
