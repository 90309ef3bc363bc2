'use client';

import { useKernelState } from '../store/editor-context';

/** The line at the foot: what just happened, or why something was refused. Read out politely. */
export function StatusLine() {
  const said = useKernelState((state) => state.said);
  const empty = useKernelState((state) => state.kernel.ops.length === 0);
  const readOnly = useKernelState((state) => state.readOnly);
  const rest = readOnly
    ? 'Read only: arrows go from op to op'
    : empty
      ? 'Add the first op from the palette: click one, drag it here, or press / and type'
      : 'Arrows go from op to op · C connects · Shift and arrows move · ? lists all keys';
  return (
    <p
      role="status"
      className="min-h-8 flex-none border-t border-rule bg-surface px-3 py-1.5 text-sm text-quiet"
    >
      {said || rest}
    </p>
  );
}
