'use client';

import { useAction } from '@/app/use-action';
import { Button } from '@/components/ui/button';
import { signOutAction } from './sign-in/actions';

/** Signs out and goes to `to`, or to the sign-in page. */
export function SignOutButton({ to }: { to?: string }) {
  const { run, busy, refusal } = useAction(signOutAction);
  return (
    <>
      <Button busy={busy} onClick={() => run({}, (done) => window.location.assign(to ?? done.to))}>
        Sign out
      </Button>
      {refusal ? (
        <p role="alert" className="mt-1 text-sm text-madder">
          {refusal.message}
        </p>
      ) : null}
    </>
  );
}
