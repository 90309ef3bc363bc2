/**
 * Solves as a worker sees them. A worker is trusted with every workspace, so nothing here asks for one, and nothing
 * here may be called for a person. Every write names worker and attempt: a worker that was thought lost changes
 * nothing when it wakes up.
 */
import { and, eq, sql } from 'drizzle-orm';
import type { Fabric } from '../../lib/fabric/fabric';
import type { Kernel } from '../../lib/graph/kernel';
import type { Id } from '../../lib/ids';
import type { Pins, Placement } from '../../lib/mapping/mapping';
import type { Tx } from '../client';
import { fabricVersions, kernelVersions, solveJobs, workerHeartbeats } from '../schema';
import type { SolveBest, SolveEnd, SolveHistoryPoint, SolveSettings } from '../schema/solve-jobs';

export const LEASE_SECONDS = 8;
export const MAX_ATTEMPTS = 3;
export const MAX_HISTORY_POINTS = 400;

/** What a worker holds of a job that it took. */
export interface Hold {
  solveId: Id<'solve'>;
  worker: string;
  attempt: number;
}

export interface TakenSolve extends Hold {
  kernel: Kernel;
  fabric: Fabric;
  settings: SolveSettings;
  pins: Pins;
  /** The best of an earlier attempt, else what the person had placed. */
  startPlacement: Placement | null;
  /** Of earlier attempts; new points follow. */
  history: SolveHistoryPoint[];
}

export interface SolveProgressNote {
  phase: string;
  bound: number | null;
  gapRatio: number | null;
  elapsedMs: number;
  nodes: number;
  /** Null: nothing better than what is stored. */
  best: SolveBest | null;
  history: SolveHistoryPoint[];
}

const held = (h: Hold) =>
  and(
    eq(solveJobs.id, h.solveId),
    eq(solveJobs.worker, h.worker),
    eq(solveJobs.attempt, h.attempt),
    eq(solveJobs.state, 'running'),
  );
const lease = sql`now() + make_interval(secs => ${LEASE_SECONDS})`;
const finite = (value: number | null) => (value !== null && Number.isFinite(value) ? value : null);

/** Takes a queued job, or a running one whose lease ended. Null: somebody else has it, or it is over. */
export async function takeSolve(
  tx: Tx,
  of: { solveId: Id<'solve'>; worker: string },
): Promise<TakenSolve | null> {
  return tx.transaction(async (inner) => {
    const taken = await inner
      .update(solveJobs)
      .set({
        state: 'running',
        worker: of.worker,
        attempt: sql`${solveJobs.attempt} + 1`,
        leaseUntil: lease,
        startedAt: sql`coalesce(${solveJobs.startedAt}, now())`,
      })
      .where(
        and(
          eq(solveJobs.id, of.solveId),
          sql`(${solveJobs.state} = 'queued' or (${solveJobs.state} = 'running' and ${solveJobs.leaseUntil} < now()))`,
          sql`not ${solveJobs.cancelRequested}`,
        ),
      )
      .returning({ attempt: solveJobs.attempt });
    if (!taken[0]) return null;
    const [job] = await inner
      .select({
        settings: solveJobs.settings,
        pins: solveJobs.pins,
        startPlacement: solveJobs.startPlacement,
        best: solveJobs.best,
        history: solveJobs.history,
        kernel: kernelVersions.document,
        fabric: fabricVersions.document,
      })
      .from(solveJobs)
      .innerJoin(kernelVersions, eq(kernelVersions.id, solveJobs.kernelVersionId))
      .innerJoin(fabricVersions, eq(fabricVersions.id, solveJobs.fabricVersionId))
      .where(eq(solveJobs.id, of.solveId));
    if (!job) return null;
    const { best, ...rest } = job;
    return { ...of, ...taken[0], ...rest, startPlacement: best?.placement ?? job.startPlacement };
  });
}

/**
 * Writes progress and renews the lease. `stop`: a person asked for the end, finish with the best.
 * `lost`: the job is no longer this worker's; stop at once and write nothing.
 */
export async function reportProgress(
  tx: Tx,
  hold: Hold,
  note: SolveProgressNote,
): Promise<'continue' | 'stop' | 'lost'> {
  const rows = await tx
    .update(solveJobs)
    .set({
      phase: note.phase,
      bound: finite(note.bound),
      gapRatio: finite(note.gapRatio),
      elapsedMs: Math.round(note.elapsedMs),
      nodes: note.nodes,
      history: thinned(note.history),
      leaseUntil: lease,
      ...(note.best ? { best: note.best, bestObjective: note.best.objectiveValue } : {}),
    })
    .where(held(hold))
    .returning({ cancelRequested: solveJobs.cancelRequested });
  if (!rows[0]) return 'lost';
  return rows[0].cancelRequested ? 'stop' : 'continue';
}

