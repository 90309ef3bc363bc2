/** How long and with what a placement is solved. */
import { z } from 'zod';
import { engineChoices } from '../mapping/certificate';

export { type EngineChoice, engineChoices } from '../mapping/certificate';

export const SOLVE_LIMITS = {
  timeLimitMs: 3_600_000,
  nodeLimit: 1e9,
  seed: 2 ** 31 - 1,
  memoryLimitMb: 4096,
} as const;

export const solveOptionsSchema = z
  .strictObject({
    /**
     * `auto`: search, then the exact search. `program`: integer programs in its place, each with the engine for its size;
     * `highs` and `simplex` with that one only. `search` proves nothing.
     */
    engine: z.enum(engineChoices),
    timeLimitMs: z.number().int().min(1).max(SOLVE_LIMITS.timeLimitMs),
    seed: z.number().int().min(0).max(SOLVE_LIMITS.seed),
    /**
     * Nodes after which the exact search ends; null: no limit. It is looked at every few nodes. With it no pass is cut short
     * by its share of the time, so the answer depends on the machine's speed only where the time limit itself is reached.
     */
    nodeLimit: z.number().int().min(1).max(SOLVE_LIMITS.nodeLimit).nullable().default(null),
    /**
     * Placements that the search may try to route before the proof takes over; null: as many as its share of the time
     * allows. With the number of an earlier solve the proof begins from the same mapping.
     */
    searchTries: z.number().int().min(0).nullable().default(null),
  })
  .refine(({ engine, nodeLimit }) => nodeLimit === null || engine === 'auto', {
    path: ['nodeLimit'],
    message: 'Counts nodes of the exact search, so it needs the engine auto',
  });
export type SolveOptions = z.infer<typeof solveOptionsSchema>;

export const defaultSolveOptions: SolveOptions = {
  engine: 'auto',
  timeLimitMs: 30_000,
  seed: 1,
  nodeLimit: null,
  searchTries: null,
};
