'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { SelectField, TextField } from '@/components/ui/field';
import { Notice } from '@/components/ui/notice';
import type { Result } from '@/lib/result';

export interface KernelChoice {
  id: `kernel_${string}`;
  name: string;
  opCount: number;
  hasErrors: boolean;
  latestVersion: number | null;
}
export interface FabricChoice {
  id: `fabric_${string}`;
  name: string;
  rows: number;
  cols: number;
}

interface NewBenchFormProps {
  workspace: string;
  kernels: readonly KernelChoice[];
  fabrics: readonly FabricChoice[];
  /** Chosen already, when one comes from a kernel or a fabric. */
  kernelId: string | null;
  fabricId: string | null;
  createBench: (input: {
    workspace: string;
    name: string;
    kernelId: `kernel_${string}`;
    fabricId: `fabric_${string}`;
  }) => Promise<Result<{ draftId: string }, { message: string }>>;
}

const usable = (kernel: KernelChoice) => !kernel.hasErrors || kernel.latestVersion !== null;

/** Kernel and fabric of a new bench. */
export function NewBenchForm(props: NewBenchFormProps) {
  const { workspace, kernels, fabrics, createBench } = props;
  const router = useRouter();
  const first = kernels.find((kernel) => kernel.id === props.kernelId) ?? kernels.find(usable) ?? kernels[0];
  const [kernelId, setKernelId] = useState(first?.id ?? null);
  const [fabricId, setFabricId] = useState(
    (fabrics.find((fabric) => fabric.id === props.fabricId) ?? fabrics[0])?.id ?? null,
  );
  const [ownName, setOwnName] = useState<string | null>(null);
  const [error, setError] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const kernel = kernels.find((candidate) => candidate.id === kernelId);
  const fabric = fabrics.find((candidate) => candidate.id === fabricId);
  const name = ownName ?? `${kernel?.name ?? ''} on ${fabric?.name ?? ''}`.slice(0, 80);
  const tooMany = kernel && fabric ? kernel.opCount > fabric.rows * fabric.cols : false;
  return (
    <form
      className="max-w-lg space-y-4"
      onSubmit={async (event) => {
        event.preventDefault();
        if (!kernelId || !fabricId) return;
        setBusy(true);
        setError(null);
        const answer = await createBench({ workspace, name: name.trim(), kernelId, fabricId });
        if (answer.ok) router.push(`/w/${workspace}/mappings/bench/${answer.value.draftId}`);
        else {
          setError(answer.error.message);
          setBusy(false);
        }
      }}
    >
      <SelectField
        label="Kernel"
        hint={kernel ? kernelHint(kernel) : undefined}
        choices={kernels.map((choice) => ({
          value: choice.id,
          label: `${choice.name} · ${choice.opCount} ops`,
        }))}
        value={kernelId ?? ''}
        onChange={(event) => setKernelId(event.target.value as KernelChoice['id'])}
      />
      <SelectField
        label="Fabric"
        hint={
          tooMany
            ? 'The kernel has more ops than this fabric has tiles: it cannot fit.'
            : 'Stands on the fabric as it is now.'
        }
        choices={fabrics.map((choice) => ({
          value: choice.id,
          label: `${choice.name} · ${choice.rows}×${choice.cols}`,
        }))}
        value={fabricId ?? ''}
        onChange={(event) => setFabricId(event.target.value as FabricChoice['id'])}
      />
      <TextField
        label="Name"
        maxLength={80}
        value={name}
        onChange={(event) => setOwnName(event.target.value)}
      />
      {error ? (
        <Notice tone="broken" live>
          {error}
        </Notice>
      ) : null}
      <Button type="submit" look="primary" busy={busy} disabled={!kernelId || !fabricId}>
        Open the bench
      </Button>
    </form>
  );
}

function kernelHint(kernel: KernelChoice): string {
  if (!kernel.hasErrors) return 'A version of the kernel as it is now is kept for the mapping.';
  return kernel.latestVersion === null
    ? 'This kernel has errors and no version yet. Mend it first.'
    : `This kernel has errors; version ${kernel.latestVersion} is used.`;
}
