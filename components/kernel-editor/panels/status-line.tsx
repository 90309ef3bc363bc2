'use client';

import { useKernelState } from '../store/editor-context';
import { useWide } from './use-wide';

/** The line at the foot: what just happened, or why something was refused. Read out politely. */
export function StatusLine() {
  const said = useKernelState((state) => state.said);
  const empty = useKernelState((state) => state.kernel.ops.length === 0);
  const readOnly = useKernelState((state) => state.readOnly);
  const wide = useWide();
  const rest = restingText({ readOnly, empty, wide });
  return (
    <p
      role="status"
      className="min-h-8 flex-none border-t border-rule bg-surface px-3 py-1.5 text-sm text-quiet"
    >
      {said || rest}
    </p>
  );
}

function restingText({
  readOnly,
  empty,
  wide,
}: {
  readOnly: boolean;
  empty: boolean;
  wide: boolean;
}): string {
  if (readOnly) return wide ? 'Read only: arrows go from op to op' : 'Read only';
  if (empty) {
    return wide
      ? 'Add the first op from the palette: click one, drag it here, or press / and type'
      : 'Add the first op from Operations';
  }
  return wide
    ? 'Arrows go from op to op · C connects · Shift and arrows move · ? lists all keys'
    : 'Tap a result, then an operand, to connect them';
}
