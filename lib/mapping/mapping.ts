/** The mapping document: where each op sits and which links each net takes. */
import { z } from 'zod';
import { linkIdSchema, tileIdSchema } from '../fabric/fabric';
import { opIdSchema } from '../graph/kernel';

/** Op to tile. Partial while a person works; complete when R1 holds. */
export const placementSchema = z.record(opIdSchema, tileIdSchema);
/** The source op of a net to the directed links of its tree. A net within one PE has no entry or an empty one. */
export const routesSchema = z.record(opIdSchema, z.array(linkIdSchema).max(8192));
export const pinsSchema = z.record(opIdSchema, tileIdSchema);

export const objectives = ['wire', 'path'] as const;
export type Objective = (typeof objectives)[number];

/** Who or what made a mapping, and what was proved of it. */
export const provenanceSchema = z.discriminatedUnion('by', [
  z.strictObject({ by: z.literal('hand') }),
  z.strictObject({
    by: z.literal('solver'),
    engine: z.string().max(80),
    objective: z.enum(objectives),
    timeLimitMs: z.number().int().positive(),
    seed: z.number().int().nonnegative(),
    status: z.enum(['optimal', 'feasible']),
    objectiveValue: z.number(),
    bound: z.number(),
    elapsedMs: z.number().nonnegative(),
    /** The placement was changed by hand after the solve, so status and bound speak of the solve only. */
    changedByHand: z.boolean(),
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

export type Placement = z.infer<typeof placementSchema>;
export type Routes = z.infer<typeof routesSchema>;
export type Pins = z.infer<typeof pinsSchema>;
export type Provenance = z.infer<typeof provenanceSchema>;
export type MappingDocument = z.infer<typeof mappingSchema>;
