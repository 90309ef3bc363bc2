import { type Kernel, kernelSchema, opId } from '@/lib/graph';

export const ids = {
  level: opId('op_level'),
  sum: opId('op_sum'),
  above: opId('op_above'),
  kept: opId('op_kept'),
};

const op = (id: string, kind: string, params: Record<string, string | number>, x: number, y = 0) => ({
  id,
  kind,
  label: id.slice(3),
  widthBits: 16,
  params,
  immediates: {},
  positionPx: { x, y },
});

/** A load, an add, a comparison and a store; the load drives operand a of the add. */
export const smallKernel: Kernel = kernelSchema.parse({
  format: 'pinloom.kernel',
  formatVersion: 1,
  name: 'Gauge reading',
  description: '',
  ops: [
    op(ids.level, 'load', { array: 'level', base: 0, stride: 1 }, 0),
    op(ids.sum, 'add', { overflow: 'wrap' }, 216),
    op(ids.above, 'less', {}, 216, 160),
    op(ids.kept, 'store', { array: 'kept', base: 0, stride: 1 }, 432),
  ],
  edges: [{ id: 'edge_1', from: ids.level, to: ids.sum, port: 'a', distance: 0, initialValues: [] }],
});

export const renamed = (name: string): Kernel => ({ ...smallKernel, name });
