/** Certificates as JSON: the document of `certificate.schema.json`. */
import { z } from 'zod';
import { type Certificate, certificateSchema } from '../mapping/certificate';
import { parseJsonDocument } from './json-document';
import { jsonText, sortedRecord } from './json-text';
import { formatErrorAt, type ParseResult, refuse } from './parse-result';
import { weightMembers } from './weights-json';

/** What `pinloom place` prints has no format of its own. */
const outcomeSchema = z.looseObject({
  format: z.undefined().optional(),
  certificate: z.looseObject({}).nullable(),
});

/**
 * Reads a certificate, by itself or within the document that `pinloom place` prints. Whether it is true is not to be seen
 * from it: that takes solving its problem again.
 */
export function parseCertificateJson(text: string): ParseResult<Certificate> {
  if (!parseJsonDocument(text, outcomeSchema).ok)
    return ofOneVersion(parseJsonDocument(text, certificateSchema));
  const outcome = parseJsonDocument(text, z.looseObject({ certificate: certificateSchema.nullable() }));
  if (!outcome.ok) return ofOneVersion(outcome);
  const { certificate } = outcome.value;
  return certificate === null
    ? refuse(
        formatErrorAt(text, 0, 'Nothing was proved, so there is no certificate.', { path: 'certificate' }),
      )
    : { ok: true, value: certificate };
}

/** Of another version nothing else is to be believed, so nothing else is reported. */
function ofOneVersion<T>(parsed: ParseResult<T>): ParseResult<T> {
  if (parsed.ok) return parsed;
  const version = parsed.errors.find(({ path }) => path?.endsWith('formatVersion'));
  if (!version) return parsed;
  const message = `${version.message} Certificates of other versions cannot be read.`;
  return refuse({ ...version, message });
}

/** The same certificate always gives the same text; reading it gives the certificate back. */
export const writeCertificateJson = (certificate: Certificate): string =>
  jsonText(certificateMembers(certificate));

/** In the order of the schema, records in the order of their names. */
export const certificateMembers = (certificate: Certificate) => ({
  format: certificate.format,
  formatVersion: certificate.formatVersion,
  engineVersion: certificate.engineVersion,
  problemDigest: certificate.problemDigest,
  objective: certificate.objective,
  ...(certificate.weights && { weights: weightMembers(certificate.weights) }),
  pins: sortedRecord(certificate.pins),
  start: certificate.start && sortedRecord(certificate.start),
  engine: certificate.engine,
  seed: certificate.seed,
  searchTries: certificate.searchTries,
  status: certificate.status,
  objectiveValue: certificate.objectiveValue,
  bound: certificate.bound,
  method: certificate.method,
  nodes: certificate.nodes,
  levels: certificate.levels.map(({ cutoff, nodes }) => ({ cutoff, nodes })),
  struckTiles: certificate.struckTiles,
  isRepeatable: certificate.isRepeatable,
});
