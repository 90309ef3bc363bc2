'use client';

import dynamic from 'next/dynamic';
import { useState } from 'react';
import type { EditorCalls } from '@/components/kernel-editor/server-calls';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { LoadingForm } from '@/components/ui/loading-form';

// What a kernel is comes with the form, not with the list.
const NewKernelForm = dynamic(() => import('./new-kernel-form').then((module) => module.NewKernelForm), {
  ssr: false,
  loading: LoadingForm,
});

interface NewKernelProps {
  workspace: string;
  create: EditorCalls['create'];
}

/** Asks for a name, then opens the empty kernel. */
export function NewKernel(props: NewKernelProps) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button look="primary" onClick={() => setOpen(true)}>
        New kernel
      </Button>
      <Dialog open={open} title="New kernel" onClose={() => setOpen(false)}>
        <NewKernelForm {...props} onClose={() => setOpen(false)} />
      </Dialog>
    </>
  );
}
