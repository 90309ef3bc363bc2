/** Mappings as JSON: the document of `mapping.schema.json`. */
import { type MappingDocument, mappingSchema, type Provenance } from '../mapping/mapping';
import { certificateMembers } from './certificate-json';
import { parseJsonDocument } from './json-document';
import { jsonText, sortedRecord } from './json-text';
import type { ParseResult } from './parse-result';
import { weightMembers } from './weights-json';

/** Reads a mapping by itself. Whether it is legal depends on its kernel and fabric: `verifyMapping` says so. */
export const parseMappingJson = (text: string): ParseResult<MappingDocument> =>
  parseJsonDocument(text, mappingSchema);

/** The same mapping always gives the same text; reading it gives the mapping back. */
export const writeMappingJson = (mapping: MappingDocument): string =>
  jsonText({
    format: mapping.format,
    formatVersion: mapping.formatVersion,
    name: mapping.name,
    kernel: { name: mapping.kernel.name, version: mapping.kernel.version },
    fabric: { name: mapping.fabric.name, version: mapping.fabric.version },
    placement: sortedRecord(mapping.placement),
    pins: sortedRecord(mapping.pins),
    routes: sortedRecord(mapping.routes),
    provenance: provenanceMembers(mapping.provenance),
  });

function provenanceMembers(provenance: Provenance) {
  if (provenance.by === 'hand') return { by: provenance.by };
  return {
    by: provenance.by,
    engine: provenance.engine,
    objective: provenance.objective,
    ...(provenance.weights && { weights: weightMembers(provenance.weights) }),
    timeLimitMs: provenance.timeLimitMs,
    seed: provenance.seed,
    status: provenance.status,
    objectiveValue: provenance.objectiveValue,
    bound: provenance.bound,
    elapsedMs: provenance.elapsedMs,
    changedByHand: provenance.changedByHand,
    ...(provenance.certificate && { certificate: certificateMembers(provenance.certificate) }),
  };
}
