/** The kernel from top to bottom, for the bench's narrow pane. Carried connections are the ones turned back in a cycle. */
import { graphlib, layout } from '@dagrejs/dagre';
import type { EdgeId, Kernel, Op, OpId } from '@/lib/graph/kernel';
import type { Point } from '@/lib/mapping/picture/fabric-geometry';
import { labelLines, shortName } from '@/lib/mapping/picture/op-label';

export const OP_HEIGHT_PX = 36;
const NARROWEST_OP_PX = 50;
const LETTER_PX = 6.7;

export interface OpBox extends Point {
  width: number;
}

export interface KernelPicture {
  width: number;
  height: number;
  /** Upper left corners and widths; all are OP_HEIGHT_PX high. */
  ops: ReadonlyMap<OpId, OpBox>;
  edges: ReadonlyMap<EdgeId, readonly Point[]>;
}

const EDGE_GAP_PX = 10;
const LINE_LETTERS = 14;

/** The lines of an op's name in its box. */
export const boxLines = (op: Pick<Op, 'label' | 'kind'>): string[] => labelLines(shortName(op), LINE_LETTERS);

const boxWidth = (op: Op): number =>
  Math.max(NARROWEST_OP_PX, ...boxLines(op).map((line) => line.length * LETTER_PX + 16));

export function kernelPicture(kernel: Kernel): KernelPicture {
  const graph = new graphlib.Graph({ multigraph: true });
  graph.setGraph({
    rankdir: 'TB',
    nodesep: 10,
    ranksep: 40,
    edgesep: EDGE_GAP_PX,
    marginx: 8,
    marginy: 10,
    acyclicer: 'greedy',
  });
  graph.setDefaultEdgeLabel(() => ({}));
  for (const op of kernel.ops) graph.setNode(op.id, { width: boxWidth(op), height: OP_HEIGHT_PX });
  for (const edge of kernel.edges) {
    if (edge.from !== edge.to) {
      graph.setEdge(edge.from, edge.to, { weight: edge.distance === 0 ? 4 : 1 }, edge.id);
    }
  }
  layout(graph);
  const ops = new Map<OpId, OpBox>();
  for (const op of kernel.ops) {
    const node = graph.node(op.id);
    ops.set(op.id, { x: node.x - node.width / 2, y: node.y - OP_HEIGHT_PX / 2, width: node.width });
  }
  const edges = new Map<EdgeId, readonly Point[]>();
  for (const edge of kernel.edges) {
    const own = ops.get(edge.from);
    const drawn = edge.from === edge.to ? null : graph.edge(edge.from, edge.to, edge.id);
    edges.set(edge.id, drawn?.points ?? (own ? ownWay(own) : []));
  }
  const size = graph.graph();
  return {
    width: Math.max(NARROWEST_OP_PX, size.width ?? 0),
    height: Math.max(OP_HEIGHT_PX, size.height ?? 0),
    ops,
    edges,
  };
}

/** From an op round its side back to itself. */
function ownWay({ x, y, width }: OpBox): Point[] {
  const right = x + width;
  return [
    { x: right - 12, y: y + OP_HEIGHT_PX },
    { x: right + 14, y: y + OP_HEIGHT_PX + 12 },
    { x: right + 14, y: y - 12 },
    { x: right - 12, y },
  ];
}

/** A smooth line through points: curves between the middles of its stretches. */
export function smoothPath(points: readonly Point[]): string {
  const [first] = points;
  const last = points.at(-1);
  if (!first || !last || points.length < 2) return '';
  const parts = [`M${first.x} ${first.y}`];
  points.slice(1, -1).forEach((point, i) => {
    const next = points[i + 2] ?? last;
    const end = i === points.length - 3 ? next : { x: (point.x + next.x) / 2, y: (point.y + next.y) / 2 };
    parts.push(`Q${point.x} ${point.y} ${end.x} ${end.y}`);
  });
  if (points.length === 2) parts.push(`L${last.x} ${last.y}`);
  return parts.join('');
}
