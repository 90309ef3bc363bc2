/** The working state of an edit: applies each step and gives the step that takes it back. */
import { assertNever, err, ok, type Result } from '../result';
import type { EdgePatch, GraphEdit, MetaPatch, OpPatch } from './graph-edit';
import { addItem, findItem, type ItemList, itemList, removeItem, replaceItem } from './item-list';
import {
  type Edge,
  type EdgeId,
  edgeSchema,
  KERNEL_LIMITS,
  type Kernel,
  kernelSchema,
  type Op,
  type OpId,
  opSchema,
} from './kernel';

export interface Draft {
  meta: Kernel;
  ops: ItemList<Op>;
  edges: ItemList<Edge>;
  /** How many ends of edges touch each op. */
  edgeEnds: Map<OpId, number>;
}

type Undo = Result<GraphEdit, string>;

export function draftOf(kernel: Kernel): Draft {
  const edgeEnds = new Map<OpId, number>();
  const draft = { meta: kernel, ops: itemList(kernel.ops), edges: itemList(kernel.edges), edgeEnds };
  for (const edge of kernel.edges) countEnds(draft, edge, 1);
  return draft;
}

/** The kernel that a draft has become; lists that no step touched are those of the kernel it began from. */
export const finishDraft = (draft: Draft): Kernel => ({
  ...draft.meta,
  ops: draft.ops.items as Op[],
  edges: draft.edges.items as Edge[],
});

/** Applies an edit in place and returns its inverse. After an error the draft is half-done: drop it. */
export function applyToDraft(draft: Draft, edit: GraphEdit): Undo {
  switch (edit.type) {
    case 'batch':
      return applyBatch(draft, edit.edits);
    case 'addOp':
      return addOp(draft, edit.op, edit.index);
    case 'removeOp':
      return removeOp(draft, edit.id);
    case 'updateOp':
      return updateOp(draft, edit.id, edit.patch);
    case 'moveOps':
      return moveOps(draft, edit.moves);
    case 'addEdge':
      return addEdge(draft, edit.edge, edit.index);
    case 'removeEdge':
      return removeEdge(draft, edit.id);
    case 'updateEdge':
      return updateEdge(draft, edit.id, edit.patch);
    case 'setMeta':
      return setMeta(draft, edit.patch);
    default:
      return assertNever(edit);
  }
}

/** Batches within batches are taken apart with a stack of our own: their depth is bounded by memory only. */
function applyBatch(draft: Draft, edits: readonly GraphEdit[]): Undo {
  const inverses: GraphEdit[] = [];
  const open: GraphEdit[] = [...edits].reverse();
  for (let edit = open.pop(); edit !== undefined; edit = open.pop()) {
    if (edit.type === 'batch') {
      for (let i = edit.edits.length - 1; i >= 0; i--) open.push(edit.edits[i]!);
      continue;
    }
    const applied = applyToDraft(draft, edit);
    if (!applied.ok) return applied;
    inverses.push(applied.value);
  }
  return ok({ type: 'batch', edits: inverses.reverse() });
}

const goneOp = (id: string): Undo => err(`The op ${id} no longer exists.`);
const goneEdge = (id: string): Undo => err(`The connection ${id} no longer exists.`);

function countEnds(draft: Draft, edge: Edge, by: 1 | -1): void {
  for (const id of [edge.from, edge.to]) draft.edgeEnds.set(id, (draft.edgeEnds.get(id) ?? 0) + by);
}

const firstIssue = (what: string, issues: readonly { path: PropertyKey[]; message: string }[]): Undo => {
  const issue = issues[0];
  return err(
    `${what} is not valid at ${issue?.path.join('.') || 'its top'}: ${issue?.message ?? 'unknown'}.`,
  );
};

function addOp(draft: Draft, op: Op, index?: number): Undo {
  if (findItem(draft.ops, op.id) !== -1) return err(`There is an op ${op.id} already.`);
  if (draft.ops.items.length >= KERNEL_LIMITS.ops)
    return err(`A kernel has at most ${KERNEL_LIMITS.ops} ops.`);
  const parsed = opSchema.safeParse(op);
  if (!parsed.success) return firstIssue('The op', parsed.error.issues);
  addItem(draft.ops, parsed.data, index);
  return ok({ type: 'removeOp', id: op.id });
}

