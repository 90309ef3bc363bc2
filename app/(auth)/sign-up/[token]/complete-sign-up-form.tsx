'use client';

import { useAction } from '@/app/use-action';
import { Button } from '@/components/ui/button';
import { TextField } from '@/components/ui/field';
import { Notice } from '@/components/ui/notice';
import { NewPasswordField } from '../../new-password-field';
import { completeSignUpAction } from '../actions';

export function CompleteSignUpForm({ token, email }: { token: string; email: string }) {
  const { run, busy, fieldError, formError } = useAction(completeSignUpAction);
  return (
    <form
      method="post"
      className="space-y-4"
      onSubmit={(event) => {
        event.preventDefault();
        const data = new FormData(event.currentTarget);
        run(
          {
            token,
            name: String(data.get('name')),
            workspaceName: String(data.get('workspaceName')),
            password: String(data.get('password')),
          },
          ({ to }) => window.location.assign(to),
        );
      }}
    >
      {formError ? (
        <Notice tone="broken" live>
          {formError}
        </Notice>
      ) : null}
      {/* For password managers: which account the new password belongs to. */}
      <input type="hidden" name="username" autoComplete="username" value={email} readOnly />
      <TextField
        label="Your name"
        name="name"
        autoComplete="name"
        required
        maxLength={80}
        error={fieldError('name')}
      />
      <TextField
        label="Name of the workspace"
        name="workspaceName"
        autoComplete="organization"
        required
        maxLength={80}
        hint="You become its owner and can invite others."
        error={fieldError('workspaceName')}
      />
      <NewPasswordField error={fieldError('password')} />
      <div className="flex justify-end">
        <Button type="submit" look="primary" busy={busy}>
          Make the account
        </Button>
      </div>
    </form>
  );
}
