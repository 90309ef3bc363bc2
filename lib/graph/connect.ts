/** Whether a new connection may be drawn, for the editor's handles and its keyboard commands. */
import type { EdgeId, Kernel, OpId } from './kernel';
import { indexKernel, type KernelIndex } from './kernel-index';
import { connectionFault, opName, portOf } from './ports';

export interface ConnectionRequest {
  from: OpId;
  to: OpId;
  port: string;
}

export type ConnectionAnswer =
  /** `needsDistance`: the edge closes a cycle within one iteration, so it must carry its value to a later one. */
  { ok: true; needsDistance: boolean } | { ok: false; reason: string };

const refuse = (reason: string): ConnectionAnswer => ({ ok: false, reason });

/**
 * Checks ends, port, type, width and that the port is free. Linear in ops and edges.
 * `ignoring` is an edge that is being moved: it neither occupies its port nor closes cycles.
 * Who asks for many ports of one kernel gives its index along, which saves building it each time.
 */
export function canConnect(
  kernel: Kernel,
  request: ConnectionRequest,
  ignoring?: EdgeId,
  index: KernelIndex = indexKernel(kernel),
): ConnectionAnswer {
  const source = index.opById.get(request.from);
  const target = index.opById.get(request.to);
  if (source === undefined) return refuse('The op that the connection starts from no longer exists.');
  if (target === undefined) return refuse('The op that the connection leads to no longer exists.');
  const port = portOf(target, request.port);
  if (port === undefined) return refuse(`${opName(target)} has no operand “${request.port}”.`);
  const fault = connectionFault(source, target, port);
  if (fault !== null) return refuse(fault);
  const present = index.edgesInto
    .get(target.id)
    ?.find((edge) => edge.port === port.name && edge.id !== ignoring);
  if (present !== undefined) {
    const holder = index.opById.get(present.from);
    const by = holder === undefined ? 'another op' : opName(holder);
    return refuse(
      `The operand “${port.label}” of ${opName(target)} is already driven by ${by}: remove that connection first.`,
    );
  }
  if (Object.hasOwn(target.immediates, port.name)) {
    return refuse(
      `The operand “${port.label}” of ${opName(target)} is the constant ${target.immediates[port.name]}: clear it first.`,
    );
  }
  return { ok: true, needsDistance: reachesInIteration(index, target.id, source.id, ignoring) };
}

/** Whether distance-0 edges lead from one op to another; an op reaches itself. */
function reachesInIteration(index: KernelIndex, from: OpId, to: OpId, ignoring?: EdgeId): boolean {
  const seen = new Set<OpId>([from]);
  const open: OpId[] = [from];
  for (let id = open.pop(); id !== undefined; id = open.pop()) {
    if (id === to) return true;
    for (const edge of index.edgesOutOf.get(id) ?? []) {
      if (edge.distance > 0 || edge.id === ignoring || seen.has(edge.to)) continue;
      seen.add(edge.to);
      open.push(edge.to);
    }
  }
  return false;
}
