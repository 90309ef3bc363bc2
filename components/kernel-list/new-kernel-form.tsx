'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { firstFocus } from '@/components/kernel-editor/panels/first-focus';
import { type EditorCalls, kernelPath } from '@/components/kernel-editor/server-calls';
import { Button } from '@/components/ui/button';
import { TextField } from '@/components/ui/field';
import { emptyKernel, KERNEL_LIMITS } from '@/lib/graph';

interface NewKernelFormProps {
  workspace: string;
  create: EditorCalls['create'];
  onClose: () => void;
}

export function NewKernelForm({ workspace, create, onClose }: NewKernelFormProps) {
  const router = useRouter();
  const [name, setName] = useState('');
  const [error, setError] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const submit = async () => {
    if (name.trim() === '') return setError('Give the kernel a name, such as what its loop computes.');
    setBusy(true);
    try {
      const made = await create({ workspace, document: emptyKernel(name.trim()) });
      if (made.ok) return router.push(kernelPath({ workspace, kernelId: made.value.id }));
      setError(made.error.message);
    } catch {
      setError('The server did not answer. Try again.');
    }
    setBusy(false);
  };
  return (
    <form
      className="flex flex-col gap-3"
      onSubmit={(event) => {
        event.preventDefault();
        void submit();
      }}
    >
      <TextField
        label="Name"
        value={name}
        maxLength={KERNEL_LIMITS.nameLength}
        ref={firstFocus}
        error={error}
        onChange={(event) => setName(event.target.value)}
      />
      <div className="flex justify-end gap-2">
        <Button look="quiet" onClick={onClose}>
          Cancel
        </Button>
        <Button look="primary" type="submit" busy={busy}>
          Create and draw
        </Button>
      </div>
    </form>
  );
}
