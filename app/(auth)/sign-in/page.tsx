import type { Metadata } from 'next';
import Link from 'next/link';
import { redirect } from 'next/navigation';
import { currentSession } from '@/app/_server/session';
import { DoorHeading } from '../door-heading';
import { nextPath } from '../next-path';
import { SignInForm } from './sign-in-form';

export const metadata: Metadata = { title: 'Sign in' };

interface SignInPageProps {
  searchParams: Promise<{ next?: string | string[] }>;
}

export default async function SignInPage({ searchParams }: SignInPageProps) {
  const next = nextPath((await searchParams).next);
  if (await currentSession()) redirect(next);
  return (
    <>
      <DoorHeading title="Sign in" />
      <SignInForm next={next} />
      <p className="mt-6 border-t border-rule pt-4 text-sm">
        New here?{' '}
        <Link href="/sign-up" className="text-indigo underline">
          Make an account and a workspace
        </Link>
      </p>
    </>
  );
}
