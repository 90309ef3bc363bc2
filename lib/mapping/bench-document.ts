/** What the bench saves while a person works: a placement that may be partial, its pins and its routes. */
import { z } from 'zod';
import { pinsSchema, placementSchema, routesSchema } from './mapping';

export const benchDocumentSchema = z.strictObject({
  placement: placementSchema,
  pins: pinsSchema,
  routes: routesSchema,
});

export type BenchDocument = z.infer<typeof benchDocumentSchema>;

export const emptyBenchDocument: BenchDocument = { placement: {}, pins: {}, routes: {} };
