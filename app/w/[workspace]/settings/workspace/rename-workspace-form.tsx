'use client';

import { useRouter } from 'next/navigation';
import { useAction } from '@/app/use-action';
import { Button } from '@/components/ui/button';
import { TextField } from '@/components/ui/field';
import { useToast } from '@/components/ui/toast';
import { renameWorkspaceAction } from './actions';

export function RenameWorkspaceForm({ workspaceSlug, name }: { workspaceSlug: string; name: string }) {
  const { run, busy, fieldError, formError } = useAction(renameWorkspaceAction);
  const router = useRouter();
  const say = useToast();
  return (
    <form
      method="post"
      className="flex max-w-md items-end gap-2"
      onSubmit={(event) => {
        event.preventDefault();
        const wanted = String(new FormData(event.currentTarget).get('name'));
        run({ workspace: workspaceSlug, name: wanted }, () => {
          say('The workspace is renamed.');
          router.refresh();
        });
      }}
    >
      <TextField
        label="Name of the workspace"
        name="name"
        required
        maxLength={80}
        defaultValue={name}
        error={fieldError('name') ?? formError}
        className="flex-1"
      />
      <Button type="submit" busy={busy}>
        Rename
      </Button>
    </form>
  );
}
