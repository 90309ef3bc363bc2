/**
 * The canvas library's nodes and edges of a kernel. Each element is built again only when something it shows has
 * changed, so one moved op re-renders one node, not all.
 */
import type { Edge, EdgeId, Kernel, Op, OpId } from '@/lib/graph';
import { nodeSizePx } from '@/lib/graph';
import type { Selection } from '../store/selection';
import type { OpFlowNode } from './op-node';
import { sentencesOf } from './op-text';
import type { ThreadFlowEdge } from './thread-edge';
import { threadNumbers } from './thread-style';

export type DragPositions = ReadonlyMap<OpId, Op['positionPx']>;

interface NodeEntry {
  op: Op;
  label: string;
  positionPx: Op['positionPx'];
  selected: boolean;
  node: OpFlowNode;
}

const FOCUSABLE = { tabIndex: -1 } as const;

export interface FlowElements {
  nodes(kernel: Kernel, selection: Selection, dragged: DragPositions | null): OpFlowNode[];
  edges(kernel: Kernel, selection: Selection): ThreadFlowEdge[];
}

export function createFlowElements(): FlowElements {
  let nodeEntries = new Map<OpId, NodeEntry>();
  let edgeEntries = new Map<EdgeId, { edge: Edge; thread: ThreadFlowEdge }>();

  function nodeFor(op: Op, label: string, selected: boolean, positionPx: Op['positionPx']): NodeEntry {
    const known = nodeEntries.get(op.id);
    const same =
      known !== undefined &&
      known.op === op &&
      known.label === label &&
      known.selected === selected &&
      known.positionPx === positionPx;
    if (same) return known;
    const { widthPx: width, heightPx: height } = nodeSizePx(op);
    const node: OpFlowNode = {
      id: op.id,
      type: 'op',
      position: positionPx,
      data: known?.op === op ? known.node.data : { op },
      selected,
      measured: { width, height },
      ariaRole: 'group',
      ariaLabel: label,
      domAttributes: FOCUSABLE,
    };
    return { op, label, positionPx, selected, node };
  }

  return {
    nodes(kernel, { opIds }, dragged) {
      const next = new Map<OpId, NodeEntry>();
      const sentences = sentencesOf(kernel);
      const nodes = kernel.ops.map((op) => {
        const at = dragged?.get(op.id) ?? op.positionPx;
        const entry = nodeFor(op, sentences.get(op.id) ?? '', opIds.has(op.id), at);
        next.set(op.id, entry);
        return entry.node;
      });
      nodeEntries = next;
      return nodes;
    },
    edges(kernel, { edgeId }) {
      const next: typeof edgeEntries = new Map();
      const numbers = threadNumbers(kernel);
      const edges = kernel.edges.map((edge) => {
        const selected = edge.id === edgeId;
        const number = numbers.get(edge.from) ?? 0;
        const known = edgeEntries.get(edge.id);
        const same =
          known?.edge === edge && known.thread.selected === selected && known.thread.data?.number === number;
        const entry = same ? known : { edge, thread: threadOf(edge, number, selected) };
        next.set(edge.id, entry);
        return entry.thread;
      });
      edgeEntries = next;
      return edges;
    },
  };
}

const threadOf = (edge: Edge, number: number, selected: boolean): ThreadFlowEdge => ({
  id: edge.id,
  type: 'thread',
  source: edge.from,
  sourceHandle: 'result',
  target: edge.to,
  targetHandle: edge.port,
  selected,
  data: { number, distance: edge.distance },
  ariaLabel: `Connection from ${edge.from.slice(3)} to ${edge.port} of ${edge.to.slice(3)}`,
});
