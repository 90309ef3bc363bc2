'use client';

import { useRouter } from 'next/navigation';
import type { FabricCommands } from '@/components/fabric-list/fabric-commands';
import { FabricForm } from './fabric-form';

interface NewFabricProps {
  workspace: string;
  create: FabricCommands['create'];
}

/** The form in its place: a created fabric's own page follows. */
export function NewFabric({ workspace, create }: NewFabricProps) {
  const router = useRouter();
  return (
    <FabricForm
      create={(form) => create({ workspace, form })}
      onCreated={(fabricId) => router.push(`/w/${workspace}/fabrics/${fabricId}`)}
    />
  );
}
