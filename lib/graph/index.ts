export { type Alignment, alignEdit, alignments, distributions } from './align';
export { paramAccepts, paramDomain } from './check-params';
export { type Rate, resultRates } from './check-rates';
export { copyFragment, type KernelFragment, kernelFragmentSchema, pasteFragment } from './clipboard';
export { type ConnectionAnswer, type ConnectionRequest, canConnect } from './connect';
export { applyEdit, initialParams, invertEdit, newOp, removeOpsEdit } from './edits';
export type { EdgePatch, GraphEdit, MetaPatch, OpPatch } from './graph-edit';
export { edgeId, freshEdgeId, freshOpId, opId, takenIds } from './ids';
export {
  type Edge,
  type EdgeId,
  edgeSchema,
  emptyKernel,
  KERNEL_LIMITS,
  type Kernel,
  kernelSchema,
  type Op,
  type OpId,
  opSchema,
  type WidthBits,
  wordWidthsBits,
} from './kernel';
export { indexKernel, type KernelIndex } from './kernel-index';
export { layoutEdit } from './layout';
export { type Net, netsOf } from './nets';
export { GRID_PX, NODE_WIDTH_PX, type NodeSize, type NodeSizeOf, nodeSizePx } from './node-size';
export {
  fallbackPort,
  type OpGroup,
  type OpKind,
  type OpSpec,
  opCatalog,
  opKinds,
  opSpec,
  type ParamSpec,
  type PortSpec,
  type PortType,
  PREDICATE_PORT,
  portsOf,
} from './op-catalog';
export { type Cycle, iterationOrder, sameIterationCycles } from './order';
export {
  connectionFault,
  fullInitialValues,
  immediateRange,
  initialValueRange,
  inRange,
  opName,
  portOf,
  type ValueRange,
  wordRange,
} from './ports';
export { type Problem, type ProblemCode, problemCodes } from './problem';
export { validateKernel } from './validate';
