'use client';

import {
  Background,
  BackgroundVariant,
  type EdgeChange,
  type NodeChange,
  ReactFlow,
  type ReactFlowInstance,
  SelectionMode,
} from '@xyflow/react';
import '@xyflow/react/dist/base.css';
import './canvas.css';
import { type DragEvent, useEffect, useMemo, useRef, useState } from 'react';
import { edgeId, GRID_PX, type OpId, type OpKind, opId, opKinds } from '@/lib/graph';
import { useEditor, useKernelState } from '../store/editor-context';
import { selectEdge, selectOps } from '../store/selection';
import { canvasHandle } from './canvas-handle';
import { createFlowElements, type DragPositions } from './flow-elements';
import { OP_DRAG_TYPE } from './op-drag';
import { type OpFlowNode, OpNode } from './op-node';
import { SteadyView } from './steady-view';
import { ThreadEdge, type ThreadFlowEdge } from './thread-edge';
import { useCanvasConnections } from './use-canvas-connections';

const nodeTypes = { op: OpNode };
const edgeTypes = { thread: ThreadEdge };
/** The whole kernel, never larger than its own size. */
const FIRST_VIEW = { maxZoom: 1, padding: 0.06 };
const SNAP: [number, number] = [GRID_PX, GRID_PX];
const PAN_BUTTONS = [1, 2];
const ADD_KEYS = ['Shift', 'Control', 'Meta'];

type Flow = ReactFlowInstance<OpFlowNode, ThreadFlowEdge>;

export function KernelCanvas() {
  const { store, canvas } = useEditor();
  const kernel = useKernelState((state) => state.kernel);
  const selection = useKernelState((state) => state.selection);
  const readOnly = useKernelState((state) => state.readOnly);
  const dragMode = useKernelState((state) => state.dragMode);
  const [elements] = useState(createFlowElements);
  const [dragged, setDragged] = useState<DragPositions | null>(null);
  const [flow, setFlow] = useState<Flow | null>(null);
  const root = useRef<HTMLDivElement>(null);
  const nodes = useMemo(
    () => elements.nodes(kernel, selection, dragged),
    [elements, kernel, selection, dragged],
  );
  const edges = useMemo(() => elements.edges(kernel, selection), [elements, kernel, selection]);
  const connections = useCanvasConnections();
  const selecting = useCanvasSelection(setDragged);

  // A finger has no second button to move the view with.
  useEffect(() => {
    if (matchMedia('(pointer: coarse)').matches) store.getState().setDragMode('pan');
  }, [store]);
  useEffect(() => {
    if (flow === null) return;
    canvas.current = canvasHandle(flow, store, root);
    return () => {
      canvas.current = null;
    };
  }, [flow, store, canvas]);

  const dropOp = (event: DragEvent) => {
    const kind = opKindOf(event.dataTransfer.getData(OP_DRAG_TYPE));
    if (kind === null || flow === null) return;
    event.preventDefault();
    const { x, y } = flow.screenToFlowPosition({ x: event.clientX, y: event.clientY });
    const added = store.getState().addOp(kind, onGrid({ x: x - 72, y: y - 20 }));
    if (added !== null) canvas.current?.focus(added);
  };

  return (
    <ReactFlow<OpFlowNode, ThreadFlowEdge>
      ref={root}
      className="kernel-canvas"
      tabIndex={0}
      aria-label="Kernel canvas. Arrow keys go from op to op, C connects, question mark lists all keys."
      nodes={nodes}
      edges={edges}
      nodeTypes={nodeTypes}
      edgeTypes={edgeTypes}
      onInit={setFlow}
      {...selecting}
      onNodeDragStop={(_event, _node, moved) => {
        const moves = moved.map((node) => ({ id: opId(node.id), positionPx: node.position }));
        store.getState().edit({ type: 'moveOps', moves }, moves.length === 1 ? 'move op' : 'move ops');
        setDragged(null);
      }}
      onDragOver={(event) => {
        if (!readOnly && event.dataTransfer.types.includes(OP_DRAG_TYPE)) event.preventDefault();
      }}
      onDrop={dropOp}
      onFocus={(event) => {
        const id = (event.target as HTMLElement).closest<HTMLElement>('.react-flow__node')?.dataset.id;
        store.getState().focusOp(id === undefined ? null : opId(id));
      }}
      onPaneClick={() => {
        if (store.getState().connecting?.by === 'click') store.getState().stopConnecting();
      }}
      {...connections}
      connectOnClick={false}
      nodesDraggable={!readOnly}
      nodesConnectable={!readOnly}
      nodesFocusable={false}
      edgesFocusable={false}
      disableKeyboardA11y
      deleteKeyCode={null}
      selectionKeyCode={null}
      multiSelectionKeyCode={ADD_KEYS}
      selectionOnDrag={dragMode === 'select'}
      selectionMode={SelectionMode.Partial}
      panOnDrag={dragMode === 'select' ? PAN_BUTTONS : true}
      panOnScroll={dragMode === 'select'}
      zoomOnDoubleClick={false}
      snapToGrid
      snapGrid={SNAP}
      nodeDragThreshold={2}
      minZoom={0.15}
      maxZoom={2.5}
      fitView
      fitViewOptions={FIRST_VIEW}
    >
      <Background variant={BackgroundVariant.Dots} gap={24} size={1.25} color="var(--rule)" />
      <SteadyView root={root} />
    </ReactFlow>
  );
}

const onGrid = ({ x, y }: { x: number; y: number }) => ({
  x: Math.round(x / GRID_PX) * GRID_PX,
  y: Math.round(y / GRID_PX) * GRID_PX,
});

const opKindOf = (text: string): OpKind | null => opKinds.find((kind) => kind === text) ?? null;

/** The library's changes become selections of the store and positions of a drag that is not over yet. */
function useCanvasSelection(
  setDragged: (update: (now: DragPositions | null) => DragPositions | null) => void,
) {
  const { store } = useEditor();
  /** What was selected before a marquee with Shift: it stays. */
  const kept = useRef<ReadonlySet<OpId>>(new Set());
  return {
    onPointerDownCapture(event: { shiftKey: boolean; target: EventTarget }) {
      const onPane = (event.target as Element).classList?.contains('react-flow__pane');
      kept.current = onPane && event.shiftKey ? store.getState().selection.opIds : new Set();
    },
    onNodesChange(changes: NodeChange<OpFlowNode>[]) {
      const moves = changes.flatMap((change) =>
        change.type === 'position' && change.dragging && change.position !== undefined
          ? [[opId(change.id), change.position] as const]
          : [],
      );
      if (moves.length > 0) setDragged((now) => new Map([...(now ?? []), ...moves]));
      const choices = changes.filter((change) => change.type === 'select');
      if (choices.length === 0) return;
      const chosen = new Set([...store.getState().selection.opIds, ...kept.current]);
      for (const { id, selected } of choices) {
        const op = opId(id);
        if (selected) chosen.add(op);
        else if (!kept.current.has(op)) chosen.delete(op);
      }
      store.getState().select(selectOps(chosen));
    },
    /** Choosing a connection is a click; a marquee's report of its ops' connections is passed over. */
    onEdgesChange(changes: EdgeChange<ThreadFlowEdge>[]) {
      const { selection, select } = store.getState();
      const gone = changes.some(
        (change) => change.type === 'select' && !change.selected && change.id === selection.edgeId,
      );
      if (gone) select(selectOps(selection.opIds));
    },
    onEdgeClick(_event: unknown, edge: ThreadFlowEdge) {
      store.getState().select(selectEdge(edgeId(edge.id)));
    },
  };
}
