'use client';

import { useAction } from '@/app/use-action';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { completeResetAction } from '../../forgotten/actions';
import { NewPasswordField } from '../../new-password-field';

export function ResetForm({ token }: { token: string }) {
  const { run, busy, fieldError, formError } = useAction(completeResetAction);
  return (
    <form
      method="post"
      className="space-y-4"
      onSubmit={(event) => {
        event.preventDefault();
        const password = String(new FormData(event.currentTarget).get('password'));
        run({ token, password }, ({ to }) => window.location.assign(to));
      }}
    >
      {formError ? (
        <Notice tone="broken" live>
          {formError}
        </Notice>
      ) : null}
      <NewPasswordField label="New password" error={fieldError('password')} />
      <div className="flex justify-end">
        <Button type="submit" look="primary" busy={busy}>
          Set the password
        </Button>
      </div>
    </form>
  );
}
