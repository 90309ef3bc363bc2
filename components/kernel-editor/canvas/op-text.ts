/** The short texts of an op: on its node, and read out. */
import { type Kernel, type Op, type OpId, opName, opSpec, portsOf } from '@/lib/graph';
import { indexOf, oncePerKernel } from '../store/kernel-facts';

/** The parameters in small space, such as `x[2 +4]` or `saturate`; empty where all are as usual. */
export function paramText(op: Op): string {
  const { array, table, base, stride, overflow } = op.params;
  if (table !== undefined) return String(table);
  if (array !== undefined) {
    const parts = [base === 0 || base === undefined ? '' : String(base), strideText(stride)].filter(Boolean);
    return parts.length === 0 ? String(array) : `${array}[${parts.join(' ')}]`;
  }
  return overflow === 'saturate' ? 'saturates' : '';
}

const strideText = (stride: string | number | undefined): string =>
  stride === undefined || stride === 1 ? '' : `${Number(stride) < 0 ? '−' : '+'}${Math.abs(Number(stride))}`;

/** Everything that each node shows, as one sentence. */
export const sentencesOf: (kernel: Kernel) => ReadonlyMap<OpId, string> = oncePerKernel(
  (kernel) => new Map(kernel.ops.map((op) => [op.id, opSentence(kernel, op.id)])),
);

function opSentence(kernel: Kernel, id: OpId): string {
  const index = indexOf(kernel);
  const op = index.opById.get(id);
  if (op === undefined) return '';
  const into = index.edgesInto.get(id) ?? [];
  const operands = portsOf(op.kind).flatMap((port) => {
    const edge = into.find((candidate) => candidate.port === port.name);
    const source = edge === undefined ? undefined : index.opById.get(edge.from);
    if (source !== undefined && edge !== undefined) {
      const later = edge.distance > 0 ? ` ${edge.distance} before` : '';
      return [`${port.label} from ${opName(source)}${later}`];
    }
    const constant = op.immediates[port.name];
    if (constant !== undefined) return [`${port.label} is ${constant}`];
    return port.required ? [`${port.label} open`] : [];
  });
  const consumers = index.edgesOutOf.get(id)?.length ?? 0;
  const result =
    opSpec(op.kind).output === null ? [] : [consumers === 1 ? 'one consumer' : `${consumers} consumers`];
  return [
    op.label ? `${op.label}: ${opSpec(op.kind).label}` : opSpec(op.kind).label,
    `${op.widthBits} bits`,
    paramText(op),
    ...operands,
    ...result,
  ]
    .filter(Boolean)
    .join(', ');
}
