/** Kernels in DOT, the language of Graphviz. */
export { parseKernelDot } from './kernel-dot-reader';
export { writeKernelDot } from './kernel-dot-writer';