function removeOp(draft: Draft, id: OpId): Undo {
  const index = findItem(draft.ops, id);
  if (index === -1) return goneOp(id);
  if ((draft.edgeEnds.get(id) ?? 0) > 0)
    return err(`The op ${id} still has connections: remove those first.`);
  const op = removeItem(draft.ops, index);
  return ok({ type: 'addOp', op, index });
}

/** The values that `patch` will overwrite. */
function previousValues<T extends object, P extends Partial<T>>(item: T, patch: P): P {
  const names = Object.keys(patch) as (keyof P & keyof T)[];
  return Object.fromEntries(names.map((name) => [name, item[name]])) as P;
}

function updateOp(draft: Draft, id: OpId, patch: OpPatch): Undo {
  const index = findItem(draft.ops, id);
  const op = draft.ops.items[index];
  if (op === undefined) return goneOp(id);
  const parsed = opSchema.safeParse({ ...op, ...patch, id });
  if (!parsed.success) return firstIssue(`The op ${id}`, parsed.error.issues);
  replaceItem(draft.ops, index, parsed.data);
  return ok({ type: 'updateOp', id, patch: previousValues(op, patch) });
}

function moveOps(draft: Draft, moves: readonly { id: OpId; positionPx: Op['positionPx'] }[]): Undo {
  const back: { id: OpId; positionPx: Op['positionPx'] }[] = [];
  for (const { id, positionPx } of moves) {
    const index = findItem(draft.ops, id);
    const op = draft.ops.items[index];
    if (op === undefined) return goneOp(id);
    const parsed = opSchema.shape.positionPx.safeParse(positionPx);
    if (!parsed.success) return firstIssue(`The position of ${id}`, parsed.error.issues);
    replaceItem(draft.ops, index, { ...op, positionPx: parsed.data });
    back.push({ id, positionPx: op.positionPx });
  }
  // Backwards, so that an op moved twice ends where it began.
  return ok({ type: 'moveOps', moves: back.reverse() });
}

/** A sentence when an edge does not fit its schema or an end of it is missing. */
function edgeFault(draft: Draft, edge: Edge): string | null {
  for (const id of [edge.from, edge.to]) {
    if (findItem(draft.ops, id) === -1)
      return `The connection ${edge.id} needs the op ${id}, which does not exist.`;
  }
  return null;
}

function addEdge(draft: Draft, edge: Edge, index?: number): Undo {
  if (findItem(draft.edges, edge.id) !== -1) return err(`There is a connection ${edge.id} already.`);
  if (draft.edges.items.length >= KERNEL_LIMITS.edges) {
    return err(`A kernel has at most ${KERNEL_LIMITS.edges} connections.`);
  }
  const parsed = edgeSchema.safeParse(edge);
  if (!parsed.success) return firstIssue('The connection', parsed.error.issues);
  const fault = edgeFault(draft, parsed.data);
  if (fault !== null) return err(fault);
  addItem(draft.edges, parsed.data, index);
  countEnds(draft, parsed.data, 1);
  return ok({ type: 'removeEdge', id: edge.id });
}

function removeEdge(draft: Draft, id: EdgeId): Undo {
  const index = findItem(draft.edges, id);
  if (index === -1) return goneEdge(id);
  const edge = removeItem(draft.edges, index);
  countEnds(draft, edge, -1);
  return ok({ type: 'addEdge', edge, index });
}

function updateEdge(draft: Draft, id: EdgeId, patch: EdgePatch): Undo {
  const index = findItem(draft.edges, id);
  const edge = draft.edges.items[index];
  if (edge === undefined) return goneEdge(id);
  const parsed = edgeSchema.safeParse({ ...edge, ...patch, id });
  if (!parsed.success) return firstIssue(`The connection ${id}`, parsed.error.issues);
  const fault = edgeFault(draft, parsed.data);
  if (fault !== null) return err(fault);
  replaceItem(draft.edges, index, parsed.data);
  countEnds(draft, edge, -1);
  countEnds(draft, parsed.data, 1);
  return ok({ type: 'updateEdge', id, patch: previousValues(edge, patch) });
}

function setMeta(draft: Draft, patch: MetaPatch): Undo {
  const parsed = kernelSchema.pick({ name: true, description: true }).partial().safeParse(patch);
  if (!parsed.success) return firstIssue('The kernel', parsed.error.issues);
  const inverse = previousValues<MetaPatch, MetaPatch>(draft.meta, patch);
  draft.meta = { ...draft.meta, ...parsed.data };
  return ok({ type: 'setMeta', patch: inverse });
}
