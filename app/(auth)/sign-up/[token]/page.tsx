import type { Metadata } from 'next';
import Link from 'next/link';
import { signUpAddressOf } from '@/app/_server/accounts/sign-up';
import { database } from '@/db/client';
import { DoorHeading, EndedLink } from '../../door-heading';
import { CompleteSignUpForm } from './complete-sign-up-form';

export const metadata: Metadata = { title: 'Finish your account', referrer: 'no-referrer' };

export default async function CompleteSignUpPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const email = await signUpAddressOf({ db: database(), now: new Date() }, token);
  if (!email) {
    return (
      <EndedLink>
        It was used or has expired.{' '}
        <Link href="/sign-up" className="text-indigo underline">
          Ask for a new one
        </Link>{' '}
        or{' '}
        <Link href="/sign-in" className="text-indigo underline">
          sign in
        </Link>
        .
      </EndedLink>
    );
  }
  return (
    <>
      <DoorHeading title="Finish your account">For {email}.</DoorHeading>
      <CompleteSignUpForm token={token} email={email} />
    </>
  );
}
