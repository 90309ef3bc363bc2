/** The edits that the inspector and the canvas make of single ops and connections. */
import {
  type ConnectionRequest,
  type Edge,
  freshEdgeId,
  type GraphEdit,
  initialParams,
  type Kernel,
  type Op,
  type OpKind,
  opSpec,
  portsOf,
  takenIds,
} from '@/lib/graph';

export function connectEdit(kernel: Kernel, request: ConnectionRequest, distance: number): GraphEdit {
  const id = freshEdgeId(takenIds(kernel));
  return { type: 'addEdge', edge: { id, ...request, distance, initialValues: [] } };
}

/** Sets or, with null, removes the constant of one operand. */
export function constantEdit(op: Op, port: string, value: number | null): GraphEdit {
  const { [port]: _, ...others } = op.immediates;
  const immediates = value === null ? others : { ...others, [port]: value };
  return { type: 'updateOp', id: op.id, patch: { immediates } };
}

export function paramEdit(op: Op, name: string, value: string | number): GraphEdit {
  return { type: 'updateOp', id: op.id, patch: { params: { ...op.params, [name]: value } } };
}

/** Another distance; initial values beyond it go. */
export function distanceEdit(edge: Edge, distance: number): GraphEdit {
  const initialValues = edge.initialValues.slice(0, distance);
  return { type: 'updateEdge', id: edge.id, patch: { distance, initialValues } };
}

/**
 * The kinds an op can become without losing a connection: those that have every operand now in use, of the same type,
 * and a result when it is used.
 */
export function kindsFor(
  op: Op,
  edgesInto: readonly Edge[],
  edgesOutOf: readonly Edge[],
): (kind: OpKind) => boolean {
  const now = new Map(portsOf(op.kind).map((port) => [port.name, port.type]));
  const used = [...edgesInto.map((edge) => edge.port), ...Object.keys(op.immediates)];
  return (kind) => {
    const then = new Map(portsOf(kind).map((port) => [port.name, port.type]));
    const operandsStay = used.every((port) => then.has(port) && then.get(port) === now.get(port));
    const resultStays = edgesOutOf.length === 0 || opSpec(kind).output === opSpec(op.kind).output;
    return operandsStay && resultStays;
  };
}

/** Changes the kind; parameters that both kinds have keep their values. */
export function kindEdit(op: Op, kind: OpKind): GraphEdit {
  const params = initialParams(kind);
  for (const name of Object.keys(params)) {
    const kept = op.params[name];
    if (kept !== undefined) params[name] = kept;
  }
  return { type: 'updateOp', id: op.id, patch: { kind, params } };
}
