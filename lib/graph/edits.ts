/** Making edits and taking them back: `applyEdit` and `invertEdit` are the only writers of a kernel. */
import { err, ok, type Result } from '../result';
import { applyToDraft, draftOf, finishDraft } from './edit-draft';
import type { GraphEdit } from './graph-edit';
import { freshOpId, takenIds } from './ids';
import type { Kernel, Op, OpId, WidthBits } from './kernel';
import { type OpKind, opSpec } from './op-catalog';

/**
 * The kernel after the edit, or one sentence on why it cannot be made. The kernel given stays as it is, and what the
 * edit does not touch is shared between both. The result fits the kernel's schema and every edge has both its ops;
 * whether the kernel can be mapped is for `validateKernel` to say. Linear in the kernel and the edit.
 */
export function applyEdit(kernel: Kernel, edit: GraphEdit): Result<Kernel, string> {
  const draft = draftOf(kernel);
  const applied = applyToDraft(draft, edit);
  return applied.ok ? ok(finishDraft(draft)) : err(applied.error);
}

/**
 * The edit that takes `applyEdit(kernelBefore, edit)` back to `kernelBefore`, down to the order of the lists.
 * Throws when the edit cannot be applied: only edits that were made have an inverse.
 */
export function invertEdit(kernelBefore: Kernel, edit: GraphEdit): GraphEdit {
  const applied = applyToDraft(draftOf(kernelBefore), edit);
  if (!applied.ok) throw new Error(`An edit that cannot be made has no inverse: ${applied.error}`);
  return applied.value;
}

/** Removes the ops with every edge that touches them. Ids that are not there are passed over. */
export function removeOpsEdit(kernel: Kernel, ids: Iterable<OpId>): GraphEdit {
  const doomed = new Set(ids);
  const edges = kernel.edges.filter((edge) => doomed.has(edge.from) || doomed.has(edge.to));
  const ops = kernel.ops.filter((op) => doomed.has(op.id));
  return {
    type: 'batch',
    // From the back, so that no removal moves what is removed next.
    edits: [
      ...edges.reverse().map((edge): GraphEdit => ({ type: 'removeEdge', id: edge.id })),
      ...ops.reverse().map((op): GraphEdit => ({ type: 'removeOp', id: op.id })),
    ],
  };
}

/** Each parameter of a kind at its initial value. */
export const initialParams = (kind: OpKind): Op['params'] =>
  Object.fromEntries(opSpec(kind).params.map((param) => [param.name, param.initial]));

/**
 * An op of a kind with a free id, a label after that id and initial parameters; add it with an `addOp` edit.
 * Without a width it takes that of the kernel's last op, or 16 bits.
 */
export function newOp(kernel: Kernel, kind: OpKind, positionPx: Op['positionPx'], widthBits?: WidthBits): Op {
  const id = freshOpId(takenIds(kernel), `${kind}1`);
  return {
    id,
    kind,
    label: id.slice('op_'.length),
    widthBits: widthBits ?? kernel.ops.at(-1)?.widthBits ?? 16,
    params: initialParams(kind),
    immediates: {},
    positionPx,
  };
}
