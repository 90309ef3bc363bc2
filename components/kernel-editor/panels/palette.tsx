'use client';

import { type KeyboardEvent, useEffect, useId, useRef, useState } from 'react';
import { type OpKind, opSpec } from '@/lib/graph';
import { OP_DRAG_TYPE } from '../canvas/op-drag';
import { formOf } from '../canvas/unit-form';
import { useEditor } from '../store/editor-context';
import { freePlacePx } from './free-place';
import { paletteGroups } from './palette-entries';

const unitHint: Record<ReturnType<typeof formOf>, string> = {
  plain: '',
  cornerTicks: 'multiplier',
  footBar: 'memory',
  notch: 'scratchpad',
  stitched: 'own unit',
};

/** The operations to add: typed for, clicked, or dragged onto the canvas. */
export function Palette() {
  const { store, canvas, focusPalette } = useEditor();
  const [query, setQuery] = useState('');
  const [active, setActive] = useState(0);
  const input = useRef<HTMLInputElement>(null);
  const listId = useId();
  const groups = paletteGroups(query);
  const kinds = groups.flatMap((group) => group.kinds);
  const current = kinds[Math.min(active, kinds.length - 1)];

  useEffect(() => {
    focusPalette.current = () => input.current?.focus();
    return () => {
      focusPalette.current = null;
    };
  }, [focusPalette]);

  const add = (kind: OpKind, moveFocus: boolean) => {
    const { kernel, addOp } = store.getState();
    const middle = canvas.current?.middlePx() ?? { x: 160, y: 120 };
    const added = addOp(kind, freePlacePx(kernel, { x: middle.x - 72, y: middle.y - 48 }));
    if (added === null) return;
    if (moveFocus) canvas.current?.focus(added);
    else canvas.current?.reveal([added]);
  };
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'ArrowDown') setActive(Math.min(active + 1, kinds.length - 1));
    else if (event.key === 'ArrowUp') setActive(Math.max(active - 1, 0));
    else if (event.key === 'Enter' && current !== undefined) add(current, false);
    else if (event.key === 'Escape') {
      if (query === '') canvas.current?.focus(store.getState().focusedOp);
      else setQuery('');
    } else return;
    event.preventDefault();
    event.stopPropagation();
  };
  useEffect(() => {
    document.getElementById(`${listId}-${current}`)?.scrollIntoView?.({ block: 'nearest' });
  }, [current, listId]);

  return (
    <section aria-label="Operations" className="flex min-h-0 flex-1 flex-col">
      <div className="flex-none p-3 pb-2">
        <input
          ref={input}
          type="text"
          role="combobox"
          aria-label="Search operations"
          aria-expanded="true"
          aria-controls={listId}
          aria-activedescendant={current === undefined ? undefined : `${listId}-${current}`}
          aria-autocomplete="list"
          placeholder="Search operations  ( / )"
          className="min-h-8 w-full rounded border border-edge! bg-surface px-2 py-1 text-sm placeholder:text-quiet"
          value={query}
          onChange={(event) => {
            setQuery(event.target.value);
            setActive(0);
          }}
          onKeyDown={onKeyDown}
        />
        <p className="sr-only">Arrow keys choose, Enter adds to the middle of the view, Escape leaves.</p>
      </div>
      <div
        id={listId}
        role="listbox"
        aria-label="Operations"
        className="min-h-0 flex-1 overflow-y-auto px-3 pb-3"
      >
        {groups.map((group) => (
          <fieldset key={group.label} aria-label={group.label} className="mb-2">
            <p className="pt-1 pb-0.5 text-xs font-semibold tracking-wide text-quiet" aria-hidden="true">
              {group.label}
            </p>
            {group.kinds.map((kind) => (
              <PaletteEntry
                key={kind}
                id={`${listId}-${kind}`}
                kind={kind}
                active={kind === current && query !== ''}
                onAdd={() => add(kind, true)}
              />
            ))}
          </fieldset>
        ))}
      </div>
      {kinds.length === 0 ? (
        <p className="flex-none px-3 pb-4 text-sm text-quiet">
          No operation is called that. Try its sign, such as + or ×.
        </p>
      ) : null}
    </section>
  );
}

function PaletteEntry(props: { id: string; kind: OpKind; active: boolean; onAdd: () => void }) {
  const { id, kind, active, onAdd } = props;
  const spec = opSpec(kind);
  const unit = unitHint[formOf(kind)];
  return (
    <button
      type="button"
      id={id}
      role="option"
      tabIndex={-1}
      aria-selected={active}
      aria-label={`${spec.label}: ${spec.summary}${unit ? `; needs a ${unit}` : ''}`}
      title={`${spec.summary}${unit ? ` · needs a ${unit}` : ''}`}
      draggable
      onDragStart={(event) => {
        event.dataTransfer.setData(OP_DRAG_TYPE, kind);
        event.dataTransfer.effectAllowed = 'copy';
      }}
      onClick={onAdd}
      className={`flex min-h-7 w-full cursor-pointer text-left items-center gap-2 rounded px-2 text-sm hover:bg-indigo-wash ${
        active ? 'bg-indigo-wash outline-1 outline-indigo' : ''
      }`}
    >
      <span className="w-11 flex-none text-center font-mono text-sm text-quiet" aria-hidden="true">
        {spec.symbol}
      </span>
      <span className="min-w-0 truncate">{spec.label}</span>
    </button>
  );
}
