import type { Metadata } from 'next';
import Link from 'next/link';
import { AskLetterForm } from '../ask-letter-form';
import { DoorHeading } from '../door-heading';
import { requestResetAction } from './actions';

export const metadata: Metadata = { title: 'Forgotten password' };

export default function ForgottenPage() {
  return (
    <>
      <DoorHeading title="Forgotten the password?">
        Enter your address, and we send you a link to choose a new one.
      </DoorHeading>
      <AskLetterForm
        action={requestResetAction}
        submitLabel="Send the link"
        sentText="If the address has an account, the link in it is good for 30 minutes."
      />
      <p className="mt-6 border-t border-rule pt-4 text-sm">
        <Link href="/sign-in" className="text-indigo underline">
          Back to signing in
        </Link>
      </p>
    </>
  );
}
