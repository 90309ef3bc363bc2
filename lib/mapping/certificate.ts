/**
 * The certificate document: what proves an answer, and all that is needed to derive it again. What is computed of it
 * is in lib/solver; the document stands here because mappings carry it.
 */
import { z } from 'zod';
import { objectives, pinsSchema, placementSchema } from './placement';
import { weightsSchema } from './weights';

export const engineChoices = ['auto', 'program', 'highs', 'simplex', 'search'] as const;
export type EngineChoice = (typeof engineChoices)[number];

/**
 * By what the last word was said. `counting`: hops that every mapping needs, or ops, pins, tiles and channels that
 * cannot go together. `bound of the stars`: what ops must at least pay to their neighbours. `exact search`: nothing is left to
 * try. `integer program`: an engine outside of the solver; nothing but its answer is known.
 */
export const proofMethods = ['counting', 'bound of the stars', 'exact search', 'integer program'] as const;
export type ProofMethod = (typeof proofMethods)[number];

const count = z.number().int().min(0);

export const certificateSchema = z
  .strictObject({
    format: z.literal('pinloom.certificate'),
    formatVersion: z.literal(1),
    /** Of the solver that proved it. Only the same version goes through the same nodes. */
    engineVersion: z.number().int().min(1),
    /** Of kernel, fabric, pins, objective and weights. */
    problemDigest: z
      .string()
      .regex(/^sha256:[0-9a-f]{64}$/, 'A digest is "sha256:" and 64 hexadecimal digits'),
    objective: z.enum(objectives),
    /** What nets or connections counted; absent where all counted 1. */
    weights: weightsSchema.optional(),
    pins: pinsSchema,
    /** The placement that the search began with; null: none was given. */
    start: placementSchema.nullable(),
    /** The choice of the options, not the engines that took part. */
    engine: z.enum(engineChoices),
    seed: count,
    /** Placements that the search had tried to route when the proof took over. */
    searchTries: count,
    status: z.enum(['optimal', 'infeasible']),
    /** Null where no mapping exists. */
    objectiveValue: z.number().nullable(),
    /** No legal mapping has a smaller objective; null where no mapping exists. */
    bound: z.number().nullable(),
    method: z.enum(proofMethods),
    /** That the exact search looked at. */
    nodes: count,
    /** Each says: no legal mapping costs at most `cutoff`, or none less than the best one found by then. */
    levels: z.array(z.strictObject({ cutoff: z.number(), nodes: count })).max(10_000),
    /** Choices of a tile for an op that were struck out because their bound exceeded a cutoff. */
    struckTiles: count,
    /** Only counts decided how the solve went: the same engine version comes to the same nodes and levels. */
    isRepeatable: z.boolean(),
  })
  .check((ctx) => {
    const { status, objectiveValue, bound, levels, nodes } = ctx.value;
    const fault = (path: string, message: string) =>
      void ctx.issues.push({ code: 'custom', path: [path], input: ctx.value, message });
    if (status === 'optimal' && objectiveValue === null) fault('objectiveValue', 'An optimum has a value');
    if (status === 'infeasible' && objectiveValue !== null) {
      fault('objectiveValue', 'Where no mapping exists there is no value');
    }
    if (bound !== objectiveValue) fault('bound', 'The bound of a proved answer equals its objective value');
    if (levels.reduce((sum, level) => sum + level.nodes, 0) > nodes) {
      fault('levels', 'The levels have more nodes than the whole search');
    }
  });

export type Certificate = z.infer<typeof certificateSchema>;
