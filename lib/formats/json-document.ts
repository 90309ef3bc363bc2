/** Reads a JSON document against a schema and says of every fault where it stands. */
import type { z } from 'zod';
import { locatePaths, pathText } from './json-locate';
import { type JsonPath, walkJson } from './json-walk';
import {
  type FormatError,
  formatErrorAt,
  MAX_FORMAT_ERRORS,
  type ParseResult,
  positionAt,
  refuse,
} from './parse-result';
import { explainIssue } from './schema-issue';

/** Longest text that is read, in UTF-16 units. */
export const MAX_JSON_LENGTH = 4_000_000;

/** A fault that the schema cannot see, with the path to point at. */
export interface DocumentFault {
  path: JsonPath;
  message: string;
}

/**
 * The document, or up to twenty errors with line and column. `check` looks at a document that fits the schema.
 * Takes time linear in the text; texts that are too long or nested too deeply are refused before they are built.
 */
export function parseJsonDocument<T>(
  text: string,
  schema: z.ZodType<T>,
  check: (value: T) => DocumentFault[] = () => [],
): ParseResult<T> {
  const body = text.startsWith('\ufeff') ? ` ${text.slice(1)}` : text;
  if (body.length > MAX_JSON_LENGTH) {
    const message = `The text has ${body.length} characters; at most ${MAX_JSON_LENGTH} are read.`;
    return refuse({ line: 1, column: 1, message });
  }
  const fault = walkJson(body);
  if (fault !== null) {
    return refuse(formatErrorAt(body, fault.offset, fault.message, { expected: fault.expected }));
  }
  const root: unknown = JSON.parse(body);
  const parsed = schema.safeParse(root);
  if (!parsed.success) return refuse(...schemaErrors(body, root, parsed.error.issues));
  const faults = check(parsed.data).slice(0, MAX_FORMAT_ERRORS);
  if (faults.length === 0) return { ok: true, value: parsed.data };
  const offsets = locatePaths(body, faults);
  return refuse(
    ...faults.map((one, i) => formatErrorAt(body, offsets[i]!, one.message, { path: pathText(one.path) })),
  );
}

function schemaErrors(text: string, root: unknown, issues: readonly z.core.$ZodIssue[]): FormatError[] {
  const explained = issues
    .slice(0, MAX_FORMAT_ERRORS)
    .flatMap((issue) => explainIssue(issue, root))
    .slice(0, MAX_FORMAT_ERRORS);
  const offsets = locatePaths(text, explained);
  return explained
    .map((one, i) => ({ one, offset: offsets[i]! }))
    .sort((a, b) => a.offset - b.offset)
    .map(({ one, offset }) => ({
      ...positionAt(text, offset),
      ...(one.path.length === 0 ? {} : { path: pathText(one.path) }),
      message: one.message,
      ...(one.expected === undefined ? {} : { expected: one.expected }),
    }));
}
