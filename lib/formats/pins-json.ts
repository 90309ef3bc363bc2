/** Pins as JSON: which ops are fixed to which tiles, the document of `pins.schema.json`. */
import { z } from 'zod';
import { type Pins, pinsSchema } from '../mapping/mapping';
import { parseJsonDocument } from './json-document';
import { jsonText, sortedRecord } from './json-text';
import type { ParseResult } from './parse-result';

export const pinsDocumentSchema = z.strictObject({
  format: z.literal('pinloom.pins'),
  formatVersion: z.literal(1),
  pins: pinsSchema,
});

/** Reads pins. Whether ops and tiles exist depends on kernel and fabric. */
export function parsePinsJson(text: string): ParseResult<Pins> {
  const parsed = parseJsonDocument(text, pinsDocumentSchema);
  return parsed.ok ? { ok: true, value: parsed.value.pins } : parsed;
}

/** The same pins always give the same text; reading it gives the pins back. */
export const writePinsJson = (pins: Pins): string =>
  jsonText({ format: 'pinloom.pins', formatVersion: 1, pins: sortedRecord(pins) });
