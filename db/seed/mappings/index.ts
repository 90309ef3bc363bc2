/** The mappings of the demonstration: by hand and by the solver. */
import { z } from 'zod';
import { pinsSchema, placementSchema, provenanceSchema, routesSchema } from '../../../lib/mapping/mapping';
import { mappingsByHand } from './by-hand';
import type { DemoMapping } from './demo-mapping';
import solved from './solved.json';

export type { DemoMapping };

/** The file holds plain text where the documents have branded ids. */
const solvedSchema: z.ZodType<DemoMapping[]> = z.array(
  z.strictObject({
    name: z.string(),
    kernelSlug: z.string(),
    fabricKey: z.enum(['gauge', 'hive', 'slope']),
    madeBy: z.enum(['architect', 'compiler']),
    placement: placementSchema,
    pins: pinsSchema,
    routes: routesSchema,
    provenance: provenanceSchema,
    kept: z.boolean(),
  }),
);

export const demoMappings: readonly DemoMapping[] = [...mappingsByHand, ...solvedSchema.parse(solved)];
