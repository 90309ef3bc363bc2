/** The kernel from top to bottom, for the bench's narrow pane. Carried connections are the ones turned back in a cycle. */
import { graphlib, layout } from '@dagrejs/dagre';
import type { EdgeId, Kernel, OpId } from '@/lib/graph/kernel';
import type { Point } from '@/lib/mapping/picture/fabric-geometry';

export const OP_WIDTH_PX = 92;
export const OP_HEIGHT_PX = 36;

export interface KernelPicture {
  width: number;
  height: number;
  /** Upper left corners. */
  ops: ReadonlyMap<OpId, Point>;
  edges: ReadonlyMap<EdgeId, readonly Point[]>;
}

const EDGE_GAP_PX = 10;

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
  for (const op of kernel.ops) graph.setNode(op.id, { width: OP_WIDTH_PX, height: OP_HEIGHT_PX });
  for (const edge of kernel.edges) {
    if (edge.from !== edge.to) {
      graph.setEdge(edge.from, edge.to, { weight: edge.distance === 0 ? 4 : 1 }, edge.id);
    }
  }
  layout(graph);
  const ops = new Map<OpId, Point>();
  for (const op of kernel.ops) {
    const node = graph.node(op.id);
    ops.set(op.id, { x: node.x - OP_WIDTH_PX / 2, y: node.y - OP_HEIGHT_PX / 2 });
  }
  const edges = new Map<EdgeId, readonly Point[]>();
  for (const edge of kernel.edges) {
    const drawn =
      edge.distance === 0 && edge.from !== edge.to ? graph.edge(edge.from, edge.to, edge.id) : null;
    edges.set(edge.id, drawn?.points ?? carriedWay(ops.get(edge.from), ops.get(edge.to)));
  }
  const size = graph.graph();
  return {
    width: Math.max(OP_WIDTH_PX + 24, size.width ?? 0),
    height: Math.max(OP_HEIGHT_PX + 24, size.height ?? 0),
    ops,
    edges,
  };
}

/** From the producer's foot round its side to the consumer's head. */
function carriedWay(from: Point | undefined, to: Point | undefined): Point[] {
  if (!from || !to) return [];
  const side = Math.max(from.x, to.x) + OP_WIDTH_PX + 10;
  return [
    { x: from.x + OP_WIDTH_PX * 0.75, y: from.y + OP_HEIGHT_PX },
    { x: side, y: from.y + OP_HEIGHT_PX + 12 },
    { x: side, y: to.y - 12 },
    { x: to.x + OP_WIDTH_PX * 0.75, y: to.y },
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
