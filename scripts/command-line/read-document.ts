/** Reads the files that the commands name; a fault is told as file:line:column. */
import { readFileSync, statSync } from 'node:fs';
import { z } from 'zod';
import type { Fabric } from '../../lib/fabric/fabric';
import { parseCertificateJson } from '../../lib/formats/certificate-json';
import { parseFabricJson } from '../../lib/formats/fabric-json';
import { parseJsonDocument } from '../../lib/formats/json-document';
import { parseKernelDot } from '../../lib/formats/kernel-dot';
import { parseKernelJson } from '../../lib/formats/kernel-json';
import { parseMappingJson } from '../../lib/formats/mapping-json';
import { type ParseResult, positionAt } from '../../lib/formats/parse-result';
import { parsePinsJson } from '../../lib/formats/pins-json';
import { parseQaplib, type QaplibDocument } from '../../lib/formats/qaplib';
import { parseWeightsJson } from '../../lib/formats/weights-json';
import type { Kernel } from '../../lib/graph/kernel';
import type { Certificate } from '../../lib/mapping/certificate';
import { type MappingDocument, type Pins, placementSchema, routesSchema } from '../../lib/mapping/mapping';
import type { Weights } from '../../lib/mapping/weights';
import { err, ok, type Result } from '../../lib/result';

/** Lines for standard error. */
export type Faults = string[];

const MAX_FILE_BYTES = 16 * 2 ** 20;

function read<T>(path: string, parse: (text: string) => ParseResult<T>): Result<T, Faults> {
  let text: string;
  try {
    if (statSync(path).size > MAX_FILE_BYTES) return err([`${path}: larger than 16 MiB`]);
    text = readFileSync(path, 'utf8');
  } catch (error) {
    return err([`${path}: cannot be read (${(error as NodeJS.ErrnoException).code ?? 'unknown cause'})`]);
  }
  const parsed = parse(text);
  if (parsed.ok) return ok(parsed.value);
  return err(
    parsed.errors.map(({ line, column, path: place, message, expected }) => {
      const where = place ? `${place}: ` : '';
      return `${path}:${line}:${column}: ${where}${message}${expected ? ` Expected: ${expected}.` : ''}`;
    }),
  );
}

export const readKernel = (path: string): Result<Kernel, Faults> =>
  read(path, path.endsWith('.dot') || path.endsWith('.gv') ? parseKernelDot : parseKernelJson);
export const readFabric = (path: string): Result<Fabric, Faults> => read(path, parseFabricJson);
export const readPins = (path: string): Result<Pins, Faults> => read(path, parsePinsJson);
export const readWeights = (path: string): Result<Weights, Faults> => read(path, parseWeightsJson);
export const readQaplib = (path: string): Result<QaplibDocument, Faults> => read(path, parseQaplib);
/** What `place` prints, as far as it says where everything is. */
const placedSchema = z.object({ placement: placementSchema, routes: routesSchema });

/** A mapping document, or what `place` has printed. */
export const readPlaced = (path: string): Result<Pick<MappingDocument, 'placement' | 'routes'>, Faults> =>
  read(path, (text) => (isOutcome(text) ? parseJsonDocument(text, placedSchema) : parseMappingJson(text)));

function isOutcome(text: string): boolean {
  try {
    const document: unknown = JSON.parse(text);
    return typeof document === 'object' && document !== null && 'status' in document;
  } catch {
    return false;
  }
}

export const readCertificate = (path: string): Result<Certificate, Faults> =>
  read(path, parseCertificateJson);
export const readMapping = (path: string): Result<MappingDocument, Faults> => read(path, parseMappingJson);

/** line:column of the first word that is the id; 1:1 without an id. */
export function placeInFile(path: string, id: string | null): string {
  if (id === null) return '1:1';
  const text = readFileSync(path, 'utf8');
  const offset = text.search(new RegExp(`\\b${id}\\b`));
  const { line, column } = positionAt(text, Math.max(0, offset));
  return `${line}:${column}`;
}
