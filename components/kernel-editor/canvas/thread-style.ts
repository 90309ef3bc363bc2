/** Threads: each net has a colour and a dash rhythm, so that neither alone has to tell it apart. */
import { type Kernel, type OpId, opSpec } from '@/lib/graph';

const COLOURS = 10;
/** Seven rhythms and ten colours meet again only after seventy nets. */
const rhythms = [undefined, '7 3', '2 3', '9 3 2 3', '13 4', '5 2 2 2 2 2', '4 6'] as const;

export interface ThreadStyle {
  colour: string;
  dash: string | undefined;
}

export const threadStyle = (number: number): ThreadStyle => ({
  colour: `var(--thread-${(number % COLOURS) + 1})`,
  dash: rhythms[number % rhythms.length],
});

/**
 * A number for each op with a result, in the kernel's order: a new connection leaves the threads there are as they
 * look, since ops are added at the end.
 */
export function threadNumbers(kernel: Kernel): ReadonlyMap<OpId, number> {
  const sources = kernel.ops.filter((op) => opSpec(op.kind).output !== null);
  return new Map(sources.map((op, number) => [op.id, number]));
}
