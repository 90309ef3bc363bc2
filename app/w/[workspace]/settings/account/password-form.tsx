'use client';

import { useRef } from 'react';
import { NewPasswordField } from '@/app/(auth)/new-password-field';
import { useAction } from '@/app/use-action';
import { Button } from '@/components/ui/button';
import { CheckboxField, PasswordField } from '@/components/ui/field';
import { Notice } from '@/components/ui/notice';
import { useToast } from '@/components/ui/toast';
import { changePasswordAction } from './actions';

export function PasswordForm({ email }: { email: string }) {
  const { run, busy, fieldError, formError } = useAction(changePasswordAction);
  const form = useRef<HTMLFormElement>(null);
  const say = useToast();
  return (
    <form
      method="post"
      ref={form}
      className="max-w-md space-y-4"
      onSubmit={(event) => {
        event.preventDefault();
        const data = new FormData(event.currentTarget);
        run(
          {
            current: String(data.get('current')),
            password: String(data.get('password')),
            endOthers: data.get('endOthers') === 'on',
          },
          ({ endedSessions }) => {
            form.current?.reset();
            say(
              endedSessions === 0
                ? 'Your password is changed.'
                : `Your password is changed; ${endedSessions} other ${endedSessions === 1 ? 'session' : 'sessions'} ended.`,
            );
          },
        );
      }}
    >
      {formError ? (
        <Notice tone="broken" live>
          {formError}
        </Notice>
      ) : null}
      <input type="hidden" name="username" autoComplete="username" value={email} readOnly />
      <PasswordField
        label="Present password"
        name="current"
        autoComplete="current-password"
        required
        error={fieldError('current')}
      />
      <NewPasswordField label="New password" error={fieldError('password')} />
      <CheckboxField
        label="End my other sessions"
        name="endOthers"
        defaultChecked
        hint="Other browsers must sign in with the new password."
      />
      <Button type="submit" busy={busy}>
        Change the password
      </Button>
    </form>
  );
}
