'use client';

import Link from 'next/link';
import { useAction } from '@/app/use-action';
import { Button } from '@/components/ui/button';
import { PasswordField, TextField } from '@/components/ui/field';
import { Notice } from '@/components/ui/notice';
import { signInAction } from './actions';

export function SignInForm({ next, email }: { next: string; email?: string }) {
  const { run, busy, fieldError, formError } = useAction(signInAction);
  return (
    <form
      method="post"
      className="space-y-4"
      onSubmit={(event) => {
        event.preventDefault();
        const data = new FormData(event.currentTarget);
        run(
          { email: String(data.get('email')), password: String(data.get('password')), next },
          // A whole load: nothing of an earlier person may stay in the page's memory.
          ({ to }) => window.location.assign(to),
        );
      }}
    >
      {formError ? (
        <Notice tone="broken" live>
          {formError}
        </Notice>
      ) : null}
      <TextField
        label="E-mail address"
        name="email"
        type="email"
        autoComplete="username"
        required
        defaultValue={email}
        error={fieldError('email')}
      />
      <PasswordField
        label="Password"
        name="password"
        autoComplete="current-password"
        required
        error={fieldError('password')}
      />
      <div className="flex items-center justify-between gap-4">
        <Link href="/forgotten" className="text-sm text-indigo underline">
          Forgotten the password?
        </Link>
        <Button type="submit" look="primary" busy={busy}>
          Sign in
        </Button>
      </div>
    </form>
  );
}
