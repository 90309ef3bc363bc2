'use client';

import { type Op, opName, opSpec } from '@/lib/graph';
import { useEditor, useKernelState } from '../store/editor-context';
import { indexOf } from '../store/kernel-facts';
import { selectEdge } from '../store/selection';

/** Where the result goes. */
export function ConsumerList({ op }: { op: Op }) {
  const { store } = useEditor();
  const kernel = useKernelState((state) => state.kernel);
  if (opSpec(op.kind).output === null) return null;
  const { edgesOutOf, opById } = indexOf(kernel);
  const edges = edgesOutOf.get(op.id) ?? [];
  return (
    <section aria-label="Consumers">
      <h3 className="mb-1 text-sm font-semibold">Result goes to</h3>
      {edges.length === 0 ? <p className="text-sm text-quiet">Nothing yet.</p> : null}
      <ul className="flex flex-col">
        {edges.map((edge) => {
          const target = opById.get(edge.to);
          return (
            <li key={edge.id}>
              <button
                type="button"
                className="min-h-6 max-w-full truncate text-left text-sm text-indigo underline underline-offset-2"
                onClick={() => store.getState().select(selectEdge(edge.id))}
              >
                {target === undefined ? edge.to : opName(target)}, {edge.port}
                {edge.distance > 0 ? ` ↻ ${edge.distance}` : ''}
              </button>
            </li>
          );
        })}
      </ul>
    </section>
  );
}
