'use client';

import { useAction } from '@/app/use-action';
import { Button } from '@/components/ui/button';
import { TextField } from '@/components/ui/field';
import { Notice } from '@/components/ui/notice';
import { makeWorkspaceAction } from './actions';

export function MakeWorkspaceForm() {
  const { run, busy, fieldError, formError } = useAction(makeWorkspaceAction);
  return (
    <form
      method="post"
      className="space-y-4"
      onSubmit={(event) => {
        event.preventDefault();
        const name = String(new FormData(event.currentTarget).get('name'));
        run({ name }, ({ to }) => window.location.assign(to));
      }}
    >
      {formError ? (
        <Notice tone="broken" live>
          {formError}
        </Notice>
      ) : null}
      <TextField
        label="Name of the workspace"
        name="name"
        required
        maxLength={80}
        error={fieldError('name')}
      />
      <Button type="submit" look="primary" busy={busy}>
        Make the workspace
      </Button>
    </form>
  );
}
