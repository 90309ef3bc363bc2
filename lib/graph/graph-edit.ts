/** The changes that can be made to a kernel, as data. */
import type { Edge, EdgeId, Kernel, Op, OpId } from './kernel';

export type OpPatch = Partial<Pick<Op, 'kind' | 'label' | 'widthBits' | 'params' | 'immediates'>>;
export type EdgePatch = Partial<Pick<Edge, 'from' | 'to' | 'port' | 'distance' | 'initialValues'>>;
export type MetaPatch = Partial<Pick<Kernel, 'name' | 'description'>>;

export type GraphEdit =
  /** All of them in turn, or none. */
  | { type: 'batch'; edits: readonly GraphEdit[] }
  /** At the end, or at an index of the kernel's list. */
  | { type: 'addOp'; op: Op; index?: number }
  /** The op's edges must be gone. */
  | { type: 'removeOp'; id: OpId }
  | { type: 'updateOp'; id: OpId; patch: OpPatch }
  | { type: 'moveOps'; moves: readonly { id: OpId; positionPx: Op['positionPx'] }[] }
  | { type: 'addEdge'; edge: Edge; index?: number }
  | { type: 'removeEdge'; id: EdgeId }
  | { type: 'updateEdge'; id: EdgeId; patch: EdgePatch }
  | { type: 'setMeta'; patch: MetaPatch };
