'use client';

import { type PointerEvent as ReactPointerEvent, useCallback, useEffect, useRef, useState } from 'react';
import { tileUnder } from '@/components/fabric-grid/tile-grid';
import type { OpId } from '@/lib/graph/kernel';
import { useBenchStore } from '../store/bench-context';

export interface Dragging {
  op: OpId;
  x: number;
  y: number;
}

const THRESHOLD_PX = 4;

/**
 * Dragging an op with mouse or pen, from the graph, the list or a tile. Fingers tap op and tile instead, so that a
 * swipe scrolls. A drop outside of the grid puts the op back; one on an element marked data-take-off takes it off.
 */
export function useOpDrag() {
  const store = useBenchStore();
  const [dragging, setDragging] = useState<Dragging | null>(null);
  const stop = useRef<() => void>(() => {});
  /** The click that follows a drag is no click. */
  const dragged = useRef(false);
  useEffect(() => () => stop.current(), []);

  const begin = useCallback(
    (event: ReactPointerEvent, op: OpId) => {
      dragged.current = false;
      if (event.button !== 0 || event.pointerType === 'touch' || store.getState().readOnly) return;
      const start = { x: event.clientX, y: event.clientY };
      const onMove = (move: PointerEvent) => {
        if (!dragged.current && Math.hypot(move.clientX - start.x, move.clientY - start.y) < THRESHOLD_PX)
          return;
        if (!dragged.current) {
          dragged.current = true;
          store.getState().pick(op);
        }
        setDragging({ op, x: move.clientX, y: move.clientY });
        const tile = tileUnder(document.elementFromPoint(move.clientX, move.clientY));
        store.getState().point(op, tile);
      };
      const onUp = (up: PointerEvent) => {
        stop.current();
        if (!dragged.current) return;
        const under = document.elementFromPoint(up.clientX, up.clientY);
        const tile = tileUnder(under);
        const state = store.getState();
        if (tile !== null && state.putDown(tile)) state.moveCursor(tile);
        else if (
          tile === null &&
          under?.closest('[data-take-off]') &&
          state.content.placement[op] !== undefined
        ) {
          state.unplace(op);
        }
        const { said } = store.getState();
        store.getState().pick(null);
        if (said.text !== '') store.getState().say(said.text, said.refused);
      };
      const onCancel = () => {
        stop.current();
        store.getState().pick(null);
      };
      stop.current = () => {
        window.removeEventListener('pointermove', onMove);
        window.removeEventListener('pointerup', onUp);
        window.removeEventListener('pointercancel', onCancel);
        stop.current = () => {};
        setDragging(null);
      };
      window.addEventListener('pointermove', onMove);
      window.addEventListener('pointerup', onUp);
      window.addEventListener('pointercancel', onCancel);
    },
    [store],
  );
  const wasDragged = useCallback(() => {
    const was = dragged.current;
    dragged.current = false;
    return was;
  }, []);
  return { dragging, begin, wasDragged };
}
