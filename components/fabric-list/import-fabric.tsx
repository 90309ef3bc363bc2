'use client';

import dynamic from 'next/dynamic';
import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { LoadingForm } from '@/components/ui/loading-form';
import type { FabricCommands } from './fabric-commands';

// The reader of fabric files comes when somebody imports.
const ImportFabricForm = dynamic(
  () => import('./import-fabric-form').then((module) => module.ImportFabricForm),
  { ssr: false, loading: LoadingForm },
);

interface ImportFabricProps {
  workspace: string;
  importFabric: FabricCommands['import'];
}

/** A button that reads a fabric file, shows what is in it and stores it only when it is right and wanted. */
export function ImportFabric({ workspace, importFabric }: ImportFabricProps) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button look="quiet" onClick={() => setOpen(true)}>
        Import JSON
      </Button>
      <Dialog open={open} title="Import a fabric" size="wide" onClose={() => setOpen(false)}>
        <ImportFabricForm workspace={workspace} importFabric={importFabric} />
      </Dialog>
    </>
  );
}
