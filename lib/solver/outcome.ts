/** What a solve ends with: one of four outcomes, every number finite. */
import type { TileId } from '../fabric/fabric';
import type { EdgeId, OpId } from '../graph/kernel';
import type { Certificate } from '../mapping/certificate';
import type { Objective, Placement, Routes } from '../mapping/mapping';

/** Why a solve that proved nothing more has ended. */
export type StopReason =
  | 'time limit'
  | 'node limit'
  | 'stopped'
  | 'memory limit'
  | 'model too large'
  | 'search complete'
  | 'another found'
  | 'routing gap'
  | 'weights too far apart'
  | 'thread failed';

export type InfeasibleCode =
  | 'too few tiles'
  | 'pin conflict'
  | 'out of reach'
  | 'too few channels'
  | 'proved by search'
  | 'no other';

/** Why no legal mapping exists, in words that tell a person what to change. */
export interface InfeasibleReason {
  code: InfeasibleCode;
  message: string;
  opIds: OpId[];
  tileIds: TileId[];
  edgeIds: EdgeId[];
}

interface OutcomeBase {
  /** The engines that took part, such as `search + highs`. */
  engine: string;
  objective: Objective;
  elapsedMs: number;
  seed: number;
  /** Nodes that the exact search looked at. */
  nodes: number;
  /** What proves it: null where nothing is proved, and where the thread was lost before it could be said. */
  certificate: Certificate | null;
}

export interface OptimalOutcome extends OutcomeBase {
  status: 'optimal';
  objectiveValue: number;
  /** Equals the objective value. */
  bound: number;
  gapRatio: 0;
  stopReason: 'proved optimal';
  placement: Placement;
  routes: Routes;
  reason: null;
  explanation: null;
}

export interface FeasibleOutcome extends OutcomeBase {
  status: 'feasible';
  objectiveValue: number;
  /** No legal mapping, routes included, has a smaller objective. */
  bound: number;
  /** (objective − bound) / objective. */
  gapRatio: number;
  stopReason: StopReason;
  placement: Placement;
  routes: Routes;
  reason: null;
  explanation: null;
}

export interface InfeasibleOutcome extends OutcomeBase {
  status: 'infeasible';
  objectiveValue: null;
  bound: null;
  gapRatio: null;
  stopReason: 'proved infeasible';
  placement: null;
  routes: null;
  /** The explanation's message. */
  reason: string;
  explanation: InfeasibleReason;
}

export interface UnknownOutcome extends OutcomeBase {
  status: 'unknown';
  objectiveValue: null;
  bound: number;
  gapRatio: null;
  stopReason: StopReason;
  placement: null;
  routes: null;
  reason: string;
  explanation: null;
}

export type SolveOutcome = OptimalOutcome | FeasibleOutcome | InfeasibleOutcome | UnknownOutcome;

/** A legal mapping that was routed and passed the verifier. */
export interface BestMapping {
  objectiveValue: number;
  longestPathHops: number;
  placement: Placement;
  routes: Routes;
}

export type SolvePhase = 'presolve' | 'search' | 'bound' | 'exact' | 'ties' | 'routes';

export interface SolveProgress {
  phase: SolvePhase;
  best: BestMapping | null;
  bound: number;
  gapRatio: number | null;
  elapsedMs: number;
  /** Nodes that the exact search has looked at. */
  nodes: number;
}

/** (objective − bound) / objective, and 0 where both are 0; null without an objective. */
export function gapRatioOf(objectiveValue: number | null, bound: number): number | null {
  if (objectiveValue === null) return null;
  if (objectiveValue <= bound) return 0;
  return (objectiveValue - bound) / objectiveValue;
}
