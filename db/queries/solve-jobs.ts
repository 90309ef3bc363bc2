/** Solves as the web process sees them. The worker's side: solve-work.ts. */
import { and, desc, eq, inArray, sql } from 'drizzle-orm';
import type { Id } from '../../lib/ids';
import type { Pins, Placement } from '../../lib/mapping/mapping';
import { err, ok, type Result } from '../../lib/result';
import type { Tx } from '../client';
import { newId } from '../ids';
import { mappingDrafts, solveJobs } from '../schema';
import type { SolveBest, SolveEnd, SolveHistoryPoint, SolveSettings, SolveState } from '../schema/solve-jobs';

interface OneSolve {
  workspaceId: Id<'workspace'>;
  solveId: Id<'solve'>;
}

export interface SolveView {
  id: Id<'solve'>;
  draftId: Id<'draft'>;
  state: SolveState;
  settings: SolveSettings;
  cancelRequested: boolean;
  phase: string;
  bestObjective: number | null;
  bound: number | null;
  /** (best − bound) / best; null while either is missing. */
  gapRatio: number | null;
  elapsedMs: number;
  /** Nodes that the exact search has looked at. */
  nodes: number;
  best: SolveBest | null;
  history: SolveHistoryPoint[];
  outcome: SolveEnd | null;
  createdAt: Date;
  startedAt: Date | null;
  finishedAt: Date | null;
}

const columns = {
  id: solveJobs.id,
  draftId: solveJobs.mappingDraftId,
  state: solveJobs.state,
  settings: solveJobs.settings,
  cancelRequested: solveJobs.cancelRequested,
  phase: solveJobs.phase,
  bestObjective: solveJobs.bestObjective,
  bound: solveJobs.bound,
  gapRatio: solveJobs.gapRatio,
  elapsedMs: solveJobs.elapsedMs,
  nodes: solveJobs.nodes,
  best: solveJobs.best,
  history: solveJobs.history,
  outcome: solveJobs.outcome,
  createdAt: solveJobs.createdAt,
  startedAt: solveJobs.startedAt,
  finishedAt: solveJobs.finishedAt,
};
const one = (s: OneSolve) => and(eq(solveJobs.workspaceId, s.workspaceId), eq(solveJobs.id, s.solveId));

/**
 * Makes a solve of a bench. When the bench has one that is queued or running, that one is the answer and `created`
 * is false. The caller then hands the id to the queue.
 */
export async function createSolve(
  tx: Tx,
  of: {
    workspaceId: Id<'workspace'>;
    userId: Id<'user'>;
    draftId: Id<'draft'>;
    settings: SolveSettings;
    pins: Pins;
    startPlacement: Placement | null;
  },
): Promise<Result<{ id: Id<'solve'>; created: boolean }, 'not_found'>> {
  const [draft] = await tx
    .select({
      kernelVersionId: mappingDrafts.kernelVersionId,
      fabricVersionId: mappingDrafts.fabricVersionId,
    })
    .from(mappingDrafts)
    .where(and(eq(mappingDrafts.workspaceId, of.workspaceId), eq(mappingDrafts.id, of.draftId)));
  if (!draft) return err('not_found');
  const made = await tx
    .insert(solveJobs)
    .values({
      id: newId('solve'),
      workspaceId: of.workspaceId,
      mappingDraftId: of.draftId,
      ...draft,
      requestedBy: of.userId,
      settings: of.settings,
      pins: of.pins,
      startPlacement: of.startPlacement,
    })
    .onConflictDoNothing()
    .returning({ id: solveJobs.id });
  if (made[0]) return ok({ id: made[0].id, created: true });
  const [live] = await tx
    .select({ id: solveJobs.id })
    .from(solveJobs)
    .where(and(eq(solveJobs.mappingDraftId, of.draftId), inArray(solveJobs.state, ['queued', 'running'])));
  // It ended between the two statements: the next press makes a new one.
  return live ? ok({ id: live.id, created: false }) : err('not_found');
}

/** Remembers that the queue has taken the solve; one without this is sent again by the worker's sweep. */
export async function noteQueued(tx: Tx, of: OneSolve & { bossJobId: string }): Promise<void> {
  await tx.update(solveJobs).set({ bossJobId: of.bossJobId }).where(one(of));
}

export async function getSolve(tx: Tx, solve: OneSolve): Promise<SolveView | null> {
  const rows = await tx.select(columns).from(solveJobs).where(one(solve));
  return rows[0] ?? null;
}

/** The bench's solves, newest first. */
export function listSolves(
  tx: Tx,
  of: { workspaceId: Id<'workspace'>; draftId: Id<'draft'>; limit?: number },
): Promise<SolveView[]> {
  return tx
    .select(columns)
    .from(solveJobs)
    .where(and(eq(solveJobs.workspaceId, of.workspaceId), eq(solveJobs.mappingDraftId, of.draftId)))
    .orderBy(desc(solveJobs.createdAt))
    .limit(Math.min(of.limit ?? 20, 100));
}

/** Ends a queued solve at once and asks a running one to stop; the best found stays. Harmless when it is over. */
export async function requestCancel(
  tx: Tx,
  solve: OneSolve,
): Promise<Result<{ state: SolveState }, 'not_found'>> {
  const queued = sql`${solveJobs.state} = 'queued'`;
  const changed = await tx
    .update(solveJobs)
    .set({
      cancelRequested: true,
      state: sql`case when ${queued} then 'cancelled' else ${solveJobs.state} end`,
      finishedAt: sql`case when ${queued} then now() else ${solveJobs.finishedAt} end`,
    })
    .where(and(one(solve), inArray(solveJobs.state, ['queued', 'running'])))
    .returning({ state: solveJobs.state });
  if (changed[0]) return ok(changed[0]);
  const [over] = await tx.select({ state: solveJobs.state }).from(solveJobs).where(one(solve));
  return over ? ok(over) : err('not_found');
}
