/** Kernels as DOT: a graph that Graphviz draws, with all of the kernel in attributes. See docs/formats/dot.md. */
import type { Edge, Kernel, Op } from '../graph/kernel';
import { plainOrQuoted, quoteText } from './dot-text';
import { sortedRecord } from './json-text';

/** The prefix of attributes that give a constant operand: `imm_b=3`. */
export const CONSTANT_PREFIX = 'imm_';

/** The same kernel always gives the same text; `parseKernelDot` gives a legal or unfinished kernel back as it was. */
export function writeKernelDot(kernel: Kernel): string {
  return [
    'digraph kernel {',
    `  graph [name=${quoteText(kernel.name)}, description=${quoteText(kernel.description)}, rankdir=LR];`,
    '  node [shape=box];',
    ...kernel.ops.map((op) => `  ${op.id} [${opAttributes(op).join(', ')}];`),
    ...kernel.edges.map((edge) => `  ${edge.from} -> ${edge.to} [${edgeAttributes(edge).join(', ')}];`),
    '}',
    '',
  ].join('\n');
}

const opAttributes = (op: Op): string[] => [
  `kind=${op.kind}`,
  `label=${quoteText(op.label)}`,
  `widthBits=${op.widthBits}`,
  ...Object.entries(sortedRecord(op.params)).map(
    ([name, value]) => `${plainOrQuoted(name)}=${plainOrQuoted(String(value))}`,
  ),
  ...Object.entries(sortedRecord(op.immediates)).map(([port, value]) => `${CONSTANT_PREFIX}${port}=${value}`),
  `positionPx="${op.positionPx.x},${op.positionPx.y}"`,
];

const edgeAttributes = (edge: Edge): string[] => [
  `id=${edge.id}`,
  `port=${edge.port}`,
  ...(edge.distance === 0 ? [] : [`distance=${edge.distance}`, 'style=dashed', 'constraint=false']),
  ...(edge.initialValues.length === 0 ? [] : [`initialValues="${edge.initialValues.join(' ')}"`]),
];
