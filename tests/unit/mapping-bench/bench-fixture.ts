/** A kernel of five ops on a fabric of 3 × 3 tiles: memory at both sides, arithmetic between, a multiplier in the middle. */

import { createBenchStore } from '@/components/mapping-bench/store/bench-store';
import { type Fabric, fabricSchema, type TileId } from '@/lib/fabric/fabric';
import { tileId } from '@/lib/fabric/tiles';
import { opId } from '@/lib/graph/ids';
import { type Kernel, kernelSchema } from '@/lib/graph/kernel';

export const ids = {
  left: opId('op_left'),
  right: opId('op_right'),
  product: opId('op_product'),
  sum: opId('op_sum'),
  out: opId('op_out'),
};

const op = (id: string, kind: string, label: string, params: object, immediates: object = {}) => ({
  id,
  kind,
  label,
  widthBits: 32,
  params,
  immediates,
  positionPx: { x: 0, y: 0 },
});
const edge = (id: string, from: string, to: string, port: string) => ({
  id,
  from,
  to,
  port,
  distance: 0,
  initialValues: [],
});

/** (left × right) + left, stored. */
export const kernel: Kernel = kernelSchema.parse({
  format: 'pinloom.kernel',
  formatVersion: 1,
  name: 'Product and sum',
  description: '',
  ops: [
    op('op_left', 'load', 'left', { array: 'x', base: 0, stride: 1 }),
    op('op_right', 'load', 'right', { array: 'y', base: 0, stride: 1 }),
    op('op_product', 'multiply', 'product', { overflow: 'wrap' }),
    op('op_sum', 'add', 'sum', { overflow: 'wrap' }),
    op('op_out', 'store', 'out', { array: 'z', base: 0, stride: 1 }),
  ],
  edges: [
    edge('edge_1', 'op_left', 'op_product', 'a'),
    edge('edge_2', 'op_right', 'op_product', 'b'),
    edge('edge_3', 'op_product', 'op_sum', 'a'),
    edge('edge_4', 'op_left', 'op_sum', 'b'),
    edge('edge_5', 'op_sum', 'op_out', 'value'),
  ],
});

const [M, A, X] = ['unit_memory', 'unit_arithmetic', 'unit_multiplier'];
/** Tile 8, at the lower right corner, has a router only. */
export const fabric: Fabric = fabricSchema.parse({
  format: 'pinloom.fabric',
  formatVersion: 1,
  name: 'Three by three',
  description: '',
  rows: 3,
  cols: 3,
  topology: 'mesh',
  units: [M, A, M, M, X, A, M, A, null],
  channels: 1,
  removedLinks: [],
  addedLinks: [],
  linkChannels: {},
  bufferDepth: 4,
  clock: { periodPs: 700, entryDelayPs: 0, hopDelayPs: 100 },
  memoryBanks: 2,
});

export const tile = (index: number): TileId => tileId(Math.floor(index / 3), index % 3);

export const emptyContent = { placement: {}, pins: {}, routes: {}, provenance: { by: 'hand' as const } };

export const newStore = (readOnly = false) =>
  createBenchStore({ kernel, fabric, content: emptyContent, readOnly });

/** A legal placement, op by op. */
export const legalTiles = [
  [ids.left, 0],
  [ids.right, 3],
  [ids.product, 4],
  [ids.sum, 1],
  [ids.out, 2],
] as const;

export function placeAll(store: ReturnType<typeof newStore>): void {
  for (const [id, index] of legalTiles) {
    store.getState().pick(id);
    store.getState().putDown(index);
  }
}
