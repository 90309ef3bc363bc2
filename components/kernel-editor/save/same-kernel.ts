/** Whether two kernels hold the same, whatever the order of their objects' keys (a database may change that). */
import type { Kernel } from '@/lib/graph';

export const sameKernel = (a: Kernel, b: Kernel): boolean => a === b || sortedJson(a) === sortedJson(b);

function sortedJson(value: unknown): string {
  return JSON.stringify(value, (_key, part: unknown) => {
    if (typeof part !== 'object' || part === null || Array.isArray(part)) return part;
    return Object.fromEntries(Object.entries(part).sort(([x], [y]) => (x < y ? -1 : 1)));
  });
}
