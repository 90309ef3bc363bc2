/**
 * The worker program: takes solves from the queue, runs each in a thread, writes progress and the best mapping to the
 * solve's row. Any number of workers may run, on any machines; each needs only DATABASE_URL.
 */
import { hostname } from 'node:os';
import type PgBoss from 'pg-boss';
import pino from 'pino';
import { closeDatabase, database, databaseUrl } from '../db/client';
import { beat, forgetWorker, sweepSolves } from '../db/queries/solve-work';
import { SOLVE_QUEUE, type SolveMessage, sendSolve, startQueue } from '../db/queue';
import { tidy } from '../db/tidy';
import { runSolveJob } from './worker/run-solve-job';

const BEAT_MS = 5000;
const SWEEP_MS = 2000;
const TIDY_MS = 3_600_000;
const POLL_SECONDS = 0.5;
/** How long a stop waits for the running solve to hand in its best. */
const STOP_WITHIN_MS = 5000;

const worker = `${hostname()}:${process.pid}`;
const log = pino({ base: { program: 'worker', worker }, level: process.env.LOG_LEVEL ?? 'info' });
const stopping = new AbortController();

/** Runs `work` again and again until the worker stops; a failure is logged and the next turn tries again. */
function every(intervalMs: number, name: string, work: () => Promise<void>): void {
  const turn = async () => {
    try {
      await work();
    } catch (error) {
      log.error({ err: error }, `${name} failed`);
    }
    if (!stopping.signal.aborted) setTimeout(turn, intervalMs);
  };
  void turn();
}

async function sweep(boss: PgBoss): Promise<void> {
  const { resend, ended } = await sweepSolves(database());
  for (const id of ended) log.warn({ solve: id }, 'gave up a solve whose workers were lost');
  for (const job of resend) {
    log.warn({ solve: job.id }, 'sent a solve again');
    await sendSolve(boss, job);
  }
}

async function main(): Promise<void> {
  const boss = await startQueue(databaseUrl(), 'worker', (error) => log.error({ err: error }, 'queue'));
  every(BEAT_MS, 'heartbeat', () => beat(database(), worker));
  every(SWEEP_MS, 'sweep', () => sweep(boss));
  every(TIDY_MS, 'tidying up', () => tidy(database(), new Date()));
  await boss.work<SolveMessage>(
    SOLVE_QUEUE,
    { pollingIntervalSeconds: POLL_SECONDS, batchSize: 1 },
    async ([job]) => {
      if (job) await runSolveJob({ solveId: job.data.jobId, worker, log, stopping: stopping.signal });
    },
  );
  log.info('ready');

  const stop = async (signal: string) => {
    if (stopping.signal.aborted) return;
    log.info({ signal }, 'stopping');
    stopping.abort();
    await boss.stop({ graceful: true, wait: true, timeout: STOP_WITHIN_MS });
    await forgetWorker(database(), worker).catch(() => {});
    await closeDatabase();
    process.exit(0);
  };
  process.on('SIGTERM', stop);
  process.on('SIGINT', stop);
}

main().catch((error: unknown) => {
  log.fatal({ err: error }, 'the worker could not start');
  process.exit(1);
});
