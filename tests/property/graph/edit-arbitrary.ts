/** Random edits for a kernel: most can be made, some cannot. */
import fc from 'fast-check';
import {
  alignEdit,
  copyFragment,
  type EdgeId,
  freshEdgeId,
  type GraphEdit,
  type Kernel,
  layoutEdit,
  newOp,
  type OpId,
  opId,
  opKinds,
  pasteFragment,
  portsOf,
  removeOpsEdit,
  takenIds,
} from '@/lib/graph';

export interface EditSeed {
  action: number;
  first: number;
  second: number;
  value: number;
}
export const editSeeds = fc.array(
  fc.record({
    action: fc.nat(10),
    first: fc.nat(500),
    second: fc.nat(500),
    value: fc.integer({ min: -99, max: 99 }),
  }),
  { maxLength: 12 },
);

const MISSING = opId('op_missing');

/** The edit that a seed means for the kernel as it stands. */
export function editFor(kernel: Kernel, seed: EditSeed): GraphEdit {
  const op = kernel.ops[seed.first % (kernel.ops.length + 1)];
  const other = kernel.ops[seed.second % Math.max(1, kernel.ops.length)];
  const edge = kernel.edges[seed.first % Math.max(1, kernel.edges.length)];
  const id: OpId = op?.id ?? MISSING;
  const kind = opKinds[seed.second % opKinds.length]!;
  const half = kernel.ops.filter((_, i) => i % 2 === seed.first % 2).map((one) => one.id);
  switch (seed.action) {
    case 0:
      return { type: 'addOp', op: newOp(kernel, kind, { x: seed.value, y: 0 }), index: seed.first % 5 };
    case 1:
      return { type: 'removeOp', id };
    case 2:
      return { type: 'updateOp', id, patch: { label: `label ${seed.value}`, immediates: { a: seed.value } } };
    case 3:
      return {
        type: 'moveOps',
        moves: [id, other?.id ?? id, id].map((one, i) => ({
          id: one,
          positionPx: { x: seed.value + i, y: i },
        })),
      };
    case 4:
      return {
        type: 'addEdge',
        edge: {
          id: freshEdgeId(takenIds(kernel)),
          from: id,
          to: other?.id ?? MISSING,
          port: portsOf(other?.kind ?? 'add')[0]!.name,
          distance: seed.first % 3,
          initialValues: [],
        },
      };
    case 5:
      return { type: 'removeEdge', id: edge?.id ?? ('edge_missing' as EdgeId) };
    case 6:
      return {
        type: 'updateEdge',
        id: edge?.id ?? ('edge_missing' as EdgeId),
        patch: { distance: seed.first % 70, to: id },
      };
    case 7:
      return removeOpsEdit(kernel, half);
    case 8:
      return pasteFragment(kernel, copyFragment(kernel, half), { x: 16, y: seed.value }).edit;
    case 9:
      return {
        type: 'batch',
        edits: [{ type: 'setMeta', patch: { name: `n${seed.value}` } }, layoutEdit(kernel)],
      };
    default:
      return alignEdit(kernel, half, 'middle');
  }
}
