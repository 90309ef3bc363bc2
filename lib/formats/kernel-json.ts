/** Kernels as JSON: the document of `kernel.schema.json`. */
import { type Kernel, kernelSchema } from '../graph/kernel';
import { type DocumentFault, parseJsonDocument } from './json-document';
import { jsonText, sortedRecord } from './json-text';
import type { ParseResult } from './parse-result';

/**
 * Reads a kernel. Ids must be unique and connections must have both ends; other faults of the graph, such as an operand
 * that is not driven, are left to `validateKernel`, so that unfinished drafts can be exchanged.
 */
export const parseKernelJson = (text: string): ParseResult<Kernel> =>
  parseJsonDocument(text, kernelSchema, structureFaults);

function structureFaults(kernel: Kernel): DocumentFault[] {
  const faults: DocumentFault[] = [];
  const opIds = new Set<string>();
  kernel.ops.forEach((op, i) => {
    if (opIds.has(op.id))
      faults.push({ path: ['ops', i, 'id'], message: `Another op has the id ${op.id} already.` });
    opIds.add(op.id);
  });
  const edgeIds = new Set<string>();
  kernel.edges.forEach((edge, i) => {
    if (edgeIds.has(edge.id)) {
      faults.push({ path: ['edges', i, 'id'], message: `Another connection has the id ${edge.id} already.` });
    }
    edgeIds.add(edge.id);
    for (const end of ['from', 'to'] as const) {
      if (opIds.has(edge[end])) continue;
      faults.push({ path: ['edges', i, end], message: `There is no op ${edge[end]} in this kernel.` });
    }
  });
  return faults;
}

/** The same kernel always gives the same text; reading it gives the kernel back. */
export const writeKernelJson = (kernel: Kernel): string =>
  jsonText({
    format: kernel.format,
    formatVersion: kernel.formatVersion,
    name: kernel.name,
    description: kernel.description,
    ops: kernel.ops.map((op) => ({
      id: op.id,
      kind: op.kind,
      label: op.label,
      widthBits: op.widthBits,
      params: sortedRecord(op.params),
      immediates: sortedRecord(op.immediates),
      positionPx: { x: op.positionPx.x, y: op.positionPx.y },
    })),
    edges: kernel.edges.map((edge) => ({
      id: edge.id,
      from: edge.from,
      to: edge.to,
      port: edge.port,
      distance: edge.distance,
      initialValues: edge.initialValues,
    })),
  });
