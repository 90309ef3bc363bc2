import type { Metadata } from 'next';
import Link from 'next/link';
import { AskLetterForm } from '../ask-letter-form';
import { DoorHeading } from '../door-heading';
import { requestSignUpAction } from './actions';

export const metadata: Metadata = { title: 'Make an account' };

export default function SignUpPage() {
  return (
    <>
      <DoorHeading title="Make an account">
        First we send a link to your address. Behind it you choose a password and name your workspace.
      </DoorHeading>
      <AskLetterForm
        action={requestSignUpAction}
        submitLabel="Send the link"
        sentText="Follow the link in it to go on."
      />
      <p className="mt-6 border-t border-rule pt-4 text-sm">
        You have an account?{' '}
        <Link href="/sign-in" className="text-indigo underline">
          Sign in
        </Link>
        . Invited to a workspace? Follow the link in the invitation instead.
      </p>
    </>
  );
}
