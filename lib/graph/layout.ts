/** Automatic layout: operands to the left of the ops that use them, few crossings. */
import { Graph, layout } from '@dagrejs/dagre';
import type { GraphEdit } from './graph-edit';
import type { Edge, Kernel, Op, OpId } from './kernel';
import { layerByDepth } from './layer-layout';
import { GRID_PX, type NodeSizeOf, nodeSizePx } from './node-size';
import { iterationOrder } from './order';

const MARGIN_PX = 40;
const LAYER_GAP_PX = 72;
const ROW_GAP_PX = 24;
/** Beyond this many ops, ranking and ordering by dagre takes seconds; plain layers are drawn instead. */
const DAGRE_OPS = 300;

const toGrid = (valuePx: number): number => Math.round(valuePx / GRID_PX) * GRID_PX;

/**
 * Moves ops (all of them, or the ones named) into layers from left to right. A part keeps its top left corner; the
 * whole kernel starts at the canvas's margin. Deterministic: the same kernel is laid out the same way.
 */
export function layoutEdit(
  kernel: Kernel,
  opIds?: Iterable<OpId>,
  sizeOf: NodeSizeOf = nodeSizePx,
): GraphEdit {
  const chosen = opIds === undefined ? null : new Set(opIds);
  const ops = chosen === null ? kernel.ops : kernel.ops.filter((op) => chosen.has(op.id));
  if (ops.length === 0) return { type: 'moveOps', moves: [] };
  const within = new Set(ops.map((op) => op.id));
  const edges = forwardEdges(kernel, within);
  const placed =
    ops.length <= DAGRE_OPS
      ? layerWithDagre(ops, edges, sizeOf)
      : layerByDepth(ops, edges, sizeOf, { layer: LAYER_GAP_PX, row: ROW_GAP_PX });
  const corner = chosen === null ? { x: MARGIN_PX, y: MARGIN_PX } : topLeft(ops.map((op) => op.positionPx));
  const from = topLeft([...placed.values()]);
  const moves = ops.flatMap((op) => {
    const at = placed.get(op.id);
    if (at === undefined) return [];
    const positionPx = { x: toGrid(at.x - from.x + corner.x), y: toGrid(at.y - from.y + corner.y) };
    return positionPx.x === op.positionPx.x && positionPx.y === op.positionPx.y
      ? []
      : [{ id: op.id, positionPx }];
  });
  return { type: 'moveOps', moves };
}

interface ForwardEdge {
  from: OpId;
  to: OpId;
  /** Same-iteration edges pull their ops together more than carried ones. */
  weight: number;
}

/** The edges between the ops, each turned to run with the order of the iteration, so that none closes a cycle. */
function forwardEdges(kernel: Kernel, within: ReadonlySet<OpId>): ForwardEdge[] {
  const order = iterationOrder(kernel) ?? kernel.ops.map((op) => op.id);
  const rank = new Map(order.map((id, i) => [id, i]));
  const inner = (edge: Edge) => within.has(edge.from) && within.has(edge.to) && edge.from !== edge.to;
  return kernel.edges.filter(inner).map((edge) => {
    const forward = rank.get(edge.from)! < rank.get(edge.to)!;
    const weight = edge.distance === 0 ? 2 : 1;
    return forward ? { from: edge.from, to: edge.to, weight } : { from: edge.to, to: edge.from, weight };
  });
}

type Point = { x: number; y: number };

const topLeft = (points: readonly Point[]): Point =>
  points.reduce((corner, at) => ({ x: Math.min(corner.x, at.x), y: Math.min(corner.y, at.y) }), {
    x: Number.POSITIVE_INFINITY,
    y: Number.POSITIVE_INFINITY,
  });

function layerWithDagre(
  ops: readonly Op[],
  edges: readonly ForwardEdge[],
  sizeOf: NodeSizeOf,
): Map<OpId, Point> {
  const graph = new Graph({ multigraph: true });
  graph.setGraph({ rankdir: 'LR', ranksep: LAYER_GAP_PX, nodesep: ROW_GAP_PX });
  graph.setDefaultEdgeLabel(() => ({}));
  for (const op of ops) {
    const size = sizeOf(op);
    graph.setNode(op.id, { width: size.widthPx, height: size.heightPx });
  }
  edges.forEach((edge, i) => {
    graph.setEdge(edge.from, edge.to, { weight: edge.weight }, String(i));
  });
  layout(graph);
  return new Map(
    ops.map((op) => {
      // Dagre answers with middles; nodes are kept by their top left corner.
      const { x, y, width, height } = graph.node(op.id);
      return [op.id, { x: x - width / 2, y: y - height / 2 }];
    }),
  );
}
