/** Writes a demo kernel as a list of named operations; the result is laid out and ready to save. */
import {
  applyEdit,
  type Edge,
  emptyKernel,
  freshEdgeId,
  freshOpId,
  type GraphEdit,
  initialParams,
  type Kernel,
  layoutEdit,
  type Op,
  type OpId,
  type OpKind,
  type WidthBits,
} from '@/lib/graph';

/** A result of an earlier iteration, with what is read before there is one. */
export interface Carried {
  from: OpId;
  distance: number;
  initialValues: number[];
}
/** A constant, the result of an op of this iteration, or one carried from an earlier iteration. */
export type Operand = number | OpId | Carried;

export const earlier = (from: OpId, distance = 1, initialValues: number[] = []): Carried => ({
  from,
  distance,
  initialValues,
});

export interface KernelBuilder {
  op(kind: OpKind, label: string, operands?: Record<string, Operand>, params?: Op['params']): OpId;
  /** Closes a loop: drives an operand of an op that was written before its source. */
  feed(to: OpId, port: string, operand: OpId | Carried): void;
  build(): Kernel;
}

/** All ops of the kernel have the given width. `build` throws when an op or connection is malformed. */
export function kernelBuilder(name: string, description: string, widthBits: WidthBits): KernelBuilder {
  const ops: Op[] = [];
  const edges: Edge[] = [];
  const taken = new Set<string>();

  const feed: KernelBuilder['feed'] = (to, port, operand) => {
    const { from, distance, initialValues } =
      typeof operand === 'string' ? { from: operand, distance: 0, initialValues: [] } : operand;
    const id = freshEdgeId(taken);
    taken.add(id);
    edges.push({ id, from, to, port, distance, initialValues });
  };

  return {
    feed,
    op(kind, label, operands = {}, params = {}) {
      const id = freshOpId(taken, label.replace(/[^A-Za-z0-9]+/g, '_').replace(/^_|_$/g, '') || kind);
      taken.add(id);
      const immediates: Record<string, number> = {};
      for (const [port, operand] of Object.entries(operands)) {
        if (typeof operand === 'number') immediates[port] = operand;
        else feed(id, port, operand);
      }
      ops.push({
        id,
        kind,
        label,
        widthBits,
        params: { ...initialParams(kind), ...params },
        immediates,
        positionPx: { x: 0, y: 0 },
      });
      return id;
    },
    build() {
      const edits: GraphEdit[] = [
        { type: 'setMeta', patch: { description } },
        ...ops.map((op): GraphEdit => ({ type: 'addOp', op })),
        ...edges.map((edge): GraphEdit => ({ type: 'addEdge', edge })),
      ];
      const drawn = made(emptyKernel(name), { type: 'batch', edits });
      return made(drawn, layoutEdit(drawn));
    },
  };
}

function made(kernel: Kernel, edit: GraphEdit): Kernel {
  const result = applyEdit(kernel, edit);
  if (!result.ok) throw new Error(`${kernel.name}: ${result.error}`);
  return result.value;
}
