/** Solves as the web process sees them. The worker's side: solve-work.ts. */
import { and, desc, eq, inArray, type SQL, sql } from 'drizzle-orm';
import type { Id } from '../../lib/ids';
import type { Pins, Placement } from '../../lib/mapping/mapping';
import { err, ok, type Result } from '../../lib/result';
import type { Tx } from '../client';
import { newId } from '../ids';
import { mappingDrafts, solveJobs } from '../schema';
import type {
  SolveAsk,
  SolveBest,
  SolveEnd,
  SolveHistoryPoint,
  SolveSettings,
  SolveState,
} from '../schema/solve-jobs';

interface OneSolve {
  workspaceId: Id<'workspace'>;
  solveId: Id<'solve'>;
}

type AskView<Asked> = Asked extends { than: Placement[] } ? Omit<Asked, 'than'> : Asked;
export interface SettingsView extends Omit<SolveSettings, 'ask'> {
  ask?: AskView<SolveAsk>;
}

export interface SolveView {
  id: Id<'solve'>;
  draftId: Id<'draft'>;
  state: SolveState;
  /** Without the placements that are to be avoided: they are many, and a view is read again and again. */
  settings: SettingsView;
  pins: Pins;
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
  settings: sql<SettingsView>`${solveJobs.settings} #- '{ask,than}'`.mapWith(solveJobs.settings),
  pins: solveJobs.pins,
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
 * Makes a solve of a bench. When the bench has one that is queued or running, that one is the answer, whatever
 * it was asked, and `created` is false. The caller then hands the id to the queue.
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
): Promise<Result<{ id: Id<'solve'>; created: boolean; asks: SolveAsk['kind'] | null }, 'not_found'>> {
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
  if (made[0]) return ok({ id: made[0].id, created: true, asks: of.settings.ask?.kind ?? null });
  const [live] = await tx
    .select({ id: solveJobs.id, settings: solveJobs.settings })
    .from(solveJobs)
    .where(and(eq(solveJobs.mappingDraftId, of.draftId), inArray(solveJobs.state, ['queued', 'running'])));
  // It ended between the two statements: the next press makes a new one.
  return live ? ok({ id: live.id, created: false, asks: live.settings.ask?.kind ?? null }) : err('not_found');
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

/**
 * The bench's last solve for the best mapping, and the last of other questions where no ordinary one was asked for since.
 * A live one is among them, being the newest.
 */
export async function lastSolves(
  tx: Tx,
  of: { workspaceId: Id<'workspace'>; draftId: Id<'draft'> },
): Promise<{ ordinary: Id<'solve'> | null; asked: Id<'solve'> | null }> {
  const isOrdinary = sql<boolean>`${solveJobs.settings} -> 'ask' is null`;
  const newest = (where?: SQL) =>
    tx
      .select({ id: solveJobs.id, isOrdinary })
      .from(solveJobs)
      .where(and(eq(solveJobs.workspaceId, of.workspaceId), eq(solveJobs.mappingDraftId, of.draftId), where))
      .orderBy(desc(solveJobs.createdAt))
      .limit(1);
  const [[last], [ordinary]] = await Promise.all([newest(), newest(isOrdinary)]);
  return { ordinary: ordinary?.id ?? null, asked: last && !last.isOrdinary ? last.id : null };
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
