'use client';

import { Button } from '@/components/ui/button';
import { opSpec } from '@/lib/graph';
import { alignCommands, layoutCommand } from '../commands/arrange-commands';
import { duplicateCommand, removeCommand } from '../commands/edit-commands';
import { useRun } from '../commands/use-commands';
import { useKernelState } from '../store/editor-context';
import { edgeById, indexOf } from '../store/kernel-facts';
import { EdgeInspector } from './edge-inspector';
import { KernelInspector } from './kernel-inspector';
import { OpInspector } from './op-inspector';

/** What is selected, in fields: one op, one connection, several ops, or the kernel itself. */
export function Inspector() {
  const kernel = useKernelState((state) => state.kernel);
  const selection = useKernelState((state) => state.selection);
  const edge = selection.edgeId === null ? undefined : edgeById(kernel).get(selection.edgeId);
  const [first] = selection.opIds;
  const op = first === undefined ? undefined : indexOf(kernel).opById.get(first);
  const many = selection.opIds.size > 1;
  const title = edge
    ? 'Connection'
    : many
      ? `${selection.opIds.size} ops`
      : op
        ? op.label || opSpec(op.kind).label
        : 'Kernel';
  return (
    <section aria-label="Inspector" className="min-h-0 flex-1 overflow-y-auto p-3">
      <h2 className="mb-2 truncate text-base font-semibold">{title}</h2>
      {edge ? (
        <EdgeInspector edge={edge} />
      ) : many ? (
        <ManyOps />
      ) : op ? (
        <OpInspector op={op} />
      ) : (
        <KernelInspector />
      )}
    </section>
  );
}

function ManyOps() {
  const readOnly = useKernelState((state) => state.readOnly);
  const count = useKernelState((state) => state.selection.opIds.size);
  const run = useRun();
  if (readOnly) return <p className="text-sm text-quiet">Select one op to see its parameters.</p>;
  return (
    <div className="flex flex-col gap-2">
      {[...alignCommands, layoutCommand, duplicateCommand].map((command) => (
        <Button
          key={command.id}
          look="quiet"
          className="justify-start! border border-rule"
          disabled={command.id.includes('distribute') && count < 3}
          onClick={() => run(command)}
        >
          {command.label}
        </Button>
      ))}
      <Button look="danger" onClick={() => run(removeCommand)}>
        Delete {count} ops
      </Button>
    </div>
  );
}
