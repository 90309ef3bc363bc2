import type { ReactFlowInstance } from '@xyflow/react';
import type { RefObject } from 'react';
import { nodeSizePx, type Op, type OpId } from '@/lib/graph';
import type { CanvasHandle } from '../store/editor-context';
import { indexOf } from '../store/kernel-facts';
import type { KernelStore } from '../store/kernel-store';
import type { OpFlowNode } from './op-node';
import type { ThreadFlowEdge } from './thread-edge';

const READABLE_ZOOM = 0.7;

/** The canvas as commands and panels see it. */
export function canvasHandle(
  flow: ReactFlowInstance<OpFlowNode, ThreadFlowEdge>,
  store: KernelStore,
  root: RefObject<HTMLElement | null>,
): CanvasHandle {
  const boundsOf = (ids: readonly OpId[]) => {
    const ops = ids.flatMap((id): Op[] => {
      const op = indexOf(store.getState().kernel).opById.get(id);
      return op === undefined ? [] : [op];
    });
    if (ops.length === 0) return null;
    const sizes = ops.map((op) => ({ ...op.positionPx, ...nodeSizePx(op) }));
    const x = Math.min(...sizes.map((box) => box.x));
    const y = Math.min(...sizes.map((box) => box.y));
    const width = Math.max(...sizes.map((box) => box.x + box.widthPx)) - x;
    const height = Math.max(...sizes.map((box) => box.y + box.heightPx)) - y;
    return { x, y, width, height };
  };
  const viewPx = () => {
    const box = root.current?.getBoundingClientRect();
    const from = flow.screenToFlowPosition({ x: box?.left ?? 0, y: box?.top ?? 0 }, { snapToGrid: false });
    const to = flow.screenToFlowPosition({ x: box?.right ?? 0, y: box?.bottom ?? 0 }, { snapToGrid: false });
    return { from, to };
  };
  /** Whatever the kernel has become is drawn with the next frame: only then can it be measured or focused. */
  const nextFrame = (run: () => void) => requestAnimationFrame(() => requestAnimationFrame(run));
  const nodeElement = (id: OpId) =>
    root.current?.querySelector<HTMLElement>(`.react-flow__node[data-id="${id}"]`);

  return {
    zoomIn: () => void flow.zoomIn(),
    zoomOut: () => void flow.zoomOut(),
    fit: () => nextFrame(() => void flow.fitView({ maxZoom: 1, padding: 0.1 })),
    reveal(ids) {
      const bounds = boundsOf(ids);
      if (bounds === null) return;
      const { from, to } = viewPx();
      const inside =
        bounds.x >= from.x &&
        bounds.y >= from.y &&
        bounds.x + bounds.width <= to.x &&
        bounds.y + bounds.height <= to.y;
      if (inside && flow.getZoom() >= READABLE_ZOOM / 2) return;
      const fits = bounds.width <= to.x - from.x && bounds.height <= to.y - from.y;
      if (fits) {
        const zoom = Math.max(flow.getZoom(), READABLE_ZOOM);
        void flow.setCenter(bounds.x + bounds.width / 2, bounds.y + bounds.height / 2, { zoom });
      } else void flow.fitBounds(bounds, { padding: 0.1 });
    },
    focus(id) {
      const now = id === null ? root.current : nodeElement(id);
      if (now) now.focus({ preventScroll: true });
      else if (id !== null) nextFrame(() => nodeElement(id)?.focus({ preventScroll: true }));
      if (id !== null) this.reveal([id]);
    },
    middlePx() {
      const { from, to } = viewPx();
      return { x: (from.x + to.x) / 2, y: (from.y + to.y) / 2 };
    },
  };
}
