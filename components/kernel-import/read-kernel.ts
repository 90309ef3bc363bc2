/** Reading a kernel from text that may be JSON or DOT. */
import { parseKernelDot } from '@/lib/formats/kernel-dot';
import { parseKernelJson } from '@/lib/formats/kernel-json';
import type { FormatError } from '@/lib/formats/parse-result';
import { type Kernel, type Problem, validateKernel } from '@/lib/graph';

export type KernelFormat = 'JSON' | 'DOT';

export type KernelReading =
  | { ok: true; format: KernelFormat; kernel: Kernel; problems: readonly Problem[] }
  | { ok: false; format: KernelFormat; errors: readonly FormatError[] };

/** JSON documents begin with a brace; everything else is read as DOT. */
export const formatOfText = (text: string): KernelFormat => (/^\s*[{[]/.test(text) ? 'JSON' : 'DOT');

export function readKernel(text: string): KernelReading {
  const format = formatOfText(text);
  const parsed = format === 'JSON' ? parseKernelJson(text) : parseKernelDot(text);
  if (!parsed.ok) return { ok: false, format, errors: parsed.errors };
  return { ok: true, format, kernel: parsed.value, problems: validateKernel(parsed.value) };
}