/** Ends the job. False: it was no longer this worker's, and nothing was written. */
export async function finishSolve(
  tx: Tx,
  hold: Hold,
  end: {
    state: 'done' | 'failed' | 'cancelled';
    outcome: SolveEnd;
    best: SolveBest | null;
    /** Up to the end; without it, what was reported last stays. */
    history?: SolveHistoryPoint[];
  },
): Promise<boolean> {
  const { outcome } = end;
  const rows = await tx
    .update(solveJobs)
    .set({
      state: end.state,
      outcome: { ...outcome, bound: finite(outcome.bound), gapRatio: finite(outcome.gapRatio) },
      bound: finite(outcome.bound),
      gapRatio: finite(outcome.gapRatio),
      elapsedMs: Math.round(outcome.elapsedMs),
      nodes: outcome.nodes,
      leaseUntil: null,
      finishedAt: sql`now()`,
      ...(end.history ? { history: thinned(end.history) } : {}),
      ...(end.best ? { best: end.best, bestObjective: end.best.objectiveValue } : {}),
    })
    .where(held(hold))
    .returning({ id: solveJobs.id });
  return rows.length === 1;
}

/** Hands a running job back, so that the next sweep gives it to another worker at once. */
export async function releaseSolve(tx: Tx, hold: Hold): Promise<void> {
  await tx.update(solveJobs).set({ leaseUntil: sql`now() - interval '1 second'` }).where(held(hold));
}

export interface Sweep {
  /** To be sent to the queue again. */
  resend: { id: Id<'solve'>; timeLimitMs: number }[];
  /** Ended: cancelled, or given up after MAX_ATTEMPTS. */
  ended: Id<'solve'>[];
}

/** Looks after jobs that nobody will finish: lost workers, and rows that never reached the queue. */
export function sweepSolves(tx: Tx): Promise<Sweep> {
  return tx.transaction(async (inner) => {
    const lost = sql`${solveJobs.state} = 'running' and ${solveJobs.leaseUntil} < now()`;
    const ended = await inner
      .update(solveJobs)
      .set({
        state: sql`case when ${solveJobs.cancelRequested} then 'cancelled' else 'failed' end`,
        leaseUntil: null,
        finishedAt: sql`now()`,
        outcome: sql`jsonb_build_object('status', 'unknown', 'engine', '', 'elapsedMs', ${solveJobs.elapsedMs}, 'nodes', ${solveJobs.nodes},
          'objectiveValue', ${solveJobs.bestObjective}, 'bound', ${solveJobs.bound}, 'gapRatio', ${solveJobs.gapRatio},
          'stopReason', case when ${solveJobs.cancelRequested} then 'stopped' else 'worker lost' end,
          'explanation', null, 'reason', case when ${solveJobs.cancelRequested} then null
            else 'The solver was interrupted ' || ${solveJobs.attempt} || ' times. The best placement found is kept; try again with a shorter time limit.' end)`,
      })
      .where(sql`${lost} and (${solveJobs.cancelRequested} or ${solveJobs.attempt} >= ${MAX_ATTEMPTS})`)
      .returning({ id: solveJobs.id });
    const again = await inner
      .update(solveJobs)
      .set({ state: 'queued', leaseUntil: null, bossJobId: 'sent again' })
      .where(
        sql`(${lost}) or (${solveJobs.state} = 'queued' and ${solveJobs.bossJobId} is null
          and ${solveJobs.createdAt} < now() - interval '30 seconds')`,
      )
      .returning({ id: solveJobs.id, settings: solveJobs.settings });
    return {
      ended: ended.map((job) => job.id),
      resend: again.map((job) => ({ id: job.id, timeLimitMs: job.settings.timeLimitMs })),
    };
  });
}

export async function beat(tx: Tx, worker: string): Promise<void> {
  await tx
    .insert(workerHeartbeats)
    .values({ worker })
    .onConflictDoUpdate({ target: workerHeartbeats.worker, set: { beatAt: sql`now()` } });
}

/** Forgets a worker that stopped by itself, and those silent for a day. */
export async function forgetWorker(tx: Tx, worker: string): Promise<void> {
  await tx
    .delete(workerHeartbeats)
    .where(
      sql`${workerHeartbeats.worker} = ${worker} or ${workerHeartbeats.beatAt} < now() - interval '1 day'`,
    );
}

/** Seconds since the youngest beat of any worker; null when there never was one. */
export async function workerAgeSeconds(tx: Tx): Promise<number | null> {
  const [row] = await tx
    .select({ age: sql<number | null>`extract(epoch from now() - max(${workerHeartbeats.beatAt}))::float8` })
    .from(workerHeartbeats);
  return row?.age ?? null;
}

/** At most MAX_HISTORY_POINTS: every second point goes until they fit; first and last stay. */
export function thinned(points: readonly SolveHistoryPoint[]): SolveHistoryPoint[] {
  let kept = [...points];
  while (kept.length > MAX_HISTORY_POINTS) {
    const last = kept.length - 1;
    kept = kept.filter((_, index) => index % 2 === 0 || index === last);
  }
  return kept;
}
