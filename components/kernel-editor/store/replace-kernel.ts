/** Taking over another state of the document (a kept version, somebody else's state) as an edit that can be undone. */
import { type GraphEdit, type Kernel, removeOpsEdit } from '@/lib/graph';

export function replaceKernelEdit(before: Kernel, after: Kernel): GraphEdit {
  return {
    type: 'batch',
    edits: [
      removeOpsEdit(
        before,
        before.ops.map((op) => op.id),
      ),
      { type: 'setMeta', patch: { name: after.name, description: after.description } },
      ...after.ops.map((op): GraphEdit => ({ type: 'addOp', op })),
      ...after.edges.map((edge): GraphEdit => ({ type: 'addEdge', edge })),
    ],
  };
}
