'use client';

import { type KeyboardEvent, type PointerEvent, useEffect, useMemo, useRef, useState } from 'react';
import { IconButton } from '@/components/ui/button';
import type { OpId } from '@/lib/graph/kernel';
import { netsOf } from '@/lib/graph/nets';
import { opSpec } from '@/lib/graph/op-catalog';
import { shortName } from '@/lib/mapping/picture/op-label';
import { threadStyle } from '@/lib/mapping/picture/thread-style';
import { boxLines, kernelPicture, OP_HEIGHT_PX, smoothPath } from '../drawing/kernel-layout';
import { useSize } from '../drawing/use-size';
import { useBench, useBenchStore } from '../store/bench-context';
import { litBy } from '../store/lit';

interface KernelGraphProps {
  onOpDown: (event: PointerEvent, op: OpId) => void;
  /** Tells whether the click ends a drag and is no click. */
  wasDragged: () => boolean;
}

interface View {
  x: number;
  y: number;
  scale: number;
}

const LARGEST = 1.6;
const SMALLEST = 0.2;
const OPTION = { role: 'option' } as const;
const LISTBOX = { role: 'listbox' } as const;

/** The kernel from top to bottom: read only, to point at and to pick from. Wheel zooms, dragging the ground moves it. */
export function KernelGraph({ onOpDown, wasDragged }: KernelGraphProps) {
  const { setting } = useBenchStore();
  const { kernel } = setting;
  const picture = useMemo(() => kernelPicture(kernel), [kernel]);
  const nets = useMemo(() => new Map(netsOf(kernel).map((net, i) => [net.source, i])), [kernel]);
  const pointedOp = useBench((state) => state.pointedOp);
  const lit = useMemo(() => litBy(kernel, pointedOp), [kernel, pointedOp]);
  const frame = useRef<HTMLDivElement>(null);
  const size = useSize(frame);
  const { view, setView, panBy, zoomBy } = useView(picture, size);
  const onGroundDown = (event: PointerEvent<SVGSVGElement>) => {
    if (event.button !== 0 || (event.target as Element).closest('[data-op]')) return;
    const target = event.currentTarget;
    target.setPointerCapture(event.pointerId);
    let last = { x: event.clientX, y: event.clientY };
    const onMove = (move: globalThis.PointerEvent) => {
      panBy(move.clientX - last.x, move.clientY - last.y);
      last = { x: move.clientX, y: move.clientY };
    };
    const onUp = () => {
      target.removeEventListener('pointermove', onMove);
      target.removeEventListener('pointerup', onUp);
      target.removeEventListener('pointercancel', onUp);
    };
    target.addEventListener('pointermove', onMove);
    target.addEventListener('pointerup', onUp);
    target.addEventListener('pointercancel', onUp);
  };
  return (
    <div ref={frame} className="relative size-full overflow-hidden" data-take-off>
      <svg
        className="block size-full cursor-grab active:cursor-grabbing"
        onPointerDown={onGroundDown}
        onWheel={(event) => zoomBy(event.deltaY < 0 ? 1.1 : 1 / 1.1)}
      >
        <title>{`Kernel ${kernel.name}`}</title>
        <g transform={`translate(${view.x} ${view.y}) scale(${view.scale})`}>
          {kernel.edges.map((edge) => {
            const { colour, dashes } = threadStyle(nets.get(edge.from) ?? 0);
            const strong = lit?.nets.has(edge.from) ?? false;
            return (
              <path
                key={edge.id}
                d={smoothPath(picture.edges.get(edge.id) ?? [])}
                fill="none"
                stroke={`var(--thread-${colour})`}
                strokeWidth={strong ? 3 : 1.9}
                strokeDasharray={dashes.join(' ') || undefined}
                opacity={lit && !strong ? 0.25 : 1}
              />
            );
          })}
          <GraphOps picture={picture} lit={lit} onOpDown={onOpDown} wasDragged={wasDragged} />
        </g>
      </svg>
      <div className="absolute right-1 bottom-1 flex rounded border border-rule bg-surface">
        <IconButton label="Zoom the kernel out" onClick={() => zoomBy(1 / 1.25)}>
          −
        </IconButton>
        <IconButton label="Fit the kernel" onClick={() => setView(fitted(picture, size))}>
          ⤢
        </IconButton>
        <IconButton label="Zoom the kernel in" onClick={() => zoomBy(1.25)}>
          +
        </IconButton>
      </div>
    </div>
  );
}

function useView(picture: { width: number; height: number }, size: { width: number; height: number }) {
  const [view, setView] = useState<View>({ x: 0, y: 0, scale: 1 });
  const { width, height } = size;
  useEffect(() => {
    if (width > 0 && height > 0) setView(fitted(picture, { width, height }));
  }, [picture, width, height]);
  const panBy = (dx: number, dy: number) => setView((now) => ({ ...now, x: now.x + dx, y: now.y + dy }));
  const zoomBy = (factor: number) =>
    setView((now) => {
      const scale = Math.min(LARGEST, Math.max(SMALLEST, now.scale * factor));
      const by = scale / now.scale;
      return {
        scale,
        x: size.width / 2 - (size.width / 2 - now.x) * by,
        y: size.height / 2 - (size.height / 2 - now.y) * by,
      };
    });
  return { view, setView, panBy, zoomBy };
}

function fitted(picture: { width: number; height: number }, size: { width: number; height: number }): View {
  const scale = Math.min(
    1.15,
    Math.max(SMALLEST, Math.min(size.width / picture.width, size.height / picture.height)),
  );
  return {
    scale,
    x: (size.width - picture.width * scale) / 2,
    y: Math.max(0, (size.height - picture.height * scale) / 2),
  };
}

