'use client';

import { useState } from 'react';
import { TextAreaField } from '@/components/ui/field';
import { hostsOf } from '@/lib/fabric/unit-library';
import { KERNEL_LIMITS, kernelSchema, opSpec } from '@/lib/graph';
import { useEditor, useKernelState } from '../store/editor-context';
import { CommitTextField } from './commit-field';

/** The kernel as a whole: its name, what it does, and which units its ops ask for. */
export function KernelInspector() {
  const { store } = useEditor();
  const kernel = useKernelState((state) => state.kernel);
  const readOnly = useKernelState((state) => state.readOnly);
  const [description, setDescription] = useState<string | null>(null);
  const needs = new Map<string, number>();
  for (const op of kernel.ops) {
    const unit = hostsOf(op.kind)[0]?.label ?? opSpec(op.kind).label;
    needs.set(unit, (needs.get(unit) ?? 0) + 1);
  }
  return (
    <div className="flex flex-col gap-3">
      <CommitTextField
        label="Name"
        value={kernel.name}
        maxLength={KERNEL_LIMITS.nameLength}
        disabled={readOnly}
        onCommit={(text) => {
          const name = kernelSchema.shape.name.safeParse(text);
          if (!name.success) return 'Give the kernel a name of up to 80 characters.';
          store.getState().edit({ type: 'setMeta', patch: { name: name.data } }, 'rename kernel');
          return null;
        }}
      />
      <TextAreaField
        label="What it does"
        rows={4}
        maxLength={2000}
        disabled={readOnly}
        value={description ?? kernel.description}
        onChange={(event) => setDescription(event.target.value)}
        onBlur={() => {
          if (description !== null && description !== kernel.description) {
            store.getState().edit({ type: 'setMeta', patch: { description } }, 'change description');
          }
          setDescription(null);
        }}
      />
      <dl className="figures grid grid-cols-[1fr_auto] gap-y-1 text-sm">
        <dt className="text-quiet">Ops</dt>
        <dd className="text-right font-mono">{kernel.ops.length}</dd>
        <dt className="text-quiet">Connections</dt>
        <dd className="text-right font-mono">{kernel.edges.length}</dd>
        {[...needs].map(([unit, count]) => (
          <div key={unit} className="contents">
            <dt className="text-quiet">{unit} units needed</dt>
            <dd className="text-right font-mono">{count}</dd>
          </div>
        ))}
      </dl>
    </div>
  );
}
