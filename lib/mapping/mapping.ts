/** The mapping document: where each op sits and which links each net takes. */
import { z } from 'zod';
import { certificateSchema } from './certificate';
import { objectives, pinsSchema, placementSchema, routesSchema } from './placement';
import { weightsSchema } from './weights';

export {
  type Objective,
  objectives,
  type Pins,
  type Placement,
  pinsSchema,
  placementSchema,
  type Routes,
  routesSchema,
} from './placement';

/** Who or what made a mapping, and what was proved of it. */
export const provenanceSchema = z.discriminatedUnion('by', [
  z.strictObject({ by: z.literal('hand') }),
  z.strictObject({
    by: z.literal('solver'),
    engine: z.string().max(80),
    objective: z.enum(objectives),
    /** What nets or connections counted in it; absent where all counted 1. */
    weights: weightsSchema.optional(),
    timeLimitMs: z.number().int().positive(),
    seed: z.number().int().nonnegative(),
    status: z.enum(['optimal', 'feasible']),
    objectiveValue: z.number(),
    bound: z.number(),
    elapsedMs: z.number().nonnegative(),
    /** The placement was changed by hand after the solve, so status and bound speak of the solve only. */
    changedByHand: z.boolean(),
    /** Of the solve; absent where nothing was proved, and in mappings of a time without certificates. */
    certificate: certificateSchema.optional(),
  }),
]);

export const mappingSchema = z.strictObject({
  format: z.literal('pinloom.mapping'),
  formatVersion: z.literal(1),
  name: z.string().trim().min(1).max(80),
  kernel: z.strictObject({ name: z.string(), version: z.number().int().positive().nullable() }),
  fabric: z.strictObject({ name: z.string(), version: z.number().int().positive().nullable() }),
  placement: placementSchema,
  pins: pinsSchema,
  routes: routesSchema,
  provenance: provenanceSchema,
});

export type Provenance = z.infer<typeof provenanceSchema>;
export type MappingDocument = z.infer<typeof mappingSchema>;
