/** What the bench knows of a solve, as the server tells it, and the words for it. */
import { z } from 'zod';
import { tileIdSchema } from '@/lib/fabric/fabric';
import { opIdSchema } from '@/lib/graph/kernel';
import { certificateSchema } from '@/lib/mapping/certificate';
import {
  type Objective,
  objectives,
  type Placement,
  type Provenance,
  pinsSchema,
  placementSchema,
  type Routes,
  routesSchema,
} from '@/lib/mapping/mapping';
import {
  effectiveWeights,
  isWeighted,
  objectiveName,
  type Weights,
  weightsSchema,
} from '@/lib/mapping/weights';
import { engineChoices } from '@/lib/solver/options';

const explanationSchema = z
  .object({ code: z.string(), opIds: z.array(z.string()), tileIds: z.array(z.string()) })
  .nullish();

const solveSettingsSchema = z.object({
  engine: z.enum(engineChoices),
  objective: z.enum(objectives),
  weights: weightsSchema.optional(),
  timeLimitMs: z.number(),
  seed: z.number(),
});
export type SolveSettings = z.infer<typeof solveSettingsSchema>;
export const firstSettings: SolveSettings = {
  objective: 'wire',
  engine: 'auto',
  timeLimitMs: 20_000,
  seed: 1,
};

const answerSchema = z.object({
  status: z.enum(['optimal', 'feasible', 'infeasible', 'unknown']),
  objective: z.enum(objectives),
  objectiveValue: z.number().nullable(),
  bound: z.number().nullable(),
});

/** What a solve was asked, if not for the best mapping. */
const askViewSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('another'), objectiveValue: z.number() }),
  z.object({
    kind: z.literal('pin price'),
    op: opIdSchema,
    tile: tileIdSchema,
    side: z.enum(['with pin', 'without pin']),
    isPinned: z.boolean(),
    other: answerSchema.extend({ solveId: z.string().nullable() }),
  }),
]);
export type AskView = z.infer<typeof askViewSchema>;

export const solveSchema = z.object({
  id: z.string(),
  state: z.enum(['queued', 'running', 'done', 'failed', 'cancelled']),
  settings: solveSettingsSchema.extend({ ask: askViewSchema.optional() }),
  pins: pinsSchema,
  cancelRequested: z.boolean(),
  phase: z.string(),
  bestObjective: z.number().nullable(),
  bound: z.number().nullable(),
  gapRatio: z.number().nullable(),
  elapsedMs: z.number(),
  nodes: z.number(),
  best: z.object({ objectiveValue: z.number(), placement: placementSchema, routes: routesSchema }).nullable(),
  history: z.array(
    z.object({ elapsedMs: z.number(), best: z.number().nullable(), bound: z.number().nullable() }),
  ),
  outcome: z
    .object({
      status: z.enum(['optimal', 'feasible', 'infeasible', 'unknown']),
      engine: z.string(),
      elapsedMs: z.number(),
      objectiveValue: z.number().nullable(),
      bound: z.number().nullable(),
      gapRatio: z.number().nullable(),
      stopReason: z.string().nullable(),
      reason: z.string().nullable(),
      explanation: explanationSchema,
      certificate: certificateSchema.nullish(),
    })
    .nullable(),
});
export type Solve = z.infer<typeof solveSchema>;

export const isLive = (solve: Pick<Solve, 'state'>): boolean =>
  solve.state === 'queued' || solve.state === 'running';

export interface SolveResult {
  placement: Placement;
  routes: Routes;
  provenance: Provenance;
}

/** What a finished solve would put on the bench; null while it runs or when it found nothing. */
export function solveResult(solve: Solve): SolveResult | null {
  const { best, outcome, settings } = solve;
  if (isLive(solve) || !best) return null;
  const bound = outcome?.bound ?? solve.bound ?? 0;
  const weights = effectiveWeights(settings.weights, settings.objective);
  return {
    placement: best.placement,
    routes: best.routes,
    provenance: {
      by: 'solver',
      engine: outcome?.engine ?? settings.engine,
      objective: settings.objective,
      ...(weights && { weights }),
      timeLimitMs: settings.timeLimitMs,
      seed: settings.seed,
      status: outcome?.status === 'optimal' ? 'optimal' : 'feasible',
      objectiveValue: best.objectiveValue,
      bound: Math.min(bound, best.objectiveValue),
      elapsedMs: outcome?.elapsedMs ?? solve.elapsedMs,
      changedByHand: false,
      ...(outcome?.certificate && { certificate: outcome.certificate }),
    },
  };
}

/** How the search for another mapping has ended. */
export function anotherSentence(solve: Solve): string {
  const { outcome, state, best, settings } = solve;
  if (best) {
    const hops = objectiveName(settings.objective, settings.weights);
    return `Another mapping of ${valueText(best.objectiveValue)} ${hops} was found; it is offered beside the fabric.`;
  }
  if (outcome?.explanation?.code === 'no other') return 'There is no other, besides mirror images.';
  if (state === 'cancelled') return 'It was stopped before another one was found; there may be one.';
  return outcome?.reason ?? 'None was found; there may be one.';
}

/** 0.4 s, 12 s, 3 min 20 s. */
export function durationText(elapsedMs: number): string {
  const seconds = elapsedMs / 1000;
  if (seconds < 10) return `${seconds.toFixed(1)} s`;
  if (seconds < 100) return `${Math.round(seconds)} s`;
  return `${Math.floor(seconds / 60)} min ${Math.round(seconds % 60)} s`;
}

/** How far a value may lie above the best possible, in words. */
export function gapText(value: number, bound: number): string {
  if (value <= bound) return 'no better one is possible';
  if (bound <= 0) return 'no useful bound yet';
  const percent = (100 * (value - bound)) / value;
  return percent < 0.01 ? 'gap below 0.01 %' : `gap at most ${Math.ceil(percent)} %`;
}

/** "weighted wire hops", with a capital where it begins a label. */
export function objectiveLabel(objective: Objective, weights?: Weights): string {
  const name = objectiveName(objective, weights);
  return name.charAt(0).toUpperCase() + name.slice(1);
}

/** Without the noise of sums of decimal fractions. */
export const valueText = (value: number): string => String(Math.round(value * 1e6) / 1e6);

/** A proven bound, never shown higher than it is; whole where all hops count 1. */
export const boundText = (bound: number, objective: Objective, weights?: Weights): string =>
  String(isWeighted(weights, objective) ? Math.floor(bound * 1e6 + 1e-3) / 1e6 : Math.ceil(bound - 1e-6));

const phases: Record<string, string> = {
  presolve: 'Looking for what cannot fit',
  search: 'Searching for good placements',
  bound: 'Raising the lower bound',
  exact: 'Proving by exact search',
  ties: 'Looking for shorter longest paths',
  routes: 'Finding routes',
};
export const phaseText = (phase: string): string => phases[phase] ?? 'Waiting for a worker';

const stops: Record<string, string> = {
  'time limit': 'the time was up',
  'node limit': 'the exact search reached its node limit',
  stopped: 'it was stopped',
  'memory limit': 'memory ran out',
  'model too large': 'the model is too large for the engine',
  'search complete': 'the search was complete',
  'another found': 'another one was found',
  'routing gap': 'routes and bound did not meet',
  'weights too far apart': 'the weights are too far apart to tell their last digits',
  'thread failed': 'its thread failed',
};
export const stopText = (reason: string | null): string => (reason === null ? '' : (stops[reason] ?? reason));
