/** The parts that mappings, benches and certificates are made of. */
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

export type Placement = z.infer<typeof placementSchema>;
export type Routes = z.infer<typeof routesSchema>;
export type Pins = z.infer<typeof pinsSchema>;
