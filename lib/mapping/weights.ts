/** Weights of nets and connections in the objective. What is not named weighs 1. */
import { z } from 'zod';
import { type EdgeId, edgeIdSchema, type Kernel, type OpId, opIdSchema } from '../graph/kernel';
import { netsOf } from '../graph/nets';
import type { Objective } from './placement';

export const MOST_WEIGHT = 1e9;

/** 0 is allowed: such a net still has to be routed, but costs nothing. */
export const weightSchema = z.number().min(0).max(MOST_WEIGHT);

export const weightsSchema = z.strictObject({
  /** By the net's source op, for the objective `wire`. */
  nets: z.record(opIdSchema, weightSchema).optional(),
  /** By connection, for the objective `path`. */
  edges: z.record(edgeIdSchema, weightSchema).optional(),
});
export type Weights = z.infer<typeof weightsSchema>;

export const netWeight = (weights: Weights | undefined, source: OpId): number => weights?.nets?.[source] ?? 1;
export const edgeWeight = (weights: Weights | undefined, edge: EdgeId): number => weights?.edges?.[edge] ?? 1;

/** Those weights of the objective that are not 1, by id. */
export function unequalWeights(weights: Weights | undefined, objective: Objective): [string, number][] {
  const named = objective === 'wire' ? weights?.nets : weights?.edges;
  return Object.entries(named ?? {}).filter(([, weight]) => weight !== 1);
}

/** Whether the objective is another one than the plain sum of hops. */
export const isWeighted = (weights: Weights | undefined, objective: Objective): boolean =>
  unequalWeights(weights, objective).length > 0;

/** What of the weights makes the objective, and nothing else; undefined where that is nothing. */
export function effectiveWeights(weights: Weights | undefined, objective: Objective): Weights | undefined {
  const unequal = unequalWeights(weights, objective);
  if (unequal.length === 0) return undefined;
  const named = Object.fromEntries(unequal);
  return objective === 'wire' ? { nets: named } : { edges: named };
}

/** What a value of the objective counts, for people. */
export const objectiveName = (objective: Objective, weights?: Weights): string =>
  `${isWeighted(weights, objective) ? 'weighted ' : ''}${objective} hops`;

/** Whether two sets of weights make the same objective. */
export function sameWeights(a: Weights | undefined, b: Weights | undefined, objective: Objective): boolean {
  const [left, right] = [unequalWeights(a, objective), new Map(unequalWeights(b, objective))];
  return left.length === right.size && left.every(([id, weight]) => right.get(id) === weight);
}

export interface WeightFault {
  id: string;
  message: string;
}

/** Weights of nets and connections that the kernel does not have. */
export function weightFaults(kernel: Kernel, weights: Weights): WeightFault[] {
  const ops = new Set<string>(kernel.ops.map((op) => op.id));
  const sources = new Set<string>(netsOf(kernel).map((net) => net.source));
  const edges = new Set<string>(kernel.edges.map((edge) => edge.id));
  const nets = Object.keys(weights.nets ?? {}).flatMap((id): WeightFault[] => {
    if (sources.has(id)) return [];
    const message = ops.has(id)
      ? `A weight names the net of ${id}, but that op feeds no other op: remove the weight.`
      : `A weight names the net of ${id}, an op that the kernel does not have: remove the weight.`;
    return [{ id, message }];
  });
  const connections = Object.keys(weights.edges ?? {}).flatMap((id): WeightFault[] =>
    edges.has(id)
      ? []
      : [
          {
            id,
            message: `A weight names the connection ${id}, which the kernel does not have: remove the weight.`,
          },
        ],
  );
  return [...nets, ...connections];
}
