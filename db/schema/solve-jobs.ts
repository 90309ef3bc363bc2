import { sql } from 'drizzle-orm';
import {
  bigint,
  boolean,
  check,
  doublePrecision,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  text,
  unique,
  uniqueIndex,
} from 'drizzle-orm/pg-core';
import type { Id } from '../../lib/ids';
import type { Certificate } from '../../lib/mapping/certificate';
import type { Objective, Pins, Placement, Routes } from '../../lib/mapping/mapping';
import type { Weights } from '../../lib/mapping/weights';
import type { InfeasibleReason } from '../../lib/solver/outcome';
import type { Answer } from '../../lib/solver/pin-price';
import type { Ask, PinPriceAsk } from '../../lib/solver/solve-ask';
import { createdAt, instant } from './columns';
import { fabricVersions } from './fabric-versions';
import { kernelVersions } from './kernel-versions';
import { mappingDrafts } from './mapping-drafts';
import { users } from './users';

export const solveStates = ['queued', 'running', 'done', 'failed', 'cancelled'] as const;
export type SolveState = (typeof solveStates)[number];

export interface SolveSettings {
  engine: 'auto' | 'program' | 'highs' | 'simplex' | 'search';
  objective: Objective;
  /** What nets or connections count in the objective; absent where all count 1. */
  weights?: Weights;
  timeLimitMs: number;
  seed: number;
  /** Another question than the one for the best mapping; absent in an ordinary solve. */
  ask?: SolveAsk;
}

/** As it was asked, with what earlier solves of the bench had shown by then. */
export type SolveAsk = (
  | Extract<Ask, { kind: 'another' }>
  /** `isPinned`: the bench itself has the pin, so that the side without it is the supposed one. */
  | (PinPriceAsk & { isPinned: boolean; other: KnownSide })
) & {
  /** No legal mapping with the solve's pins is cheaper. */
  provenBound: number;
};

/** What is known of the other side, and the solve whose mapping its objective is; null where it is the bench's own. */
export type KnownSide = Answer & { solveId: Id<'solve'> | null };

export interface SolveBest {
  objectiveValue: number;
  placement: Placement;
  routes: Routes;
}

/** Best value and lower bound at one moment; null while there is none. */
export interface SolveHistoryPoint {
  elapsedMs: number;
  best: number | null;
  bound: number | null;
}

/** How a solve ended, without its placement: that is `best`. */
export interface SolveEnd {
  status: 'optimal' | 'feasible' | 'infeasible' | 'unknown';
  engine: string;
  elapsedMs: number;
  /** Nodes that the exact search looked at. */
  nodes: number;
  objectiveValue: number | null;
  bound: number | null;
  gapRatio: number | null;
  stopReason: string | null;
  /** Why nothing fits, or what went wrong; plain sentences for the person at the bench. */
  reason: string | null;
  /** The ops, tiles and connections that the reason names, to be shown on the bench; null unless infeasible. */
  explanation: InfeasibleReason | null;
  /** What proves it; null where nothing is proved, absent in solves of a time without certificates. */
  certificate?: Certificate | null;
}

/** One request to the solver. The queue delivers its id; what it is and how far it came stands here. */
export const solveJobs = pgTable(
  'solve_jobs',
  {
    id: text('id').$type<Id<'solve'>>().primaryKey(),
    workspaceId: text('workspace_id').$type<Id<'workspace'>>().notNull(),
    mappingDraftId: text('mapping_draft_id').$type<Id<'draft'>>().notNull(),
    kernelVersionId: text('kernel_version_id').$type<Id<'kernelversion'>>().notNull(),
    fabricVersionId: text('fabric_version_id').$type<Id<'fabricversion'>>().notNull(),
    requestedBy: text('requested_by')
      .$type<Id<'user'>>()
      .notNull()
      .references(() => users.id),
    state: text('state').$type<SolveState>().notNull().default('queued'),
    settings: jsonb('settings').$type<SolveSettings>().notNull(),
    pins: jsonb('pins').$type<Pins>().notNull(),
    /** The placement to begin from; null: from nothing. */
    startPlacement: jsonb('start_placement').$type<Placement>(),
    /** A person asked for the end; the worker stops and keeps the best. */
    cancelRequested: boolean('cancel_requested').notNull().default(false),
    /** The worker that has or had it; null while queued. */
    worker: text('worker'),
    /** Counts the times it was taken. Every write of a worker names its attempt, so a late one changes nothing. */
    attempt: integer('attempt').notNull().default(0),
    /** The worker is thought lost after this moment; null unless running. */
    leaseUntil: instant('lease_until'),
    bossJobId: text('boss_job_id'),
    phase: text('phase').notNull().default(''),
    bestObjective: doublePrecision('best_objective'),
    bound: doublePrecision('bound'),
    gapRatio: doublePrecision('gap_ratio'),
    elapsedMs: integer('elapsed_ms').notNull().default(0),
    /** Nodes that the exact search has looked at. */
    nodes: bigint('nodes', { mode: 'number' }).notNull().default(0),
    best: jsonb('best').$type<SolveBest>(),
    history: jsonb('history').$type<SolveHistoryPoint[]>().notNull().default([]),
    /** Null until finished. */
    outcome: jsonb('outcome').$type<SolveEnd>(),
    createdAt: createdAt(),
    startedAt: instant('started_at'),
    finishedAt: instant('finished_at'),
  },
  (t) => [
    foreignKey({
      name: 'solve_jobs_draft_fk',
      columns: [t.workspaceId, t.mappingDraftId],
      foreignColumns: [mappingDrafts.workspaceId, mappingDrafts.id],
    }).onDelete('cascade'),
    foreignKey({
      name: 'solve_jobs_kernel_version_fk',
      columns: [t.workspaceId, t.kernelVersionId],
      foreignColumns: [kernelVersions.workspaceId, kernelVersions.id],
    }),
    foreignKey({
      name: 'solve_jobs_fabric_version_fk',
      columns: [t.workspaceId, t.fabricVersionId],
      foreignColumns: [fabricVersions.workspaceId, fabricVersions.id],
    }),
    unique('solve_jobs_workspace_id_unique').on(t.workspaceId, t.id),
    // One live solve per bench: a second click finds the first one.
    uniqueIndex('solve_jobs_one_live').on(t.mappingDraftId).where(sql`state in ('queued', 'running')`),
    index('solve_jobs_live').on(t.state, t.leaseUntil).where(sql`state in ('queued', 'running')`),
    check('solve_jobs_state', sql`${t.state} in ('queued', 'running', 'done', 'failed', 'cancelled')`),
    check('solve_jobs_lease', sql`(${t.state} = 'running') = (${t.leaseUntil} is not null)`),
    check(
      'solve_jobs_finished',
      sql`(${t.state} in ('done', 'failed', 'cancelled')) = (${t.finishedAt} is not null)`,
    ),
    check(
      'solve_jobs_history',
      sql`jsonb_typeof(${t.history}) = 'array' and jsonb_array_length(${t.history}) <= 400`,
    ),
  ],
);
