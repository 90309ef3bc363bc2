'use client';

import { Button } from '@/components/ui/button';
import { type Edge, initialValueRange, inRange, KERNEL_LIMITS, opName, portOf } from '@/lib/graph';
import { removeCommand } from '../commands/edit-commands';
import { useRun } from '../commands/use-commands';
import { useEditor, useKernelState } from '../store/editor-context';
import { indexOf } from '../store/kernel-facts';
import { distanceEdit } from '../store/op-edits';
import { CommitTextField, IntegerField, parseIntegers } from './commit-field';

/** One connection: its ends, how far it carries its value, and what is read before the first value arrives. */
export function EdgeInspector({ edge }: { edge: Edge }) {
  const { store, canvas } = useEditor();
  const readOnly = useKernelState((state) => state.readOnly);
  const source = useKernelState(({ kernel }) => indexOf(kernel).opById.get(edge.from));
  const target = useKernelState(({ kernel }) => indexOf(kernel).opById.get(edge.to));
  const run = useRun();
  if (source === undefined || target === undefined) return null;
  const range = initialValueRange(source);
  const { edit } = store.getState();
  return (
    <div className="flex flex-col gap-3">
      <p className="text-sm">
        <EndButton name={opName(source)} onGo={() => canvas.current?.focus(edge.from)} /> to{' '}
        <EndButton name={opName(target)} onGo={() => canvas.current?.focus(edge.to)} />, operand{' '}
        {portOf(target, edge.port)?.label ?? edge.port}
      </p>
      <IntegerField
        key={`distance-${edge.id}`}
        label="Distance"
        hint="Iterations that the value is carried; 0 is the same iteration."
        value={edge.distance}
        min={0}
        max={KERNEL_LIMITS.distance}
        disabled={readOnly}
        onCommit={(distance) => {
          if (distance !== null) edit(distanceEdit(edge, distance), 'change distance');
        }}
      />
      {edge.distance === 0 ? null : (
        <CommitTextField
          key={`initial-${edge.id}`}
          label="Initial values"
          hint={`Up to ${edge.distance}, with commas between; what is missing is 0.`}
          value={edge.initialValues.join(', ')}
          disabled={readOnly}
          onCommit={(text) => {
            const initialValues = parseIntegers(text);
            if (initialValues === null || initialValues.some((value) => !inRange(value, range))) {
              return `Give integers from ${range.min} to ${range.max}, with commas between.`;
            }
            if (initialValues.length > edge.distance) {
              return `Give at most ${edge.distance}: the distance is ${edge.distance}.`;
            }
            edit({ type: 'updateEdge', id: edge.id, patch: { initialValues } }, 'change initial values');
            return null;
          }}
        />
      )}
      {readOnly ? null : (
        <div>
          <Button look="danger" onClick={() => run(removeCommand)}>
            Delete connection
          </Button>
        </div>
      )}
    </div>
  );
}

function EndButton({ name, onGo }: { name: string; onGo: () => void }) {
  return (
    <button type="button" className="min-h-6 text-indigo underline underline-offset-2" onClick={onGo}>
      {name}
    </button>
  );
}