interface GraphOpsProps extends KernelGraphProps {
  picture: ReturnType<typeof kernelPicture>;
  lit: ReturnType<typeof litBy>;
}

/** The ops as one list box: one tab stop, arrows go from op to op, Enter picks up, P pins, Delete takes off. */
function GraphOps({ picture, lit, onOpDown, wasDragged }: GraphOpsProps) {
  const store = useBenchStore();
  const { kernel } = store.setting;
  const placement = useBench((state) => state.content.placement);
  const pins = useBench((state) => state.content.pins);
  const held = useBench((state) => state.held);
  const marks = useBench((state) => state.marks);
  const readOnly = useBench((state) => state.readOnly);
  const [cursor, setCursor] = useState<OpId | null>(kernel.ops[0]?.id ?? null);
  const root = useRef<SVGGElement>(null);
  const focusOp = (id: OpId) => {
    setCursor(id);
    root.current?.querySelector<SVGElement>(`[data-op="${id}"]`)?.focus();
  };
  const onKeyDown = (event: KeyboardEvent) => {
    if (
      opKey(
        event,
        kernel.ops.map((op) => op.id),
        cursor,
        store.getState(),
        focusOp,
      )
    )
      event.preventDefault();
  };
  const box = { ...LISTBOX, 'aria-label': 'Ops of the kernel', onKeyDown };
  return (
    <g ref={root} {...box}>
      {kernel.ops.map((op) => {
        const at = picture.ops.get(op.id) ?? { x: 0, y: 0, width: 0 };
        const isPlaced = placement[op.id] !== undefined;
        const part =
          held === op.id ? 'held' : lit?.op === op.id ? 'pointed' : lit?.near.has(op.id) ? 'near' : 'plain';
        const lines = boxLines(op);
        const option = {
          ...OPTION,
          'aria-selected': held === op.id,
          'aria-label': `${shortName(op)}, ${opSpec(op.kind).label}, ${isPlaced ? 'placed' : 'not placed'}${
            pins[op.id] === undefined ? '' : ', pinned'
          }`,
          tabIndex: cursor === op.id ? 0 : -1,
          onFocus: () => {
            setCursor(op.id);
            store.getState().point(op.id, null);
          },
          onPointerEnter: () => store.getState().point(op.id, null),
          onPointerLeave: () => store.getState().point(null, null),
          onPointerDown: (event: PointerEvent) => onOpDown(event, op.id),
          onClick: () => {
            if (!wasDragged()) store.getState().pick(held === op.id ? null : op.id);
          },
        };
        return (
          <g
            key={op.id}
            data-op={op.id}
            transform={`translate(${at.x} ${at.y})`}
            className={`outline-none [&:focus-visible>rect:first-child]:stroke-(--indigo) [&:focus-visible>rect:first-child]:[stroke-width:3] ${readOnly ? 'cursor-default' : 'cursor-pointer'}`}
            {...option}
          >
            <rect
              width={at.width}
              height={OP_HEIGHT_PX}
              rx={2}
              fill={part === 'held' ? 'var(--indigo-wash)' : isPlaced ? 'var(--surface)' : 'var(--paper)'}
              stroke={strokeOf(part, marks?.opIds.includes(op.id) ?? false)}
              strokeWidth={part === 'plain' && !marks?.opIds.includes(op.id) ? 1.1 : 2.4}
              strokeDasharray={isPlaced ? undefined : '4 3'}
            />
            {lines.map((line, i) => (
              <text
                key={i}
                x={at.width / 2}
                y={OP_HEIGHT_PX / 2 + 4 + (i - (lines.length - 1) / 2) * 13}
                textAnchor="middle"
                fontSize={12.5}
                fontWeight={isPlaced ? 600 : 400}
                fill="var(--ink)"
              >
                {line}
              </text>
            ))}
            {pins[op.id] === undefined ? null : (
              <circle cx={at.width - 7} cy={7} r={3.5} fill="var(--indigo)" />
            )}
          </g>
        );
      })}
    </g>
  );
}

function strokeOf(part: 'held' | 'pointed' | 'near' | 'plain', marked: boolean): string {
  if (marked) return 'var(--madder)';
  return part === 'plain' ? 'var(--edge)' : 'var(--indigo)';
}

/** What a key does at an op; true when it did something. */
export function opKey(
  event: KeyboardEvent,
  ids: readonly OpId[],
  cursor: OpId | null,
  state: ReturnType<ReturnType<typeof useBenchStore>['getState']>,
  focusOp: (id: OpId) => void,
): boolean {
  if (cursor === null || event.ctrlKey || event.metaKey || event.altKey) return false;
  const at = ids.indexOf(cursor);
  const goTo = (index: number) => {
    const id = ids[Math.min(ids.length - 1, Math.max(0, index))];
    if (id !== undefined) focusOp(id);
    return true;
  };
  switch (event.key) {
    case 'ArrowDown':
    case 'ArrowRight':
      return goTo(at + 1);
    case 'ArrowUp':
    case 'ArrowLeft':
      return goTo(at - 1);
    case 'Home':
      return goTo(0);
    case 'End':
      return goTo(ids.length - 1);
    case 'Enter':
    case ' ':
      state.pick(state.held === cursor ? null : cursor);
      return true;
    case 'Escape':
      if (state.held === null) return false;
      state.pick(null);
      return true;
    case 'Delete':
    case 'Backspace':
    case 'u':
      state.unplace(cursor);
      return true;
    case 'p':
      state.togglePin(cursor);
      return true;
    default:
      return false;
  }
}
