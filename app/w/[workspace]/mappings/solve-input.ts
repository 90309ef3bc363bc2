/** What a request for a solve may ask for. */
import { z } from 'zod';
import { idSchema } from '@/lib/ids';
import { objectives, pinsSchema, placementSchema } from '@/lib/mapping/mapping';
import { weightsSchema } from '@/lib/mapping/weights';
import { engineChoices, SOLVE_LIMITS } from '@/lib/solver/options';
import { askSchema } from '@/lib/solver/solve-ask';

const LONGEST_MS = 600_000;

export const solveInput = z.object({
  workspace: z.string(),
  draftId: idSchema('draft'),
  settings: z.strictObject({
    engine: z.enum(engineChoices),
    objective: z.enum(objectives),
    weights: weightsSchema.optional(),
    timeLimitMs: z.number().int().min(1000, 'At least 1 second').max(LONGEST_MS, 'At most 10 minutes'),
    seed: z.number().int().min(0).max(SOLVE_LIMITS.seed),
    ask: askSchema.optional(),
  }),
  /** Of the bench as it is, also where the question supposes others. */
  pins: pinsSchema,
  startPlacement: placementSchema.nullable(),
});
