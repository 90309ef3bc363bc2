'use client';

import { type Edge, immediateRange, type Op, opName, type PortSpec, portsOf } from '@/lib/graph';
import { useEditor, useKernelState } from '../store/editor-context';
import { indexOf } from '../store/kernel-facts';
import { constantEdit } from '../store/op-edits';
import { selectEdge } from '../store/selection';
import { IntegerField } from './commit-field';

/** Where each operand comes from: a connection, a constant, or nothing yet. Predicate and fallback stand last. */
export function OperandList({ op }: { op: Op }) {
  const kernel = useKernelState((state) => state.kernel);
  const into = indexOf(kernel).edgesInto.get(op.id) ?? [];
  return (
    <fieldset className="min-w-0">
      <legend className="mb-1 text-sm font-semibold">Operands</legend>
      <ul className="flex flex-col gap-1.5">
        {portsOf(op.kind).map((port) => (
          <li key={`${op.id}-${port.name}`}>
            <OperandRow op={op} port={port} edge={into.find((edge) => edge.port === port.name)} />
          </li>
        ))}
      </ul>
    </fieldset>
  );
}

function OperandRow({ op, port, edge }: { op: Op; port: PortSpec; edge: Edge | undefined }) {
  const { store } = useEditor();
  const readOnly = useKernelState((state) => state.readOnly);
  const source = useKernelState(({ kernel }) =>
    edge === undefined ? undefined : indexOf(kernel).opById.get(edge.from),
  );
  const range = immediateRange(op, port);
  const name = port.required ? port.label : `${port.label}, optional`;
  return (
    <div className="grid grid-cols-[6.5rem_1fr] items-center gap-2 text-sm">
      <span>
        {port.label} <span className="text-xs text-quiet">{port.type}</span>
      </span>
      {edge !== undefined ? (
        <span className="flex min-w-0 items-center gap-1">
          <button
            type="button"
            className="min-h-6 min-w-0 truncate text-left text-indigo underline underline-offset-2"
            onClick={() => store.getState().select(selectEdge(edge.id))}
          >
            {source === undefined ? edge.from : opName(source)}
            {edge.distance > 0 ? ` ↻ ${edge.distance}` : ''}
          </button>
          {readOnly ? null : (
            <button
              type="button"
              className="ml-auto min-h-6 min-w-6 rounded hover:bg-indigo-wash"
              aria-label={`Remove the connection to ${port.label}`}
              onClick={() => store.getState().edit({ type: 'removeEdge', id: edge.id }, 'remove connection')}
            >
              ✕
            </button>
          )}
        </span>
      ) : (
        <IntegerField
          label={`Constant for ${name}`}
          labelHidden
          value={op.immediates[port.name] ?? null}
          min={range.min}
          max={range.max}
          optional
          disabled={readOnly}
          onCommit={(value) => store.getState().edit(constantEdit(op, port.name, value), 'change constant')}
        />
      )}
    </div>
  );
}
