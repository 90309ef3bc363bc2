'use client';

import { useStore, useStoreApi } from '@xyflow/react';
import { type RefObject, useEffect, useRef } from 'react';

/** Below this zoom the small print cannot be read: labels grow, operand names make room for them. */
const SMALL_PRINT_ZOOM = 0.6;

/** Keeps the middle of the view in the middle when the canvas changes its size, and marks a view from far away. */
export function SteadyView({ root }: { root: RefObject<HTMLElement | null> }) {
  const flow = useStoreApi();
  const far = useStore((state) => state.transform[2] < SMALL_PRINT_ZOOM);
  const widthPx = useStore((state) => state.width);
  const heightPx = useStore((state) => state.height);
  const before = useRef({ widthPx: 0, heightPx: 0 });
  useEffect(() => {
    root.current?.toggleAttribute('data-far', far);
  }, [root, far]);
  useEffect(() => {
    const was = before.current;
    before.current = { widthPx, heightPx };
    if (was.widthPx === 0 || was.heightPx === 0) return;
    const shift = { x: (widthPx - was.widthPx) / 2, y: (heightPx - was.heightPx) / 2 };
    if (shift.x !== 0 || shift.y !== 0) void flow.getState().panBy(shift);
  }, [flow, widthPx, heightPx]);
  return null;
}
