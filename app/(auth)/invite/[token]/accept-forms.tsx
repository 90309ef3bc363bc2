'use client';

import { useAction } from '@/app/use-action';
import { Button } from '@/components/ui/button';
import { TextField } from '@/components/ui/field';
import { Notice } from '@/components/ui/notice';
import { NewPasswordField } from '../../new-password-field';
import { acceptAction, acceptAsNewAction } from './actions';

export function AcceptButton({ token }: { token: string }) {
  const { run, busy, refusal } = useAction(acceptAction);
  return (
    <div className="space-y-4">
      {refusal ? (
        <Notice tone="broken" live>
          {refusal.message}
        </Notice>
      ) : null}
      <Button
        look="primary"
        busy={busy}
        onClick={() => run({ token }, ({ to }) => window.location.assign(to))}
      >
        Accept the invitation
      </Button>
    </div>
  );
}

export function AcceptAsNewForm({ token, email }: { token: string; email: string }) {
  const { run, busy, fieldError, formError } = useAction(acceptAsNewAction);
  return (
    <form
      method="post"
      className="space-y-4"
      onSubmit={(event) => {
        event.preventDefault();
        const data = new FormData(event.currentTarget);
        run({ token, name: String(data.get('name')), password: String(data.get('password')) }, ({ to }) =>
          window.location.assign(to),
        );
      }}
    >
      {formError ? (
        <Notice tone="broken" live>
          {formError}
        </Notice>
      ) : null}
      <input type="hidden" name="username" autoComplete="username" value={email} readOnly />
      <TextField
        label="Your name"
        name="name"
        autoComplete="name"
        required
        maxLength={80}
        error={fieldError('name')}
      />
      <NewPasswordField error={fieldError('password')} />
      <div className="flex justify-end">
        <Button type="submit" look="primary" busy={busy}>
          Make the account and join
        </Button>
      </div>
    </form>
  );
}
