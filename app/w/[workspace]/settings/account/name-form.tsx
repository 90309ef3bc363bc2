'use client';

import { useRouter } from 'next/navigation';
import { useAction } from '@/app/use-action';
import { Button } from '@/components/ui/button';
import { TextField } from '@/components/ui/field';
import { useToast } from '@/components/ui/toast';
import { renameAccountAction } from './actions';

export function NameForm({ name }: { name: string }) {
  const { run, busy, fieldError, formError } = useAction(renameAccountAction);
  const router = useRouter();
  const say = useToast();
  return (
    <form
      method="post"
      className="flex max-w-md items-end gap-2"
      onSubmit={(event) => {
        event.preventDefault();
        const wanted = String(new FormData(event.currentTarget).get('name'));
        run({ name: wanted }, () => {
          say('Your name is changed.');
          router.refresh();
        });
      }}
    >
      <TextField
        label="Name"
        name="name"
        autoComplete="name"
        required
        maxLength={80}
        defaultValue={name}
        error={fieldError('name') ?? formError}
        className="flex-1"
      />
      <Button type="submit" busy={busy}>
        Change the name
      </Button>
    </form>
  );
}
