/** The queue that carries solves from the web process to a worker: pg-boss on our own PostgreSQL. */
import PgBoss from 'pg-boss';
import type { Id } from '../lib/ids';

export const SOLVE_QUEUE = 'solve';
/** What a job may take beyond its own time limit (loading, verifying, saving) before the queue gives it to another. */
export const SOLVE_MARGIN_SECONDS = 60;

export interface SolveMessage {
  jobId: Id<'solve'>;
}

export type QueueSide = 'sender' | 'worker';

/**
 * Starts the queue and returns it; the caller stops it with `boss.stop()`.
 * Only a worker supervises (expiry, retries, clean-up); a sender just sends.
 */
export async function startQueue(
  url: string,
  side: QueueSide,
  onError: (error: Error) => void,
): Promise<PgBoss> {
  const boss = new PgBoss({
    connectionString: url,
    application_name: `pinloom queue ${side}`,
    max: side === 'worker' ? 4 : 2,
    supervise: side === 'worker',
    schedule: false,
    archiveCompletedAfterSeconds: 3600,
    deleteAfterDays: 7,
  });
  boss.on('error', onError);
  await boss.start();
  await createSolveQueue(boss);
  return boss;
}

async function createSolveQueue(boss: PgBoss): Promise<void> {
  // A second creation of the same queue changes nothing.
  await boss.createQueue(SOLVE_QUEUE, {
    name: SOLVE_QUEUE,
    policy: 'standard',
    retryLimit: 2,
    retryDelay: 1,
    expireInSeconds: 3600,
  });
}

/** Puts a solve in the queue; returns the queue's own id of it. */
export function sendSolve(
  boss: PgBoss,
  job: { id: Id<'solve'>; timeLimitMs: number },
): Promise<string | null> {
  const message: SolveMessage = { jobId: job.id };
  return boss.send(SOLVE_QUEUE, message, {
    expireInSeconds: Math.ceil(job.timeLimitMs / 1000) + SOLVE_MARGIN_SECONDS,
  });
}
