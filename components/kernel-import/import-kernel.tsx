'use client';

import dynamic from 'next/dynamic';
import { useState } from 'react';
import type { EditorCalls } from '@/components/kernel-editor/server-calls';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { LoadingForm } from '@/components/ui/loading-form';

// The readers of both formats come when somebody imports.
const ImportForm = dynamic(() => import('./import-form').then((module) => module.ImportForm), {
  ssr: false,
  loading: LoadingForm,
});

interface ImportKernelProps {
  workspace: string;
  create: EditorCalls['create'];
}

/** Imports a kernel from a file or from text: what was read is shown before anything is saved. */
export function ImportKernel(props: ImportKernelProps) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button onClick={() => setOpen(true)}>Import</Button>
      <Dialog open={open} title="Import a kernel" size="wide" onClose={() => setOpen(false)}>
        <ImportForm {...props} onClose={() => setOpen(false)} />
      </Dialog>
    </>
  );
}
