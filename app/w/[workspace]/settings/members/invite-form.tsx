'use client';

import { useRouter } from 'next/navigation';
import { useRef } from 'react';
import { useAction } from '@/app/use-action';
import { Button } from '@/components/ui/button';
import { SelectField, TextField } from '@/components/ui/field';
import { Notice } from '@/components/ui/notice';
import { useToast } from '@/components/ui/toast';
import { roleSummaries, roles } from '@/lib/roles';
import { inviteAction } from './actions';

export function InviteForm({ workspaceSlug }: { workspaceSlug: string }) {
  const { run, busy, fieldError, formError } = useAction(inviteAction);
  const form = useRef<HTMLFormElement>(null);
  const router = useRouter();
  const say = useToast();
  return (
    <form
      method="post"
      ref={form}
      className="max-w-md space-y-4"
      onSubmit={(event) => {
        event.preventDefault();
        const data = new FormData(event.currentTarget);
        const email = String(data.get('email'));
        const role = roles.find((one) => one === data.get('role')) ?? 'viewer';
        run({ workspace: workspaceSlug, email, role }, () => {
          form.current?.reset();
          say(`The invitation to ${email} is on its way.`);
          router.refresh();
        });
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
        autoComplete="off"
        required
        error={fieldError('email')}
      />
      <SelectField
        label="Role"
        name="role"
        defaultValue="editor"
        choices={roles.map((role) => ({ value: role, label: `${role}: ${roleSummaries[role]}` }))}
      />
      <Button type="submit" look="primary" busy={busy}>
        Send the invitation
      </Button>
    </form>
  );
}
