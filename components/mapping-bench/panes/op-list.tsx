'use client';

import { type KeyboardEvent, type PointerEvent, useRef } from 'react';
import { tileLabel } from '@/lib/fabric/tiles';
import type { OpId } from '@/lib/graph/kernel';
import { opSpec } from '@/lib/graph/op-catalog';
import { shortName } from '@/lib/mapping/picture/op-label';
import { useBench, useBenchStore } from '../store/bench-context';
import { opKey } from './kernel-graph';

interface OpListProps {
  onOpDown: (event: PointerEvent, op: OpId) => void;
  wasDragged: () => boolean;
}

/** The ops as a plain list, those without a place first: the other way in, for keys, fingers and long kernels. */
export function OpList({ onOpDown, wasDragged }: OpListProps) {
  const store = useBenchStore();
  const placement = useBench((state) => state.content.placement);
  const pins = useBench((state) => state.content.pins);
  const held = useBench((state) => state.held);
  const readOnly = useBench((state) => state.readOnly);
  const list = useRef<HTMLUListElement>(null);
  const ops = store.setting.kernel.ops.toSorted(
    (a, b) => Number(placement[a.id] !== undefined) - Number(placement[b.id] !== undefined),
  );
  const ids = ops.map((op) => op.id);
  const focusOp = (id: OpId) => list.current?.querySelector<HTMLElement>(`[data-op="${id}"] button`)?.focus();
  const onKeyDown = (event: KeyboardEvent, id: OpId) => {
    if (event.key === 'Enter' || event.key === ' ') return;
    if (opKey(event, ids, id, store.getState(), focusOp)) event.preventDefault();
  };
  return (
    <ul ref={list} className="size-full overflow-y-auto py-1" data-take-off>
      {ops.map((op) => {
        const tile = placement[op.id];
        return (
          <li key={op.id} data-op={op.id} className="flex">
            <button
              type="button"
              aria-pressed={held === op.id}
              disabled={readOnly}
              className={`flex min-h-8 min-w-0 flex-1 items-baseline gap-2 px-3 py-1 text-left text-sm disabled:cursor-default ${held === op.id ? 'bg-indigo-wash' : 'enabled:hover:bg-indigo-wash'}`}
              onClick={() => {
                if (!wasDragged()) store.getState().pick(held === op.id ? null : op.id);
              }}
              onKeyDown={(event) => onKeyDown(event, op.id)}
              onFocus={() => store.getState().point(op.id, null)}
              onPointerEnter={() => store.getState().point(op.id, null)}
              onPointerLeave={() => store.getState().point(null, null)}
              onPointerDown={(event) => onOpDown(event, op.id)}
            >
              <span className="truncate font-semibold">{shortName(op)}</span>
              <span className="truncate text-xs text-quiet">{opSpec(op.kind).label}</span>
              <span className="ml-auto flex-none text-xs text-quiet">
                {tile === undefined ? 'not placed' : tileLabel(tile)}
                {pins[op.id] === undefined ? '' : ' · pinned'}
              </span>
            </button>
          </li>
        );
      })}
    </ul>
  );
}
