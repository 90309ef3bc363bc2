/** Weights as JSON: what nets and connections count in the objective, the document of `weights.schema.json`. */
import { z } from 'zod';
import { type Weights, weightsSchema } from '../mapping/weights';
import { parseJsonDocument } from './json-document';
import { jsonText, sortedRecord } from './json-text';
import type { ParseResult } from './parse-result';

export const weightsDocumentSchema = z.strictObject({
  format: z.literal('pinloom.weights'),
  formatVersion: z.literal(1),
  ...weightsSchema.shape,
});

/** Reads weights. Whether nets and connections exist depends on the kernel. */
export function parseWeightsJson(text: string): ParseResult<Weights> {
  const parsed = parseJsonDocument(text, weightsDocumentSchema);
  if (!parsed.ok) return parsed;
  const { format: _, formatVersion: __, ...weights } = parsed.value;
  return { ok: true, value: weights };
}

/** The same weights always give the same text; reading it gives the weights back. */
export const writeWeightsJson = (weights: Weights): string =>
  jsonText({ format: 'pinloom.weights', formatVersion: 1, ...weightMembers(weights) });

/** Their members in the order of every written document. */
export const weightMembers = ({ nets, edges }: Weights): Record<string, Record<string, number>> => ({
  ...(nets && { nets: sortedRecord(nets) }),
  ...(edges && { edges: sortedRecord(edges) }),
});
