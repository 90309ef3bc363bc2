/** A connection that has been started and waits for its operand. */
import { type ConnectionAnswer, canConnect, type Kernel, type OpId, portsOf } from '@/lib/graph';
import { indexOf } from './kernel-facts';

export interface Connecting {
  from: OpId;
  /** `drag` ends when the pointer is let go, `click` with a second click or Escape. */
  by: 'drag' | 'click';
  /** The answer for every operand of the kernel, by `portKey`. */
  answers: ReadonlyMap<string, ConnectionAnswer>;
}

export const portKey = (op: OpId, port: string): string => `${op}.${port}`;

export function startConnecting(kernel: Kernel, from: OpId, by: Connecting['by']): Connecting {
  const index = indexOf(kernel);
  const answers = new Map<string, ConnectionAnswer>();
  for (const op of kernel.ops) {
    for (const port of portsOf(op.kind)) {
      const request = { from, to: op.id, port: port.name };
      answers.set(portKey(op.id, port.name), canConnect(kernel, request, undefined, index));
    }
  }
  return { from, by, answers };
}
