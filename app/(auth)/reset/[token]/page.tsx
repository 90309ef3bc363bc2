import type { Metadata } from 'next';
import Link from 'next/link';
import { isResetOpen } from '@/app/_server/accounts/reset';
import { database } from '@/db/client';
import { DoorHeading, EndedLink } from '../../door-heading';
import { ResetForm } from './reset-form';

export const metadata: Metadata = { title: 'New password', referrer: 'no-referrer' };

export default async function ResetPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  if (!(await isResetOpen({ db: database(), now: new Date() }, token))) {
    return (
      <EndedLink>
        It was used, replaced by a newer one, or has expired.{' '}
        <Link href="/forgotten" className="text-indigo underline">
          Ask for a new one
        </Link>
        .
      </EndedLink>
    );
  }
  return (
    <>
      <DoorHeading title="Choose a new password">
        All your present sessions end, in every browser.
      </DoorHeading>
      <ResetForm token={token} />
    </>
  );
}
